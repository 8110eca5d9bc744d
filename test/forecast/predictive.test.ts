/**
 * Source: bearing cages, 1,703 units, 6 failures (Abernethy et al. 1983; Meeker & Escobar 1998), failures in the next 300 hours:
 * expected 5.057 (published, recalled from memory); one-sided 95 % upper bounds computed elsewhere with the same data:
 * plug-in 9, direct 12, pivotal 19 (predictions.json). The bounds tested here are our own measurement and differ from those:
 * three seeds of 40,000 draws by fractional random weights gave 17, 18, 17 pivotal and 13, 13, 13 direct. With six failures
 * the kind of random refit moves the bound.
 */
import { expect, test } from 'vitest';
import { weibull } from '../../src/families/weibull.js';
import { drawsForForecast } from '../../src/fit/drawn.js';
import { parameterDraws } from '../../src/fit/draws.js';
import { fitProduct } from '../../src/fit/product.js';
import { termsOf } from '../../src/fit/terms.js';
import { exposedAges } from '../../src/forecast/ages.js';
import { predictiveCounts } from '../../src/forecast/counts.js';
import { forecastProduct } from '../../src/forecast/product.js';
import { columnOf, predictedCount } from '../../src/forecast/summary.js';
import type { AgeGroup, ProductRecords } from '../../src/records.js';
import { loadFits } from '../reference/load.js';
import { loadPredictions } from '../reference/predictions.js';
import { agedProduct, configWith, datedProduct } from '../support/data.js';

const { manyAges } = loadPredictions();
const cages = agedProduct('cage', loadFits().find((d) => d.name === 'bearingcage')?.ages as AgeGroup[]);
const config = configWith({ candidates: ['weibull'], draws: 8000, ageStep: 300, horizon: 1, levels: [0.9] });

function forecast(records: ProductRecords, changes = {}) {
  const settings = { ...config, ...changes };
  const fit = fitProduct(settings, records);
  return forecastProduct(settings, records, fit, drawsForForecast(settings, records, fit));
}

test('bearing cages, the next 300 hours: the plug-in expectation and the pivotal upper bound', () => {
  const { product } = forecast(cages);
  expect(product.method?.parameters).toBe('pivotal');
  expect(product.periods[0]?.plugIn).toBeCloseTo(manyAges.expected.value, 3);
  const upper = product.periods[0]?.quantiles['0.95'] as number;
  expect(upper).toBeGreaterThanOrEqual(17);
  expect(upper).toBeLessThanOrEqual(18);
});

test('bearing cages: the refits themselves, without the pivotal form, give 13', () => {
  const terms = termsOf(config, cages);
  const best = fitProduct(config, cages).candidates[0]?.parameters as { scale: number; shape: number };
  const direct = { ...weibull, logLocationScale: false };
  const draws = parameterDraws(terms, direct, weibull.free([best.scale, best.shape]), 8000, ['direct']);
  if (draws === null) throw new Error('refits failed');
  const { counts, columns } = predictiveCounts(exposedAges(config, cages, 1, 300), {
    ...draws,
    findings: [],
  });
  const upper = predictedCount(0, 0, columnOf(counts, columns, 0), [0.95]).quantiles['0.95'] as number;
  expect(upper).toBeGreaterThanOrEqual(12);
  expect(upper).toBeLessThanOrEqual(13);
});

test('a constant rate: the interval is that of the exact limits for the count (conditional binomial, computed: r = 20, T2 = T1: 11 to 32)', () => {
  const exact = agedProduct('rate', [
    { outcome: 'returned', from: 50, to: 50, exact: true, quantity: 20 },
    { outcome: 'surviving', from: 100, to: 100, exact: true, quantity: 1_000_000 },
  ]);
  const { product } = forecast(exact, { candidates: ['exponential'], ageStep: 100 });
  const quantiles = product.periods[0]?.quantiles ?? {};
  const [lower, upper] = [quantiles['0.05'], quantiles['0.95']];
  expect(Math.abs((lower as number) - 11)).toBeLessThanOrEqual(1);
  expect(Math.abs((upper as number) - 32)).toBeLessThanOrEqual(1);
});

const start = 20_000;
const monthly = datedProduct(
  'M',
  [0, 1, 2, 3].map((i) => ({ from: start + 30 * i, to: start + 30 * (i + 1), shipped: 500 })),
  [0, 1, 2, 3].map((i) => ({ cohort: i, from: start + 90, to: start + 120, quantity: 6 - i })),
  { planned: [{ from: start + 120, to: start + 150, shipped: 500 }] },
);
const dated = { asOf: '2025-01-31', horizon: 3, draws: 3000, ageStep: null };

