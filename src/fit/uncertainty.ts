import { chiSquareQuantile } from '../math/chi-square.js';
import { invertPositive } from '../math/linear.js';
import { maximise } from '../math/maximise.js';
import type { ParameterInterval } from '../records.js';
import type { Fitted } from './maximum.js';

/** Standard errors of the parameters from the inverse observed information, by the delta method; null when it has none. */
export function standardErrors(fitted: Fitted): (number | null)[] {
  const slopes = fitted.family.slopes(fitted.maximum.point);
  return freeErrors(fitted).map((error, i) =>
    error === null ? null : Math.abs(slopes[i] as number) * error,
  );
}

/** True when the observed information determines every parameter, if only within a factor of e^100. */
export function isIdentified(fitted: Fitted): boolean {
  return freeErrors(fitted).every((error) => error !== null && error < 100);
}

/** Standard errors of the free coordinates. */
function freeErrors({ likelihood, maximum }: Fitted): (number | null)[] {
  const k = likelihood.size;
  likelihood.evaluate(maximum.point);
  const covariance = invertPositive(
    likelihood.hessian.map((entry) => -entry),
    k,
  );
  return Array.from({ length: k }, (_, i) =>
    covariance === null ? null : Math.sqrt(covariance[i * k + i] as number),
  );
}

/**
 * Likelihood-ratio intervals of the parameters: where twice the drop of the profile log likelihood reaches the chi-square
 * quantile with one degree of freedom. An end that the likelihood never reaches is null.
 */
export function likelihoodRatioIntervals(fitted: Fitted, level: number): ParameterInterval[] {
  const drop = 0.5 * chiSquareQuantile(level, 1);
  const errors = freeErrors(fitted);
  const slopes = fitted.family.slopes(fitted.maximum.point);
  return slopes.map((slope, i) => {
    const spread = errors[i] ?? 1;
    const ends = [-1, 1].map((side) => profileEnd(fitted, i, side, spread, drop));
    const [lower, upper] = (slope > 0 ? ends : ends.reverse()) as [number | null, number | null];
    return { level, lower, upper, method: 'likelihood-ratio' };
  });
}

/** The parameter value on one side of the maximum where its profile has dropped by `drop`. */
function profileEnd(fitted: Fitted, i: number, side: number, spread: number, drop: number): number | null {
  const { likelihood, maximum, family } = fitted;
  const fixed = Array.from({ length: likelihood.size }, (_, j) => j === i);
  const wanted = Math.sqrt(2 * drop);
  const near = Math.max(1e-8, 4e-16 * Math.abs(maximum.value));
  let from = maximum.point;
  let nearest = 0;
  let farthest = Infinity;
  let distance = wanted * spread;
  for (let step = 0; step < 100; step++) {
    const start = Float64Array.from(from);
    start[i] = (maximum.point[i] as number) + side * distance;
    const profile = maximise(likelihood, start, { fixed, tolerance: 1e-12, inside: likelihood.inside });
    const root = Math.sqrt(Math.max(0, 2 * (maximum.value - profile.value)));
    if (!profile.converged || root > wanted) farthest = Math.min(farthest, distance);
    else nearest = Math.max(nearest, distance);
    if (profile.converged) from = profile.point;
    if (profile.converged && Math.abs(root - wanted) < near)
      return family.parameters(profile.point)[i] ?? null;
    if (distance > 600) return null;
    const slope = (-side * (likelihood.gradient[i] as number)) / root;
    distance = nextDistance(distance + (wanted - root) / slope, distance, nearest, farthest);
    if (farthest - nearest < 1e-12 * farthest) return null;
  }
  return null;
}

/** Newton's proposal, kept inside the bracket and from running away. */
function nextDistance(proposal: number, distance: number, nearest: number, farthest: number): number {
  if (proposal > nearest && proposal < Math.min(farthest, 3 * distance + 1)) return proposal;
  return farthest === Infinity ? 2 * distance : 0.5 * (nearest + farthest);
}
