import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Config } from '../config.js';
import { exitCodes, UserError } from '../errors.js';
import { reopen, reopenedFiles, reopenRun } from '../ledger/reopen.js';
import type { MonthEnd } from '../records.js';
import { readStoredConfig } from '../settings.js';
import { repairOutput } from './output.js';

/** What an earlier command left in its output folder. */
export interface Earlier {
  readonly config: Config;
  readonly result: MonthEnd;
}

/**
 * Reads an output folder, after finishing a swap that was interrupted.
 * @throws UserError exit 3 when anything is missing, altered or of another schema; faults name the file with its folder.
 */
export function readEarlier(folder: string): Earlier {
  repairOutput(folder);
  try {
    const files = readFiles(folder);
    const config = readStoredConfig(reopenRun(files).settings, 'run.json');
    return { config, result: reopen(files) };
  } catch (error) {
    if (!(error instanceof UserError)) throw error;
    const faults = error.faults.map((fault) =>
      fault.file === undefined ? fault : { ...fault, file: join(folder, fault.file) },
    );
    throw new UserError(faults, error.exitCode);
  }
}

function readFiles(folder: string): ReadonlyMap<string, string> {
  if (!existsSync(folder)) {
    const fault = { code: 'missing-folder', message: `missing folder ${folder} after --from` };
    throw new UserError(
      { ...fault, remedy: 'name a folder that an earlier command wrote' },
      exitCodes.unusableInput,
    );
  }
  const present = reopenedFiles.filter((name) => existsSync(join(folder, name)));
  return new Map(present.map((name) => [name, readFileSync(join(folder, name), 'utf8')]));
}
