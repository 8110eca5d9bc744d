import { performance } from 'node:perf_hooks';
import type { Progress } from '../records.js';

/** Seconds spent on each step, in the order in which the steps began. */
export interface Stopwatch {
  /** Tells that a step is at work; a progress function that also measures. */
  readonly progress: Progress;
  readonly seconds: () => Readonly<Record<string, number>>;
}

/** Measures from one change of step to the next; `show` is told of every progress. */
export function startStopwatch(show: Progress): Stopwatch {
  const spent = new Map<string, number>();
  let [step, since] = ['start', performance.now()];
  const close = () => {
    const now = performance.now();
    spent.set(step, (spent.get(step) ?? 0) + (now - since) / 1000);
    since = now;
  };
  return {
    progress(next, done, total) {
      if (next !== step) close();
      step = next;
      show(next, done, total);
    },
    seconds() {
      close();
      return Object.fromEntries([...spent].map(([name, value]) => [name, Number(value.toFixed(3))]));
    },
  };
}
