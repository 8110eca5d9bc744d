import { type DayRange, parseIsoDate } from '../calendar.js';
import { alteredFile } from './altered.js';
import type { cellColumns } from './cells.js';
import type { LeftRow } from './read-csv.js';

/** A row of cells.csv. */
export type CellRow = LeftRow<(typeof cellColumns)[number]>;

/** The days from `first` to `last`, both ISO dates that belong. @throws UserError exit 3 when they are no range. */
export function rangeIn(file: string, first: string, last: string, line?: number): DayRange {
  const [from, to] = [parseIsoDate(first), parseIsoDate(last)];
  if (from !== null && to !== null && from <= to) return { from, to: to + 1 };
  throw alteredFile(file, `invalid dates ${JSON.stringify(first)} to ${JSON.stringify(last)}`, line);
}

/** The quantity of a row. @throws UserError exit 3 unless it is a whole number above 0. */
export function quantityIn(file: string, { cells: { quantity }, line }: CellRow): number {
  if (/^[1-9]\d{0,14}$/.test(quantity)) return Number(quantity);
  throw alteredFile(
    file,
    `invalid quantity ${JSON.stringify(quantity)}, allowed a whole number above 0`,
    line,
  );
}

/** Orders by first day, then by last. */
export function byRange(a: DayRange, b: DayRange): number {
  return a.from - b.from || a.to - b.to;
}

export function rangeKey({ from, to }: DayRange): string {
  return `${from}/${to}`;
}
