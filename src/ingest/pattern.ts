import { UTCDate } from '@date-fns/utc';
import { parse } from 'date-fns';
import { type PeriodKind, periodOf } from '../calendar.js';
import { UserError } from '../errors.js';
import { type Dated, dated, type Grain } from './dated.js';
import type { DateFault } from './dates.js';

const millisecondsPerDay = 86_400_000;

/**
 * Reads dates by a date-fns pattern, without a time zone. A pattern without a day names the week, month or quarter.
 * @throws UserError exit 2 when date-fns refuses the pattern, or when it names neither day, week, month nor quarter.
 */
export function patternReader(pattern: string): (text: string) => Dated | DateFault {
  const grain = grainOf(pattern);
  if (grain === null) throw badPattern(pattern, 'it names neither a day, a week, a month nor a quarter');
  tryPattern(pattern);
  return (text) => {
    const time = parse(text, pattern, new UTCDate(1970, 0, 1)).getTime();
    if (Number.isNaN(time))
      return { code: 'unreadable-date', message: `invalid date ${text}: it is not ${pattern}` };
    const day = Math.floor(time / millisecondsPerDay);
    return dated(
      grain === 'day' ? { from: day, to: day + 1 } : periodOf(day, grain satisfies PeriodKind),
      grain,
    );
  };
}

/** The finest unit that the letters of a pattern name outside quotes (Unicode TR 35 field symbols). */
function grainOf(pattern: string): Grain | null {
  const letters = pattern.replace(/'(?:[^']|'')*'/g, '');
  if (/[dDtTPEeci]/.test(letters)) return 'day';
  if (/[Iw]/.test(letters)) return 'week';
  if (/[ML]/.test(letters)) return 'month';
  return /[Qq]/.test(letters) ? 'quarter' : null;
}

function tryPattern(pattern: string): void {
  try {
    parse('2026-10-31', pattern, new UTCDate(1970, 0, 1));
  } catch (error) {
    throw badPattern(pattern, error instanceof Error ? error.message : String(error));
  }
}

function badPattern(pattern: string, why: string): UserError {
  const message = `invalid dateFormat ${pattern}: ${why}`;
  return new UserError(
    { code: 'invalid-date-format', message, remedy: 'use a date-fns pattern such as dd.MM.yyyy' },
    2,
  );
}
