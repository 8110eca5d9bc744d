import { CsvError, parse } from 'csv-parse/sync';
import { unprotectText } from '../csv.js';
import { alteredFile } from './altered.js';

/** A row of a CSV file that we wrote: its cells by column, without the protection, and its first line. */
export interface LeftRow<C extends string> {
  readonly line: number;
  readonly cells: Readonly<Record<C, string>>;
}

/**
 * The rows of a CSV file that an earlier stage left.
 * @param columns its header, in order.
 * @throws UserError exit 3 when it is no CSV or has other columns.
 */
export function readLeftCsv<C extends string>(
  file: string,
  text: string,
  columns: readonly C[],
): LeftRow<C>[] {
  const [header, ...rows] = parseRows(file, text);
  if (header?.record.join() !== columns.join()) {
    throw alteredFile(file, `invalid header, allowed ${columns.join()}`, 1);
  }
  let line = header.info.lines + 1;
  return rows.map(({ record, info }) => {
    const cells = Object.fromEntries(columns.map((column, i) => [column, unprotectText(record[i] ?? '')]));
    const row = { line, cells: cells as Record<C, string> };
    line = info.lines + 1;
    return row;
  });
}

interface ParsedRow {
  readonly record: readonly string[];
  readonly info: { readonly lines: number };
}

function parseRows(file: string, text: string): readonly ParsedRow[] {
  try {
    return parse(text, { info: true, record_delimiter: '\n' }) as unknown as ParsedRow[];
  } catch (error) {
    if (error instanceof CsvError) throw alteredFile(file, `invalid CSV: ${error.message}`);
    throw error;
  }
}
