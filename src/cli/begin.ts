import type { Config } from '../config.js';
import { exitCodes, UserError } from '../errors.js';
import type { MonthEnd } from '../records.js';
import { type Flags, overrideStored } from '../settings.js';
import type { Invocation } from './arguments.js';
import { readEarlier } from './earlier.js';
import { nothingToDo } from './failure.js';
import { hasInput, loadSettings } from './settings-file.js';

/** Where a command starts from: records to read, or what an earlier command left. */
export interface Start {
  readonly config: Config;
  /** The folder that input paths are relative to. */
  readonly base: string;
  /** Stages that need not run again. */
  readonly earlier: Partial<Pick<MonthEnd, 'intake' | 'fit'>>;
  /** Set when nothing is left to compute: a report from finished documents. */
  readonly finished: MonthEnd | null;
}

/** @throws UserError exit 2 for settings and flags that cannot be used, 3 for an earlier folder that cannot be read. */
export function begin(invocation: Invocation): Start {
  const { command, from, settings, flags } = invocation;
  if (from !== null) return beginFrom(from, invocation);
  if (hasInput(settings, flags)) return { ...loadSettings(settings, flags), earlier: {}, finished: null };
  throw usage(
    nothingToDo,
    `missing input: ${command} has neither settings nor records to read`,
    missingRemedy,
  );
}

const missingRemedy = 'name files with --shipments and --returns, or settings with --settings';

function beginFrom(from: string, { command, settings, flags }: Invocation): Start {
  if (settings !== null) {
    const message = 'invalid --settings, not allowed beside --from: the settings of that folder hold';
    throw usage('conflicting-input', message, 'leave one of the two out');
  }
  const left = readEarlier(from);
  const config = overrideStored(left.config, flags);
  const base = process.cwd();
  if (command === 'report') {
    refuseChoices(flags);
    return { config, base, earlier: {}, finished: left.result };
  }
  const { intake, fit } = left.result;
  const refit = command === 'fit' || fit === null || changesFit(flags);
  return { config, base, earlier: refit ? { intake } : { intake, fit }, finished: null };
}

/** A fit was made with its own candidates and draws; others need another fit. */
function changesFit({ candidates, draws, seed }: Flags): boolean {
  return candidates !== undefined || draws !== undefined || seed !== undefined;
}

/** A report from finished documents computes nothing, so that a choice could only be ignored. */
function refuseChoices(flags: Flags): void {
  const names = Object.entries(flags).flatMap(([name, value]) => (value === undefined ? [] : [name]));
  if (names.length === 0) return;
  const message = `invalid choice beside report --from (${names.join(', ')}): it renders what is there`;
  throw usage('conflicting-input', message, 'use run --from to compute again');
}

function usage(code: string, message: string, remedy: string): UserError {
  return new UserError({ code, message, remedy }, exitCodes.unusableSettings);
}
