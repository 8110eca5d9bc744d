/** The commands that are built, in the order of the work, each with its help in one line. */
export const commands = {
  table: 'Nevada-style table of the records: ship month by return month, with survivors',
  fit: 'fit the candidate distributions and rank them',
  forecast: 'returns to come, period by period, with intervals',
  report: 'HTML report, from records or from what an earlier command left (--from)',
  run: 'all of it: the month end from records to report',
} as const;
export type CommandName = keyof typeof commands;

/** Commands that a later version will have. */
export const unbuiltCommands = [
  'backtest',
  'compare',
  'reserve',
  'watch',
  'ledger',
  'replay',
  'init',
  'check',
  'sql',
] as const;

/** What the program does, in a sentence. */
export const programHelp =
  'Forecasts warranty returns, month by month and with intervals, from shipment and return records.';

/** What follows the list of options: examples to copy, and what an exit code means. */
export function commandHelp(command: CommandName | null): string {
  const lines = command === null ? [...examples.program, '', ...exitLines] : examples[command];
  return `\nExamples:\n${lines.map((line) => (line === '' ? '' : `  ${line}`)).join('\n')}\n`.replace(
    '\n\n  Exit codes:',
    '\n\nExit codes:',
  );
}

const exitLines = [
  'Exit codes:',
  '0  done',
  '1  a fault of the program',
  '2  the command line, the settings or the output folder cannot be used',
  '3  the input cannot be used, or no product could be forecast',
  '4  done, but some products could not be forecast; they are named',
  '130, 143  stopped by a signal; earlier output is as it was',
];

const examples: Readonly<Record<CommandName | 'program', readonly string[]>> = {
  program: [
    'returnfall run --shipments shipped.csv --returns returned.csv \\',
    '    --as-of 2026-10-31 --warranty-months 24',
    'returnfall run                     (with a returnfall.json in this folder)',
    'returnfall run --help              (inputs, choices and examples of a command)',
  ],
  table: [
    'returnfall table --shipments "shipped-*.csv" --returns returned.csv \\',
    '    --as-of 2026-10-31',
    'returnfall table --settings month-end/returnfall.json --out october',
    'export-shipments | returnfall table --shipments - --returns returned.csv \\',
    '    --as-of 2026-10-31',
  ],
  fit: [
    'returnfall fit --shipments shipped.csv --returns returned.csv \\',
    '    --as-of 2026-10-31',
    'returnfall fit --table table.csv \\',
    '    --as-of 2026-10-31 --candidates weibull,lognormal',
    'returnfall fit --ages bearings.csv',
  ],
  forecast: [
    'returnfall forecast --shipments shipped.csv --returns returned.csv \\',
    '    --as-of 2026-10-31 --horizon 6',
    'returnfall forecast --from october --levels 0.5,0.9 --json',
    'returnfall forecast --settings returnfall.json --period quarter --horizon 4',
  ],
  report: [
    'returnfall report --from october --out october-report',
    'returnfall report --from october --single-file --out for-mailing',
  ],
  run: [
    'returnfall run --shipments shipped.csv --returns returned.csv \\',
    '    --as-of 2026-10-31 --warranty-months 24',
    'returnfall run --settings month-end/returnfall.json --out october',
    'returnfall run --from october --horizon 24 --out october-two-years',
  ],
};
