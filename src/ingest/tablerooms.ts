import { compareText } from '../csv.js';
import type { Fleet } from './fleet.js';
import type { CohortRow } from './tablerow.js';
import { rejectRow, setAsideRow } from './tally.js';

/** The rows of a table that count: not after the cut-off, and with no more returns than were shipped. */
export function usableCohorts(rows: readonly CohortRow[], cutoff: number): CohortRow[] {
  return rows.filter((row) => {
    if (isLate(row, cutoff)) return false;
    const returned = unitsBy(row, cutoff);
    if (returned <= row.shipped) return true;
    const message = `${returned} units returned where ${row.shipped} were shipped`;
    rejectRow(row, 'returns-exceed-shipped', null, message);
    return false;
  });
}

/** The rows of a table of withdrawals that its table has room for: withdrawn and returned within what was shipped. */
export function usableWithdrawals(
  rows: readonly CohortRow[],
  table: readonly CohortRow[],
  fleet: Fleet,
  cutoff: number,
): CohortRow[] {
  const rooms = new Map<string, number>();
  for (const row of table) {
    rooms.set(placeOf(row), (rooms.get(placeOf(row)) ?? 0) + row.shipped - unitsBy(row, cutoff));
  }
  const sorted = [...rows].sort((a, b) => compareText(a.text, b.text));
  return sorted.filter((row) => !isLate(row, cutoff) && isKnown(row, fleet) && fits(row, rooms, cutoff));
}

/** Units in the cells of a row that begin before the cut-off. */
export function unitsBy(row: CohortRow, cutoff: number): number {
  return row.cells.reduce((sum, { when, quantity }) => sum + (when.from < cutoff ? quantity : 0), 0);
}

function isLate(row: CohortRow, cutoff: number): boolean {
  if (row.shippedIn.from < cutoff) return false;
  setAsideRow(row, 'after-as-of', 'shipped_in', 'shipped after the as-of date');
  return true;
}

function isKnown(row: CohortRow, fleet: Fleet): boolean {
  if (fleet.products.has(row.product)) return true;
  rejectRow(row, 'unknown-product', 'product', `product ${row.product} was not shipped by the as-of date`);
  return false;
}

function fits(row: CohortRow, rooms: Map<string, number>, cutoff: number): boolean {
  const room = rooms.get(placeOf(row)) ?? 0;
  const withdrawn = unitsBy(row, cutoff);
  if (withdrawn <= room) {
    rooms.set(placeOf(row), room - withdrawn);
    return true;
  }
  const message = `${withdrawn} units withdrawn where ${room} were left of those shipped`;
  rejectRow(row, 'returns-exceed-shipped', null, message);
  return false;
}

function placeOf({ product, shippedIn }: CohortRow): string {
  return `${shippedIn.key} ${product}`;
}
