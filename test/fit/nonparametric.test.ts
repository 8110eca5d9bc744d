/** The nonparametric estimate that stands beside the curves. */
import { expect, test } from 'vitest';
import { dayNumber } from '../../src/calendar.js';
import { cellProbability } from '../../src/exposure/probability.js';
import { weibull } from '../../src/families/weibull.js';
import { nonparametricEstimate } from '../../src/fit/nonparametric.js';
import type { AgeGroup } from '../../src/records.js';
import { agedProduct, configWith, datedProduct } from '../support/data.js';

/**
 * Source: remission times in weeks under 6-mercaptopurine (Freireich et al. 1963), product-limit estimate as printed in
 * textbooks of survival analysis; data and values from memory,
 * and equal to what R's survival prints, with the interval: survfit(Surv(t, d) ~ 1, conf.type = "log-log").
 */
test('exact ages give the product-limit estimate of Kaplan & Meier 1958', () => {
  const times: readonly (readonly [age: number, returned: number, surviving: number])[] = [
    [6, 3, 1],
    [7, 1, 0],
    [9, 0, 1],
    [10, 1, 1],
    [11, 0, 1],
    [13, 1, 0],
    [16, 1, 0],
    [17, 0, 1],
    [19, 0, 1],
    [20, 0, 1],
    [22, 1, 0],
    [23, 1, 0],
    [25, 0, 1],
    [32, 0, 2],
    [34, 0, 1],
    [35, 0, 1],
  ];
  const group = (outcome: AgeGroup['outcome'], age: number, quantity: number): AgeGroup[] =>
    quantity === 0 ? [] : [{ outcome, from: age, to: age, exact: true, quantity }];
  const ages = times.flatMap(([age, r, s]) => [...group('returned', age, r), ...group('surviving', age, s)]);
  const points = nonparametricEstimate(configWith(), agedProduct('6-MP', ages));
  const survival = (age: number) => 1 - (points.filter((p) => p.age <= age).at(-1)?.probability ?? 0);
  for (const [age, printed] of [
    [6, 0.857],
    [7, 0.807],
    [10, 0.753],
    [13, 0.69],
    [16, 0.627],
    [22, 0.538],
    [23, 0.448],
  ] as const) {
    expect(survival(age)).toBeCloseTo(printed, 3);
  }
  expect(points.find((p) => p.age === 10)?.atRisk).toBe(15);
  const last = points.find((p) => p.age === 23);
  expect([last?.lower, last?.upper].map((p) => 1 - (p as number))).toEqual([
    expect.closeTo(0.68, 3),
    expect.closeTo(0.188, 3),
  ]);
});

test.each([
  [1, 3000],
  [2.2, 1400],
])(
  'expected counts of a Weibull (shape %f, scale %f) by month give its cdf back within 1e-3 at every age',
  (shape, scale) => {
    const months = Array.from({ length: 24 }, (_, i) => ({
      from: dayNumber(2024, 1 + i, 1),
      to: dayNumber(2024, 2 + i, 1),
    }));
    const cohorts = months.map((month) => ({ ...month, shipped: 1000 }));
    const life = { family: weibull, free: weibull.free([scale, shape]), delay: 0, limit: Infinity };
    const returned = cohorts.flatMap((cohort, i) =>
      months
        .slice(i)
        .map((month) => ({ cohort: i, ...month, quantity: 1000 * cellProbability(life, cohort, month) })),
    );
    const points = nonparametricEstimate(
      configWith({ asOf: '2025-12-31' }),
      datedProduct('E', cohorts, returned),
    );
    expect(points.length).toBeGreaterThan(20);
    for (const { age, probability } of points) {
      const truth = -Math.expm1(life.family.at(life.free).logSurvival(age));
      expect(Math.abs(probability - truth), `at ${age} days`).toBeLessThan(1e-3);
    }
  },
);

test('daily records give the same within sampling noise, and withdrawals leave the risk set', () => {
  const cohorts = Array.from({ length: 300 }, (_, i) => ({ from: i, to: i + 1, shipped: 4 }));
  const gone = cohorts.map((_, i) => ({ cohort: i, from: i, to: i + 1, quantity: 4 })).slice(200);
  const returned = [{ cohort: 0, from: 100, to: 101, quantity: 1 }];
  const records = datedProduct('W', cohorts, returned, { withdrawn: gone, resolution: 'day' });
  const points = nonparametricEstimate(configWith({ asOf: '1970-10-28' }), records);
  expect(points.at(-1)?.probability).toBeCloseTo(1 / 800, 4);
  expect(points[0]?.atRisk).toBeLessThanOrEqual(900);
});
