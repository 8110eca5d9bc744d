import { intervalKeys, quantileKey } from '../quantiles.js';
import type { PredictedCount } from '../records.js';

/** Probabilities at which quantiles are given: both ends of every level, and the median. Ascending. */
export function quantileProbabilities(levels: readonly number[]): number[] {
  const keys = new Set(['0.5', ...levels.flatMap((level) => intervalKeys(level))]);
  return [...keys].map(Number).sort((a, b) => a - b);
}

/** A predicted count: means as given, and quantiles of the draws, p being the smallest y with G(y) ≥ p. Sorts `draws`. */
export function predictedCount(
  expected: number,
  plugIn: number,
  draws: Float64Array,
  probabilities: readonly number[],
): PredictedCount {
  draws.sort();
  const at = (p: number) => draws[Math.max(0, Math.ceil(p * draws.length - 1e-9) - 1)] ?? 0;
  return {
    expected,
    plugIn,
    quantiles: Object.fromEntries(probabilities.map((p) => [quantileKey(p), at(p)])),
  };
}

/** Draws of one column out of a matrix of draws by columns. */
export function columnOf(counts: ArrayLike<number>, columns: number, j: number): Float64Array {
  return Float64Array.from({ length: counts.length / columns }, (_, b) => counts[b * columns + j] as number);
}

/** For each of the first `periods` columns the draws of the sum of the columns up to it. */
export function cumulativeColumns(
  counts: ArrayLike<number>,
  columns: number,
  periods: number,
): Float64Array[] {
  const sums: Float64Array[] = [];
  for (let j = 0; j < periods; j++) {
    const before = sums[j - 1];
    sums.push(columnOf(counts, columns, j).map((count, b) => count + (before?.[b] ?? 0)));
  }
  return sums;
}

/** Running sums. */
export function cumulative(values: ArrayLike<number>): number[] {
  let sum = 0;
  return Array.from(values, (value) => {
    sum += value;
    return sum;
  });
}
