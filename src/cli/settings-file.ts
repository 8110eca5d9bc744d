import { existsSync, readFileSync } from 'node:fs';
import { dirname, relative, resolve, sep } from 'node:path';
import type { Config } from '../config.js';
import { exitCodes, UserError } from '../errors.js';
import { type Flags, readSettings, resolveConfig } from '../settings.js';

/** A run's settings, and the folder that the paths in them are relative to. */
export interface LoadedSettings {
  readonly config: Config;
  readonly base: string;
}

/** Where settings are looked for when none are named. */
const defaultSettings = 'returnfall.json';

/**
 * Settings file and flags made into one configuration. Paths of flags, relative to the current folder, become relative to
 * the settings file.
 * @param file the settings file, or null to take `returnfall.json` of the current folder where there is one.
 * @throws UserError exit 2 with every fault.
 */
export function loadSettings(file: string | null, flags: Flags): LoadedSettings {
  const named = file ?? (existsSync(defaultSettings) ? defaultSettings : null);
  const base = named === null ? process.cwd() : dirname(resolve(named));
  const settings = named === null ? null : readSettings(readText(named), named);
  return { config: resolveConfig(settings, fromBase(flags, base)), base };
}

/** True when there is anything to start from: settings that are named or stand in the current folder, or files of records. */
export function hasInput(settings: string | null, flags: Flags): boolean {
  return settings !== null || existsSync(defaultSettings) || namesInputs(flags);
}

function namesInputs(flags: Flags): boolean {
  const { shipments, returns, withdrawals, plan, table, tableWithdrawn, ages } = flags;
  return [shipments, returns, withdrawals, plan, table, tableWithdrawn, ages].some(
    (paths) => paths !== undefined,
  );
}

function fromBase(flags: Flags, base: string): Flags {
  const move = (path: string) => (path === '-' ? path : relative(base, resolve(path)).split(sep).join('/'));
  const moveAll = (paths: readonly string[] | undefined) => paths?.map(move);
  const moveOne = (path: string | undefined) => (path === undefined ? undefined : move(path));
  return {
    ...flags,
    shipments: moveAll(flags.shipments),
    returns: moveAll(flags.returns),
    withdrawals: moveAll(flags.withdrawals),
    plan: moveAll(flags.plan),
    table: moveOne(flags.table),
    tableWithdrawn: moveOne(flags.tableWithdrawn),
    ages: moveOne(flags.ages),
  };
}

function readText(file: string): string {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(readFileSync(file));
  } catch (error) {
    const missing = (error as NodeJS.ErrnoException).code === 'ENOENT';
    const reason = error instanceof Error ? error.message : String(error);
    const fault = missing
      ? { code: 'missing-file', message: 'missing settings file', remedy: 'check the path after --settings' }
      : {
          code: 'unreadable-file',
          message: `invalid settings file: ${reason}`,
          remedy: 'save it as UTF-8 text',
        };
    throw new UserError({ ...fault, file }, exitCodes.unusableSettings);
  }
}
