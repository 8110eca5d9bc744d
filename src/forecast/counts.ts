import { familyNamed } from '../families/index.js';
import { binomialDraw } from '../math/binomial.js';
import { type Random, randomStream } from '../math/random.js';
import type { ParameterDraws } from '../records.js';
import { type Expectation, type Exposed, expectation } from './exposed.js';

/** The predictive distribution of the counts, as draws. */
export interface PredictiveCounts {
  readonly draws: number;
  /** Periods, and one more: until warranty ends, units shipped by the as-of date only. */
  readonly columns: number;
  /** Draw b, column j at b · columns + j. */
  readonly counts: Int32Array;
  /** Means over the draws of the conditional expectations, without count noise. */
  readonly mean: Expectation;
}

/**
 * For each draw of the parameters a multinomial draw over the columns within each group, summed over groups, so
 * that periods, cumulative and totals come from the same draws. Draw b depends on the seed words and b alone.
 */
export function predictiveCounts(exposed: Exposed, parameters: ParameterDraws): PredictiveCounts {
  const { free, k, seed } = parameters;
  const family = familyNamed(parameters.family);
  const draws = free.length / k;
  const columns = exposed.periods + 1;
  const counts = new Int32Array(draws * columns);
  const mean = {
    periods: new Float64Array(exposed.periods),
    planned: new Float64Array(exposed.periods),
    untilWarrantyEnds: 0,
  };
  for (let b = 0; b < draws; b++) {
    const chances = exposed.chances(family.jetsAt(free.subarray(b * k, (b + 1) * k)));
    const expected = expectation(exposed, chances);
    expected.periods.forEach((x, j) => {
      mean.periods[j] = (mean.periods[j] as number) + x / draws;
      mean.planned[j] = (mean.planned[j] as number) + (expected.planned[j] as number) / draws;
    });
    mean.untilWarrantyEnds += expected.untilWarrantyEnds / draws;
    drawCounts(
      exposed,
      chances,
      randomStream(...seed, 'counts', b),
      counts.subarray(b * columns, (b + 1) * columns),
    );
  }
  return { draws, columns, counts, mean };
}

/** Adds one multinomial draw of every group to `out`. */
function drawCounts(exposed: Exposed, chances: Float64Array, random: Random, out: Int32Array): void {
  const { groups, columns, periods } = exposed;
  for (let g = 0; g < groups.length; g++) {
    const { units, planned } = groups[g] as (typeof groups)[number];
    const used = planned ? periods : columns;
    let rest = 0;
    for (let j = 0; j < used; j++) rest += chances[g * columns + j] as number;
    let left = binomialDraw(random, units, rest);
    if (!planned) out[periods] = (out[periods] as number) + left;
    for (let j = 0; j < periods && left > 0; j++) {
      const chance = chances[g * columns + j] as number;
      const here = j === used - 1 ? left : binomialDraw(random, left, chance / rest);
      out[j] = (out[j] as number) + here;
      left -= here;
      rest -= chance;
    }
  }
}
