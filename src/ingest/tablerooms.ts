import { compareText } from '../csv.js';
import type { Fleet } from './fleet.js';
import type { CohortRow } from './tablerow.js';
import { rejectRow, setAsideRow } from './tally.js';

/** The rows of a table that count: not after the cut-off, and with no more returns than were shipped. */
export function usableCohorts(rows: readonly CohortRow[], cutOff: number): CohortRow[] {
  return rows.filter((row) => {
    if (isLate(row, cutOff)) return false;
    const returned = unitsBy(row, cutOff);
    if (returned <= row.shipped) return true;
    const message = `${returned} units returned where ${row.shipped} were shipped`;
    rejectRow(row, 'returns-exceed-shipped', null, message);
    return false;
  });
}

/**
 * The rows of a table of withdrawals that its table has room for: withdrawn and returned within what was shipped. Each repeats
 * the `shipped` of its cohort, or of one of the rows that the table has for it.
 * @param table the rows of the table that count.
 * @param fleet what they shipped.
 */
export function usableWithdrawals(
  rows: readonly CohortRow[],
  table: readonly CohortRow[],
  fleet: Fleet,
  cutOff: number,
): CohortRow[] {
  const places = new Map<string, Place>();
  for (const row of table) {
    const before = places.get(placeOf(row)) ?? emptyPlace;
    places.set(placeOf(row), {
      shipped: before.shipped + row.shipped,
      room: before.room + row.shipped - unitsBy(row, cutOff),
      rows: [...before.rows, row.shipped],
    });
  }
  const sorted = [...rows].sort((a, b) => compareText(a.text, b.text));
  return sorted.filter(
    (row) => !isLate(row, cutOff) && isKnown(row, fleet) && agrees(row, places) && fits(row, places, cutOff),
  );
}

/** What a table says of one product and ship period. */
interface Place {
  readonly shipped: number;
  /** Units neither returned nor withdrawn so far. */
  readonly room: number;
  /** `shipped` of each of its rows. */
  readonly rows: readonly number[];
}

const emptyPlace: Place = { shipped: 0, room: 0, rows: [] };

/** Units in the cells of a row that begin before the cut-off. */
export function unitsBy(row: CohortRow, cutOff: number): number {
  return row.cells.reduce((sum, { when, quantity }) => sum + (when.from < cutOff ? quantity : 0), 0);
}

function isLate(row: CohortRow, cutOff: number): boolean {
  if (row.shippedIn.from < cutOff) return false;
  setAsideRow(row, 'after-as-of', 'shipped_in', 'shipped after the as-of date');
  return true;
}

function isKnown(row: CohortRow, fleet: Fleet): boolean {
  if (fleet.products.has(row.product)) return true;
  rejectRow(row, 'unknown-product', 'product', `product ${row.product} was not shipped by the as-of date`);
  return false;
}

/** True when a row of withdrawals says of its cohort what the table says; where the table has no such cohort nothing is said. */
function agrees(row: CohortRow, places: ReadonlyMap<string, Place>): boolean {
  const place = places.get(placeOf(row));
  if (place === undefined || place.shipped === row.shipped || place.rows.includes(row.shipped)) return true;
  const message = `invalid shipped ${row.shipped}: the table has ${place.shipped} for this product and ship period`;
  rejectRow(row, 'bad-quantity', 'shipped', message);
  return false;
}

function fits(row: CohortRow, places: Map<string, Place>, cutOff: number): boolean {
  const place = places.get(placeOf(row)) ?? emptyPlace;
  const withdrawn = unitsBy(row, cutOff);
  if (withdrawn <= place.room) {
    places.set(placeOf(row), { ...place, room: place.room - withdrawn });
    return true;
  }
  const message = `${withdrawn} units withdrawn where ${place.room} were left of those shipped`;
  rejectRow(row, 'returns-exceed-shipped', null, message);
  return false;
}

function placeOf({ product, shippedIn }: CohortRow): string {
  return `${shippedIn.key} ${product}`;
}
