/** Whole days as numbers, day 0 is 1970-01-01. Everything is in UTC, so the machine's time zone does not matter. */

const milliseconds = 86400000;

/** Months beyond 12 carry into the year. */
export function dayNumber(year, month, day) {
  return Date.UTC(year, month - 1, day) / milliseconds;
}

/** The last day of the month stands for a day that the month lacks. */
export function addMonths(day, months) {
  const [year, month, d] = iso(day).split('-').map(Number);
  return Math.min(dayNumber(year, month + months, d), dayNumber(year, month + months + 1, 1) - 1);
}

export function yearOf(day) {
  return Number(iso(day).slice(0, 4));
}

/** 2026-10-31 */
export function iso(day) {
  return new Date(day * milliseconds).toISOString().slice(0, 10);
}

/** 31.10.2026 */
export function dotted(day) {
  return iso(day).split('-').reverse().join('.');
}
