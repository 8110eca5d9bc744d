import {
  type Distribution,
  type Family,
  type Jets,
  requireFinite,
  requirePositive,
  type StartPoints,
} from './family.js';

/** A distribution on the whole line, standard form, with the derivatives that likelihoods need. */
export interface Standard {
  readonly logDensity: (z: number) => number;
  readonly logSurvival: (z: number) => number;
  readonly logCdf: (z: number) => number;
  readonly quantile: (logProbability: number, tail: 'lower' | 'upper') => number;
  /** Log density with its first and second derivative by z, into out[0..2]. */
  readonly densityJet: (z: number, out: Float64Array) => void;
  /** Log survival with its first and second derivative by z, into out[0..2]. */
  readonly survivalJet: (z: number, out: Float64Array) => void;
}

/** The family log T = location + scale · Z, with the parameters location and scale of log age. */
export function logLocationScaleFamily(name: string, standard: Standard): Family {
  return {
    name,
    parameterNames: ['location', 'scale'],
    logLocationScale: true,
    spread: (free) => Math.exp(free[1] as number),
    parameters: (free) => [free[0] as number, Math.exp(free[1] as number)],
    free: ([location, scale]) =>
      Float64Array.of(
        requireFinite('location', location as number),
        Math.log(requirePositive('scale', scale as number)),
      ),
    slopes: (free) => [1, Math.exp(free[1] as number)],
    at: (free) => logLocationScale(standard, free[0] as number, Math.exp(free[1] as number)),
    jetsAt: (free) => logLocationScaleJets(standard, free[0] as number, free[1] as number),
    start: (near) => startOnLine(standard, near),
  };
}

/** log T = location + scale · Z for a standard Z. @param scale above 0. */
export function logLocationScale(standard: Standard, location: number, scale: number): Distribution {
  const z = (age: number) => (Math.log(age) - location) / scale;
  return {
    logDensity: (age) => standard.logDensity(z(age)) - Math.log(scale) - Math.log(age),
    logSurvival: (age) => (age > 0 ? standard.logSurvival(z(age)) : 0),
    logCdf: (age) => (age > 0 ? standard.logCdf(z(age)) : -Infinity),
    quantile: (logP, tail) => Math.exp(location + scale * standard.quantile(logP, tail)),
  };
}

/**
 * Jets in the free coordinates (location, log scale).
 * With z = (log t − location)/scale: ∂z/∂location = −1/scale and ∂z/∂(log scale) = −z.
 */
export function logLocationScaleJets(standard: Standard, location: number, logScale: number): Jets {
  const inverse = Math.exp(-logScale);
  const s = new Float64Array(3);
  const chain = (z: number, out: Float64Array) => {
    const first = s[1] as number;
    const second = s[2] as number;
    out[1] = -first * inverse;
    out[2] = -first * z;
    out[3] = second * inverse * inverse;
    out[4] = (second * z + first) * inverse;
    out[5] = (second * z + first) * z;
  };
  return {
    logDensity: (_age, logAge, out) => {
      const z = (logAge - location) * inverse;
      standard.densityJet(z, s);
      chain(z, out);
      out[0] = (s[0] as number) - logScale - logAge;
      out[2] = (out[2] as number) - 1;
    },
    logSurvival: (_age, logAge, out) => {
      const z = (logAge - location) * inverse;
      standard.survivalJet(z, s);
      chain(z, out);
      out[0] = s[0] as number;
    },
  };
}

/** Location and log scale of the line through two points of the cdf. */
export function startOnLine(standard: Standard, near: StartPoints): Float64Array {
  const [t1, t2] = near.ages;
  const [z1, z2] = near.cdf.map((p) => standard.quantile(Math.log(p), 'lower')) as [number, number];
  const steep = z2 > z1 && t2 > t1 ? (Math.log(t2) - Math.log(t1)) / (z2 - z1) : 1;
  const scale = Math.min(20, Math.max(0.02, steep));
  return Float64Array.of(Math.log(t2) - scale * z2, Math.log(scale));
}
