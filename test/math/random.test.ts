/** Moments and exact tails of the random numbers, each within five of its own standard errors, seeds fixed. */
import { expect, test } from 'vitest';
import { binomialDraw } from '../../src/math/binomial.js';
import { gammaDraw, normalDraw, type Random, randomStream } from '../../src/math/random.js';

const draws = 200_000;

function moments(seed: string, draw: (random: Random) => number): { mean: number; variance: number } {
  const random = randomStream(seed);
  let [sum, squares] = [0, 0];
  for (let i = 0; i < draws; i++) {
    const x = draw(random);
    sum += x;
    squares += x * x;
  }
  return { mean: sum / draws, variance: squares / draws - (sum / draws) ** 2 };
}

test('a stream depends on its words and nothing else', () => {
  const first = Array.from({ length: 5 }, () => randomStream(1, 'A', 7).uniform());
  expect(new Set(first).size).toBe(1);
  const words = [
    [1, 'A', 7],
    [1, 'A', 8],
    [2, 'A', 7],
    [1, 'B', 7],
    [1, 'A7'],
    [17, 'A'],
  ] as const;
  expect(new Set(words.map((w) => randomStream(...w).uniform())).size).toBe(words.length);
});

test('uniform: mean 1/2, variance 1/12, inside (0, 1)', () => {
  const { mean, variance } = moments('uniform', (r) => r.uniform());
  expect(Math.abs(mean - 0.5)).toBeLessThan(5 * Math.sqrt(1 / 12 / draws));
  expect(Math.abs(variance - 1 / 12)).toBeLessThan(5 * Math.sqrt(1 / 180 / draws));
});

test('neighbouring streams do not resemble one another', () => {
  let sum = 0;
  const n = 20_000;
  for (let b = 0; b < n; b++) {
    sum += (randomStream(1, 'x', b).uniform() - 0.5) * (randomStream(1, 'x', b + 1).uniform() - 0.5);
  }
  expect(Math.abs(sum / n)).toBeLessThan(5 / (12 * Math.sqrt(n)));
});

test('normal: mean 0, variance 1', () => {
  const { mean, variance } = moments('normal', normalDraw);
  expect(Math.abs(mean)).toBeLessThan(5 / Math.sqrt(draws));
  expect(Math.abs(variance - 1)).toBeLessThan(5 * Math.sqrt(2 / draws));
});

test.each([0.2, 1, 2.5, 400])('gamma of shape %f: mean and variance are the shape', (shape) => {
  const { mean, variance } = moments('gamma', (r) => gammaDraw(r, shape));
  expect(Math.abs(mean - shape)).toBeLessThan(5 * Math.sqrt(shape / draws));
  expect(Math.abs(variance / shape - 1)).toBeLessThan(5 * Math.sqrt((2 + 6 / shape) / draws));
});

test.each([
  [7, 0.3],
  [30, 0.9],
  [1000, 0.004],
  [200, 0.2],
  [100_000, 0.3],
])('binomial %i, %f: mean, variance, and never outside', (n, p) => {
  const { mean, variance } = moments('binomial', (r) => {
    const k = binomialDraw(r, n, p);
    if (!(k >= 0 && k <= n && Number.isInteger(k))) throw new Error(`${k}`);
    return k;
  });
  const wanted = n * p * (1 - p);
  expect(Math.abs(mean - n * p)).toBeLessThan(5 * Math.sqrt(wanted / draws));
  expect(Math.abs(variance / wanted - 1)).toBeLessThan(5 * Math.sqrt((2 + 1 / wanted) / draws));
});

test('binomial by rejection has the exact distribution: chi-square over the cells of Bin(60, 0.4)', () => {
  const [n, p] = [60, 0.4];
  const seen = new Array<number>(n + 1).fill(0);
  const random = randomStream('cells');
  for (let i = 0; i < draws; i++) {
    const k = binomialDraw(random, n, p);
    seen[k] = (seen[k] ?? 0) + 1;
  }
  let statistic = 0;
  let cells = 0;
  for (let k = 0, probability = (1 - p) ** n; k <= n; k++) {
    const expected = draws * probability;
    if (expected > 5) {
      statistic += ((seen[k] ?? 0) - expected) ** 2 / expected;
      cells += 1;
    }
    probability *= ((n - k) * p) / ((k + 1) * (1 - p));
  }
  expect(cells).toBeGreaterThan(25);
  expect(Math.abs(statistic - cells)).toBeLessThan(4 * Math.sqrt(2 * cells));
});

test('the bounds of a probability', () => {
  const random = randomStream('bounds');
  expect([binomialDraw(random, 9, 0), binomialDraw(random, 9, 1), binomialDraw(random, 0, 0.5)]).toEqual([
    0, 9, 0,
  ]);
});
