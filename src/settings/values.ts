import * as z from 'zod';
import { parseIsoDate } from '../calendar.js';
import { judgePattern } from '../date-pattern.js';

// Every message below says what is allowed; it ends the sentence "invalid NAME VALUE, allowed …".

/** A text that is not empty. */
export const text = z.string('a text that is not empty').min(1, 'a text that is not empty');

/** A real date written YYYY-MM-DD. */
export const isoDay = checkedText('a real date written YYYY-MM-DD', (t) => parseIsoDate(t) !== null);

/** A currency code of ISO 4217. */
export const currencyCode = checkedText('an ISO 4217 code of three capital letters', (t) =>
  /^[A-Z]{3}$/.test(t),
);

/** A date-fns pattern that carries at least the year and the week, month or quarter. */
export const datePattern = checkedText(
  'a date-fns pattern with a year and a day, week, month or quarter, such as dd.MM.yyyy (not DD.MM.YYYY), without zone (X, x, O, z), instant (T, t) or locale (P, p)',
  (t) => 'grain' in judgePattern(t),
);

/** A WHATWG label of an encoding. */
export const encodingLabel = checkedText('an encoding by its WHATWG label, such as windows-1252', isEncoding);

/** A whole number from `min` to `max`. */
export function whole(min: number, max: number) {
  const allowed = `a whole number from ${min} to ${max}`;
  return z.number(allowed).int(allowed).min(min, allowed).max(max, allowed);
}

/** A number from `min` to `max`, without `max` any from `min` on. */
export function real(min: number, max = Infinity) {
  const allowed = max === Infinity ? `a number of ${min} or more` : `a number from ${min} to ${max}`;
  return z.number(allowed).min(min, allowed).max(max, allowed);
}

/** A number above 0. */
export const positive = z.number('a number above 0').positive('a number above 0');

/** A list of one to `most` values, each of them once. */
export function distinct<T extends z.ZodType>(item: T, allowed: string, most = 100) {
  return z
    .array(item, allowed)
    .min(1, allowed)
    .max(most, allowed)
    .refine((list) => new Set(list).size === list.length, `${allowed}, each of them once`);
}

function checkedText(allowed: string, holds: (text: string) => boolean) {
  return z.string(allowed).refine(holds, allowed);
}

function isEncoding(label: string): boolean {
  try {
    return new TextDecoder(label).encoding !== '';
  } catch (error) {
    if (error instanceof RangeError) return false;
    throw error;
  }
}
