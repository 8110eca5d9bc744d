import { type DayRange, isoDate, type PeriodKind, parseIsoDate, periodLabel, periodOf } from '../calendar.js';
import type { Config } from '../config.js';
import { exitCodes, UserError } from '../errors.js';

/** Units or rows that the records date to some days. */
export interface DatedQuantity {
  readonly range: DayRange;
  readonly quantity: number;
}

/** Share of an average period below which a last period is taken for a stray date. */
const strayShare = 0.02;

/** The end of the as-of day, Infinity when the settings do not name one. */
export function cutOffOrOpen(config: Config): number {
  const day = config.asOf === null ? null : parseIsoDate(config.asOf);
  return day === null ? Infinity : day + 1;
}

/** The fault of a run without an as-of date; its remedy proposes the last complete period of the records. */
export function missingAsOf(kind: PeriodKind, dates: Iterable<DatedQuantity>): UserError {
  const period = lastComplete(kind, dates);
  const remedy =
    period === null
      ? 'set asOf, or give --as-of, the last day whose records count'
      : `the last complete period in the records is ${periodLabel(period.from, kind)}: set asOf to ${isoDate(period.to - 1)}, or give --as-of ${isoDate(period.to - 1)}`;
  return new UserError(
    { code: 'missing-as-of', message: 'missing asOf: the last day whose records count', remedy },
    exitCodes.unusableSettings,
  );
}

function lastComplete(kind: PeriodKind, dates: Iterable<DatedQuantity>): DayRange | null {
  const ends = new Map<number, { quantity: number; end: number }>();
  for (const { range, quantity } of dates) {
    const { from } = periodOf(range.to - 1, kind);
    const before = ends.get(from) ?? { quantity: 0, end: 0 };
    ends.set(from, { quantity: before.quantity + Math.abs(quantity), end: Math.max(before.end, range.to) });
  }
  const average = [...ends.values()].reduce((sum, { quantity }) => sum + quantity, 0) / ends.size;
  const active = [...ends].filter(([, { quantity }]) => quantity >= strayShare * average);
  const last = active.reduce<[number, number] | null>(
    (best, [from, { end }]) => (best === null || from > best[0] ? [from, end] : best),
    null,
  );
  if (last === null) return null;
  const period = periodOf(last[0], kind);
  return last[1] >= period.to ? period : periodOf(period.from - 1, kind);
}