test('an as-of date inside a period: the rest of it comes first and does not count in the horizon', () => {
  const { product } = forecast(monthly, { ...dated, asOf: '2025-02-11' });
  expect(product.periods.map((p) => [p.period, p.from, p.partial])).toEqual([
    ['2025-02', '2025-02-12', true],
    ['2025-03', '2025-03-01', false],
    ['2025-04', '2025-04-01', false],
    ['2025-05', '2025-05-01', false],
  ]);
});

test('planned shipments are a part of the expectation, told apart, and not awaited until warranty ends', () => {
  const rules = { ...config.everyProduct, warrantyDays: 365 };
  const changes = { ...dated, everyProduct: rules };
  const { product } = forecast(monthly, changes);
  const without = forecast({ ...monthly, planned: [] }, changes).product;
  const [plan, bare] = [product.periods.at(-1), without.periods.at(-1)];
  expect(plan?.planned.plugIn).toBeGreaterThan(0.5);
  expect(plan?.plugIn).toBeCloseTo((bare?.plugIn as number) + (plan?.planned.plugIn as number), 9);
  expect(product.untilWarrantyEnds?.plugIn).toBeCloseTo(without.untilWarrantyEnds?.plugIn as number, 9);
  expect(product.untilWarrantyEnds?.plugIn).toBeGreaterThan(bare?.cumulative.plugIn as number);
});

test('the draws have the mean that the expectation says, and quantiles in order', () => {
  const { product, counts } = forecast(monthly, dated);
  const column = columnOf(counts?.counts as Int32Array, counts?.columns as number, 1);
  const mean = column.reduce((sum, x) => sum + x, 0) / column.length;
  expect(Math.abs(mean / (product.periods[1]?.expected as number) - 1)).toBeLessThan(0.05);
  for (const { quantiles } of product.periods) {
    expect(quantiles['0.05']).toBeLessThanOrEqual(quantiles['0.5'] as number);
    expect(quantiles['0.5']).toBeLessThanOrEqual(quantiles['0.95'] as number);
  }
});

test('the last months cannot be returned twice: expected never exceeds the survivors', () => {
  const worn = datedProduct(
    'W',
    [{ from: start, to: start + 30, shipped: 40 }],
    [
      { cohort: 0, from: start + 60, to: start + 90, quantity: 10 },
      { cohort: 0, from: start + 90, to: start + 120, quantity: 25 },
    ],
  );
  const { product, counts } = forecast(worn, { ...dated, horizon: 24 });
  expect(product.periods.at(-1)?.cumulative.expected).toBeLessThanOrEqual(5 + 1e-9);
  expect(product.periods.at(-1)?.cumulative.expected).toBeGreaterThan(4.9);
  const most = Math.max(
    ...columnOf(counts?.counts as Int32Array, counts?.columns as number, (counts?.columns as number) - 1),
  );
  expect(most).toBeLessThanOrEqual(5);
});

test('quantile p is the smallest y with G(y) ≥ p', () => {
  const { quantiles } = predictedCount(0, 0, Float64Array.of(4, 1, 3, 2, 5), [0.2, 0.21, 0.5, 0.8, 0.99]);
  expect(quantiles).toEqual({ '0.2': 1, '0.21': 2, '0.5': 3, '0.8': 4, '0.99': 5 });
});

test('candidates of weight outside the interval are a warning; a narrow choice is not', () => {
  const everything = { candidates: ['weibull', 'lognormal'], horizon: 20 };
  const { product } = forecast(cages, { ...everything, levels: [0.1] });
  const finding = product.findings.find((f) => f.code === 'choice-outside-interval');
  expect(finding?.severity).toBe('warning');
  expect(finding?.message).toMatch(
    /^the interval takes the Weibull distribution as right; .*with 46 % of the weight.*lognormal \d+/,
  );
  const wide = forecast(cages, { ...everything, levels: [0.99] }).product;
  expect(wide.findings.map((f) => f.code)).not.toContain('choice-outside-interval');
});

test('a mean that differs from the plug-in figure by more than a twentieth is noted', () => {
  const { product } = forecast(cages, { horizon: 8 });
  const last = product.periods.at(-1)?.cumulative as { expected: number; plugIn: number };
  const percent = Math.round(100 * (last.expected / last.plugIn - 1));
  expect(Math.abs(percent)).toBeGreaterThan(5);
  const finding = product.findings.find((f) => f.code === 'mean-differs-from-plug-in');
  expect(finding?.message).toContain(
    `over the horizon ${Math.abs(percent)} % ${percent < 0 ? 'below' : 'above'}`,
  );
});
