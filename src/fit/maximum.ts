import { exponential } from '../families/exponential.js';
import type { Family, StartPoints } from '../families/family.js';
import { weibull } from '../families/weibull.js';
import { type Maximum, maximise } from '../math/maximise.js';
import { type LogLikelihood, logLikelihood } from './likelihood.js';
import type { LaidTerms, Terms } from './terms.js';

/** A family at the maximum of its likelihood. */
export interface Fitted {
  readonly family: Family;
  readonly likelihood: LogLikelihood;
  readonly maximum: Maximum;
}

/** Everything about a product's data that fitting needs. */
export interface Problem {
  readonly terms: Terms;
  readonly laid: LaidTerms;
  /** Two ages among the returns, early and late, counted from the end of the delay. */
  readonly ages: readonly [number, number];
}

/**
 * Fits families to the same data. The exponential starts from returns per exposure, the Weibull from it, the others from
 * the cdf of the Weibull at two ages among the returns.
 */
export function fitFamilies(problem: Problem, wanted: readonly Family[]): Fitted[] {
  const first = fitFrom(problem, exponential, Float64Array.of(Math.log(meanExposure(problem))));
  const shaped = fitFrom(problem, weibull, Float64Array.of(first.maximum.point[0] as number, 0));
  const guide = shaped.maximum.converged ? shaped : first;
  const near = startPoints(guide, problem.ages);
  return wanted.map((family) => {
    if (family.name === exponential.name) return first;
    if (family.name === weibull.name) return shaped;
    return fitFrom(problem, family, family.start(near));
  });
}

/** Fits one family from given free coordinates. */
function fitFrom(problem: Problem, family: Family, start: Float64Array): Fitted {
  const likelihood = logLikelihood(problem.terms, problem.laid, family);
  return { family, likelihood, maximum: maximise(likelihood, start, { inside: likelihood.inside }) };
}

/** Ages at which returns fell, roughly: the first and the last decile of the windows' middles, and of known ages. */
export function typicalAges(terms: Terms): readonly [number, number] {
  const middles: [number, number][] = terms.returned.map((window, w) => {
    const from = Math.max(terms.delay, Math.min(...window.knots));
    return [0.5 * (from + window.end) - terms.delay, terms.counts[w] as number];
  });
  const offset = terms.returned.length + terms.kept.length;
  terms.aged.forEach((group, a) => {
    if (group.outcome === 'returned') {
      middles.push([0.5 * (group.from + group.to), terms.counts[offset + a] as number]);
    }
  });
  middles.sort((a, b) => a[0] - b[0]);
  const [early, late] = [weightedQuantile(middles, 0.1), weightedQuantile(middles, 0.9)];
  return late > early ? [early, late] : [0.5 * late, late];
}

/** The guide's cdf at two ages, kept inside (0, 1). */
function startPoints(guide: Fitted, ages: readonly [number, number]): StartPoints {
  const life = guide.family.at(guide.maximum.point);
  const cdf = ages.map((age) => Math.min(0.999, Math.max(1e-12, Math.exp(life.logCdf(age)))));
  return { ages, cdf: cdf as [number, number] };
}

/** Total time at risk over the number of returns, in rough strokes: every window and age counts with its middle. */
function meanExposure({ terms }: Problem): number {
  const middle = (age: number) => Math.max(1e-3, age - terms.delay);
  let exposure = 0;
  terms.returned.forEach((window, w) => {
    exposure +=
      (terms.counts[w] as number) * middle(0.5 * (Math.max(0, Math.min(...window.knots)) + window.end));
  });
  terms.kept.forEach((window, w) => {
    const units = terms.counts[terms.returned.length + w] as number;
    exposure += units * middle(0.5 * (window.full + window.end));
  });
  for (const group of terms.aged) exposure += group.quantity * Math.max(1e-9, 0.5 * (group.from + group.to));
  return exposure / Math.max(1, terms.returns);
}

function weightedQuantile(sorted: readonly (readonly [number, number])[], p: number): number {
  const total = sorted.reduce((sum, [, weight]) => sum + weight, 0);
  let reached = 0;
  for (const [value, weight] of sorted) {
    reached += weight;
    if (reached >= p * total) return value;
  }
  return sorted.at(-1)?.[0] ?? 1;
}
