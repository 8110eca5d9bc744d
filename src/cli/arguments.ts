import { Command, CommanderError, Option } from 'commander';
import { exitCodes, UserError } from '../errors.js';
import type { Flags } from '../settings.js';
import { type CommandName, commandHelp, commands, programHelp, unbuiltCommands } from './help.js';

/** A command line, taken apart. Values are as written; settings.ts checks those of `flags`. */
export interface Invocation {
  readonly command: CommandName;
  readonly settings: string | null;
  readonly from: string | null;
  readonly out: string | null;
  /** Threads; null leaves it to the machine. */
  readonly workers: number | null;
  readonly singleFile: boolean;
  readonly json: boolean;
  readonly quiet: boolean;
  readonly verbose: boolean;
  readonly flags: Flags;
}

/** What a command line asks for: a command, or a text to print (help, version). */
export type Request = { readonly invocation: Invocation } | { readonly text: string };

/**
 * @param words the command line without node and script. @param version of the program.
 * @throws UserError exit 2 for whatever cannot be understood or is not built.
 */
export function parseArguments(words: readonly string[], version: string): Request {
  let invocation: Invocation | null = null;
  let text = '';
  const program = describeProgram(version, (command, options) => {
    invocation = invocationOf(command, options);
  });
  for (const command of [program, ...program.commands]) {
    command.exitOverride().configureOutput({ writeOut: (chunk) => (text += chunk), writeErr: () => {} });
  }
  try {
    program.parse(words, { from: 'user' });
  } catch (error) {
    if (!(error instanceof CommanderError)) throw error;
    if (error.exitCode !== 0) throw usageFault(error);
    return { text };
  }
  return invocation === null ? { text } : { invocation };
}

/** The help of a command, or of the program for null and for a name that is none. */
export function helpText(name: string | null): string {
  const program = describeProgram('', () => {});
  const command = program.commands.find((described) => described.name() === name);
  const examples = commandHelp(command === undefined ? null : (name as CommandName));
  return (command ?? program).helpInformation() + examples;
}

type Options = Readonly<Record<string, string | string[] | boolean | undefined>>;

function describeProgram(version: string, action: (command: CommandName, options: Options) => void): Command {
  const program = new Command('returnfall')
    .description(programHelp)
    .usage('COMMAND [options]')
    .version(version, '--version', 'print the version')
    .helpOption('-h, --help', 'print this help')
    .helpCommand(false)
    .configureHelp({ helpWidth: 80 })
    .addHelpText('after', commandHelp(null));
  for (const [name, description] of Object.entries(commands) as [CommandName, string][]) {
    const command = program.command(name).description(description).allowExcessArguments(false);
    for (const option of optionsOf(name)) command.addOption(option);
    command
      .version(version, '--version', 'print the version')
      .helpOption('-h, --help', 'print this help')
      .addHelpText('after', commandHelp(name))
      .action((options: Options) => action(name, options));
  }
  for (const name of unbuiltCommands) {
    program
      .command(name, { hidden: true })
      .allowUnknownOption()
      .allowExcessArguments()
      .helpOption(false)
      .action(() => {
        throw notBuilt(`command ${name}`, `it has ${Object.keys(commands).join(', ')}`);
      });
  }
  return program;
}

function optionsOf(name: CommandName): Option[] {
  const report = name === 'run' || name === 'report';
  return [
    ...inputOptions.map(([flags, text]) => new Option(flags, text).helpGroup('Inputs:')),
    ...choiceOptions.map(([flags, text]) => new Option(flags, text).helpGroup('Choices:')),
    new Option('--fail-on <condition>').hideHelp().argParser(() => {
      throw notBuilt('option --fail-on', 'leave it out');
    }),
    ...(report ? [new Option('--single-file', 'put the pages of the products into index.html')] : []),
    new Option('--out <dir>', report ? 'folder to write (default: returnfall-out)' : 'folder to write'),
    new Option('--json', 'print the main document as JSON, and nothing else'),
    new Option('--quiet', 'no progress and no summary'),
    new Option('--verbose', 'show where in the program an error arose'),
  ];
}

const inputOptions = [
  ['--settings <file>', 'settings file (default: returnfall.json, where there is one)'],
  ['--shipments <file...>', 'shipments, by unit or counted; patterns such as "2026-*.csv" are fine'],
  ['--returns <file...>', 'returns'],
  ['--withdrawals <file...>', 'units that left without a return'],
  ['--plan <file...>', 'shipments planned after the as-of date'],
  ['--table <file>', 'a Nevada-style table in place of shipments and returns'],
  ['--table-withdrawn <file>', 'withdrawals in the same layout'],
  ['--ages <file>', 'ages of returned and surviving units, without a calendar'],
  ['--from <dir>', 'go on from what an earlier command left there'],
  ['--as-of <date>', 'last day whose records count, such as 2026-10-31'],
] as const;

const choiceOptions = [
  ['--period <kind>', 'week, month or quarter (default: month)'],
  ['--horizon <n>', 'periods to forecast (default: 12)'],
  ['--warranty-months <n>', 'warranty of every product, in calendar months'],
  ['--warranty-days <n>', 'warranty of every product, in days'],
  ['--delay-days <n>', 'days in which no unit can be returned'],
  ['--candidates <names>', 'distributions to try, such as weibull,lognormal'],
  ['--levels <list>', 'levels of the intervals (default: 0.8,0.95)'],
  ['--draws <n>', 'draws behind the intervals (default: 4000)'],
  ['--seed <n>', 'seed of the draws (default: 1)'],
  ['--workers <n>', 'threads (default: one a core); never changes a number'],
] as const;

function invocationOf(command: CommandName, options: Options): Invocation {
  const one = (name: string) => (typeof options[name] === 'string' ? options[name] : null);
  const { settings: _, from: __, out: ___, workers, json, quiet, verbose, singleFile, ...flags } = options;
  return {
    command,
    settings: one('settings'),
    from: one('from'),
    out: one('out'),
    workers: workers === undefined ? null : workerCount(String(workers)),
    singleFile: singleFile === true,
    json: json === true,
    quiet: quiet === true,
    verbose: verbose === true,
    flags: flags as Flags,
  };
}

function workerCount(text: string): number {
  if (/^\d{1,3}$/.test(text) && Number(text) >= 1) return Number(text);
  const message = `invalid --workers ${text}, allowed whole numbers from 1 to 999`;
  throw new UserError(
    { code: 'invalid-flag', message, column: '--workers', remedy: 'leave it out for one a core' },
    exitCodes.unusableSettings,
  );
}

function usageFault(error: CommanderError): UserError {
  const [said = '', hint = ''] = error.message
    .replace(/^error: /, '')
    .replace(/\.$/, '')
    .split('\n');
  const message = said.startsWith('unknown') ? said : `invalid command line: ${said}`;
  const remedy = hint === '' ? 'see returnfall --help' : hint.replace(/^\((.*)\?\)$/, '$1?').toLowerCase();
  return new UserError({ code: 'usage', message, remedy }, exitCodes.unusableSettings);
}

function notBuilt(what: string, remedy: string): UserError {
  const message = `unknown ${what}: this version does not have it`;
  return new UserError({ code: 'not-built', message, remedy }, exitCodes.unusableSettings);
}
