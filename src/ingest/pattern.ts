import { type PeriodKind, periodOf } from '../calendar.js';
import { dayByPattern, judgePattern } from '../date-pattern.js';
import { exitCodes, UserError } from '../errors.js';
import { type Dated, dated, type Grain } from './dated.js';
import type { DateFault } from './dates.js';

/**
 * Reads dates by a date-fns pattern, without a time zone. A pattern without a day names the week, month or quarter.
 * @throws UserError exit 2 when date-fns refuses the pattern, or when it names a zone, an instant, no year, or neither day, week, month
 * nor quarter.
 */
export function patternReader(pattern: string): (text: string) => Dated | DateFault {
  const grain = checkedGrain(pattern);
  return (text) => {
    const day = dayByPattern(text, pattern);
    if (day === null) {
      return { code: 'unreadable-date', message: `invalid date ${text}: it is not ${pattern}` };
    }
    return dated(
      grain === 'day' ? { from: day, to: day + 1 } : periodOf(day, grain satisfies PeriodKind),
      grain,
    );
  };
}

function checkedGrain(pattern: string): Grain {
  const verdict = judgePattern(pattern);
  if ('grain' in verdict) return verdict.grain;
  const message = `invalid dateFormat ${pattern}: ${verdict.reason}`;
  const remedy = 'use a date-fns pattern such as dd.MM.yyyy';
  throw new UserError({ code: 'invalid-date-format', message, remedy }, exitCodes.unusableSettings);
}
