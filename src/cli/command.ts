import { exitCodes, UserError } from '../errors.js';
import { intakeDocument } from '../ingest/document.js';
import { jsonText } from '../ledger/json.js';
import { rejectsCsv } from '../ledger/rejects.js';
import { monthEnd, type Until } from '../pipeline.js';
import type { MonthEnd } from '../records.js';
import type { Invocation } from './arguments.js';
import { begin, type Start } from './begin.js';
import { deliver } from './deliver.js';
import { type NodeEffects, nodeEffects } from './effects.js';
import { openOutput, placeOf, repairOutput, writeRejected } from './output.js';
import { warningsText } from './print/warnings.js';
import type { Scope } from './scope.js';
import { mainDocument, resultText, summaryText } from './show.js';
import { startStopwatch } from './stopwatch.js';
import type { Terminal } from './terminal.js';
import { type Missing, missingProducts, missingText } from './verdict.js';

/** What a command has around it. */
export interface Session {
  /** Version of the program. */
  readonly version: string;
  readonly scope: Scope;
  readonly terminal: Terminal;
  readonly signal: AbortSignal;
}

/** Runs a command from settings to the last printed line. @returns the exit code. @throws UserError */
export async function runCommand(invocation: Invocation, session: Session): Promise<number> {
  const { terminal, scope, signal, version } = session;
  const out = outOf(invocation);
  if (out !== null) repairOutput(out);
  const start = begin(invocation);
  const output = out === null ? null : openOutput(out, scope);
  const watch = startStopwatch(terminal.progress.show);
  const effects = nodeEffects({
    base: start.base,
    workers: invocation.workers ?? undefined,
    progress: watch.progress,
    replaced: out === null ? undefined : placeOf(out),
    scope,
    signal,
  });
  const { result, missing } = await finish(invocation, start, effects, out);
  const delivery = { invocation, config: start.config, result, version, effects, watch };
  const run = output === null ? null : deliver({ ...delivery, output });
  const { json } = invocation;
  terminal.mention(warningsText(result, invocation.command === 'run' || invocation.command === 'report'));
  if (missing.length > 0) terminal.tell(missingText(missing));
  terminal.print(
    json
      ? jsonText(mainDocument(invocation, result, run))
      : resultText(invocation, out, result, terminal.width),
  );
  terminal.mention(summaryText(invocation, out, result, missing.length));
  return missing.length > 0 ? exitCodes.someNotForecast : exitCodes.done;
}

interface Finished {
  readonly result: MonthEnd;
  readonly missing: readonly Missing[];
}

/** The stages; on unusable input the rejects and the account are kept beside an untouched output. */
async function finish(
  invocation: Invocation,
  start: Start,
  effects: NodeEffects,
  out: string | null,
): Promise<Finished> {
  try {
    const result =
      start.finished ?? (await monthEnd(start.config, untilOf(invocation, start), effects, start.earlier));
    return { result, missing: missingProducts(result) };
  } catch (error) {
    if (!(error instanceof UserError) || error.intake === null || out === null) throw error;
    const files = new Map([
      ['rejects.csv', rejectsCsv(error.intake.rejects)],
      ['intake.json', jsonText(intakeDocument(start.config, error.intake))],
    ]);
    const kept = {
      code: 'rejects-kept',
      message: `rejected rows and account are in ${writeRejected(out, files)}`,
    };
    throw new UserError([...error.faults, kept], error.exitCode, error.intake);
  }
}

/** Ages without a step of use are fitted and reported, and nothing is forecast. */
function untilOf({ command }: Invocation, { config }: Start): Until {
  if (command === 'table' || command === 'fit') return command;
  const steps = config.ages.files.length === 0 || config.ageStep !== null;
  if (command !== 'forecast' || steps) return steps ? 'forecast' : 'fit';
  throw new UserError(
    {
      code: 'missing-age-step',
      message: 'missing ageStep: ages without a calendar have no periods to forecast',
      remedy: 'set ageStep, the length of a forecast step in the unit of the ages, or use fit or report',
    },
    exitCodes.unusableSettings,
  );
}

function outOf({ command, out }: Invocation): string | null {
  if (out === '') {
    const fault = {
      code: 'invalid-flag',
      message: 'invalid --out, allowed the path of a folder',
      column: '--out',
    };
    throw new UserError({ ...fault, remedy: 'name a folder, or leave it out' }, exitCodes.unusableSettings);
  }
  return out ?? (command === 'run' || command === 'report' ? 'returnfall-out' : null);
}
