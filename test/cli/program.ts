import { spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import { mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

const script = fileURLToPath(new URL('../../dist/cli/main.js', import.meta.url));

export interface Ended {
  readonly code: number | null;
  readonly stdout: string;
  readonly stderr: string;
}

export interface RunOptions {
  readonly stdin?: string;
  readonly env?: Readonly<Record<string, string>>;
  /** Sends this signal after the first line of progress. */
  readonly interrupt?: NodeJS.Signals;
}

/** A folder of its own for one test, with the built program to run in it. */
export interface Workplace {
  readonly path: (name: string) => string;
  readonly put: (name: string, text: string | Uint8Array) => void;
  readonly run: (words: readonly string[], options?: RunOptions) => Promise<Ended>;
  readonly remove: () => void;
}

export function openWorkplace(): Workplace {
  const folder = mkdtempSync(join(tmpdir(), 'program-'));
  return {
    path: (name) => join(folder, name),
    put(name, text) {
      mkdirSync(dirname(join(folder, name)), { recursive: true });
      writeFileSync(join(folder, name), text);
    },
    run: (words, options = {}) => runProgram(folder, words, options),
    remove: () => rmSync(folder, { recursive: true, force: true }),
  };
}

/** Every file below a folder with its bytes as Latin-1 text, in the order of their names. */
export function contentsOf(folder: string, below = ''): Map<string, string> {
  const names = readdirSync(join(folder, below)).sort();
  return new Map(
    names.flatMap((name) => {
      const path = below === '' ? name : `${below}/${name}`;
      if (statSync(join(folder, path)).isDirectory()) return [...contentsOf(folder, path)];
      return [[path, readFileSync(join(folder, path), 'latin1')] as const];
    }),
  );
}

/** Every file below a folder with a digest of its bytes, but for timing.json, whose seconds may differ. */
export function digestsOf(folder: string): Map<string, string> {
  const files = [...contentsOf(folder)].filter(([name]) => name !== 'timing.json');
  return new Map(
    files.map(([name, text]) => [name, createHash('sha256').update(text, 'latin1').digest('hex')]),
  );
}

function runProgram(folder: string, words: readonly string[], options: RunOptions): Promise<Ended> {
  const env = { ...process.env, NO_COLOR: '1', ...options.env };
  const child = spawn(process.execPath, [script, ...words], { cwd: folder, env });
  const taken = { stdout: '', stderr: '' };
  child.stdout.setEncoding('utf8').on('data', (chunk) => (taken.stdout += chunk));
  child.stderr.setEncoding('utf8').on('data', (chunk) => {
    if (taken.stderr === '' && options.interrupt !== undefined) child.kill(options.interrupt);
    taken.stderr += chunk;
  });
  child.stdin.end(options.stdin ?? '');
  return new Promise((resolve, reject) => {
    child.on('error', reject);
    child.on('close', (code) => resolve({ code, ...taken }));
  });
}
