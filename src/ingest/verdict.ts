import { compareText } from '../csv.js';
import { exitCodes, type Fault, UserError } from '../errors.js';
import type { FileAccount, Finding, InputRole, Intake, RejectCode, RejectRow } from '../records.js';
import { codeWords, grouped } from './code-words.js';
import { mostKept } from './tally.js';

/** The files that say what was shipped. */
const shipping: readonly InputRole[] = ['shipments', 'table'];

/** Codes of rows that only miss their shipment. */
const missing: readonly RejectCode[] = ['unknown-product', 'unknown-unit', 'returns-exceed-shipped'];

/**
 * Refuses records of which too much was rejected in some file; one with more rejected rows than are kept is refused whatever
 * the share. Where most rows of a refused file of shipments were rejected, other files that would pass without the rows that
 * miss those shipments are no fault of their own.
 * @param maxRejectShare share of a file's rows, 0 to 1.
 * @throws UserError exit 3 that carries the intake, one fault a file.
 */
export function checkRejectShare(intake: Intake, maxRejectShare: number): void {
  const refused = intake.files.filter(
    ({ rejected, read }) => rejected > mostKept || rejected > maxRejectShare * read,
  );
  const lost = refused.some(({ role, rejected, read }) => shipping.includes(role) && rejected > 0.5 * read);
  const faults = refused
    .filter((file) => !lost || !onlyFollows(file, maxRejectShare))
    .map((file) => tooManyRejected(file, intake.rejects, maxRejectShare));
  if (faults.length > 0) throw new UserError(faults, exitCodes.unusableInput, intake);
}

/** What a reader should know of each file: rows rejected, rows set aside, no rows at all. */
export function fileFindings(files: readonly FileAccount[]): Finding[] {
  return files.flatMap((file) => {
    const findings: Finding[] = [];
    if (file.rejected > 0) {
      const message = `${rowsOf(file.rejected, file)} rejected: ${wordsOf(file, 'rejected')}`;
      findings.push({ code: 'rows-rejected', severity: 'warning', message });
    }
    if (file.setAside > 0) {
      const message = `${rowsOf(file.setAside, file)} set aside: ${wordsOf(file, 'set-aside')}`;
      findings.push({ code: 'rows-set-aside', severity: 'note', message });
    }
    if (file.read === 0) {
      findings.push({ code: 'no-rows', severity: 'note', message: `${file.file} has a header and no rows` });
    }
    return findings;
  });
}

/** Orders rows as rejects.csv lists them: by file, line, then code. */
export function compareRejects(a: RejectRow, b: RejectRow): number {
  return compareText(a.file, b.file) || a.line - b.line || compareText(a.code, b.code);
}

/** True for a file whose rejected rows would be few enough without those that miss their shipment. */
function onlyFollows({ role, rejected, read, codes }: FileAccount, maxRejectShare: number): boolean {
  const missed = missing.reduce((sum, code) => sum + (codes[code] ?? 0), 0);
  return !shipping.includes(role) && rejected - missed <= maxRejectShare * read;
}

function tooManyRejected(file: FileAccount, rejects: readonly RejectRow[], share: number): Fault {
  const first = rejects.find((row) => row.file === file.file && row.kind === 'rejected');
  const example = first === undefined ? '' : `; the first is line ${first.line}: ${first.message}`;
  const codes = codesOf(file, 'rejected')
    .map(([code, rows]) => `${code} ${rows}`)
    .join(', ');
  return {
    code: 'too-many-rejected',
    file: file.file,
    message: `invalid records: ${grouped(file.rejected)} of ${grouped(file.read)} rows were rejected (${codes})${example}`,
    remedy:
      file.rejected > mostKept
        ? `check the columns, the dateFormat and the encoding of the file; rejects.csv lists the first ${grouped(mostKept)}`
        : `correct the rows that rejects.csv lists, or raise maxRejectShare (${share}) if they may be missed`,
  };
}

/** `3 of 1,221 rows of returns.csv`. */
function rowsOf(rows: number, { read, file }: FileAccount): string {
  return `${grouped(rows)} of ${grouped(read)} ${read === 1 ? 'row' : 'rows'} of ${file}`;
}

/** `1 with a missing value (missing-value), 2 …`, sorted by code. */
function wordsOf(file: FileAccount, kind: RejectRow['kind']): string {
  const words = new Map<string, string>(Object.entries(codeWords[kind]));
  const counts = codesOf(file, kind);
  return counts.map(([code, rows]) => `${grouped(rows)} ${words.get(code)} (${code})`).join(', ');
}

/** The codes of one kind with their rows, sorted by code. */
function codesOf({ codes }: FileAccount, kind: RejectRow['kind']): [string, number][] {
  return Object.entries(codes).filter(([code]) => Object.hasOwn(codeWords[kind], code));
}
