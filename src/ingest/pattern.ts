import { UTCDate } from '@date-fns/utc';
import { format, parse } from 'date-fns';
import { type PeriodKind, periodOf } from '../calendar.js';
import { exitCodes, UserError } from '../errors.js';
import { type Dated, dated, type Grain } from './dated.js';
import type { DateFault } from './dates.js';

const millisecondsPerDay = 86_400_000;
/** Two-digit years are taken near this one, as date-fns does: 1981 to 2080. */
const reference = new UTCDate(2030, 9, 31);

/**
 * Reads dates by a date-fns pattern, without a time zone. A pattern without a day names the week, month or quarter.
 * @throws UserError exit 2 when date-fns refuses the pattern, or when it names a zone, an instant, no year, or neither day, week, month
 * nor quarter.
 */
export function patternReader(pattern: string): (text: string) => Dated | DateFault {
  const grain = checkedGrain(pattern);
  return (text) => {
    const time = parse(text, pattern, reference).getTime();
    if (Number.isNaN(time)) {
      return { code: 'unreadable-date', message: `invalid date ${text}: it is not ${pattern}` };
    }
    const day = Math.floor(time / millisecondsPerDay);
    return dated(
      grain === 'day' ? { from: day, to: day + 1 } : periodOf(day, grain satisfies PeriodKind),
      grain,
    );
  };
}

function checkedGrain(pattern: string): Grain {
  const letters = pattern.replace(/'(?:[^']|'')*'/g, '');
  if (/[YD]/.test(letters)) throw badPattern(pattern, 'a year is yyyy and a day is dd, in small letters');
  if (/[XxOztT]/.test(letters)) throw badPattern(pattern, 'a zone or an instant may change the written date');
  if (/[Pp]/.test(letters)) throw badPattern(pattern, 'P and p depend on a locale');
  if (!/[yRu]/.test(letters)) throw badPattern(pattern, 'it names no year');
  const grain = grainOf(letters);
  if (grain === null) throw badPattern(pattern, 'it names neither a day, a week, a month nor a quarter');
  if (!readsItself(pattern)) throw badPattern(pattern, 'date-fns cannot read it');
  return grain;
}

/** The finest unit that the letters of a pattern name (Unicode TR 35 field symbols). */
function grainOf(letters: string): Grain | null {
  if (/[dEeci]/.test(letters)) return 'day';
  if (/[Iw]/.test(letters)) return 'week';
  if (/[ML]/.test(letters)) return 'month';
  return /[Qq]/.test(letters) ? 'quarter' : null;
}

/** True when date-fns reads what it writes by the pattern. */
function readsItself(pattern: string): boolean {
  try {
    return !Number.isNaN(parse(format(reference, pattern), pattern, reference).getTime());
  } catch {
    return false;
  }
}

function badPattern(pattern: string, why: string): UserError {
  const message = `invalid dateFormat ${pattern}: ${why}`;
  return new UserError(
    { code: 'invalid-date-format', message, remedy: 'use a date-fns pattern such as dd.MM.yyyy' },
    exitCodes.unusableSettings,
  );
}
