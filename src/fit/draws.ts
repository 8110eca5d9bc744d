import { precisionFor } from '../exposure/grid.js';
import type { Family } from '../families/family.js';
import { cholesky, solveCholesky } from '../math/linear.js';
import { type Maximum, maximise } from '../math/maximise.js';
import { gammaDraw, randomStream } from '../math/random.js';
import type { ParameterDraws } from '../records.js';
import { coarseTerms } from './coarse.js';
import { logLikelihood } from './likelihood.js';
import { layTerms, type Terms } from './terms.js';

/** A candidate whose refits fail more often than this is not used for intervals. */
const allowedFailures = 0.01;

/**
 * Draws of the parameters by fractional random weights (Xu, Gotwalt, Hong, King & Meeker 2020, Am. Stat. 74:345-358):
 * every unit gets a standard exponential weight, so a term of r units gets Gamma(r, 1), and the likelihood is maximised
 * anew. Families of log location and scale take the pivotal form of the draw, μ̂ + (μ̂ − μ*) σ̂/σ* and σ̂²/σ*.
 * Draw b depends on the seed words and b alone.
 * @returns null when more than `allowedFailures` of the refits failed.
 */
export function parameterDraws(
  terms: Terms,
  family: Family,
  best: Float64Array,
  draws: number,
  seed: readonly (string | number)[],
): Omit<ParameterDraws, 'findings'> | null {
  const k = best.length;
  const free = new Float64Array(draws * k);
  const { counts, centre, refit } = refitter(terms, family, best);
  let restarted = 0;
  for (let b = 0; b < draws; b++) {
    let point: Float64Array | null = null;
    for (let attempt = 0; point === null; attempt++) {
      if (restarted > allowedFailures * draws) return null;
      point = refit(randomWeights(counts, [...seed, 'weights', b, attempt]))?.point ?? null;
      if (point === null) restarted++;
    }
    free.set(family.logLocationScale ? pivotal(best, centre, point) : shifted(best, centre, point), b * k);
  }
  return {
    family: family.name,
    free,
    k,
    kind: family.logLocationScale ? 'pivotal' : 'direct',
    restarted,
    seed,
  };
}

/** Refits of one family to weighted data. */
export interface Refitter {
  /** Units behind each coarse term, which the weights replace. */
  readonly counts: Float64Array;
  /** The maximum with the counts themselves. */
  readonly centre: Float64Array;
  /** The maximum for given weights; null when the refit fails. */
  readonly refit: (weights: Float64Array) => Maximum | null;
}

/**
 * Prepares refits on coarse terms. Each begins one step away from the centre, along the scores of the terms: the first
 * Newton step with the curvature that the weights have on average, which costs no evaluation.
 */
export function refitter(terms: Terms, family: Family, best: Float64Array): Refitter {
  const coarse = coarseTerms(terms);
  const likelihood = logLikelihood(coarse, layTerms(coarse, precisionFor(family, best)), family);
  const options = { tolerance: 1e-5, inside: likelihood.inside, predictLast: true };
  const first = maximise(likelihood, best, { inside: likelihood.inside });
  const centre = first.converged ? first.point : best;
  likelihood.evaluate(centre);
  const curvature = cholesky(
    likelihood.hessian.map((entry) => -entry),
    centre.length,
  );
  const scores = likelihood.scores(centre);
  const refit = (weights: Float64Array) => {
    likelihood.counts.set(weights);
    const start = curvature === null ? centre : oneStep(centre, curvature, scores, weights, coarse.counts);
    const near = maximise(likelihood, likelihood.inside(start) ? start : centre, options);
    const maximum = near.converged ? near : maximise(likelihood, centre, options);
    return maximum.converged ? maximum : null;
  };
  return { counts: coarse.counts, centre, refit };
}

function oneStep(
  centre: Float64Array,
  curvature: Float64Array,
  scores: Float64Array,
  weights: Float64Array,
  counts: Float64Array,
): Float64Array {
  const k = centre.length;
  const slope = new Float64Array(k);
  for (let t = 0; t < counts.length; t++) {
    const extra = weights[t]! - counts[t]!;
    for (let i = 0; i < k; i++) slope[i] = slope[i]! + extra * scores[t * k + i]!;
  }
  const step = solveCholesky(curvature, slope, k);
  const longest = step.reduce((most, x) => Math.max(most, Math.abs(x)), 0);
  const length = Math.min(1, 1 / longest);
  return centre.map((x, i) => x + length * step[i]!);
}

/** A standard gamma weight for every count. */
export function randomWeights(counts: Float64Array, words: readonly (string | number)[]): Float64Array {
  const random = randomStream(...words);
  return counts.map((count) => gammaDraw(random, count));
}

/** The generalised pivotal quantity; `centre` is the maximum of the same coarse terms, so that their error cancels. */
function pivotal(best: Float64Array, centre: Float64Array, draw: Float64Array): Float64Array {
  const [location, logScale] = [best[0] as number, best[1] ?? 0];
  const ratio = (centre[1] ?? 0) - (draw[1] ?? 0);
  const moved = location + ((centre[0] as number) - (draw[0] as number)) * Math.exp(ratio);
  return best.length === 1 ? Float64Array.of(moved) : Float64Array.of(moved, logScale + ratio);
}

function shifted(best: Float64Array, centre: Float64Array, draw: Float64Array): Float64Array {
  return best.map((value, i) => value + (draw[i] as number) - (centre[i] as number));
}
