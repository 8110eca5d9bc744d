import { describeFault, exitCodes, type Fault, UserError } from '../errors.js';
import { printable } from './print/text.js';

/** What an error becomes: text for standard error, the object for `--json`, the exit code. */
export interface Failure {
  readonly text: string;
  readonly document: { readonly error: FailureDetail };
  readonly exitCode: number;
}

/** The first fault; `more` holds the others where there are several. */
export interface FailureDetail extends Detail {
  readonly more?: readonly Detail[];
}

type Detail = {
  readonly [Key in 'code' | 'message' | 'file' | 'line' | 'column' | 'remedy']: Fault[Key] | null;
};

/** Code of the fault beside which help is printed: a command without settings and without records. */
export const nothingToDo = 'nothing-to-do';

/** One line a fault; the stack only when `verbose`. Whatever is not a UserError is a fault of the program. */
export function describeFailure(error: unknown, verbose: boolean): Failure {
  const { faults, exitCode } = error instanceof UserError ? error : programFault(error);
  const [first, ...rest] = faults.map(detailOf) as [Detail, ...Detail[]];
  const lines = faults.map((fault) => `returnfall: ${printable(describeFault(fault))}\n`);
  const stack = verbose && error instanceof Error ? `${error.stack ?? ''}\n` : '';
  return {
    text: lines.join('') + stack,
    document: { error: rest.length === 0 ? first : { ...first, more: rest } },
    exitCode,
  };
}

function detailOf(fault: Fault): Detail {
  const { code, message, file = null, line = null, column = null, remedy = null } = fault;
  return { code, message, file, line, column, remedy };
}

function programFault(error: unknown): { faults: readonly Fault[]; exitCode: number } {
  const what = error instanceof Error ? `${error.name}: ${error.message}` : String(error);
  const fault = {
    code: 'program-fault',
    message: `this is a fault of the program, not of the input (${what})`,
    remedy: 'run it again with --verbose and report what it prints',
  };
  return { faults: [fault], exitCode: exitCodes.fault };
}
