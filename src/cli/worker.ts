/** The only entry of a thread: computes the tasks that it is sent, one after another. */
import { parentPort } from 'node:worker_threads';
import { UserError } from '../errors.js';
import { tasks } from '../pipeline.js';
import type { Answer, Job } from './parallel.js';

parentPort?.on('message', (job: Job) => parentPort?.postMessage(answer(job)));

function answer({ index, task, input }: Job): Answer {
  try {
    const run = (tasks as Readonly<Record<string, (input: never) => unknown>>)[task];
    if (run === undefined) throw new Error(`unknown task ${task}`);
    return { index, value: run(input as never) };
  } catch (error) {
    if (error instanceof UserError) return { index, faults: error.faults, exitCode: error.exitCode };
    if (error instanceof Error) return { index, message: error.message, stack: error.stack ?? error.message };
    return { index, message: String(error), stack: String(error) };
  }
}
