import type { DayRange } from '../calendar.js';
import { compareText, rowText } from '../csv.js';
import type { FileAccount, InputRole, RejectCode, RejectRow, SetAsideCode, Source } from '../records.js';
import type { Columns } from './columns.js';

/** The running account of one file. */
export interface FileTally {
  readonly source: Source;
  readonly role: InputRole;
  columns: Columns | null;
  /** Positions of the cells that hold the units of a row; null when that is the column `quantity`. */
  unitsAt: readonly number[] | null;
  read: number;
  rejected: number;
  setAside: number;
  /** Rows by reject or set-aside code. */
  readonly codes: Map<string, number>;
  /** End of the latest days that a row gives, as far as they count by the as-of date; -Infinity without any. */
  seenUntil: number;
  /** Size and SHA-256 of the file, null until they are asked for. */
  digest: Awaited<ReturnType<Source['digest']>> | null;
  /** The rows that are not used; of the rejected ones no more than `mostKept`. */
  readonly rejects: RejectRow[];
  /** Units in rejected rows, by the product that they name. */
  readonly rejectedUnits: Map<string, number>;
}

/** A row that may still be refused. */
export interface RowRef {
  readonly tally: FileTally;
  readonly line: number;
  /** The row as CSV. */
  readonly text: string;
  /** The product it names, null when it names none. */
  readonly product: string | null;
  /** Units it stands for; negative for a reversal. */
  readonly quantity: number;
}

/** Longest cell that is read, in UTF-16 units. */
export const longestCell = 1000;

/** Rejected rows of a file that are kept; a file with more of them is counted to its end and refused. */
export const mostKept = 500_000;

export function newTally(source: Source, role: InputRole): FileTally {
  return {
    source,
    role,
    columns: null,
    unitsAt: null,
    read: 0,
    rejected: 0,
    setAside: 0,
    codes: new Map(),
    seenUntil: -Infinity,
    digest: null,
    rejects: [],
    rejectedUnits: new Map(),
  };
}

/**
 * Puts a row among the rejected ones.
 * @param field the column at fault, by our name or by its position; null when it is the whole row.
 */
export function rejectRow(
  row: RowRef,
  code: RejectCode,
  field: string | number | null,
  message: string,
): void {
  if (++row.tally.rejected <= mostKept) keep(row, 'rejected', code, field, message);
  count(row.tally, code);
  if (row.product === null || row.quantity <= 0) return;
  const { rejectedUnits } = row.tally;
  rejectedUnits.set(row.product, (rejectedUnits.get(row.product) ?? 0) + row.quantity);
}

/** Puts a row that is right, but does not count, beside the used ones. */
export function setAsideRow(row: RowRef, code: SetAsideCode, field: string | null, message: string): void {
  row.tally.setAside++;
  keep(row, 'set-aside', code, field, message);
  count(row.tally, code);
}

/** Notes the days that a row gives. @param cutOff end of the as-of day; what comes after it is not noted. */
export function noteDays(tally: FileTally, { from, to }: DayRange, cutOff: number): void {
  if (from < cutOff && to > tally.seenUntil) tally.seenUntil = Math.min(to, cutOff);
}

/** A row as rejects.csv shows it; cells that are too long are cut. */
export function shownRow(cells: readonly string[]): string {
  return rowText(cells.map((cell) => (cell.length > longestCell ? `${cell.slice(0, longestCell)}…` : cell)));
}

/** The account: every row read is used, rejected or set aside. */
export async function fileAccount(tally: FileTally): Promise<FileAccount> {
  const { bytes, sha256 } = tally.digest ?? (await tally.source.digest());
  const { rejected, setAside } = tally;
  return {
    file: tally.source.name,
    role: tally.role,
    bytes,
    sha256,
    read: tally.read,
    used: tally.read - rejected - setAside,
    rejected,
    setAside,
    codes: Object.fromEntries([...tally.codes].sort(([a], [b]) => compareText(a, b))),
    unusedColumns: tally.columns?.unused ?? [],
  };
}

function keep(
  { tally, line, text }: RowRef,
  kind: RejectRow['kind'],
  code: RejectRow['code'],
  field: string | number | null,
  message: string,
): void {
  const at = typeof field === 'string' ? tally.columns?.at(field) : field;
  const column = tally.columns?.header[at ?? -1] ?? '';
  tally.rejects.push({ file: tally.source.name, line, kind, code, column, message, row: text });
}

function count({ codes }: FileTally, code: RejectRow['code']): void {
  codes.set(code, (codes.get(code) ?? 0) + 1);
}
