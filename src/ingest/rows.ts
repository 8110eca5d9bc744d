import { finished } from 'node:stream/promises';
import { Parser } from 'csv-parse';
import { exitCodes, UserError } from '../errors.js';
import type { Source } from '../records.js';
import { utf8Bytes } from './decode.js';
import { headerLine } from './separator.js';

/** Takes one row: its cells as they stand in the file, and its first physical line (1-based). */
export type RowHandler = (cells: string[], line: number) => void;

/** Longest row in bytes; what is longer has a quote that never closes. */
const longestRow = 1 << 20;

/**
 * Reads a CSV file (RFC 4180) row by row: separator comma, semicolon or tab, whichever the header line holds most of
 * outside quotes; LF, CRLF or CR; quoted fields may hold line breaks. Blank lines, and rows whose cells are all empty, are no rows.
 * @param begin takes the header and returns what takes the rows.
 * @param onBytes is told the length of each piece of the file as it is read.
 * @returns the number of rows below the header.
 * @throws UserError exit 3 for a file without a header, an unclosed quote or invalid text, and what the handlers throw.
 */
export async function readRows(
  source: Source,
  encoding: string | null,
  begin: (header: string[]) => RowHandler,
  onBytes: (bytes: number) => void = () => {},
): Promise<number> {
  let parser: RowParser | null = null;
  let held: Buffer = Buffer.alloc(0);
  for await (const bytes of utf8Bytes(source, encoding, onBytes)) {
    if (parser !== null) {
      parser.write(bytes);
      if (parser.errored !== null) break;
    } else {
      held = held.length === 0 ? bytes : Buffer.concat([held, bytes]);
      if (headerLine(held) !== null || held.length > longestRow) parser = startParser(source, held, begin);
    }
  }
  parser ??= startParser(source, held, begin);
  await endParser(source, parser);
  if (!parser.begun) throw emptyFile(source);
  return parser.rows;
}

/** csv-parse with each record handled where it is made: no queue, no object per row, and the line at hand. */
class RowParser extends Parser {
  rows = 0;
  begun = false;
  /** First line of the next record, if no blank line comes before it. */
  nextLine = 1;
  private handler: RowHandler | null = null;
  private blanks = 0;
  private lines = 0;
  private readonly begin: (header: string[]) => RowHandler;

  constructor(delimiter: string, lineEnds: string[], begin: (header: string[]) => RowHandler) {
    super({
      delimiter,
      record_delimiter: lineEnds,
      relax_column_count: true,
      relax_quotes: true,
      skip_empty_lines: true,
      max_record_size: longestRow,
    });
    this.begin = begin;
  }

  override push(record: string[] | null): boolean {
    if (record === null) return super.push(null);
    const { empty_lines: blanks, lines } = this.info;
    const line = this.nextLine + blanks - this.blanks;
    const oneLine = lines - this.lines === 1 + blanks - this.blanks;
    this.nextLine = line + 1 + (oneLine ? 0 : lineBreaks(record));
    this.blanks = blanks;
    this.lines = lines;
    if (!isBlank(record)) this.hand(record, line);
    return true;
  }

  private hand(record: string[], line: number): void {
    if (this.handler !== null) {
      this.rows++;
      this.handler(record, line);
      return;
    }
    this.begun = true;
    this.handler = this.begin(record);
  }
}

/** csv-parse counts a CRLF inside quotes as two lines, so breaks of a row of several lines are counted here. */
function lineBreaks(cells: readonly string[]): number {
  return cells.reduce((sum, cell) => sum + (cell.match(/\r\n|\r|\n/g)?.length ?? 0), 0);
}

function isBlank(cells: readonly string[]): boolean {
  for (let i = 0; i < cells.length; i++) if ((cells[i] as string).trim() !== '') return false;
  return true;
}

function startParser(source: Source, head: Buffer, begin: (header: string[]) => RowHandler): RowParser {
  const line = headerLine(head) ?? headerLine(head, true);
  if (line === null || line.blank) throw emptyFile(source);
  if (head.subarray(0, longestRow).includes(0)) throw holdsNulls(source);
  const parser = new RowParser(line.separator, line.lineEnd === '\r' ? ['\r'] : ['\n', '\r\n'], begin);
  parser.on('error', () => {});
  parser.write(head);
  return parser;
}

async function endParser(source: Source, parser: RowParser): Promise<void> {
  const end = finished(parser);
  if (parser.errored === null) parser.end();
  parser.resume();
  try {
    await end;
  } catch (error) {
    if (!(error instanceof Error) || !('code' in error)) throw error;
    throw unclosedQuote(source, parser.nextLine);
  }
}

function emptyFile(source: Source): UserError {
  const message = 'empty file: it has no header line';
  const remedy = 'check the export that writes it, or leave the file out';
  return new UserError({ code: 'empty-file', file: source.name, message, remedy }, exitCodes.unusableInput);
}

function holdsNulls(source: Source): UserError {
  const message = 'invalid text: the file holds null characters, as UTF-16 read as UTF-8 does';
  const remedy = 'set encoding to utf-16le or utf-16be, or save the file as UTF-8';
  return new UserError(
    { code: 'invalid-encoding', file: source.name, line: 1, message, remedy },
    exitCodes.unusableInput,
  );
}

function unclosedQuote(source: Source, line: number): UserError {
  const message = `invalid row: a quoted field is not closed, or the row is longer than ${longestRow} bytes`;
  const remedy = 'close the quote; a quote inside a quoted field is written twice';
  return new UserError(
    { code: 'unclosed-quote', file: source.name, line, message, remedy },
    exitCodes.unusableInput,
  );
}
