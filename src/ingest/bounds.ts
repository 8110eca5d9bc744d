import type { DayRange } from '../calendar.js';
import type { ProductRules } from '../config.js';

/** Why a return has probability zero under the settings. */
export type OutOfBounds = 'beyond-warranty' | 'before-delay';

/**
 * Tells whether no unit of a cohort can be returned within `cell` (SPEC 6.2): every age possible there is at or above the
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

/** What a row says that is out of bounds. */
export function outOfBoundsText(code: OutOfBounds, rules: ProductRules): string {
  if (code === 'before-delay')
    return `returned within the delay of ${rules.delayDays} days; counted as withdrawn`;
  return 'returned after the end of warranty; counted as a survivor of the warranty';
}
