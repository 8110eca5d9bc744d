import type { Config } from '../config.js';
import {
  badQuantity,
  dateOf,
  isWellFormed,
  missingValue,
  productAt,
  type Row,
  refOf,
  textAt,
  wholeNumber,
} from './cells.js';
import { findColumns } from './columns.js';
import type { Dated } from './dated.js';
import { type DateReader, dateReader } from './dates.js';
import { readRows } from './rows.js';
import { type FileTally, type RowRef, rejectRow, setAsideRow } from './tally.js';

/** A row of a returns or withdrawals file that could be read: units that left the fleet. */
export interface Leaving extends RowRef {
  readonly kind: 'returned' | 'withdrawn';
  /** Serial, null when the row counts units. */
  readonly unit: string | null;
  /** Ship date as the row gives it, null when it does not. */
  readonly shipped: Dated | null;
  /** When they left. */
  readonly when: Dated;
}

/**
 * Reads one file of returns or of withdrawals, by unit and with origin mixed, and hands on what counts by the cut-off; the
 * rest goes into the tally.
 * @param cutoff end of the as-of day, Infinity when it is not known.
 */
export async function readLeavings(
  config: Config,
  tally: FileTally,
  cutoff: number,
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
      return (cells, line) => {
        const leaving = readLeaving(tally, { cells, line }, kind, readDate);
        if (leaving === null) return;
        if (leaving.when.from < cutoff) handle(leaving);
        else setAsideRow(leaving, 'after-as-of', dateField(kind), `${kind} after the as-of date`);
      };
    },
    onBytes,
  );
}

function readLeaving(
  tally: FileTally,
  row: Row,
  kind: Leaving['kind'],
  readDate: DateReader,
): Leaving | null {
  if (!isWellFormed(tally, row)) return null;
  const at = (field: string) => tally.columns?.at(field) ?? -1;
  const unit = textAt(row, at('unit'));
  const product = productAt(tally, row, at('product'));
  if (unit === '' && (at('product') < 0 || at('ship_date') < 0)) return missingValue(tally, row, 'unit');
  if (unit === '' && product === '') return missingValue(tally, row, 'product');
  const shipText = textAt(row, at('ship_date'));
  const needsOrigin = unit === '' || shipText !== '';
  const shipped = needsOrigin ? dateOf(tally, row, 'ship_date', at('ship_date'), readDate) : null;
  if (needsOrigin && shipped === null) return null;
  const when = dateOf(tally, row, dateField(kind), at(dateField(kind)), readDate);
  if (when === null) return null;
  const quantity = quantityOf(tally, row, unit, at('quantity'));
  if (quantity === null) return null;
  const leaving = { ...refOf(tally, row), kind, unit: unit === '' ? null : unit, shipped, when, quantity };
  return shipped === null || isInOrder(leaving, shipped) ? leaving : null;
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

/** True unless the whole of the given time lies before the shipment; then the row is rejected. */
export function isInOrder(leaving: Leaving, shipped: Dated): boolean {
  if (leaving.when.to > shipped.from) return true;
  const message = `${leaving.kind} before the shipment`;
  rejectRow(leaving, 'return-before-shipment', dateField(leaving.kind), message);
  return false;
}

/** Our name of the date column of such a file. */
export function dateField(kind: Leaving['kind']): string {
  return kind === 'returned' ? 'return_date' : 'date';
}
