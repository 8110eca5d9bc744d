import type { Intake } from './records.js';

/** What a run ends with; the numbers are the process exit codes. */
export const exitCodes = {
  done: 0,
  fault: 1,
  unusableSettings: 2,
  unusableInput: 3,
  someNotForecast: 4,
} as const;

/** One thing a reader can mend: what is wrong, where, and what to do about it. */
export interface Fault {
  /** Stable, for scripts: `unknown-key`, `missing-file` … */
  readonly code: string;
  /** Lower case, no full stop: *invalid / unknown / missing* + name + value + allowed range. */
  readonly message: string;
  readonly file?: string;
  /** 1-based physical line. */
  readonly line?: number;
  /** 1-based column of the line, or the name of the CSV column. */
  readonly column?: number | string;
  /** What to do, as a sentence fragment. */
  readonly remedy?: string;
}

/** The only error meant for a reader. Anything else that is thrown is a fault of the program. */
export class UserError extends Error {
  readonly faults: readonly Fault[];
  readonly exitCode: number;
  /** What was read before the fault, so that rejected rows are not lost. */
  readonly intake: Intake | null;

  /** @param faults at least one, in the order to print them. @param exitCode 2 settings or output, 3 input. */
  constructor(faults: Fault | readonly Fault[], exitCode: number, intake: Intake | null = null) {
    const list: readonly Fault[] = 'code' in faults ? [faults] : faults;
    super(list.map(describeFault).join('\n'));
    this.name = 'UserError';
    this.faults = list;
    this.exitCode = exitCode;
    this.intake = intake;
  }
}

/** A fault on one line: `file:line:column: message; remedy`. */
export function describeFault(fault: Fault): string {
  const place = [fault.file, fault.line, fault.column].filter((part) => part !== undefined).join(':');
  const remedy = fault.remedy === undefined ? '' : `; ${fault.remedy}`;
  return `${place === '' ? '' : `${place}: `}${fault.message}${remedy}`;
}
