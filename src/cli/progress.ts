import { performance } from 'node:perf_hooks';
import type { Writable } from 'node:stream';
import { SingleBar } from 'cli-progress';
import type { Progress } from '../records.js';
import { printable } from './print/text.js';

/** A view of the progress that has to be put away before anything else is printed. */
export interface ProgressView {
  readonly show: Progress;
  readonly stop: () => void;
}

/** Milliseconds between two plain lines. */
const quietTime = 3000;

/** A bar on a terminal, plain lines every few seconds elsewhere; neither uses colour. */
export function progressView(stream: Writable, terminal: boolean): ProgressView {
  return terminal ? bar(stream) : lines(stream);
}

export const noProgress: ProgressView = { show: () => {}, stop: () => {} };

function bar(stream: Writable): ProgressView {
  const view = new SingleBar({
    stream: stream as NodeJS.WritableStream,
    format: '{bar} {percentage} % {step}',
    barsize: 24,
    barCompleteChar: '=',
    barIncompleteChar: ' ',
    clearOnComplete: true,
    fps: 10,
  });
  return {
    show(step, done, total) {
      if (!view.isActive) view.start(Math.max(total, 1), 0, { step: '' });
      view.setTotal(Math.max(total, 1));
      view.update(Math.min(done, Math.max(total, 1)), { step: printable(step) });
    },
    stop: () => view.stop(),
  };
}

function lines(stream: Writable): ProgressView {
  let last = Number.NEGATIVE_INFINITY;
  return {
    show(step, done, total) {
      const now = performance.now();
      if (now - last < quietTime) return;
      last = now;
      const share = total > 0 ? ` (${Math.floor((100 * done) / total)} %)` : '';
      stream.write(`${printable(step)}${share}\n`);
    },
    stop: () => {},
  };
}
