import { createHash } from 'node:crypto';
import type { Config } from '../config.js';
import { compareText } from '../csv.js';
import type { FileAccount, RunDocument } from '../records.js';

/** What `runDocument` writes down. */
export interface RunFacts {
  /** Version of the package. */
  readonly version: string;
  /** `run`, `table`, … without flags. */
  readonly command: string;
  readonly config: Config;
  readonly files: readonly FileAccount[];
  /** Contents of every file in the output folder but run.json and timing.json, by path with `/`. */
  readonly outputs: ReadonlyMap<string, string | Uint8Array>;
}

/** `run.json`: enough to reproduce a run, and to notice when a file of it was altered since. */
export function runDocument({ version, command, config, files, outputs }: RunFacts): RunDocument {
  return {
    schema: 'returnfall/run/1',
    version,
    command,
    seed: config.seed,
    settings: config,
    inputs: files
      .map(({ file, role, bytes, sha256 }) => ({ file, role, bytes, sha256 }))
      .sort((a, b) => compareText(`${a.file}\n${a.role}`, `${b.file}\n${b.role}`)),
    outputs: [...outputs]
      .map(([file, content]) => ({ file, ...digestOf(content) }))
      .sort((a, b) => compareText(a.file, b.file)),
  };
}

/** Size in bytes (UTF-8) and SHA-256 in hex. */
export function digestOf(content: string | Uint8Array): { bytes: number; sha256: string } {
  const bytes = Buffer.from(content as string);
  return { bytes: bytes.length, sha256: createHash('sha256').update(bytes).digest('hex') };
}
