import type { CandidateFit, NotForecast } from '../records.js';
import type { Fitted } from './maximum.js';
import { isIdentified, likelihoodRatioIntervals, standardErrors } from './uncertainty.js';

const intervalLevel = 0.95;

/** AICc with the number of returns d as sample size (Hurvich & Tsai 1989); null when d ≤ k + 1. */
export function aicc(logLikelihood: number, k: number, d: number): number | null {
  return d > k + 1 ? -2 * logLikelihood + 2 * k + (2 * k * (k + 1)) / (d - k - 1) : null;
}

/** BIC with the number of returns d as sample size (Schwarz 1978). */
export function bic(logLikelihood: number, k: number, d: number): number {
  return -2 * logLikelihood + k * Math.log(d);
}

/**
 * The candidates as fit.json holds them, best AICc first and the ruled-out ones last, with Akaike weights over those that
 * are not ruled out. @param d number of returns.
 */
export function rankCandidates(fits: readonly Fitted[], d: number): CandidateFit[] {
  const candidates = fits.map((fitted) => describe(fitted, d));
  const best = Math.min(...candidates.map(criterion));
  const total = candidates.reduce((sum, c) => sum + Math.exp(-0.5 * (criterion(c) - best)), 0);
  return candidates
    .map((c) => ({ ...c, weight: c.ruledOut === null ? Math.exp(-0.5 * (criterion(c) - best)) / total : 0 }))
    .sort(order);
}

/** AICc, or Infinity for a candidate that is ruled out. */
export function criterion(candidate: CandidateFit): number {
  return candidate.ruledOut === null ? (candidate.aicc ?? Infinity) : Infinity;
}

/** Why a candidate cannot be chosen, or null. */
export function ruledOut(fitted: Fitted, d: number): NotForecast | null {
  const k = fitted.likelihood.size;
  if (d <= k + 1) {
    const message = `${d} ${d === 1 ? 'return is' : 'returns are'} too few for ${k} ${k === 1 ? 'parameter' : 'parameters'}, at least ${k + 2} are needed`;
    return { code: 'too-few-returns', message };
  }
  if (!fitted.maximum.converged) {
    return { code: 'not-converged', message: `the fit did not converge: ${fitted.maximum.reason}` };
  }
  if (isIdentified(fitted)) return null;
  const message = 'the likelihood is flat at its maximum: the records do not determine the parameters';
  return { code: 'not-identified', message };
}

function describe(fitted: Fitted, d: number): CandidateFit {
  const { family, maximum } = fitted;
  const usable = maximum.converged;
  const errors = standardErrors(fitted);
  const intervals = usable ? likelihoodRatioIntervals(fitted, intervalLevel) : [];
  const value = Number.isFinite(maximum.value) ? maximum.value : null;
  const k = fitted.likelihood.size;
  return {
    family: family.name,
    atRisk: null,
    parameters: named(family.parameterNames, family.parameters(maximum.point)),
    standardErrors: named(family.parameterNames, usable ? errors : errors.map(() => null)),
    intervals: named(family.parameterNames.slice(0, intervals.length), intervals),
    logLikelihood: value,
    parameterCount: k,
    aicc: value === null ? null : aicc(value, k, d),
    bic: value === null || d === 0 ? null : bic(value, k, d),
    weight: 0,
    converged: maximum.converged,
    ruledOut: ruledOut(fitted, d),
    chosenShare: null,
  };
}

function order(a: CandidateFit, b: CandidateFit): number {
  const [x, y] = [criterion(a), criterion(b)];
  return x === y ? 0 : x - y;
}

function named<T>(names: readonly string[], values: readonly T[]): Record<string, T> {
  return Object.fromEntries(names.map((name, i) => [name, values[i] as T]));
}
