import { availableParallelism } from 'node:os';
import type { Readable } from 'node:stream';
import type { Effects } from '../pipeline.js';
import type { Progress } from '../records.js';
import { parallelTasks } from './parallel.js';
import { openScope, type Scope } from './scope.js';
import { fileSources } from './sources.js';
import { readTemplates } from './templates.js';

export interface NodeEffectsOptions {
  /** The folder that paths are relative to. */
  readonly base: string;
  /** Most threads at a time; by default as many as there are cores. Never changes a result. */
  readonly workers?: number | undefined;
  /** Told of every progress; by default nobody is. */
  readonly progress?: Progress | undefined;
  /** Stops work in threads. */
  readonly signal?: AbortSignal | undefined;
  /** What `-` reads; by default standard input. */
  readonly stdin?: Readable | undefined;
  /** A folder that is about to be replaced: no input may lie in it. */
  readonly replaced?: string | undefined;
  /** Closed by the caller in place of `close`. */
  readonly scope?: Scope | undefined;
}

/** Effects on the files, threads and standard input of this machine. */
export interface NodeEffects extends Effects {
  /** The report's templates, as the package brings them. */
  readonly templates: () => Readonly<Record<string, string>>;
  /** Removes the copy of standard input; call it when the work is done. */
  readonly close: () => void;
}

export function nodeEffects(options: NodeEffectsOptions): NodeEffects {
  const scope = options.scope ?? openScope();
  return {
    sources: fileSources({
      base: options.base,
      stdin: options.stdin ?? process.stdin,
      scope,
      replaced: options.replaced ?? null,
    }),
    parallel: parallelTasks({
      workers: options.workers ?? availableParallelism(),
      ...(options.signal === undefined ? {} : { signal: options.signal }),
    }),
    progress: options.progress ?? (() => {}),
    templates: readTemplates,
    close: () => scope.close(),
  };
}
