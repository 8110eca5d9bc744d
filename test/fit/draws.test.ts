/** The parameter draws of fractional random weights, by identities and by large-sample theory. */
import { expect, test } from 'vitest';
import { cellProbability } from '../../src/exposure/probability.js';
import { lognormal } from '../../src/families/lognormal.js';
import { weibull } from '../../src/families/weibull.js';
import { coarseTerms } from '../../src/fit/coarse.js';
import { drawsForForecast } from '../../src/fit/drawn.js';
import { parameterDraws, randomWeights, refitter } from '../../src/fit/draws.js';
import { logLikelihood } from '../../src/fit/likelihood.js';
import { fitProduct } from '../../src/fit/product.js';
import { layTerms, termsOf } from '../../src/fit/terms.js';
import { maximise } from '../../src/math/maximise.js';
import { randomStream } from '../../src/math/random.js';
import type { ParameterDraws } from '../../src/records.js';
import { loadGrouped } from '../reference/load.js';
import { configWith, datedProduct, groupedProduct } from '../support/data.js';

const table = loadGrouped();
const config = configWith({ asOf: table.asOf, candidates: ['weibull'], draws: 1500 });
const grouped = groupedProduct(table);

function spread(values: readonly number[]): { mean: number; deviation: number } {
  const mean = values.reduce((sum, x) => sum + x, 0) / values.length;
  return { mean, deviation: Math.sqrt(values.reduce((sum, x) => sum + (x - mean) ** 2, 0) / values.length) };
}

test('with many returns the draws scatter as the standard errors say (delta method, 510 returns)', () => {
  const fit = fitProduct(config, grouped);
  const draws = drawsForForecast(config, grouped, fit) as ParameterDraws;
  const shapes = Array.from({ length: config.draws }, (_, b) => Math.exp(-(draws.free[2 * b + 1] as number)));
  const { mean, deviation } = spread(shapes);
  const candidate = fit.candidates[0];
  expect(Math.abs(deviation / (candidate?.standardErrors.shape as number) - 1)).toBeLessThan(0.1);
  expect(Math.abs(mean - (candidate?.parameters.shape as number))).toBeLessThan(0.2 * deviation);
});

test('a draw depends on the seed, the product and its index, not on how many are made', () => {
  const fit = fitProduct(config, grouped);
  const few = drawsForForecast({ ...config, draws: 100 }, grouped, fit) as ParameterDraws;
  const many = drawsForForecast({ ...config, draws: 300 }, grouped, fit) as ParameterDraws;
  expect(many.free.subarray(0, 200)).toEqual(few.free);
  const other = drawsForForecast({ ...config, draws: 100, seed: 2 }, grouped, fit) as ParameterDraws;
  expect(other.free).not.toEqual(few.free);
});

/** Three years of daily shipments of a made-up product, one return every few days. */
function daily() {
  const random = randomStream('daily');
  const start = 19_000;
  const cohorts = Array.from({ length: 900 }, (_, i) => ({
    from: start + i,
    to: start + i + 1,
    shipped: 12,
  }));
  const cells = cohorts.flatMap(({ from }, cohort) => {
    const day = from + Math.floor(3000 * (-Math.log(random.uniform())) ** (1 / 1.6));
    return day < start + 900 ? [{ cohort, from: day, to: day + 1, quantity: 1 }] : [];
  });
  return datedProduct('D', cohorts, cells, { resolution: 'day' });
}

test('coarse terms keep the units, move the maximum by less than a hundredth of its error, and scatter alike', () => {
  const records = daily();
  const settings = configWith({ asOf: '2024-07-07' });
  const terms = termsOf(settings, records);
  const coarse = coarseTerms(terms);
  const sum = (counts: Float64Array) => counts.reduce((total, n) => total + n, 0);
  expect(sum(coarse.counts)).toBeCloseTo(sum(terms.counts), 6);
  expect(coarse.kept.length).toBeLessThan(terms.kept.length / 3);
  const likelihood = logLikelihood(terms, layTerms(terms, 'fit'), lognormal);
  const exact = (weights: Float64Array) => {
    likelihood.counts.set(weights);
    return maximise(likelihood, Float64Array.of(9, 0.5), { inside: likelihood.inside }).point;
  };
  const best = exact(terms.counts);
  const { centre, counts, refit } = refitter(terms, lognormal, best);
  const locations = (each: Float64Array, solve: (weights: Float64Array) => Float64Array | undefined) =>
    Array.from({ length: 400 }, (_, b) => solve(randomWeights(each, ['w', b]))?.[0] as number);
  const fits = [
    { centre: best, ...spread(locations(terms.counts, exact)) },
    { centre, ...spread(locations(counts, (weights) => refit(weights)?.point)) },
  ];
  const [fine, rough] = fits as [(typeof fits)[number], (typeof fits)[number]];
  expect(Math.abs((fine.centre[0] as number) - (rough.centre[0] as number))).toBeLessThan(
    0.01 * fine.deviation,
  );
  expect(Math.abs(rough.deviation / fine.deviation - 1)).toBeLessThan(0.15);
});

test('refits that fail too often yield no draws: all units back on one day, the shape has no end', () => {
  const cohorts = [{ from: 0, to: 1, shipped: 5 }];
  const records = datedProduct('F', cohorts, [{ cohort: 0, from: 30, to: 31, quantity: 5 }], {
    resolution: 'day',
  });
  const terms = termsOf(configWith({ asOf: '1970-02-10' }), records);
  expect(parameterDraws(terms, weibull, Float64Array.of(5, 0), 200, ['f'])).toBeNull();
});

test('a distribution that is steep within one period is refitted on the fine grid', () => {
  const months = Array.from({ length: 4 }, (_, i) => ({ from: 30 * i, to: 30 * (i + 1) }));
  const life = { family: weibull, free: weibull.free([29, 6.4]), delay: 0, limit: Infinity };
  const returned = months.slice(0, 2).flatMap((cohort, i) =>
    months.slice(i, i + 3).map((month) => {
      const quantity = Math.round(600 * cellProbability(life, cohort, month));
      return { cohort: i, ...month, quantity };
    }),
  );
  const shipped = (i: number) => returned.filter((c) => c.cohort === i).reduce((n, c) => n + c.quantity, 0);
  const cohorts = months.slice(0, 2).map((month, i) => ({ ...month, shipped: shipped(i) }));
  const records = datedProduct('S', cohorts, returned);
  const settings = configWith({ asOf: '1970-04-30', candidates: ['weibull'], draws: 200 });
  const fit = fitProduct(settings, records);
  const { scale = 0, shape = 0 } = fit.candidates[0]?.parameters ?? {};
  expect(shape).toBeGreaterThan(3.5);
  const best = weibull.free([scale, shape]);
  const { centre } = refitter(termsOf(settings, records), weibull, best);
  centre.forEach((x, i) => {
    expect(Math.abs(x - (best[i] as number))).toBeLessThan(1e-6);
  });
  expect(drawsForForecast(settings, records, fit)).toMatchObject({ family: 'weibull', findings: [] });
});
