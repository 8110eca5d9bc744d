import type { Fault } from '../errors.js';
import { type Complaint, checkKeys } from './check.js';
import { ruleKeys, type Stated, settingKeys } from './keys.js';
import type { Path } from './path.js';

/** The command line's own words, not yet read: each as it was typed, lists only where a flag takes several paths. */
export interface Flags {
  readonly asOf?: string | undefined;
  readonly period?: string | undefined;
  readonly horizon?: string | undefined;
  readonly warrantyMonths?: string | undefined;
  readonly warrantyDays?: string | undefined;
  readonly delayDays?: string | undefined;
  /** Family names with commas between. */
  readonly candidates?: string | undefined;
  /** Numbers with commas between. */
  readonly levels?: string | undefined;
  readonly draws?: string | undefined;
  readonly seed?: string | undefined;
  /** Paths or patterns, relative to the settings file as those in it are. */
  readonly shipments?: readonly string[] | undefined;
  readonly returns?: readonly string[] | undefined;
  readonly withdrawals?: readonly string[] | undefined;
  readonly plan?: readonly string[] | undefined;
  readonly table?: string | undefined;
  readonly tableWithdrawn?: string | undefined;
  readonly ages?: string | undefined;
}

/** What the flags say, checked by the same description of the keys as the settings. */
export interface ReadFlags {
  readonly settings: Stated<typeof settingKeys>;
  /** Said of every product. */
  readonly rules: Stated<typeof ruleKeys>;
  readonly complaints: readonly Complaint[];
}

/** Reads the flags that are there; the path of a complaint begins with the key that its flag stands for. */
export function readFlags(flags: Flags): ReadFlags {
  const settings = checkKeys(settingKeys, present(settingsOf(flags)), []);
  const rules = checkKeys(ruleKeys, present(rulesOf(flags)), []);
  return {
    settings: settings.stated,
    rules: rules.stated,
    complaints: [...settings.complaints, ...rules.complaints],
  };
}

/** Place of a flag's fault: the flag's name. */
export function flagPlace(path: Path): Pick<Fault, 'column'> {
  return { column: flagName(String(path[0])) };
}

/** `--as-of` for `asOf`. */
export function flagName(key: string): string {
  return `--${key.replaceAll(/[A-Z]/g, (capital) => `-${capital.toLowerCase()}`)}`;
}

function settingsOf(flags: Flags): Record<keyof Omit<Flags, RuleFlag>, unknown> {
  return {
    asOf: flags.asOf,
    period: flags.period,
    horizon: numberIn(flags.horizon),
    candidates: flags.candidates?.split(',').map((name) => name.trim()),
    levels: flags.levels?.split(',').map((level) => numberIn(level.trim())),
    draws: numberIn(flags.draws),
    seed: numberIn(flags.seed),
    shipments: files(flags.shipments),
    returns: files(flags.returns),
    withdrawals: files(flags.withdrawals),
    plan: files(flags.plan),
    table: flags.table,
    tableWithdrawn: flags.tableWithdrawn,
    ages: flags.ages,
  };
}

type RuleFlag = 'warrantyMonths' | 'warrantyDays' | 'delayDays';

function rulesOf(flags: Flags): Record<RuleFlag, unknown> {
  return {
    warrantyMonths: numberIn(flags.warrantyMonths),
    warrantyDays: numberIn(flags.warrantyDays),
    delayDays: numberIn(flags.delayDays),
  };
}

function files(paths: readonly string[] | undefined): unknown {
  return paths === undefined ? undefined : { files: paths };
}

/** The number that a text writes in decimal digits; any other text as it is, for the check to refuse. */
function numberIn(text: string | undefined): unknown {
  return text !== undefined && /^[+-]?\d+(\.\d+)?$/.test(text) ? Number(text) : text;
}

function present(values: Record<string, unknown>): Record<string, unknown> {
  return Object.fromEntries(Object.entries(values).filter(([, value]) => value !== undefined));
}
