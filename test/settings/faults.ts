import { describeFault, type Fault, UserError } from '../../src/errors.js';
import { type Flags, readSettings, resolveConfig } from '../../src/settings.js';

/** Every fault of a settings text and flags, null for no settings file; none when they are sound. */
export function faultsOf(text: string | null, flags: Flags = {}): readonly Fault[] {
  try {
    resolveConfig(text === null ? null : readSettings(text, 's.json'), flags);
    return [];
  } catch (error) {
    if (!(error instanceof UserError) || error.exitCode !== 2) throw error;
    return error.faults;
  }
}

/** The same as a reader sees them, one line a fault, with the code in front. */
export function faultLines(text: string | null, flags: Flags = {}): readonly string[] {
  return faultsOf(text, flags).map((fault) => `${fault.code} ${describeFault(fault)}`);
}
