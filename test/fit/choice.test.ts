/** Ranking, weights and the reasons for ruling a candidate out. */
import { expect, test } from 'vitest';
import { aicc, bic } from '../../src/fit/choice.js';
import { fitProduct } from '../../src/fit/product.js';
import type { AgeGroup } from '../../src/records.js';
import { loadFits } from '../reference/load.js';
import { agedProduct, configWith, datedProduct } from '../support/data.js';

const agesOf = (name: string) => loadFits().find((d) => d.name === name)?.ages as AgeGroup[];

test('AICc and BIC by hand: log likelihood −100, two parameters, twelve returns', () => {
  expect(aicc(-100, 2, 12)).toBeCloseTo(200 + 4 + 12 / 9, 12);
  expect(bic(-100, 2, 12)).toBeCloseTo(200 + 2 * Math.log(12), 12);
  expect(aicc(-100, 2, 3)).toBeNull();
});

test('candidates are ranked by AICc and weighted by exp(−Δ/2)', () => {
  const { candidates, chosen } = fitProduct(configWith(), agedProduct('b', agesOf('ballbearing')));
  const scores = candidates.map((c) => c.aicc as number);
  expect([...scores].sort((a, b) => a - b)).toEqual(scores);
  expect(chosen).toBe(candidates[0]?.family);
  expect(candidates.reduce((sum, c) => sum + c.weight, 0)).toBeCloseTo(1, 12);
  const [first, second] = candidates;
  expect((second?.weight as number) / (first?.weight as number)).toBeCloseTo(
    Math.exp(-0.5 * ((scores[1] as number) - (scores[0] as number))),
    9,
  );
  expect(candidates.reduce((sum, c) => sum + (c.chosenShare as number), 0)).toBeCloseTo(1, 9);
});

test('weights of Weibull and lognormal on the bearing cages, log likelihoods .15 apart (.54 and .46, computed elsewhere)', () => {
  const config = configWith({ candidates: ['weibull', 'lognormal'] });
  const { candidates } = fitProduct(config, agedProduct('c', agesOf('bearingcage')));
  expect(candidates.map((c) => [c.family, Math.round(100 * c.weight)])).toEqual([
    ['weibull', 54],
    ['lognormal', 46],
  ]);
});

const few = (quantity: number) =>
  datedProduct(
    'F',
    [{ from: 20_000, to: 20_030, shipped: 900 }],
    [{ cohort: 0, from: 20_060, to: 20_090, quantity }],
  );

test('too few returns rule a candidate out, with the number that is needed', () => {
  const fit = fitProduct(configWith({ asOf: '2025-06-30' }), few(3));
  expect(fit.candidates.find((c) => c.family === 'weibull')?.ruledOut).toEqual({
    code: 'too-few-returns',
    message: '3 returns are too few for 2 parameters, at least 4 are needed',
  });
  expect(fit.chosen).toBe('exponential');
  expect(fit.candidates.find((c) => c.family === 'weibull')?.weight).toBe(0);
});

test('no returns: not forecast, and why', () => {
  const fit = fitProduct(configWith({ asOf: '2025-06-30' }), { ...few(1), returned: [] });
  expect(fit).toMatchObject({ chosen: null, candidates: [], notForecast: { code: 'no-returns' } });
});

test('two returns: all ruled out, and why', () => {
  const fit = fitProduct(configWith({ asOf: '2025-06-30' }), few(2));
  expect(fit).toMatchObject({ chosen: null, notForecast: { code: 'too-few-returns' } });
  expect(fit.candidates.length).toBe(5);
});

test('all units back on one day: the shape has no end, and the candidate says so', () => {
  const records = datedProduct(
    'O',
    [{ from: 0, to: 1, shipped: 6 }],
    [{ cohort: 0, from: 30, to: 31, quantity: 6 }],
    {
      resolution: 'day',
    },
  );
  const fit = fitProduct(configWith({ asOf: '1970-03-31' }), records);
  expect(fit.candidates.find((c) => c.family === 'weibull')).toMatchObject({
    converged: false,
    ruledOut: { code: 'not-converged', message: expect.stringMatching(/rises without end/) },
  });
});

test('a Weibull shape above 20 is flagged (common practice)', () => {
  const ages: AgeGroup[] = [98, 99, 100, 101, 102].map((age) => ({
    outcome: 'returned',
    from: age,
    to: age,
    exact: true,
    quantity: 1,
  }));
  const fit = fitProduct(configWith(), agedProduct('S', ages));
  expect(fit.findings.map((f) => f.code)).toEqual(['steep-shape']);
});

test('a delay shifts the ages: fitting t − 50 with no delay is fitting t with a delay of 50', () => {
  const ages = agesOf('nist');
  const moved = ages.map((g) => ({ ...g, from: g.from + 50, to: g.to + 50 }));
  const plain = fitProduct(configWith(), agedProduct('n', ages));
  const config = configWith();
  const rules = { ...config.everyProduct, delayDays: 50, delayReason: 'known' };
  const delayed = fitProduct({ ...config, everyProduct: rules }, agedProduct('n', moved));
  delayed.candidates.forEach((candidate, i) => {
    expect(candidate.logLikelihood).toBeCloseTo(plain.candidates[i]?.logLikelihood as number, 8);
  });
});

test('a warranty limit censors: ages beyond it say no more than the limit itself', () => {
  const config = configWith();
  const rules = { ...config.everyProduct, warrantyDays: 400 };
  const group = (to: number): AgeGroup[] => [
    ...agesOf('nist').filter((g) => g.outcome === 'returned' && g.to < 400),
    { outcome: 'surviving', from: to, to, exact: true, quantity: 12 },
  ];
  const [at, beyond] = [400, 900].map((to) =>
    fitProduct({ ...config, everyProduct: rules }, agedProduct('n', group(to))).candidates.map(
      (c) => c.logLikelihood,
    ),
  );
  expect(beyond).toEqual(at);
});

test('a curve that does not follow the records says so, one that does keeps silent', () => {
  const group = (age: number, quantity: number, outcome: AgeGroup['outcome'] = 'returned'): AgeGroup => ({
    outcome,
    from: age,
    to: age,
    exact: true,
    quantity,
  });
  const ages = Array.from({ length: 20 }, (_, i) => 10 * (i + 1));
  const settled = [...ages.map((age) => group(age, 15)), group(1000, 5000, 'surviving')];
  const codes = (records: readonly AgeGroup[]) =>
    fitProduct(configWith({ candidates: ['weibull'] }), agedProduct('S', records)).findings.map(
      (f) => f.code,
    );
  expect(codes(settled)).toContain('curve-leaves-estimate');
  expect(codes(agesOf('ballbearing'))).toEqual([]);
});
