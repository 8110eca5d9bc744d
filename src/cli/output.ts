import { mkdirSync, readdirSync, realpathSync, renameSync, rmdirSync, rmSync, writeFileSync } from 'node:fs';
import { basename, dirname, join, resolve } from 'node:path';
import { exitCodes, UserError } from '../errors.js';
import type { Scope } from './scope.js';
import { folderState, repairSteps, swapSteps } from './swap.js';

/** A folder that is being written beside the place where it will stand. */
export interface OutputFolder {
  /** @param name path below the folder, `/` as separator. */
  readonly write: (name: string, text: string) => void;
  /** Puts the folder into its place; nobody ever sees it half-written. */
  readonly commit: () => void;
}

/**
 * Repairs the place, checks that it may be replaced and begins the new folder in `OUT.partial-<pid>`.
 * @param out as the reader wrote it, relative to the current folder.
 * @throws UserError exit 2 when the place holds anything that is not ours, or cannot be written.
 */
export function openOutput(out: string, scope: Scope): OutputFolder {
  const place = placeOf(out);
  const partial = `${place}.partial-${process.pid}`;
  guarded(out, () => {
    repairOutput(out);
    if (!isReplaceable(place)) throw notOurs(out);
    mkdirSync(dirname(place), { recursive: true });
    removeAbandoned(place);
    rmSync(partial, { recursive: true, force: true });
    mkdirSync(partial);
  });
  const forget = scope.add(() => rmSync(partial, { recursive: true, force: true }));
  return {
    write: (name, text) => guarded(out, () => writeBelow(partial, name, text)),
    commit: () =>
      guarded(out, () => {
        for (const _ of swapSteps(place, partial));
        forget();
        removeRejected(place);
      }),
  };
}

/** Finishes or takes back a swap that was interrupted, so that a whole folder stands at `out` again. */
export function repairOutput(out: string): void {
  const place = placeOf(out);
  guarded(out, () => {
    if (!isReplaceable(`${place}.previous`)) throw notOurs(`${out}.previous`);
    for (const _ of repairSteps(place));
  });
}

/**
 * What an unusable input leaves: `OUT.rejected/` beside an untouched OUT. @returns the folder as the reader wrote it.
 * @throws UserError exit 2 when that folder holds anything else.
 */
export function writeRejected(out: string, files: ReadonlyMap<string, string>): string {
  const folder = `${placeOf(out)}.rejected`;
  const name = `${out.replace(/\/+$/, '')}.rejected`;
  guarded(name, () => {
    if (!['absent', 'empty', 'rejected'].includes(folderState(folder))) throw notOurs(name);
    mkdirSync(folder, { recursive: true });
    for (const [file, text] of files) {
      writeFileSync(join(folder, `${file}.partial`), text);
      renameSync(join(folder, `${file}.partial`), join(folder, file));
    }
  });
  return name;
}

/** The real place of an output folder, links resolved. */
export function placeOf(out: string): string {
  const place = resolve(out);
  try {
    return realpathSync(place);
  } catch {
    return place;
  }
}

function isReplaceable(folder: string): boolean {
  return ['absent', 'empty', 'ours'].includes(folderState(folder));
}

function writeBelow(folder: string, name: string, text: string): void {
  const path = join(folder, name);
  mkdirSync(dirname(path), { recursive: true });
  writeFileSync(path, text);
}

/** Rejects of an earlier, failed attempt would mislead beside a folder that is good. */
function removeRejected(place: string): void {
  const folder = `${place}.rejected`;
  if (folderState(folder) !== 'rejected') return;
  rmSync(join(folder, 'rejects.csv'), { force: true });
  rmSync(join(folder, 'intake.json'), { force: true });
  if (readdirSync(folder).length === 0) rmdirSync(folder);
}

/** Partial folders of processes that are gone. */
function removeAbandoned(place: string): void {
  const prefix = `${basename(place)}.partial-`;
  for (const name of readdirSync(dirname(place))) {
    const pid = name.startsWith(prefix) ? name.slice(prefix.length) : '';
    if (/^\d+$/.test(pid) && !isRunning(Number(pid))) {
      rmSync(join(dirname(place), name), { recursive: true, force: true });
    }
  }
}

function isRunning(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return (error as NodeJS.ErrnoException).code !== 'ESRCH';
  }
}

/** What the file system refuses is the reader's to mend. */
function guarded<T>(out: string, action: () => T): T {
  try {
    return action();
  } catch (error) {
    if (!(error instanceof Error) || !('syscall' in error)) throw error;
    throw new UserError(
      {
        code: 'unwritable-output',
        message: `invalid output folder ${out}: it cannot be written (${error.message})`,
        remedy: 'choose another --out, or make the place writable',
      },
      exitCodes.unusableSettings,
    );
  }
}

function notOurs(out: string): UserError {
  return new UserError(
    {
      code: 'output-not-ours',
      message: `invalid output folder ${out}: it holds something else than an earlier result (no run.json of ours)`,
      remedy: 'choose another --out, or move it away',
    },
    exitCodes.unusableSettings,
  );
}
