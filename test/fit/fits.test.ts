/**
 * Sources: the six published samples of test/reference/fits.json and the grouped table of grouped.json, each fitted
 * with R's survival and with mpmath at 45 digits; printed values of the NIST/SEMATECH e-Handbook and of Lieblein & Zelen.
 */
import { describe, expect, test } from 'vitest';
import { fitProduct } from '../../src/fit/product.js';
import type { FitProduct } from '../../src/records.js';
import { loadFits, loadGrouped, type ReferenceFit } from '../reference/load.js';
import { agedProduct, configWith, groupedProduct } from '../support/data.js';
import { near } from '../support/near.js';

function sameFit(fit: FitProduct, expected: ReferenceFit): void {
  const candidate = fit.candidates.find((c) => c.family === expected.family);
  expect(candidate?.converged, expected.family).toBe(true);
  near(candidate?.logLikelihood, expected.logLikelihood, 'logLikelihood', expected.family);
  for (const [name, value] of Object.entries(expected.parameters)) {
    near(candidate?.parameters[name], value, 'parameter', `${expected.family} ${name}`);
    near(
      candidate?.standardErrors[name],
      expected.standardErrors[name] as number,
      'standardError',
      `${expected.family} ${name}`,
    );
  }
  if (candidate?.ruledOut === null) {
    near(candidate.aicc, expected.aicc, 'logLikelihood', `${expected.family} AICc`);
    near(candidate.bic, expected.bic, 'logLikelihood', `${expected.family} BIC`);
  }
}

describe.each(loadFits().map((data) => ({ data, name: data.name })))('$name', ({ data }) => {
  const fit = fitProduct(configWith(), agedProduct(data.name, data.ages));
  for (const expected of data.fits) test(expected.family, () => sameFit(fit, expected));
  test('Weibull likelihood-ratio intervals', () => {
    const expected = data.fits.find((f) => f.family === 'weibull')?.intervals95 ?? {};
    expect(Object.keys(expected)).toEqual(expect.arrayContaining(['shape', 'scale']));
    const intervals = fit.candidates.find((c) => c.family === 'weibull')?.intervals;
    for (const name of ['shape', 'scale']) {
      const [lower, upper] = expected[name] as readonly [number, number];
      near(intervals?.[name]?.lower, lower, 'interval', `${name} lower`);
      near(intervals?.[name]?.upper, upper, 'interval', `${name} upper`);
    }
  });
  for (const printed of data.printed) {
    test(`${printed.family} as printed in ${printed.from}, to the printed digits`, () => {
      const candidate = fit.candidates.find((c) => c.family === printed.family);
      expect(Object.keys(printed.parameters).length).toBeGreaterThan(0);
      for (const [name, value] of Object.entries(printed.parameters)) {
        const lastDigit = 10 ** -(String(value).split('.')[1]?.length ?? 0);
        const actual = candidate?.parameters[name] as number;
        expect(Math.abs(actual - value), `${name} ${actual}`).toBeLessThanOrEqual(0.5 * lastDigit);
      }
    });
  }
});

describe('grouped table v1', () => {
  const table = loadGrouped();
  const fit = fitProduct(configWith({ asOf: table.asOf }), groupedProduct(table));
  for (const expected of table.fits) test(expected.family, () => sameFit(fit, expected));
});
