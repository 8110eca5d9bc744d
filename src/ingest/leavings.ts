import type { Config } from '../config.js';
import {
  badQuantity,
  dateOf,
  isWellFormed,
  missingValue,
  productAt,
  type Row,
  textAt,
  wholeNumber,
} from './cells.js';
import { type Columns, findColumns } from './columns.js';
import type { Dated } from './dated.js';
import { type DateReader, dateReader } from './dates.js';
import type { ShippedLot } from './fleet.js';
import { readRows } from './rows.js';
import { type FileTally, noteDays, type RowRef, rejectRow, setAsideRow, shownRow } from './tally.js';

/** A row of a returns or withdrawals file that could be read: units that left the fleet. */
export interface Leaving extends RowRef {
  readonly kind: 'returned' | 'withdrawn';
  /** Serial, null when the row counts units. */
  readonly unit: string | null;
  /** Ship date as the row gives it, null when it does not. */
  readonly shipped: Dated | null;
  /** When they left. */
  readonly when: Dated;
  /** The shipment of the unit, null until it is met. */
  lot: ShippedLot | null;
  /** Another row of the same unit. */
  next: Leaving | null;
}

/**
 * Reads one file of returns or of withdrawals, by unit and with origin mixed, and hands on what counts by the cut-off; the
 * rest goes into the tally.
 * @param cutOff end of the as-of day, Infinity when it is not known.
 */
export async function readLeavings(
  config: Config,
  tally: FileTally,
  cutOff: number,
  handle: (leaving: Leaving) => void,
  onBytes: (bytes: number) => void,
): Promise<void> {
  const kind = tally.role === 'returns' ? 'returned' : 'withdrawn';
  const input = kind === 'returned' ? config.returns : config.withdrawals;
  const readDate = dateReader(input.dateFormat);
  tally.read = await readRows(
    tally.source,
    input.encoding,
    (header) => {
      tally.columns = findColumns(tally.role, tally.source.name, header, input);
      const at = positionsOf(tally.columns, kind);
      return (cells, line) => {
        const leaving = readLeaving(tally, { cells, line }, at, readDate);
        if (leaving === null) return;
        noteDays(tally, leaving.when, cutOff);
        if (leaving.when.from < cutOff) handle(leaving);
        else setAsideRow(leaving, 'after-as-of', dateField(kind), `${kind} after the as-of date`);
      };
    },
    onBytes,
  );
}

interface Positions {
  readonly kind: Leaving['kind'];
  readonly unit: number;
  readonly product: number;
  readonly shipped: number;
  readonly when: number;
  readonly quantity: number;
}

function positionsOf(columns: Columns, kind: Leaving['kind']): Positions {
  return {
    kind,
    unit: columns.at('unit'),
    product: columns.at('product'),
    shipped: columns.at('ship_date'),
    when: columns.at(dateField(kind)),
    quantity: columns.at('quantity'),
  };
}

function readLeaving(tally: FileTally, row: Row, at: Positions, readDate: DateReader): Leaving | null {
  if (!isWellFormed(tally, row)) return null;
  const unit = textAt(row, at.unit);
  const product = productAt(tally, row, at.product);
  if (unit === '' && (at.product < 0 || at.shipped < 0)) return missingValue(tally, row, 'unit');
  if (unit === '' && product === '') return missingValue(tally, row, 'product');
  const needsOrigin = unit === '' || textAt(row, at.shipped) !== '';
  const shipped = needsOrigin ? dateOf(tally, row, 'ship_date', at.shipped, readDate) : null;
  if (needsOrigin && shipped === null) return null;
  const when = dateOf(tally, row, dateField(at.kind), at.when, readDate);
  if (when === null) return null;
  const quantity = quantityOf(tally, row, unit, at.quantity);
  if (quantity === null) return null;
  const leaving: Leaving = {
    tally,
    line: row.line,
    text: shownRow(row.cells),
    product: product === '' ? null : product,
    quantity,
    kind: at.kind,
    unit: unit === '' ? null : unit,
    shipped,
    when,
    lot: null,
    next: null,
  };
  return shipped === null || isInOrder(leaving, leaving.product, shipped) ? leaving : null;
}

function quantityOf(tally: FileTally, row: Row, unit: string, at: number): number | null {
  const text = textAt(row, at);
  if (text === '') return 1;
  const quantity = wholeNumber(text);
  if (unit !== '' && quantity !== 1) {
    return badQuantity(tally, row, 'quantity', text, 'a row with a unit stands for 1');
  }
  if (quantity !== null && quantity !== 0) return quantity;
  return badQuantity(tally, row, 'quantity', text, 'it must be a whole number other than 0');
}

/**
 * True unless the whole of the time that a row gives lies before the shipment; then the row is rejected.
 * @param product the product of the units, null when it is not known.
 */
export function isInOrder(leaving: Leaving, product: string | null, shipped: Dated): boolean {
  if (leaving.when.to > shipped.from) return true;
  const message = `${leaving.kind} before the shipment`;
  rejectRow({ ...leaving, product }, 'return-before-shipment', dateField(leaving.kind), message);
  return false;
}

/** Our name of the date column of such a file. */
export function dateField(kind: Leaving['kind']): string {
  return kind === 'returned' ? 'return_date' : 'date';
}
