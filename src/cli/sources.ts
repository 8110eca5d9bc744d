import { createHash } from 'node:crypto';
import { createReadStream, createWriteStream, mkdtempSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, relative, resolve, sep } from 'node:path';
import type { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import { createGunzip } from 'node:zlib';
import { compareText } from '../csv.js';
import { exitCodes, UserError } from '../errors.js';
import type { Effects } from '../pipeline.js';
import type { Source } from '../records.js';
import { expandPattern, isPattern } from './glob.js';
import type { Scope } from './scope.js';

export interface SourceOptions {
  /** The folder that paths are relative to. */
  readonly base: string;
  readonly stdin: Readable;
  /** Removes the copy of standard input. */
  readonly scope: Scope;
  /** A folder that is about to be replaced, so that no input may lie in it; null for none. */
  readonly replaced: string | null;
}

/** `Effects.sources` on real files. Standard input is copied to a temporary file, so that it can be read twice. */
export function fileSources(options: SourceOptions): Effects['sources'] {
  let stdinTaken = false;
  return async (patterns) => {
    const found = new Map<string, Source>();
    for (const pattern of patterns) {
      if (pattern === '-') {
        if (stdinTaken) throw stdinTwice();
        stdinTaken = true;
        found.set('-', fileSource('-', await spool(options)));
        continue;
      }
      for (const path of await filesOf(pattern, options)) {
        const name = relative(options.base, path).split(sep).join('/');
        found.set(name, fileSource(name, path));
      }
    }
    return [...found.values()].sort((a, b) => compareText(a.name, b.name));
  };
}

async function filesOf(pattern: string, options: SourceOptions): Promise<string[]> {
  const paths = await expandPattern(options.base, pattern);
  if (paths.length === 0) throw nothingFound(options.base, pattern);
  const { replaced } = options;
  const inside = paths.find((path) => replaced !== null && path.startsWith(replaced + sep));
  if (inside === undefined) return paths;
  const message = `invalid output folder ${replaced}: it holds the input ${inside} and would be replaced`;
  throw new UserError(
    { code: 'input-in-output', message, remedy: 'choose another --out' },
    exitCodes.unusableSettings,
  );
}

function fileSource(name: string, path: string): Source {
  return {
    name,
    open: () => chunksOf(name, path),
    digest: async () => {
      const hash = createHash('sha256');
      let bytes = 0;
      for await (const chunk of rawChunks(name, path)) {
        hash.update(chunk);
        bytes += chunk.length;
      }
      return { bytes, sha256: hash.digest('hex') };
    },
  };
}

function chunksOf(name: string, path: string): AsyncIterable<Uint8Array> {
  return name.toLowerCase().endsWith('.gz') ? unzippedChunks(name, path) : rawChunks(name, path);
}

async function* rawChunks(name: string, path: string): AsyncGenerator<Uint8Array> {
  try {
    for await (const chunk of createReadStream(path)) yield chunk;
  } catch (error) {
    throw readFault(name, error, 'check that it is there and may be read');
  }
}

async function* unzippedChunks(name: string, path: string): AsyncGenerator<Uint8Array> {
  const raw = createReadStream(path);
  const unzipped = createGunzip();
  raw.on('error', (error) => unzipped.destroy(error));
  try {
    for await (const chunk of raw.pipe(unzipped)) yield chunk;
  } catch (error) {
    throw readFault(name, error, 'check it with gzip -t, and fetch or compress it again');
  } finally {
    raw.destroy();
  }
}

async function spool({ stdin, scope }: SourceOptions): Promise<string> {
  const folder = mkdtempSync(join(tmpdir(), 'returnfall-'));
  scope.add(() => rmSync(folder, { recursive: true, force: true }));
  const path = join(folder, 'stdin');
  await pipeline(stdin, createWriteStream(path));
  return path;
}

/** Only what the system says about a file is a reader's fault; an error of the consumer passes through unchanged. */
function readFault(name: string, error: unknown, remedy: string): unknown {
  if (!(error instanceof Error) || !('code' in error)) return error;
  const message = `invalid file: it cannot be read (${error.message})`;
  return new UserError({ code: 'unreadable-file', message, file: name, remedy }, exitCodes.unusableInput);
}

function nothingFound(base: string, pattern: string): UserError {
  const kind = statSync(resolve(base, pattern), { throwIfNoEntry: false });
  const here = `paths are relative to ${base}`;
  if (kind?.isDirectory()) {
    return missing('invalid file: it is a folder', pattern, `name its files, such as ${pattern}/*.csv`);
  }
  if (kind) return missing('invalid file: it is no regular file', pattern, 'pipe it in and name it -');
  return isPattern(pattern)
    ? missing('missing files: the pattern matches none', pattern, here)
    : missing('missing file', pattern, here);
}

function missing(message: string, file: string, remedy: string): UserError {
  return new UserError({ code: 'missing-file', message, file, remedy }, exitCodes.unusableInput);
}

function stdinTwice(): UserError {
  const message = 'invalid use of -: standard input can be read only once';
  return new UserError(
    { code: 'stdin-twice', message, remedy: 'name one of the two as a file' },
    exitCodes.unusableSettings,
  );
}
