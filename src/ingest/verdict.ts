import { compareText } from '../csv.js';
import { type Fault, UserError } from '../errors.js';
import type { FileAccount, Finding, Intake, RejectRow } from '../records.js';

/**
 * Refuses records of which too much was rejected in some file.
 * @param maxRejectShare share of a file's rows, 0 to 1.
 * @throws UserError exit 3 that carries the intake, one fault a file.
 */
export function checkRejectShare(intake: Intake, maxRejectShare: number): void {
  const faults = intake.files
    .filter((file) => file.rejected > maxRejectShare * file.read)
    .map((file) => tooManyRejected(file, intake.rejects, maxRejectShare));
  if (faults.length > 0) throw new UserError(faults, 3, intake);
}

/** What a reader should know of each file: rows rejected, rows set aside, no rows at all. */
export function fileFindings(files: readonly FileAccount[], rejects: readonly RejectRow[]): Finding[] {
  return files.flatMap((file) => {
    const findings: Finding[] = [];
    if (file.rejected > 0) {
      const message = `${file.rejected} of ${file.read} rows of ${file.file} were rejected: ${codesOf(file, rejects, 'rejected')}`;
      findings.push({ code: 'rows-rejected', severity: 'warning', message });
    }
    if (file.setAside > 0) {
      const message = `${file.setAside} of ${file.read} rows of ${file.file} were set aside: ${codesOf(file, rejects, 'set-aside')}`;
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

function tooManyRejected(file: FileAccount, rejects: readonly RejectRow[], share: number): Fault {
  const first = rejects.find((row) => row.file === file.file && row.kind === 'rejected');
  const example = first === undefined ? '' : `; the first is line ${first.line}: ${first.message}`;
  const codes = codesOf(file, rejects, 'rejected');
  return {
    code: 'too-many-rejected',
    file: file.file,
    message: `invalid records: ${file.rejected} of ${file.read} rows were rejected (${codes})${example}`,
    remedy: `correct the rows that rejects.csv lists, or raise maxRejectShare (${share}) if they may be missed`,
  };
}

function codesOf(file: FileAccount, rejects: readonly RejectRow[], kind: RejectRow['kind']): string {
  const own = new Set(
    rejects.filter((row) => row.file === file.file && row.kind === kind).map((row) => row.code),
  );
  return [...own]
    .sort(compareText)
    .map((code) => `${code} ${file.codes[code]}`)
    .join(', ');
}
