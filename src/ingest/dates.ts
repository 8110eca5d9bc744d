import { dayNumber, parseIsoDate, parsePeriod } from '../calendar.js';
import { type Dated, dated } from './dated.js';
import { patternReader } from './pattern.js';

/** Why a date cell cannot be read. */
export interface DateFault {
  readonly code: 'unreadable-date' | 'ambiguous-date';
  readonly message: string;
}

/** Reads a trimmed, non-empty date cell. */
export type DateReader = (text: string) => Dated | DateFault;

/** Years before this are taken for slips of the pen. */
const earliestYear = 1900;
const cacheSize = 20_000;

/**
 * A reader of the dates of a file: ISO 8601 days, months (`2026-10`), weeks (`2026-W45`), quarters (`2026-Q4`) and
 * date-times, whose calendar date counts; or, with `dateFormat`, that date-fns pattern alone.
 * @throws UserError exit 2 when the pattern cannot be used.
 */
export function dateReader(dateFormat: string | null): DateReader {
  const readAnew = dateFormat === null ? readIso : patternReader(dateFormat);
  const known = new Map<string, Dated | DateFault>();
  return (cell) => {
    const text = dateFormat === null ? withoutTime(cell) : cell;
    const before = known.get(text);
    if (before !== undefined) return before;
    if (known.size >= cacheSize) known.clear();
    const date = notTooEarly(text, readAnew(text));
    known.set(text, date);
    return date;
  };
}

/** Clock times as ISO 8601 has them (from memory): seconds to 60 for a leap second, and 24:00 for the end of a day. */
const dateTime = new RegExp(
  [
    /^\d{4}-\d{2}-\d{2}[T ]/,
    /(?:(?:[01]\d|2[0-3])(?::?[0-5]\d(?::?(?:[0-5]\d|60)(?:[.,]\d+)?)?)?|24(?::?00(?::?00(?:[.,]0+)?)?)?)/,
    /(?:Z|[+-](?:[01]\d|2[0-3])(?::?[0-5]\d)?)?$/,
  ]
    .map(({ source }) => source)
    .join(''),
);

function withoutTime(text: string): string {
  return text.length > 10 && dateTime.test(text) ? text.slice(0, 10) : text;
}

function readIso(text: string): Dated | DateFault {
  const range = parsePeriod(text);
  if (range === null) return notIso(text);
  const grain =
    parseIsoDate(text) !== null ? 'day' : /W/.test(text) ? 'week' : /Q/.test(text) ? 'quarter' : 'month';
  return dated(range, grain);
}

function notTooEarly(text: string, date: Dated | DateFault): Dated | DateFault {
  if ('code' in date || date.from >= dayNumber(earliestYear, 1, 1)) return date;
  return { code: 'unreadable-date', message: `invalid date ${text}: before the year ${earliestYear}` };
}

/** Says which pattern would read the date, or which two would. */
function notIso(text: string): DateFault {
  const parts = /^(\d{1,2})([./-])(\d{1,2})\2(\d{4}|\d{2})$/.exec(text);
  if (parts === null) return unreadable(text, 'as ISO 8601 (2026-10-31, 2026-10); set dateFormat');
  const [, first = '', separator = '', second = '', year = ''] = parts;
  const pattern = (a: string, b: string) =>
    [a.repeat(first.length), b.repeat(second.length), 'y'.repeat(year.length)].join(separator);
  const [dayFirst, monthFirst] = [pattern('d', 'M'), pattern('M', 'd')];
  if (Number(first) > 12) return unreadable(text, `as ISO 8601; set dateFormat to ${dayFirst}`);
  if (Number(second) > 12) return unreadable(text, `as ISO 8601; set dateFormat to ${monthFirst}`);
  return {
    code: 'ambiguous-date',
    message: `ambiguous date ${text}: day or month first; set dateFormat to ${dayFirst} or to ${monthFirst}`,
  };
}

function unreadable(text: string, rest: string): DateFault {
  return { code: 'unreadable-date', message: `invalid date ${text}: it cannot be read ${rest}` };
}
