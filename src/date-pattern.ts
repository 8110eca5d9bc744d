/** What a date-fns pattern can say of a day. Pure: read and written in UTC, so that no time zone can move a day. */
import { UTCDate } from '@date-fns/utc';
import { format, parse } from 'date-fns';
import { type PeriodKind, periodOf } from './calendar.js';

const millisecondsPerDay = 86_400_000;
/** Two-digit years are taken near this one, as date-fns does: 1981 to 2080. */
const reference = new UTCDate(2030, 9, 31);

/** The finest unit that dates written by a pattern keep, or why the pattern cannot be used. */
export type PatternVerdict = { readonly grain: 'day' | PeriodKind } | { readonly reason: string };

/** The day number that `text` gives by the pattern, the first day it may mean; null where it is not written so. */
export function dayByPattern(text: string, pattern: string): number | null {
  const time = parse(text, pattern, reference).getTime();
  return Number.isNaN(time) ? null : Math.floor(time / millisecondsPerDay);
}

/**
 * Judges a pattern by writing known days with it and reading them again: each must come back within its own day, week
 * (ISO 8601), month or quarter. Letters are those of Unicode TR 35, as date-fns reads them.
 */
export function judgePattern(pattern: string): PatternVerdict {
  const letters = pattern.replace(/''|'(?:''|[^'])+(?:'|$)/g, '');
  if (/[YD]/.test(letters)) return { reason: 'a year is yyyy and a day is dd, in small letters' };
  if (/[XxOztT]/.test(letters)) return { reason: 'a zone or an instant may change the written date' };
  if (/[Pp]/.test(letters)) return { reason: 'P and p depend on a locale' };
  if (!/[yRu]/.test(letters)) return { reason: 'it names no year' };
  const pairs = probes.map((day) => [day, readAgain(day, pattern)] as const);
  if (pairs.some(([, read]) => read === null)) return { reason: 'date-fns cannot read it' };
  const keeps = (start: (day: number) => number) =>
    pairs.every(([day, read]) => read !== null && start(read) === start(day));
  if (keeps((day) => day)) return { grain: 'day' };
  const kind = kinds.find((kind) => keeps((day) => periodOf(day, kind).from));
  return kind === undefined
    ? { reason: 'it gives neither a day, a week, a month nor a quarter' }
    : { grain: kind };
}

const kinds: readonly PeriodKind[] = ['week', 'month', 'quarter'];

/** Every eleventh day of three years, among them a leap year: all weekdays, all months, both halves of a turn of year. */
const probes = Array.from({ length: 100 }, (_, i) => 20_100 + 11 * i);

function readAgain(day: number, pattern: string): number | null {
  try {
    return dayByPattern(format(new UTCDate(day * millisecondsPerDay), pattern), pattern);
  } catch (error) {
    if (error instanceof RangeError) return null;
    throw error;
  }
}
