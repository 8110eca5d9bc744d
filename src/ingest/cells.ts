import { unprotectText } from '../csv.js';
import { exitCodes, UserError } from '../errors.js';
import type { Dated } from './dated.js';
import type { DateReader } from './dates.js';
import { type FileTally, longestCell, type RowRef, rejectRow, shownRow } from './tally.js';

/** A row as it is read: its cells and its first physical line. */
export interface Row {
  readonly cells: readonly string[];
  readonly line: number;
}

/** The name that totals carry in every output, so that no product may. */
const reservedProduct = '(total)';

/** The trimmed text at a position, with the apostrophe removed that protects it; empty where there is no such column. */
export function textAt(row: Row, at: number): string {
  const cell = at < 0 ? undefined : row.cells[at];
  return cell === undefined ? '' : unprotectText(cell.trim());
}

/** True when the row has as many cells as the header and none is too long; otherwise it is rejected. */
export function isWellFormed(tally: FileTally, row: Row): boolean {
  const { cells } = row;
  const width = tally.columns?.header.length ?? 0;
  if (cells.length !== width) {
    rejectRow(
      refOf(tally, row),
      'wrong-width',
      null,
      `invalid row: ${cells.length} cells where the header has ${width}`,
    );
    return false;
  }
  for (let i = 0; i < width; i++) {
    if ((cells[i] as string).length > longestCell) {
      const message = `invalid row: ${tally.columns?.header[i]} is longer than ${longestCell} characters`;
      rejectRow(refOf(tally, row), 'field-too-long', i, message);
      return false;
    }
  }
  return true;
}

/** The product at a position. @throws UserError exit 3 for the one name that is taken. */
export function productAt(tally: FileTally, row: Row, at: number): string {
  const product = textAt(row, at);
  if (product !== reservedProduct) return product;
  const message = `invalid product ${reservedProduct}: the name is kept for totals`;
  const remedy = 'give the product another name';
  throw new UserError(
    { code: 'reserved-product', file: tally.source.name, line: row.line, message, remedy },
    exitCodes.unusableInput,
  );
}

/** The date of a field; a missing or unreadable one rejects the row and is null. */
export function dateOf(
  tally: FileTally,
  row: Row,
  field: string,
  at: number,
  read: DateReader,
): Dated | null {
  const text = textAt(row, at);
  if (text === '') return missingValue(tally, row, field);
  const date = read(text);
  if (!('code' in date)) return date;
  rejectRow(refOf(tally, row), date.code, field, date.message);
  return null;
}

/** The whole number in a text, null when it is none; `12`, `+12`, `-3` and `12.0` are. */
export function wholeNumber(text: string): number | null {
  return /^[+-]?\d{1,12}(?:\.0+)?$/.test(text) ? Number(text) : null;
}

/** Rejects a row for a cell that must be filled. */
export function missingValue(tally: FileTally, row: Row, field: string): null {
  rejectRow(refOf(tally, row), 'missing-value', field, `missing ${field}`);
  return null;
}

/** Rejects a row for a quantity. @param allowed what it should be. */
export function badQuantity(tally: FileTally, row: Row, field: string, text: string, allowed: string): null {
  rejectRow(refOf(tally, row), 'bad-quantity', field, `invalid ${field} ${text}: ${allowed}`);
  return null;
}

/** A row held for its account; product and quantity as far as they can be read. */
export function refOf(tally: FileTally, row: Row): RowRef {
  const at = (field: string) => tally.columns?.at(field) ?? -1;
  const product = textAt(row, at('product'));
  return {
    tally,
    line: row.line,
    text: shownRow(row.cells),
    product: product === '' ? null : product,
    quantity: unitsIn(tally, row),
  };
}

/** Units that a row stands for, as far as they can be read. */
function unitsIn({ columns, unitsAt }: FileTally, row: Row): number {
  if (unitsAt === null) return wholeNumber(textAt(row, columns?.at('quantity') ?? -1)) ?? 1;
  return unitsAt.reduce((sum, at) => sum + Math.max(0, wholeNumber(textAt(row, at)) ?? 0), 0);
}
