import { UserError } from '../errors.js';
import type { FileAccount, InputRole, Intake, RejectCode } from '../records.js';
import { checkRejectShare } from './verdict.js';

/** The files that say what was shipped. */
const shipping: readonly InputRole[] = ['shipments', 'table'];

/** Codes of rows that only miss their shipment. */
const missing: readonly RejectCode[] = ['unknown-product', 'unknown-unit', 'returns-exceed-shipped'];

/**
 * `checkRejectShare`; but where a file of shipments is refused and most of its rows were rejected, the faults of other files that
 * come from missing those shipments are left out.
 * @throws UserError exit 3 that carries the intake, one fault a file.
 */
export function checkShares(intake: Intake, maxRejectShare: number): void {
  try {
    checkRejectShare(intake, maxRejectShare);
  } catch (error) {
    const lost = intake.files.filter((file) => isLost(file, maxRejectShare));
    if (!(error instanceof UserError) || lost.length === 0) throw error;
    const following = intake.files.filter((file) => onlyFollows(file, maxRejectShare));
    const among = (list: readonly FileAccount[], name?: string) => list.some(({ file }) => file === name);
    const faults = error.faults.filter(({ file }) => among(lost, file) || !among(following, file));
    throw new UserError(faults, error.exitCode, intake);
  }
}

/** True for a file of shipments that is refused and of which most rows were rejected. */
function isLost({ role, rejected, read }: FileAccount, maxRejectShare: number): boolean {
  return shipping.includes(role) && rejected > Math.max(0.5, maxRejectShare) * read;
}

/** True for a file whose rejected rows would be few enough without those that miss their shipment. */
function onlyFollows({ role, rejected, read, codes }: FileAccount, maxRejectShare: number): boolean {
  const missed = missing.reduce((sum, code) => sum + (codes[code] ?? 0), 0);
  return !shipping.includes(role) && rejected - missed <= maxRejectShare * read;
}
