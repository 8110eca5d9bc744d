/** Where a fit can go wrong without a word: steep starts, tight ages, flat likelihoods, huge counts. */
import { describe, expect, test } from 'vitest';
import { dayNumber, periodsIn } from '../../src/calendar.js';
import { cellProbability } from '../../src/exposure/probability.js';
import { familyNamed } from '../../src/families/index.js';
import { weibull } from '../../src/families/weibull.js';
import { drawsForForecast } from '../../src/fit/drawn.js';
import { fitProduct } from '../../src/fit/product.js';
import { binomialDraw } from '../../src/math/binomial.js';
import { randomStream } from '../../src/math/random.js';
import type { AgeGroup, CandidateFit, FitProduct } from '../../src/records.js';
import { agedProduct, configWith, datedProduct } from '../support/data.js';
import { near } from '../support/near.js';

const months = periodsIn({ from: dayNumber(2025, 1, 1), to: dayNumber(2026, 1, 1) }, 'month');
const config = configWith({ asOf: '2025-12-31', draws: 300 });
const group = (outcome: AgeGroup['outcome'], from: number, to: number, quantity: number): AgeGroup => ({
  outcome,
  from,
  to,
  exact: from === to,
  quantity,
});
const find = (fit: FitProduct, family: string) => fit.candidates.find((c) => c.family === family);

test.each([0.5, 0.1, 0.05])(
  'same-day probability of a Weibull of shape %f within 1e-9 of its series Σ (−1)^(k+1) η^(−βk) / (k! (βk + 1))',
  (shape) => {
    const scale = Math.exp(6 / shape);
    let [exact, power] = [0, 1];
    for (let k = 1; k < 40; k++) {
      power *= -(scale ** -shape) / k;
      exact -= power / (shape * k + 1);
    }
    const life = { family: weibull, free: weibull.free([scale, shape]), delay: 0, limit: Infinity };
    near(cellProbability(life, { from: 0, to: 1 }, { from: 0, to: 1 }), exact, 'cellProbability');
  },
);

test('failures that nearly all come at once and early are forecast by a family that follows them', () => {
  const random = randomStream('early');
  const life = { family: weibull, free: weibull.free([Math.exp(34), 0.1]), delay: 0, limit: Infinity };
  const cells = months.flatMap((cohort, i) => {
    let [left, rest] = [1000, 1];
    return months.slice(i).flatMap((month) => {
      const chance = cellProbability(life, cohort, month);
      const quantity = binomialDraw(random, left, chance / rest);
      left -= quantity;
      rest -= chance;
      return quantity === 0 ? [] : [{ cohort: i, ...month, quantity }];
    });
  });
  const records = datedProduct(
    'E',
    months.map((month) => ({ ...month, shipped: 1000 })),
    cells,
  );
  const fit = fitProduct(config, records);
  expect(find(fit, 'weibull')).toMatchObject({ converged: true, ruledOut: null });
  expect(find(fit, 'weibull')?.parameters.scale).toBeGreaterThan(Math.exp(20));
  expect(find(fit, 'exponential')?.weight).toBeLessThan(1e-9);
  expect(drawsForForecast(config, records, fit)).toMatchObject({ family: fit.chosen, findings: [] });
});

describe('what was ruled out and follows the records better', () => {
  const cohorts = months.map((month) => ({ ...month, shipped: 1000 }));
  const records = datedProduct('F', cohorts, [
    { cohort: 0, ...(months[11] as { from: number; to: number }), quantity: 10 },
  ]);
  test('forbids a forecast when it is far ahead', () => {
    const fit = fitProduct(config, records);
    expect(fit).toMatchObject({ chosen: null, notForecast: { code: 'best-fit-ruled-out' } });
    expect(drawsForForecast(config, records, fit)).toMatchObject({ code: 'best-fit-ruled-out' });
    expect(fit.findings.map((f) => f.code)).toContain('ruled-out-fits-better');
  });
});

