import { noProgress, type ProgressView, progressView } from './progress.js';

/** Where a command speaks to the reader. */
export interface Terminal {
  /** To standard output: what was asked for. */
  readonly print: (text: string) => void;
  /** To standard error, past any progress: faults and what else must be said. */
  readonly tell: (text: string) => void;
  /** To standard error unless `--quiet`: the closing summary. */
  readonly mention: (text: string) => void;
  readonly progress: ProgressView;
  /** Characters a line. */
  readonly width: number;
}

/** The terminal of this process. A bar is drawn only where standard error is a terminal that can move its cursor. */
export function processTerminal(quiet: boolean): Terminal {
  const { stdout, stderr, env } = process;
  const progress = quiet ? noProgress : progressView(stderr, stderr.isTTY && env.TERM !== 'dumb');
  const tell = (text: string) => {
    progress.stop();
    stderr.write(text);
  };
  return {
    print(text) {
      progress.stop();
      stdout.write(text);
    },
    tell,
    mention: quiet ? () => {} : tell,
    progress,
    width: stdout.columns ?? columnsOf(env.COLUMNS),
  };
}

function columnsOf(text: string | undefined): number {
  const columns = Number(text ?? '');
  return Number.isInteger(columns) && columns >= 40 ? columns : 80;
}
