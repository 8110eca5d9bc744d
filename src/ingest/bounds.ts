import type { DayRange } from '../calendar.js';
import type { ProductRules } from '../config.js';

/** Why a return has probability zero under the settings. */
export type OutOfBounds = 'beyond-warranty' | 'before-delay';

/**
 * Tells whether no unit of a cohort can be returned within `cell`: every age possible there is at or above the
 * warranty limit, or none is above the delay. Null when some return is possible.
 * @param limit age in days at which warranty ends, Infinity without a limit.
 */
export function outOfBounds(
  cell: DayRange,
  cohort: DayRange,
  limit: number,
  delay: number,
): OutOfBounds | null {
  const [youngest, oldest] = [cell.from - cohort.to, cell.to - cohort.from];
  if (youngest >= limit) return 'beyond-warranty';
  return oldest <= delay ? 'before-delay' : null;
}

/** What is said of a row that is out of bounds. @param among what its unit counts as. */
export function outOfBoundsText(
  code: OutOfBounds,
  rules: ProductRules,
  among: 'withdrawn' | 'surviving',
): string {
  const found =
    code === 'before-delay'
      ? `returned within the delay of ${rules.delayDays} days`
      : 'returned after the end of warranty';
  return `${found}; its unit is censored there and counts among the ${among}`;
}
