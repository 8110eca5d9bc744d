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
import type { Dated } from './dated.js';
import type { DateReader } from './dates.js';
import type { PeriodColumn } from './tablehead.js';
import { type FileTally, type RowRef, rejectRow } from './tally.js';

/** A row of a Nevada-style table: one cohort and what left it by period. */
export interface CohortRow extends RowRef {
  readonly product: string;
  readonly shippedIn: Dated;
  /** 0 or above. */
  readonly shipped: number;
  /** Cells above 0. */
  readonly cells: readonly { readonly when: Dated; readonly quantity: number }[];
}

/** Reads a row; null when it is rejected. */
export function readCohortRow(
  tally: FileTally,
  row: Row,
  periods: readonly PeriodColumn[],
  read: DateReader,
): CohortRow | null {
  if (!isWellFormed(tally, row)) return null;
  const at = (field: string) => tally.columns?.at(field) ?? -1;
  const product = productAt(tally, row, at('product'));
  if (product === '') return missingValue(tally, row, 'product');
  const shippedIn = dateOf(tally, row, 'shipped_in', at('shipped_in'), read);
  if (shippedIn === null) return null;
  const text = textAt(row, at('shipped'));
  if (text === '') return missingValue(tally, row, 'shipped');
  const shipped = wholeNumber(text);
  if (shipped === null || shipped < 0) return badQuantity(tally, row, 'shipped', text, wholeOrZero);
  const cells: { when: Dated; quantity: number }[] = [];
  for (const column of periods) {
    const quantity = wholeNumber(textAt(row, column.at) === '' ? '0' : textAt(row, column.at));
    if (quantity === null || quantity < 0) return badCell(tally, row, column);
    if (quantity > 0 && column.when.to <= shippedIn.from) return tooEarly(tally, row, column);
    if (quantity > 0) cells.push({ when: column.when, quantity });
  }
  return { ...refOf(tally, row), product, shippedIn, shipped, cells };
}

const wholeOrZero = 'it must be a whole number, 0 or above';

function badCell(tally: FileTally, row: Row, { at }: PeriodColumn): null {
  const message = `invalid ${tally.columns?.header[at]} ${textAt(row, at)}: ${wholeOrZero}`;
  rejectRow(refOf(tally, row), 'bad-quantity', at, message);
  return null;
}

function tooEarly(tally: FileTally, row: Row, { at }: PeriodColumn): null {
  const message = `${textAt(row, at)} units in ${tally.columns?.header[at]}, before the shipment`;
  rejectRow(refOf(tally, row), 'return-before-shipment', at, message);
  return null;
}
