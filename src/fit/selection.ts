import { freeOf } from '../families/family.js';
import { familyNamed } from '../families/index.js';
import type { CandidateFit } from '../records.js';
import { aicc } from './choice.js';
import { randomWeights, refitter } from './draws.js';
import type { Terms } from './terms.js';

/**
 * In which share of refits to randomly weighted data each candidate would have had the best AICc; null for those that
 * are ruled out. It says how much of the choice is chance.
 * @param refits number of random weightings, the same ones for every candidate.
 */
export function withChosenShares(
  terms: Terms,
  candidates: readonly CandidateFit[],
  refits: number,
  seed: readonly (string | number)[],
): CandidateFit[] {
  const standing = candidates.filter((candidate) => candidate.ruledOut === null);
  const contests = standing.map((candidate) => {
    const family = familyNamed(candidate.family);
    const best = freeOf(family, candidate.parameters);
    const { counts, refit } = refitter(terms, family, best);
    const score = (weights: Float64Array) => {
      const value = refit(weights)?.value;
      return value === undefined
        ? Infinity
        : (aicc(value, candidate.parameterCount, terms.returns) ?? Infinity);
    };
    return { counts, score };
  });
  const wins = new Float64Array(standing.length);
  for (let b = 0; b < refits; b++) {
    const weights = randomWeights(contests[0]?.counts ?? terms.counts, [...seed, 'weights', b, 0]);
    const scores = contests.map((contest) => contest.score(weights));
    const winner = scores.indexOf(Math.min(...scores));
    wins[winner] = (wins[winner] as number) + 1;
  }
  return candidates.map((candidate) => {
    const place = standing.indexOf(candidate);
    return place < 0 ? candidate : { ...candidate, chosenShare: (wins[place] as number) / refits };
  });
}
