/** Intervals of a predicted count, read from its quantiles and put into words. */
import { intervalKeys } from '../quantiles.js';
import type { PredictedCount } from '../records.js';
import { countText, percentText, rangeText } from './numbers.js';

/** The two-sided interval at a level in (0, 1); null where its quantiles are not among those kept. */
export function intervalOf(
  count: PredictedCount,
  level: number,
): { lower: number | null; upper: number | null } {
  const [lower, upper] = intervalKeys(level);
  return { lower: count.quantiles[lower] ?? null, upper: count.quantiles[upper] ?? null };
}

/** `between 24 and 39 (80 %)`. */
export function betweenText(count: PredictedCount, level: number): string {
  const { lower, upper } = intervalOf(count, level);
  return `between ${countText(lower)} and ${countText(upper)} (${percentText(level)})`;
}

/** `with 80 % probability between 24 and 39`, where an interval is first spoken of. */
export function probablyText(count: PredictedCount, level: number): string {
  const { lower, upper } = intervalOf(count, level);
  return `with ${percentText(level)} probability between ${countText(lower)} and ${countText(upper)}`;
}

/** `24 to 39`. */
export function intervalText(count: PredictedCount, level: number): string {
  const { lower, upper } = intervalOf(count, level);
  return rangeText(lower, upper);
}
