import { exitCodes, type Fault, UserError } from '../errors.js';

/** What to do about any file of an earlier run that cannot be used. */
const remedy = 'run the earlier stage again';

/** A file that an earlier stage left is not as it was left. */
export function alteredFile(file: string, message: string, line?: number): UserError {
  const fault: Fault = { code: 'altered-file', file, message, remedy };
  return new UserError(line === undefined ? fault : { ...fault, line }, exitCodes.unusableInput);
}

/** A file that an earlier stage leaves is not there. */
export function missingFile(file: string): UserError {
  const message = `missing ${file}, which an earlier stage leaves there`;
  return new UserError({ code: 'missing-file', file, message, remedy }, exitCodes.unusableInput);
}
