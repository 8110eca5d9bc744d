/**
 * Source: samples that are the quantiles of a known distribution at (i − ½)/n, normal quantiles from jstat (accurate at
 * ordinary levels), so that the family is known without a fit.
 */
import jstat from 'jstat';
import { expect, test } from 'vitest';
import { fitProduct } from '../../src/fit/product.js';
import type { AgeGroup } from '../../src/records.js';
import { agedProduct, configWith } from '../support/data.js';

const units = 200;

function sharesOf(quantile: (p: number) => number): Record<string, number> {
  const ages = Array.from({ length: units }, (_, i): AgeGroup => {
    const age = quantile((i + 0.5) / units);
    return { outcome: 'returned', from: age, to: age, exact: true, quantity: 1 };
  });
  const { candidates } = fitProduct(configWith(), agedProduct('S', ages));
  return Object.fromEntries(candidates.map((c) => [c.family, c.chosenShare as number]));
}

const families = [
  { name: 'lognormal', quantile: (p: number) => Math.exp(6 + 0.6 * jstat.normal.inv(p, 0, 1)) },
  { name: 'weibull', quantile: (p: number) => 500 * (-Math.log1p(-p)) ** (1 / 3) },
];

test.each(families)(
  'refits to a clear $name sample choose it most often, and the exponential never',
  (one) => {
    const { [one.name]: share, ...others } = sharesOf(one.quantile);
    expect(share).toBeGreaterThan(Math.max(...Object.values(others)));
    expect(share).toBeGreaterThan(0.5);
    expect(others.exponential).toBe(0);
  },
);
