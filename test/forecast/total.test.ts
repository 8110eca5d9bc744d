/**
 * The predictive distribution of a fitted product until warranty ends, and of the sum of two products: identities between
 * the draws and what is printed of them. Records: test/reference/warranty.json; quantile p is the smallest y with
 * G(y) ≥ p, counted here without sorting.
 */
import { describe, expect, test } from 'vitest';
import { drawsForForecast } from '../../src/fit/drawn.js';
import { fitProduct } from '../../src/fit/product.js';
import { forecastProduct, type ProductDraws } from '../../src/forecast/product.js';
import { totalForecast } from '../../src/forecast/total.js';
import type { PredictedCount, ProductRecords } from '../../src/records.js';
import { loadWarranty, type WarrantyScenario } from '../reference/load.js';
import { scenarioConfig, scenarioRecords } from '../support/warranty.js';

const draws = 1500;
const scenario = loadWarranty()[0] as WarrantyScenario;
const config = scenarioConfig(scenario, { draws, candidates: ['weibull'] });
const forecast = (records: ProductRecords): ProductDraws => {
  const fit = fitProduct(config, records);
  return forecastProduct(config, records, fit, drawsForForecast(config, records, fit));
};
const small = scenarioRecords(scenario, 'small');
const large = {
  ...scenarioRecords(scenario, 'large'),
  cohorts: small.cohorts.map((cohort) => ({ ...cohort, shipped: 3 * cohort.shipped })),
};
const products = [forecast(small), forecast(large)];
const last = (products[0]?.counts?.columns as number) - 1;

/** Draw by draw the counts of the columns first … end − 1. */
function countsOf({ counts }: ProductDraws, first: number, end: number): number[] {
  if (counts === null) throw new Error('not forecast');
  return Array.from({ length: draws }, (_, b) =>
    counts.counts.subarray(b * counts.columns + first, b * counts.columns + end).reduce((n, x) => n + x, 0),
  );
}

/** The smallest y that at least the share p of the draws does not exceed. */
function quantile(counts: readonly number[], p: number): number {
  for (let y = 0; ; y++)
    if (counts.filter((count) => count <= y).length >= p * counts.length - 1e-9) return y;
}

function sameQuantiles(predicted: PredictedCount | null | undefined, counts: readonly number[]): void {
  const expected = ['0.025', '0.1', '0.5', '0.9', '0.975'].map((key) => [key, quantile(counts, Number(key))]);
  expect(predicted?.quantiles).toEqual(Object.fromEntries(expected));
}

describe.each(products.map((result) => ({ result, name: result.product.product })))('$name', ({ result }) => {
  const until = result.product.untilWarrantyEnds as PredictedCount;
  const counts = countsOf(result, last, last + 1);

  test('the interval until warranty ends holds the expectation, and its draws have it as their mean', () => {
    expect(until.quantiles['0.025']).toBeLessThan(until.expected);
    expect(until.quantiles['0.975']).toBeGreaterThan(until.expected);
    const mean = counts.reduce((sum, x) => sum + x, 0) / draws;
    const variance = counts.reduce((sum, x) => sum + (x - mean) ** 2, 0) / draws;
    expect(Math.abs(mean - until.expected)).toBeLessThan(4 * Math.sqrt(variance / draws));
    sameQuantiles(until, counts);
  });

  test('a draw of the horizon without the plan is never above the draw until warranty ends', () => {
    const bare = { ...(result.product.product === 'small' ? small : large), planned: [] };
    const shipped = forecast(bare);
    const horizon = countsOf(shipped, 0, last);
    const whole = countsOf(shipped, last, last + 1);
    expect(horizon.every((count, b) => count <= (whole[b] as number))).toBe(true);
    expect(Math.max(...horizon)).toBeGreaterThan(0);
  });
});

describe('the sum of two products', () => {
  const total = totalForecast(config, products);
  const sumOf = (first: number, end: number) => {
    const [a, b] = products.map((result) => countsOf(result, first, end)) as [number[], number[]];
    return a.map((count, i) => count + (b[i] as number));
  };

  test('quantiles are those of the summed draws: by period, cumulative, until warranty ends', () => {
    expect(total.periods.length).toBe(scenario.ahead.length);
    total.periods.forEach((period, j) => {
      sameQuantiles(period, sumOf(j, j + 1));
      sameQuantiles(period.cumulative, sumOf(0, j + 1));
    });
    sameQuantiles(total.untilWarrantyEnds, sumOf(last, last + 1));
  });

  test('quantiles lie above those of each product, and within the sum of the ends', () => {
    const key = '0.975';
    const parts = products.map(({ product }) => product.untilWarrantyEnds?.quantiles[key] as number);
    const whole = total.untilWarrantyEnds?.quantiles[key] as number;
    expect(whole).toBeGreaterThan(Math.max(...parts));
    expect(whole).toBeLessThan((parts[0] as number) + (parts[1] as number));
  });

  test('the sum of the expectations is the mean of the summed draws', () => {
    const counts = sumOf(last, last + 1);
    const mean = counts.reduce((sum, x) => sum + x, 0) / draws;
    const variance = counts.reduce((sum, x) => sum + (x - mean) ** 2, 0) / draws;
    const expected = total.untilWarrantyEnds?.expected as number;
    expect(Math.abs(mean - expected)).toBeLessThan(4 * Math.sqrt(variance / draws));
  });
});