test('a stand-in may be a little behind the chosen candidate, never far', () => {
  const cohorts = [{ from: 0, to: 1, shipped: 6 }];
  const records = datedProduct('S', cohorts, [{ cohort: 0, from: 30, to: 31, quantity: 6 }], {
    resolution: 'day',
  });
  const settings = configWith({ asOf: '1970-03-31', draws: 100 });
  const fit = fitProduct(settings, records);
  const standing = fit.candidates.map((c) => ({ ...c, ruledOut: null }));
  const failing = standing.filter((c) => c.family === 'weibull').map((c) => ({ ...c, aicc: 100 }));
  const exponential = standing.filter((c) => c.family === 'exponential');
  const draws = (behind: number) =>
    drawsForForecast(settings, records, {
      ...fit,
      notForecast: null,
      candidates: [...failing, ...exponential.map((c) => ({ ...c, aicc: 100 + behind }))],
    });
  expect(draws(4)).toMatchObject({
    family: 'exponential',
    findings: [
      { code: 'refits-failed', message: expect.stringMatching(/Weibull.*rests on the exponential/) },
    ],
  });
  expect(draws(40)).toMatchObject({ code: 'no-usable-draws' });
});

test('tight exact ages have a maximum: no grid stands in their way', () => {
  const ages = [100, 101, 102].map((age) => group('returned', age, age, 5));
  const lognormal = find(fitProduct(configWith(), agedProduct('T', ages)), 'lognormal');
  expect(lognormal).toMatchObject({ converged: true, ruledOut: null });
  const logs = [100, 101, 102].map(Math.log);
  const mean = logs.reduce((a, b) => a + b) / 3;
  const deviation = Math.sqrt(logs.reduce((sum, x) => sum + (x - mean) ** 2, 0) / 3);
  near(lognormal?.parameters.location, mean, 'parameter');
  near(lognormal?.parameters.scale, deviation, 'parameter');
});

test('a likelihood that is flat says so: one interval and survivors at its end determine one number, not two', () => {
  const ages = [group('returned', 0, 50, 20), group('surviving', 50, 50, 80)];
  const fit = fitProduct(configWith(), agedProduct('L', ages));
  expect(find(fit, 'weibull')?.ruledOut?.code).toBe('not-identified');
  expect(find(fit, 'exponential')?.ruledOut).toBeNull();
  near(find(fit, 'exponential')?.parameters.scale, -50 / Math.log(0.8), 'parameter');
});

test('an interval across the warranty limit ends there: F(100 − 5) − F(90 − 5)', () => {
  const rules = { ...configWith().everyProduct, warrantyDays: 100, delayDays: 5, delayReason: 'known' };
  const ages = [10, 30, 50, 70].map((age) => group('returned', age, age, 2));
  const more = [...ages, group('returned', 90, 120, 3), group('surviving', 100, 100, 40)];
  const fit = fitProduct(configWith({ everyProduct: rules }), agedProduct('W', more));
  const { logLikelihood, parameters } = find(fit, 'weibull') as CandidateFit;
  const family = familyNamed('weibull');
  const life = family.at(family.free(family.parameterNames.map((name) => parameters[name] as number)));
  const exact = [10, 30, 50, 70].reduce((sum, age) => sum + 2 * life.logDensity(age - 5), 0);
  const between = Math.exp(life.logCdf(95)) - Math.exp(life.logCdf(85));
  near(logLikelihood, exact + 3 * Math.log(between) + 40 * life.logSurvival(95), 'logLikelihood');
});

test('likelihood-ratio intervals stand at nine million returns', () => {
  const cohorts = months.map((month) => ({ ...month, shipped: 1e9 }));
  const cells = [0, 1, 2, 3, 4, 5].flatMap((i) =>
    [1, 2, 3, 4, 5].map((k) => ({
      cohort: i,
      ...(months[i + k] as { from: number; to: number }),
      quantity: k * 1e5,
    })),
  );
  const fit = fitProduct(config, datedProduct('H', cohorts, cells));
  for (const { family, intervals, parameterCount } of fit.candidates) {
    expect(Object.keys(intervals), family).toHaveLength(parameterCount);
    for (const [name, { lower, upper }] of Object.entries(intervals)) {
      expect(lower, `${family} ${name}`).not.toBeNull();
      expect(upper, `${family} ${name}`).not.toBeNull();
    }
  }
});
