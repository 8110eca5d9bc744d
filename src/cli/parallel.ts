import { setImmediate } from 'node:timers/promises';
import { Worker } from 'node:worker_threads';
import type { Fault } from '../errors.js';
import { UserError } from '../errors.js';
import { type Effects, type TaskName, type Tasks, tasks } from '../pipeline.js';

/** What a worker is asked for. */
export interface Job {
  readonly index: number;
  readonly task: string;
  readonly input: unknown;
}

/** What it answers; an error loses its class on the way and is put together again here. */
export type Answer =
  | { readonly index: number; readonly value: unknown }
  | { readonly index: number; readonly faults: readonly Fault[]; readonly exitCode: number }
  | { readonly index: number; readonly message: string; readonly stack: string };

export interface ParallelOptions {
  /** Most threads at a time, 1 or more; 1 computes in this thread. */
  readonly workers: number;
  /** Stops the work: threads are ended, the result rejects with the reason. */
  readonly signal?: AbortSignal;
  /** The script of a thread; by default the one beside this file. */
  readonly script?: URL;
}

/** A thread takes 60 to 75 ms to start: below this much work, in seconds, it is not worth it. */
const worthWorkers = 0.5;

/** `Effects.parallel` on threads; results are in the order of the inputs, whoever finishes first. Begins with `onDone(0)`. */
export function parallelTasks(options: ParallelOptions): Effects['parallel'] {
  return async <T extends TaskName>(
    task: T,
    inputs: readonly Parameters<Tasks[T]>[0][],
    seconds: number,
    onDone: (finished: number) => void,
  ) => {
    onDone(0);
    const threads = Math.min(options.workers, inputs.length);
    if (threads < 2 || seconds < worthWorkers) return inThisThread(task, inputs, options.signal, onDone);
    const script = options.script ?? new URL('./worker.js', import.meta.url);
    const jobs = inputs.map((input, index) => ({ index, task, input }));
    const results = await inWorkers(script, threads, jobs, options.signal, onDone);
    return results as ReturnType<Tasks[T]>[];
  };
}

async function inThisThread<T extends TaskName>(
  task: T,
  inputs: readonly Parameters<Tasks[T]>[0][],
  signal: AbortSignal | undefined,
  onDone: (finished: number) => void,
): Promise<ReturnType<Tasks[T]>[]> {
  const run = tasks[task] as (input: Parameters<Tasks[T]>[0]) => ReturnType<Tasks[T]>;
  const results: ReturnType<Tasks[T]>[] = [];
  for (const input of inputs) {
    await setImmediate();
    signal?.throwIfAborted();
    results.push(run(input));
    onDone(results.length);
  }
  return results;
}

async function inWorkers(
  script: URL,
  threads: number,
  jobs: readonly Job[],
  signal: AbortSignal | undefined,
  onDone: (finished: number) => void,
): Promise<unknown[]> {
  signal?.throwIfAborted();
  const workers = Array.from({ length: threads }, () => new Worker(script));
  const results: unknown[] = new Array(jobs.length);
  let [next, finished] = [0, 0];
  try {
    await new Promise<void>((resolve, reject) => {
      signal?.addEventListener('abort', () => reject(signal.reason), { once: true });
      const give = (worker: Worker) => {
        const job = jobs[next++];
        if (job !== undefined) worker.postMessage(job);
      };
      for (const worker of workers) {
        worker.on('message', (answer: Answer) => {
          if (!('value' in answer)) return reject(errorOf(answer));
          results[answer.index] = answer.value;
          onDone(++finished);
          if (finished === jobs.length) resolve();
          else give(worker);
        });
        worker.on('error', reject);
        worker.on('exit', (code) => reject(new Error(`a worker thread ended with code ${code}`)));
        give(worker);
      }
    });
  } finally {
    await Promise.all(workers.map((worker) => worker.terminate()));
  }
  return results;
}

function errorOf(answer: Exclude<Answer, { value: unknown }>): Error {
  if ('faults' in answer) return new UserError(answer.faults, answer.exitCode);
  const error = new Error(answer.message);
  error.stack = answer.stack;
  return error;
}
