import type { Config } from '../config.js';
import { jsonText } from '../ledger/json.js';
import { outputFiles } from '../ledger/outputs.js';
import { runDocument } from '../ledger/run.js';
import type { MonthEnd, RunDocument } from '../records.js';
import { renderReport } from '../report/report.js';
import type { Invocation } from './arguments.js';
import type { NodeEffects } from './effects.js';
import type { OutputFolder } from './output.js';
import type { Stopwatch } from './stopwatch.js';

export interface Delivery {
  readonly invocation: Invocation;
  readonly config: Config;
  readonly result: MonthEnd;
  readonly version: string;
  readonly effects: NodeEffects;
  readonly output: OutputFolder;
  readonly watch: Stopwatch;
}

/** Writes all that a command leaves and puts the folder into its place. @returns the run document. */
export function deliver(delivery: Delivery): RunDocument {
  const { invocation, config, result, version, output, watch } = delivery;
  watch.progress('writing results', 0, 0);
  const outputs = new Map([...outputFiles(result), ...pages(delivery)]);
  const files = result.table.files;
  const run = runDocument({ version, command: invocation.command, config, files, outputs });
  for (const [name, text] of outputs) output.write(name, text);
  output.write('run.json', jsonText(run));
  output.write('timing.json', jsonText({ seconds: watch.seconds() }));
  output.commit();
  return run;
}

function pages({
  invocation,
  config,
  result,
  version,
  effects,
  watch,
}: Delivery): ReadonlyMap<string, string> {
  if (invocation.command !== 'run' && invocation.command !== 'report') return new Map();
  watch.progress('drawing the report', 0, 0);
  const { table, fit, forecast } = result;
  const { singleFile } = invocation;
  return renderReport({ table, fit, forecast, settings: config, version }, effects.templates(), {
    singleFile,
  });
}
