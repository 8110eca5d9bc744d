import { logNormalSurvival, normalHazard } from '../math/erf.js';
import { logComplement } from '../math/gamma.js';
import type { Standard } from './log-location-scale.js';

const halfLogTwoPi = 0.5 * Math.log(2 * Math.PI);

/** Smallest extreme value: S(z) = exp(−eᶻ). */
export const smallestExtremeValue: Standard = {
  logDensity: (z) => z - Math.exp(z),
  logSurvival: (z) => -Math.exp(z),
  logCdf: (z) => logComplement(-Math.exp(z)),
  quantile: (logP, tail) => Math.log(-(tail === 'upper' ? logP : logComplement(logP))),
  densityJet: (z, out) => {
    const w = Math.exp(z);
    out[0] = z - w;
    out[1] = 1 - w;
    out[2] = -w;
  },
  survivalJet: (z, out) => {
    const w = -Math.exp(z);
    out[0] = w;
    out[1] = w;
    out[2] = w;
  },
};

/** Standard normal. */
export const normal: Standard = {
  logDensity: (z) => -0.5 * z * z - halfLogTwoPi,
  logSurvival: logNormalSurvival,
  logCdf: (z) => logNormalSurvival(-z),
  quantile: (logP, tail) => (tail === 'upper' ? upperNormalQuantile(logP) : -upperNormalQuantile(logP)),
  densityJet: (z, out) => {
    out[0] = -0.5 * z * z - halfLogTwoPi;
    out[1] = -z;
    out[2] = -1;
  },
  survivalJet: (z, out) => {
    const hazard = normalHazard(z);
    out[0] = logNormalSurvival(z);
    out[1] = -hazard;
    out[2] = -hazard * (hazard - z);
  },
};

/** Standard logistic: S(z) = 1/(1 + eᶻ). */
export const logistic: Standard = {
  logDensity: (z) => -Math.abs(z) - 2 * Math.log1p(Math.exp(-Math.abs(z))),
  logSurvival: (z) => -softplus(z),
  logCdf: (z) => -softplus(-z),
  quantile: (logP, tail) => {
    const odds = logP - logComplement(logP);
    return tail === 'upper' ? -odds : odds;
  },
  densityJet: (z, out) => {
    const e = Math.exp(-Math.abs(z));
    const q = e / (1 + e);
    out[0] = -Math.abs(z) - 2 * Math.log(1 + e);
    out[1] = z > 0 ? 2 * q - 1 : 1 - 2 * q;
    out[2] = -2 * q * (1 - q);
  },
  survivalJet: (z, out) => {
    const p = 1 / (1 + Math.exp(-z));
    out[0] = -softplus(z);
    out[1] = -p;
    out[2] = -p * (1 - p);
  },
};

/** log(1 + eᶻ). */
function softplus(z: number): number {
  return Math.max(z, 0) + Math.log1p(Math.exp(-Math.abs(z)));
}

/** z with log P(Z > z) = logP, by Newton's iteration on the concave log survival. */
function upperNormalQuantile(logP: number): number {
  if (logP > -Math.LN2) return -upperNormalQuantile(logComplement(logP));
  let z = Math.sqrt(-2 * logP) * 0.9;
  for (let i = 0; i < 60; i++) {
    const change = (logNormalSurvival(z) - logP) / normalHazard(z);
    z += change;
    if (Math.abs(change) <= 1e-15 * Math.max(1, Math.abs(z))) break;
  }
  return z;
}
