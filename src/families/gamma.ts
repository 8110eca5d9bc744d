/** Gamma: density t^(shape − 1) exp(−t / scale) / (Γ(shape) scale^shape). Free coordinates: log shape, log scale. */
import { digamma, logGamma, logIncompleteGamma, trigamma } from '../math/gamma.js';
import { differenceJet } from './difference-jet.js';
import { type Distribution, type Family, type Jet, requirePositive } from './family.js';

export const gamma: Family = {
  name: 'gamma',
  parameterNames: ['shape', 'scale'],
  logLocationScale: false,
  spread: (free) => Math.exp(-0.5 * (free[0] as number)),
  parameters: (free) => [Math.exp(free[0] as number), Math.exp(free[1] as number)],
  free: ([shape, scale]) =>
    Float64Array.of(
      Math.log(requirePositive('shape', shape as number)),
      Math.log(requirePositive('scale', scale as number)),
    ),
  slopes: (free) => [Math.exp(free[0] as number), Math.exp(free[1] as number)],
  at: (free) => distribution(Math.exp(free[0] as number), Math.exp(free[1] as number)),
  jetsAt: (free) => ({
    logDensity: densityJet(Math.exp(free[0] as number), free[1] as number),
    logSurvival: differenceJet(
      free,
      (shifted, age) =>
        logIncompleteGamma(Math.exp(shifted[0] as number), age * Math.exp(-(shifted[1] as number))).upper,
    ),
  }),
  start: ({ ages, cdf }) => {
    const shape = growthBetween(ages, cdf);
    const reached = distribution(shape, 1).quantile(Math.log(cdf[1]), 'lower');
    return Float64Array.of(Math.log(shape), Math.log(ages[1] / reached));
  },
};

function distribution(a: number, b: number): Distribution {
  const norm = logGamma(a) + Math.log(b);
  return {
    logDensity: (t) => (a - 1) * Math.log(t / b) - t / b - norm,
    logSurvival: (t) => logIncompleteGamma(a, t / b).upper,
    logCdf: (t) => logIncompleteGamma(a, t / b).lower,
    quantile: (logP, tail) => b * standardQuantile(a, logP, tail),
  };
}

/** log f = (a − 1)(log t − log b) − t/b − log b − log Γ(a), by log a and log b. */
function densityJet(a: number, logB: number): Jet {
  const [psi, psi1, norm, inverse] = [digamma(a), trigamma(a), logGamma(a) + logB, Math.exp(-logB)];
  return (age, logAge, out) => {
    const logX = logAge - logB;
    const x = age * inverse;
    const byShape = a * (logX - psi);
    out[0] = (a - 1) * logX - x - norm;
    out[1] = byShape;
    out[2] = x - a;
    out[3] = byShape - a * a * psi1;
    out[4] = -a;
    out[5] = -x;
  };
}

/** Newton's iteration for log x on the log probability, which is monotone and concave in log x; halved when it overshoots. */
function standardQuantile(a: number, logP: number, tail: 'lower' | 'upper'): number {
  const log = (y: number) => logIncompleteGamma(a, Math.exp(y))[tail];
  const logSlope = (y: number) => a * y - Math.exp(y) - logGamma(a);
  const sign = tail === 'lower' ? 1 : -1;
  let y = tail === 'lower' ? Math.min(Math.log(a + 1), (logP + logGamma(a + 1)) / a) : Math.log(a + 1);
  for (let i = 0; i < 200; i++) {
    const value = log(y);
    const step = ((logP - value) * sign) / Math.exp(logSlope(y) - value);
    const change = Math.max(-1, Math.min(1, step));
    y += change;
    if (Math.abs(change) < 1e-15 * Math.max(1, Math.abs(y))) break;
  }
  return Math.exp(y);
}

/** Slope of the log cumulative hazard by log age between two ages: a shape of about the right size. */
function growthBetween(ages: readonly [number, number], cdf: readonly [number, number]): number {
  const [h1, h2] = cdf.map((p) => Math.log(-Math.log1p(-p))) as [number, number];
  const steep = ages[1] > ages[0] ? (h2 - h1) / Math.log(ages[1] / ages[0]) : 1;
  return Math.min(50, Math.max(0.05, steep));
}
