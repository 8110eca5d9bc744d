/** What every family promises (families/family.ts), over every registered family. Identities only: two routes, one number. */
import { describe, expect, test } from 'vitest';
import { differenceJet } from '../../src/families/difference-jet.js';
import { type Family, jetSize } from '../../src/families/family.js';
import { families, familyNamed } from '../../src/families/index.js';

/** Parameters from gentle to awkward, in the order of parameterNames. */
const samples: Readonly<Record<string, readonly (readonly number[])[]>> = {
  exponential: [[1], [3000]],
  weibull: [
    [1000, 1.3],
    [10, 0.3],
    [700, 25],
  ],
  lognormal: [
    [6, 1],
    [2, 3],
    [6.5, 0.05],
  ],
  loglogistic: [
    [6, 0.7],
    [3, 2.5],
    [6.5, 0.04],
  ],
  gamma: [
    [1.4, 900],
    [0.3, 2000],
    [25, 30],
  ],
};
const probabilities = [1e-12, 1e-6, 0.001, 0.1, 0.5, 0.9, 0.999];

describe.each(families.map((family) => ({ family, name: family.name })))('$name', ({ family, name }) => {
  const all = samples[name] ?? [];
  test('has samples, and free coordinates that lead back to the parameters', () => {
    expect(all.length).toBeGreaterThan(1);
    for (const parameters of all) {
      const back = family.parameters(family.free(parameters));
      back.forEach((value, i) => {
        expect(value).toBeCloseTo(parameters[i] as number, 9);
      });
    }
  });

  test.each(all.map((p) => [p]))('%j: quantile and survival undo each other in both tails', (parameters) => {
    const life = family.at(family.free(parameters));
    for (const p of probabilities) {
      const lower = life.quantile(Math.log(p), 'lower');
      expect(life.logCdf(lower) / Math.log(p)).toBeCloseTo(1, 9);
      const upper = life.quantile(Math.log(p), 'upper');
      expect(life.logSurvival(upper) / Math.log(p)).toBeCloseTo(1, 9);
      expect(Math.exp(life.logCdf(lower)) + Math.exp(life.logSurvival(lower))).toBeCloseTo(1, 12);
    }
  });

  test.each(all.map((p) => [p]))(
    '%j: density is the slope of the cumulative hazard times survival',
    (parameters) => {
      const life = family.at(family.free(parameters));
      for (const p of [0.01, 0.3, 0.7, 0.99]) {
        const t = life.quantile(Math.log(p), 'lower');
        const h = 1e-5 * t;
        const slope = (-life.logSurvival(t + h) - -life.logSurvival(t - h)) / (2 * h);
        expect((Math.log(slope) + life.logSurvival(t)) / life.logDensity(t)).toBeCloseTo(1, 6);
      }
    },
  );

  test.each(all.map((p) => [p]))('%j: monotone, with the right limits', (parameters) => {
    const life = family.at(family.free(parameters));
    expect(life.logSurvival(0)).toBe(0);
    expect(life.logCdf(0)).toBe(-Infinity);
    const ages = probabilities.map((p) => life.quantile(Math.log(p), 'lower'));
    const survivals = ages.map((t) => life.logSurvival(t));
    expect([...ages].sort((a, b) => a - b)).toEqual(ages);
    expect([...survivals].sort((a, b) => b - a)).toEqual(survivals);
    expect(life.logSurvival(life.quantile(-250, 'upper'))).toBeCloseTo(-250, 6);
  });

  test.each(all.map((p) => [p]))('%j: jets agree with differences', (parameters) => {
    const free = family.free(parameters);
    for (const what of ['logDensity', 'logSurvival'] as const) {
      const jet = new Float64Array(jetSize(free.length));
      const other = new Float64Array(jet.length);
      const life = family.at(free);
      for (const p of [0.02, 0.4, 0.95]) {
        const t = life.quantile(Math.log(p), 'lower');
        family.jetsAt(free)[what](t, Math.log(t), jet);
        differenceJet(free, (at, age) => family.at(at)[what](age))(t, Math.log(t), other);
        jet.forEach((value, i) => {
          expect(Math.abs(value - (other[i] as number)) / (1 + Math.abs(value))).toBeLessThan(2e-5);
        });
      }
    }
  });

  test('start values agree with the cdf they are given', () => {
    for (const parameters of all) {
      const life = family.at(family.free(parameters));
      const cdf = [0.05, 0.2] as const;
      const ages = cdf.map((p) => life.quantile(Math.log(p), 'lower')) as [number, number];
      const started = family.at(family.start({ ages, cdf: [...cdf] as [number, number] }));
      expect(Math.exp(started.logCdf(ages[1]))).toBeCloseTo(0.2, 6);
    }
  });

  test('refuses parameters outside the domain, with name and value', () => {
    const good = all[0] as readonly number[];
    const bad = good.map((value, i) => (i === good.length - 1 ? -1 : value));
    expect(() => family.free(bad)).toThrow(/^invalid (scale|shape) -1, must be above 0/);
  });
});

test('an unknown family is named', () => {
  expect(() => familyNamed('rayleigh')).toThrow(/unknown family rayleigh/);
});

test('every family is log location-scale where it says so', () => {
  const shift = (family: Family) => {
    const free = family.free(samples[family.name]?.[0] ?? []);
    const moved = Float64Array.from(free);
    moved[0] = (moved[0] as number) + 1;
    return (
      family.at(moved).quantile(Math.log(0.3), 'lower') / family.at(free).quantile(Math.log(0.3), 'lower')
    );
  };
  for (const family of families.filter((f) => f.logLocationScale))
    expect(shift(family)).toBeCloseTo(Math.E, 9);
});
