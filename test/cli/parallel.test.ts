import { describe, expect, it } from 'vitest';
import { type ParallelOptions, parallelTasks } from '../../src/cli/parallel.js';
import { UserError } from '../../src/errors.js';
import type { Effects } from '../../src/pipeline.js';

/** Runs `inputs` through a script of threads/; the inputs are the script's own, so their types are put aside. */
function run(script: string, inputs: readonly unknown[], options: Partial<ParallelOptions> = {}) {
  const done: number[] = [];
  const url = new URL(`./threads/${script}.mjs`, import.meta.url);
  const parallel = parallelTasks({ workers: 2, script: url, ...options }) as unknown as (
    ...given: [string, readonly unknown[], number, (n: number) => void]
  ) => ReturnType<Effects['parallel']>;
  return { done, result: parallel('fit', inputs, 10, (n) => done.push(n)) as Promise<unknown> };
}

describe('work in threads', () => {
  it('returns results in the order of the inputs, whoever finishes first', async () => {
    const { result, done } = run('slow-first', [1, 2, 3, 4, 5]);
    expect(await result).toEqual([10, 20, 30, 40, 50]);
    expect(done).toEqual([0, 1, 2, 3, 4, 5]);
  });

  it('rejects when a thread ends, throws or reports a fault, even while the others hang', async () => {
    await expect(run('failing', ['hang', 'exit']).result).rejects.toThrow(
      'a worker thread ended with code 7',
    );
    await expect(run('failing', ['hang', 'throw']).result).rejects.toThrow('the thread broke');
    const fault = await run('failing', ['hang', 'fault']).result.catch((error: unknown) => error);
    expect(fault).toBeInstanceOf(UserError);
    expect(fault).toMatchObject({ exitCode: 3, faults: [{ file: 'a.csv', line: 3 }] });
  });

  it('ends the threads and rejects with the reason when it is stopped', async () => {
    const controller = new AbortController();
    const { result } = run('failing', ['hang', 'hang'], { signal: controller.signal });
    setTimeout(() => controller.abort(new Error('stopped')), 50);
    await expect(result).rejects.toThrow('stopped');
  });

  it('has nothing to do for no inputs', async () => {
    expect(await run('failing', []).result).toEqual([]);
  });
});
