import { logGamma } from './gamma.js';
import type { Random } from './random.js';

/**
 * A binomial draw: inversion where n p is below 10, else transformed rejection (Hörmann 1993, algorithm BTRS).
 * @param n trials, a whole number ≥ 0. @param p probability; values outside [0, 1] by rounding count as the bound.
 */
export function binomialDraw(random: Random, n: number, p: number): number {
  if (n === 0 || p <= 0) return 0;
  if (p >= 1) return n;
  if (p > 0.5) return n - binomialDraw(random, n, 1 - p);
  return n * p < 10 ? byInversion(random, n, p) : byRejection(random, n, p);
}

function byInversion(random: Random, n: number, p: number): number {
  const odds = p / (1 - p);
  let probability = Math.exp(n * Math.log1p(-p));
  let u = random.uniform();
  let k = 0;
  while (u > probability && k < n) {
    u -= probability;
    k += 1;
    probability *= (odds * (n - k + 1)) / k;
  }
  return k;
}

function byRejection(random: Random, n: number, p: number): number {
  const spread = Math.sqrt(n * p * (1 - p));
  const b = 1.15 + 2.53 * spread;
  const a = -0.0873 + 0.0248 * b + 0.01 * p;
  const c = n * p + 0.5;
  const vr = 0.92 - 4.2 / b;
  const alpha = (2.83 + 5.1 / b) * spread;
  const logOdds = Math.log(p / (1 - p));
  const mode = Math.floor((n + 1) * p);
  const h = logGamma(mode + 1) + logGamma(n - mode + 1);
  for (;;) {
    const v = random.uniform();
    const u = random.uniform() - 0.5;
    const us = 0.5 - Math.abs(u);
    const k = Math.floor(((2 * a) / us + b) * u + c);
    if (us >= 0.07 && v <= vr) return k;
    if (k < 0 || k > n) continue;
    const bound = Math.log((v * alpha) / (a / (us * us) + b));
    if (bound <= h - logGamma(k + 1) - logGamma(n - k + 1) + (k - mode) * logOdds) return k;
  }
}
