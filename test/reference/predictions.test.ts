import { describe, expect, it } from 'vitest';
import { loadFits } from './load.js';
import { type Bounds, loadPredictions } from './predictions.js';

/** Identities that hold among the committed predictions, worked from their definitions alone. */
describe('the worked predictions', () => {
  const { oneAge, manyAges, byFamily, constantRate } = loadPredictions();

  /** Of a Weibull unit that has reached `age`, to fail before `age + next`. */
  const conditional = (shape: number, scale: number, age: number, next: number) =>
    -Math.expm1((age / scale) ** shape - ((age + next) / scale) ** shape);
  const fitOf = (family: string) =>
    loadFits()
      .find(({ name }) => name === manyAges.dataSet)
      ?.fits.find((fit) => fit.family === family);
  const { shape = Number.NaN, scale = Number.NaN } = fitOf('weibull')?.parameters ?? {};

  it('of units of one age follow from the parameters', () => {
    const { shape = Number.NaN, scale = Number.NaN } = oneAge.parameters;
    const p = conditional(shape, scale, oneAge.ageMonths, oneAge.nextMonths);
    const survivors = oneAge.units - oneAge.failures;
    expect(p).toBeCloseTo(oneAge.conditionalProbability, 9);
    expect(survivors * p).toBeCloseTo(oneAge.expected, 4);
    const plugIn = binomialCdf(survivors, p, 100);
    expect(plugIn.findIndex((cdf) => cdf >= 0.95)).toBe(oneAge.upper95.plugIn.count);
    expect(plugIn.findIndex((cdf) => cdf >= 0.05)).toBe(oneAge.lower95.plugIn.count);
  });

  it('of units of many ages follow from the fit of the sample', () => {
    const ages = manyAges.atRisk.map(([hours]) => conditional(shape, scale, hours, manyAges.nextHours));
    const { values } = manyAges.conditionalProbabilities;
    ages.forEach((p, i) => {
      expect(Math.abs(p - (values[i] ?? Number.NaN)), `age ${i}`).toBeLessThanOrEqual(0.6e-6);
    });
    const expected = manyAges.atRisk.reduce((sum, [, units], i) => sum + units * (ages[i] ?? Number.NaN), 0);
    expect(expected).toBeCloseTo(manyAges.expected.value, 3);
    const cdf = manyAges.atRisk
      .map(([, units], i) => binomialCdf(units, ages[i] ?? Number.NaN, 14))
      .reduce(convolved);
    cdf.forEach((value, count) => {
      expect(value, `count ${count}`).toBeCloseTo(manyAges.countDistribution.cdf[count] ?? Number.NaN, 5);
    });
    expect(cdf.findIndex((value) => value >= 0.95)).toBe(manyAges.upper95.plugIn.count);
  });

  it('by family agree with the fits of the sample', () => {
    const [weibull, lognormal] = ['weibull', 'lognormal'].map((family) => fitOf(family)?.logLikelihood);
    const difference = (weibull ?? Number.NaN) - (lognormal ?? Number.NaN);
    expect(difference).toBeCloseTo(byFamily.logLikelihoodDifference, 2);
    // Akaike weights of two candidates with as many parameters (Burnham & Anderson 2002)
    expect(1 / (1 + Math.exp(-difference))).toBeCloseTo(byFamily.akaikeWeights.weibull ?? Number.NaN, 2);
    const whole = manyAges.atRisk.reduce(
      (sum, [hours, units]) => sum + units * conditional(shape, scale, hours, byFamily.nextHours),
      0,
    );
    expect(whole).toBeCloseTo(byFamily.expected.weibull ?? Number.NaN, 1);
  });

  it('of a constant rate are those of the conditional binomial argument', () => {
    for (const { exposureRatio, byFailures } of constantRate) {
      for (const [failures, lower, upper] of byFailures) {
        const past = 1 / (1 + exposureRatio);
        const atMost = (next: number) => binomialCdf(failures + next, past, failures + 1)[failures] ?? 1;
        const below = (next: number) => binomialCdf(failures + next, past, failures + 1)[failures - 1] ?? 0;
        const counts = Array.from({ length: 120 }, (_, next) => next);
        const name = `${failures} at ${exposureRatio}`;
        expect(
          counts.findLast((next) => atMost(next) > 0.05),
          name,
        ).toBe(upper);
        expect(
          counts.find((next) => 1 - below(next) > 0.05),
          name,
        ).toBe(lower);
      }
    }
  });

  it('widen from the plug-in bound to the calibrated one', () => {
    const above = ({ plugIn, calibrated, direct, pivotal }: Bounds) =>
      [calibrated, direct, pivotal].map(({ count }) => count - plugIn.count);
    expect(Math.min(...above(oneAge.upper95), ...above(manyAges.upper95))).toBeGreaterThan(0);
    expect(Math.max(...above(oneAge.lower95))).toBeLessThan(0);
  });
});

/** Probability of at most 0, 1, … `length − 1` of `n`, by the recursion of the binomial terms. */
function binomialCdf(n: number, p: number, length: number): number[] {
  const terms = [(1 - p) ** n];
  for (let k = 1; k < length; k++) terms.push(((terms[k - 1] ?? 0) * (n - k + 1) * p) / (k * (1 - p)));
  let sum = 0;
  return terms.map((term) => (sum += term));
}

/** Distribution of the sum of two independent counts, both as cumulative probabilities from 0 on. */
function convolved(a: readonly number[], b: readonly number[]): number[] {
  const step = (cdf: readonly number[], k: number) => (cdf[k] ?? 0) - (cdf[k - 1] ?? 0);
  return a.map((_, count) =>
    Array.from({ length: count + 1 }, (_, k) => step(a, k) * (b[count - k] ?? 0)).reduce((x, y) => x + y, 0),
  );
}
