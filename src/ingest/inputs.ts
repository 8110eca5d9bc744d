import { exitCodes, UserError } from '../errors.js';
import type { FileAccount, InputRole, Sources } from '../records.js';

/** Roles of which files without a row are no fault. */
const mayBeEmpty: readonly InputRole[] = ['withdrawals', 'plan', 'table-withdrawn'];

/**
 * Checks that the inputs belong together: records, or a table, or ages.
 * @throws UserError exit 2.
 */
export function checkInputs(sources: Sources): void {
  const given = (role: InputRole) => sources[role].length > 0;
  const records = (['shipments', 'returns', 'withdrawals'] as const).filter(given);
  if (given('ages')) {
    const others = [...records, ...(['plan', 'table', 'table-withdrawn'] as const).filter(given)];
    if (others.length > 0) throw mixed(['ages', ...others]);
    return;
  }
  if (given('table-withdrawn') && !given('table'))
    throw missing('table', 'the withdrawals of a table need the table');
  if (given('table')) {
    if (records.length > 0) throw mixed(['table', ...records]);
    return;
  }
  if (!given('shipments')) throw missing('shipments', 'without them nothing can be forecast');
  if (!given('returns')) throw missing('returns', 'without them nothing can be forecast');
}

/** @throws UserError exit 3 when the files of a role that is needed hold no row. */
export function checkRows(files: readonly FileAccount[]): void {
  const roles = [...new Set(files.map((file) => file.role))].filter((role) => !mayBeEmpty.includes(role));
  const empty = roles
    .map((role) => files.filter((file) => file.role === role))
    .filter((ofRole) => ofRole.every((file) => file.read === 0));
  const faults = empty.flat().map(({ file, role }) => ({
    code: 'no-rows',
    file,
    message: `invalid ${role}: a header and no rows`,
    remedy: 'check the export that writes it',
  }));
  if (faults.length > 0) throw new UserError(faults, exitCodes.unusableInput);
}

function mixed(roles: readonly string[]): UserError {
  const message = `invalid inputs: ${roles.join(', ')} cannot be used together`;
  const remedy = 'give shipments and returns, or a table, or ages';
  return new UserError({ code: 'mixed-inputs', message, remedy }, exitCodes.unusableSettings);
}

function missing(role: 'shipments' | 'returns' | 'table', why: string): UserError {
  const message = `missing ${role}: ${why}`;
  return new UserError(
    { code: 'missing-input', message, remedy: `name the files in the settings, or with --${role}` },
    exitCodes.unusableSettings,
  );
}
