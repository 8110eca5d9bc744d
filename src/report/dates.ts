/** Dates and periods in words, from ISO dates and the labels of calendar.ts. */
import { civilDate, parseIsoDate } from '../calendar.js';

const months = 'January February March April May June July August September October November December'.split(
  ' ',
);

/** `2026-10-31` → `31 October 2026`; other text comes back unchanged. */
export function dateText(iso: string): string {
  const day = parseIsoDate(iso);
  if (day === null) return iso;
  const date = civilDate(day);
  return `${date.day} ${monthName(date.month)} ${date.year}`;
}

/** `2026-11` → `November 2026`, `2026-W45` → `week 45 of 2026`, `2026-Q4` → `quarter 4 of 2026`, `3` → `step 3`. */
export function periodText(label: string): string {
  const { year, month, week, quarter } = partsOf(label);
  if (month !== null) return `${monthName(month)} ${year}`;
  if (week !== null) return `week ${week} of ${year}`;
  if (quarter !== null) return `quarter ${quarter} of ${year}`;
  return /^\d+$/.test(label) ? `step ${label}` : label;
}

/** `2026-11` → `Nov 2026`, `2026-W45` → `W45 2026`, `2026-Q4` → `Q4 2026`, `2026` → `2026`. */
export function shortPeriodText(label: string): string {
  const { year, short } = periodParts(label);
  return year === null ? short : `${short} ${year}`;
}

/** Where a period stands: its year, its name within the year, its place there from 0, and the places of a year. */
export interface PeriodParts {
  /** Null for steps of use, which are counted in tens. */
  readonly year: string | null;
  readonly short: string;
  readonly place: number;
  readonly places: number;
}

/** `2026-11` → 2026, Nov, 10 of 12; weeks and quarters alike. */
export function periodParts(label: string): PeriodParts {
  const { year, month, week, quarter } = partsOf(label);
  if (month !== null) return { year, short: monthName(month).slice(0, 3), place: month - 1, places: 12 };
  if (week !== null) return { year, short: `W${week}`, place: week - 1, places: 52 };
  if (quarter !== null) return { year, short: `Q${quarter}`, place: quarter - 1, places: 4 };
  return { year: null, short: label, place: Number(label) - 1, places: 10 };
}

function partsOf(label: string) {
  const match = /^(\d{4})-(?:(\d{2})|W(\d{2})|Q(\d))$/.exec(label);
  const part = (i: number) => (match?.[i] === undefined ? null : Number(match[i]));
  return { year: match?.[1] ?? null, month: part(2), week: part(3), quarter: part(4) };
}

function monthName(month: number): string {
  return months[month - 1] ?? String(month);
}
