import { lstatSync, readdirSync, readFileSync, renameSync, rmdirSync, rmSync } from 'node:fs';
import { join } from 'node:path';

/**
 * What stands at a path: nothing, an empty folder, a folder that a run left whole (it holds run.json), one that a failed run
 * left (it holds an account of rows and no run.json), or anything else.
 */
export type FolderState = 'absent' | 'empty' | 'ours' | 'rejected' | 'foreign';

export function folderState(path: string): FolderState {
  const found = lstatSync(path, { throwIfNoEntry: false });
  if (found === undefined) return 'absent';
  if (!found.isDirectory()) return 'foreign';
  if (readdirSync(path).length === 0) return 'empty';
  if (schemaOf(join(path, 'run.json')).startsWith('returnfall/run/')) return 'ours';
  return schemaOf(join(path, 'intake.json')).startsWith('returnfall/intake/') ? 'rejected' : 'foreign';
}

/**
 * Puts the finished folder `partial` at `out`. It pauses after each change of the file system; wherever it ends,
 * a whole folder stands at `out` or at `out.previous`, if one stood at `out` before.
 */
export function* swapSteps(out: string, partial: string): Generator<string> {
  const before = folderState(out);
  if (before === 'empty') {
    rmdirSync(out);
    yield 'empty folder removed';
  } else if (before === 'ours') {
    renameSync(out, `${out}.previous`);
    yield 'old folder moved aside';
  }
  renameSync(partial, out);
  yield 'new folder in place';
  yield* removeSteps(`${out}.previous`);
}

/** Brings a swap that was interrupted to an end: the old folder back to `out`, or away when the new one stands there. */
export function* repairSteps(out: string): Generator<string> {
  const previous = `${out}.previous`;
  const [standing, aside] = [folderState(out), folderState(previous)];
  if (aside === 'ours' && (standing === 'absent' || standing === 'empty')) {
    if (standing === 'empty') {
      rmdirSync(out);
      yield 'empty folder removed';
    }
    renameSync(previous, out);
    yield 'old folder back in place';
  } else if ((aside === 'ours' && standing === 'ours') || aside === 'empty') {
    yield* removeSteps(previous);
  }
}

/** Removes a folder of ours, run.json last, so that what an interruption leaves is still known as ours. */
function* removeSteps(folder: string): Generator<string> {
  if (folderState(folder) === 'absent') return;
  const names = readdirSync(folder).filter((name) => name !== 'run.json');
  for (const name of [...names, 'run.json']) {
    rmSync(join(folder, name), { recursive: true, force: true });
    yield `${name} of the old folder removed`;
  }
  rmdirSync(folder);
  yield 'old folder removed';
}

function schemaOf(path: string): string {
  try {
    const document: unknown = JSON.parse(readFileSync(path, 'utf8'));
    const schema =
      typeof document === 'object' && document !== null && 'schema' in document && document.schema;
    return typeof schema === 'string' ? schema : '';
  } catch {
    return '';
  }
}
