/**
 * The proleptic Gregorian calendar as day numbers. Day d is the interval [d, d + 1); day 0 is 1970-01-01. No `Date`
 * is involved, so no time zone and no locale can be.
 */

export type PeriodKind = 'week' | 'month' | 'quarter';

/** A half-open interval of day numbers, [from, to). */
export interface DayRange {
  readonly from: number;
  readonly to: number;
}

/** Days in the month that ages are shown in. */
export const daysPerMonth = 30.4375;

/**
 * Day number of a civil date; any integers are allowed, months beyond 1..12 carry into the year.
 * Source: the era decomposition of H. Hinnant, "chrono-compatible low-level date algorithms" (2014).
 */
export function dayNumber(year: number, month: number, day: number): number {
  const monthsFromMarch = year * 12 + month - 3;
  const y = Math.floor(monthsFromMarch / 12);
  const m = monthsFromMarch - 12 * y;
  const era = Math.floor(y / 400);
  const yearOfEra = y - era * 400;
  const dayOfYear = Math.floor((153 * m + 2) / 5) + day - 1;
  const dayOfEra = yearOfEra * 365 + Math.floor(yearOfEra / 4) - Math.floor(yearOfEra / 100) + dayOfYear;
  return era * 146097 + dayOfEra - 719468;
}

/** Year, month (1 to 12) and day of a day number. */
export function civilDate(day: number): { year: number; month: number; day: number } {
  const z = day + 719468;
  const era = Math.floor(z / 146097);
  const doe = z - era * 146097;
  const yoe = Math.floor(
    (doe - Math.floor(doe / 1460) + Math.floor(doe / 36524) - Math.floor(doe / 146096)) / 365,
  );
  const doy = doe - (365 * yoe + Math.floor(yoe / 4) - Math.floor(yoe / 100));
  const mp = Math.floor((5 * doy + 2) / 153);
  const month = mp < 10 ? mp + 3 : mp - 9;
  return {
    year: yoe + era * 400 + (month <= 2 ? 1 : 0),
    month,
    day: doy - Math.floor((153 * mp + 2) / 5) + 1,
  };
}

/** `2026-10-31`. */
export function isoDate(day: number): string {
  const { year, month, day: d } = civilDate(day);
  return `${String(year).padStart(4, '0')}-${two(month)}-${two(d)}`;
}

/** The day number of `text` when it is a real date written YYYY-MM-DD, else null. */
export function parseIsoDate(text: string): number | null {
  if (!/^\d{4}-\d{2}-\d{2}$/.test(text)) return null;
  const [year, month, day] = [Number(text.slice(0, 4)), Number(text.slice(5, 7)), Number(text.slice(8))];
  if (month < 1 || month > 12 || day < 1 || day > daysInMonth(year, month)) return null;
  return dayNumber(year, month, day);
}

/** `day` moved by whole calendar months; a day that the month lacks becomes its last. */
export function addMonths(day: number, months: number): number {
  const date = civilDate(day);
  const first = dayNumber(date.year, date.month + months, 1);
  const { year, month } = civilDate(first);
  return first + Math.min(date.day, daysInMonth(year, month)) - 1;
}

/** The week (Monday to Sunday, ISO 8601), calendar month or calendar quarter that holds `day`. */
export function periodOf(day: number, kind: PeriodKind): DayRange {
  if (kind === 'week') {
    const from = day - mondayBased(day);
    return { from, to: from + 7 };
  }
  const { year, month } = civilDate(day);
  const length = kind === 'month' ? 1 : 3;
  const first = month - ((month - 1) % length);
  return { from: dayNumber(year, first, 1), to: dayNumber(year, first + length, 1) };
}

/** `2026-11`, `2026-W45` (ISO 8601) or `2026-Q4` for the period that holds `day`. */
export function periodLabel(day: number, kind: PeriodKind): string {
  if (kind === 'week') {
    const thursday = day - mondayBased(day) + 3;
    const { year } = civilDate(thursday);
    return `${year}-W${two(Math.floor((thursday - dayNumber(year, 1, 1)) / 7) + 1)}`;
  }
  const { year, month } = civilDate(day);
  return kind === 'month' ? `${year}-${two(month)}` : `${year}-Q${Math.floor((month + 2) / 3)}`;
}

/** The days that `2026-11-05`, `2026-11`, `2026-W45` or `2026-Q4` names, else null. */
export function parsePeriod(text: string): DayRange | null {
  const day = parseIsoDate(text);
  if (day !== null) return { from: day, to: day + 1 };
  const month = /^(\d{4})-(0[1-9]|1[0-2])$/.exec(text);
  if (month) return periodOf(dayNumber(Number(month[1]), Number(month[2]), 1), 'month');
  const quarter = /^(\d{4})-Q([1-4])$/.exec(text);
  if (quarter) return periodOf(dayNumber(Number(quarter[1]), Number(quarter[2]) * 3, 1), 'quarter');
  const week = /^(\d{4})-W(\d{2})$/.exec(text);
  if (!week) return null;
  const range = periodOf(dayNumber(Number(week[1]), 1, 4) + 7 * (Number(week[2]) - 1), 'week');
  return periodLabel(range.from, 'week') === text ? range : null;
}

/** The periods of one kind that touch [range.from, range.to), in order, whole. */
export function periodsIn(range: DayRange, kind: PeriodKind): DayRange[] {
  const periods: DayRange[] = [];
  for (let day = range.from; day < range.to; ) {
    const period = periodOf(day, kind);
    periods.push(period);
    day = period.to;
  }
  return periods;
}

function daysInMonth(year: number, month: number): number {
  return dayNumber(year, month + 1, 1) - dayNumber(year, month, 1);
}

/** 0 for Monday … 6 for Sunday; day 0 was a Thursday. */
function mondayBased(day: number): number {
  return (((day + 3) % 7) + 7) % 7;
}

function two(n: number): string {
  return String(n).padStart(2, '0');
}
