import type { Family } from '../families/family.js';
import { type Maximum, maximise } from '../math/maximise.js';
import { gammaDraw, randomStream } from '../math/random.js';
import type { ParameterDraws } from '../records.js';
import { coarseTerms } from './coarse.js';
import { logLikelihood } from './likelihood.js';
import { type LaidTerms, layTerms, type Terms } from './terms.js';

/** A candidate whose refits fail more often than this is not used for intervals. */
export const allowedFailures = 0.01;

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
  const coarse = coarseTerms(terms);
  const refit = refitter(coarse, layTerms(coarse, 'draw'), family);
  const centre = refit(coarse.counts, best)?.point ?? best;
  let restarted = 0;
  for (let b = 0; b < draws; b++) {
    let point: Float64Array | null = null;
    for (let attempt = 0; point === null; attempt++) {
      if (restarted > allowedFailures * draws) return null;
      point = refit(randomWeights(coarse.counts, [...seed, 'weights', b, attempt]), centre)?.point ?? null;
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

/** The maximum for given weights, from a start; null when the refit fails. */
export function refitter(
  terms: Terms,
  laid: LaidTerms,
  family: Family,
): (weights: Float64Array, start: Float64Array) => Maximum | null {
  const likelihood = logLikelihood(terms, laid, family);
  return (weights, start) => {
    likelihood.counts.set(weights);
    const maximum = maximise(likelihood, start, { tolerance: 1e-5, inside: likelihood.inside });
    return maximum.converged ? maximum : null;
  };
}

/** A standard gamma weight for every count. */
export function randomWeights(counts: Float64Array, words: readonly (string | number)[]): Float64Array {
  const random = randomStream(...words);
  return counts.map((count) => gammaDraw(random, count));
}

/** The generalised pivotal quantity; `centre` is the maximum on the draws' coarser grid, so that its error cancels. */
function pivotal(best: Float64Array, centre: Float64Array, draw: Float64Array): Float64Array {
  const [location, logScale] = [best[0] as number, best[1] ?? 0];
  const ratio = (centre[1] ?? 0) - (draw[1] ?? 0);
  const moved = location + ((centre[0] as number) - (draw[0] as number)) * Math.exp(ratio);
  return best.length === 1 ? Float64Array.of(moved) : Float64Array.of(moved, logScale + ratio);
}

function shifted(best: Float64Array, centre: Float64Array, draw: Float64Array): Float64Array {
  return best.map((value, i) => value + (draw[i] as number) - (centre[i] as number));
}
