import { existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { openOutput, repairOutput, writeRejected } from '../../src/cli/output.js';
import { openScope } from '../../src/cli/scope.js';
import { folderState, repairSteps, swapSteps } from '../../src/cli/swap.js';

let place = '';
beforeEach(() => {
  place = mkdtempSync(join(tmpdir(), 'swap-'));
});
afterEach(() => rmSync(place, { recursive: true, force: true }));

/** A whole folder: run.json, two more files, each with the same word in it. */
function fill(name: string, word: string): string {
  const folder = join(place, name);
  mkdirSync(join(folder, 'products'), { recursive: true });
  writeFileSync(join(folder, 'run.json'), JSON.stringify({ schema: 'returnfall/run/1', word }));
  writeFileSync(join(folder, 'forecast.json'), word);
  writeFileSync(join(folder, 'products', 'a.html'), word);
  return folder;
}

/** The word of a folder that holds all its files, null when one is missing or is of another folder. */
function wordOf(folder: string): string | null {
  const files = ['forecast.json', 'products/a.html'].map((name) => join(folder, name));
  if (!existsSync(join(folder, 'run.json')) || !files.every(existsSync)) return null;
  const words = files.map((file) => readFileSync(file, 'utf8'));
  words.push(JSON.parse(readFileSync(join(folder, 'run.json'), 'utf8')).word);
  return words.every((word) => word === words[0]) ? (words[0] ?? null) : null;
}

/** Runs `steps` until `count` of them are done. @returns false when there were fewer. */
function interrupted(steps: Generator<string>, count: number): boolean {
  for (let done = 0; done < count; done++) if (steps.next().done === true) return false;
  return true;
}

describe('the swap of output folders', () => {
  it('leaves a whole folder at OUT or OUT.previous wherever it is interrupted, and is repaired to one of them', () => {
    let points = 0;
    for (let count = 0; ; count++) {
      rmSync(place, { recursive: true, force: true });
      const out = fill('out', 'old');
      const going = interrupted(swapSteps(out, fill('partial', 'new')), count);
      expect([wordOf(out), wordOf(`${out}.previous`)].filter((word) => word !== null).length).toBeGreaterThan(
        0,
      );
      for (const _ of repairSteps(out));
      expect(wordOf(out)).toBe(count < 2 ? 'old' : 'new');
      expect(folderState(`${out}.previous`)).toBe('absent');
      if (!going) break;
      points++;
    }
    expect(points).toBe(7);
  });

  it('bears an interruption of the repair as well', () => {
    for (let first = 0; first < 7; first++) {
      for (let second = 0; second < 5; second++) {
        rmSync(place, { recursive: true, force: true });
        const out = fill('out', 'old');
        interrupted(swapSteps(out, fill('partial', 'new')), first);
        interrupted(repairSteps(out), second);
        for (const _ of repairSteps(out));
        expect(wordOf(out)).toBe(first < 2 ? 'old' : 'new');
        expect(folderState(`${out}.previous`)).toBe('absent');
      }
    }
  });

  it('takes an empty folder or none at all as free', () => {
    for (const before of ['absent', 'empty'] as const) {
      const out = join(place, before);
      if (before === 'empty') mkdirSync(out);
      for (const _ of swapSteps(out, fill('partial', 'new')));
      expect(wordOf(out)).toBe('new');
    }
  });
});

describe('openOutput', () => {
  it('refuses a folder that holds something else, and leaves it as it was', () => {
    const out = join(place, 'letters');
    mkdirSync(out);
    writeFileSync(join(out, 'letter.txt'), 'dear reader');
    expect(() => openOutput(out, openScope())).toThrow(
      /invalid output folder .*letters: it holds something else/,
    );
    expect(readFileSync(join(out, 'letter.txt'), 'utf8')).toBe('dear reader');
  });

  it('refuses a run.json that another program wrote', () => {
    const out = join(place, 'other');
    mkdirSync(out);
    writeFileSync(join(out, 'run.json'), '{"schema":"elsewhere/run/1"}');
    expect(() => openOutput(out, openScope())).toThrow(/no run.json of ours/);
  });

  it('refuses to touch a .previous that is not ours', () => {
    const out = fill('out', 'old');
    mkdirSync(`${out}.previous`);
    writeFileSync(join(`${out}.previous`, 'letter.txt'), 'dear reader');
    expect(() => openOutput(out, openScope())).toThrow(/out\.previous: it holds something else/);
    expect(existsSync(join(`${out}.previous`, 'letter.txt'))).toBe(true);
  });

  it('removes the partial folder when the scope closes before the commit, and keeps the old folder', () => {
    const [out, scope] = [fill('out', 'old'), openScope()];
    openOutput(out, scope).write('forecast.json', 'new');
    expect(existsSync(`${out}.partial-${process.pid}`)).toBe(true);
    scope.close();
    expect(existsSync(`${out}.partial-${process.pid}`)).toBe(false);
    expect(wordOf(out)).toBe('old');
  });

  it('clears away what a killed process left, and only that', () => {
    const out = fill('out', 'old');
    // 2^22 + 1 is above the largest process id that Linux gives (proc(5), pid_max).
    fill('out.partial-4194305', 'half');
    fill('out.partial-notes', 'mine');
    openOutput(out, openScope());
    expect(existsSync(`${out}.partial-4194305`)).toBe(false);
    expect(existsSync(`${out}.partial-notes`)).toBe(true);
    rmSync(`${out}.partial-${process.pid}`, { recursive: true });
  });

  it('brings the old folder back when only .previous stands', () => {
    fill('out.previous', 'old');
    repairOutput(join(place, 'out'));
    expect(wordOf(join(place, 'out'))).toBe('old');
  });

  it('keeps rejects beside a result, and touches no folder of somebody else', () => {
    const out = fill('out', 'old');
    const files = new Map([
      ['intake.json', '{"schema":"returnfall/intake/1"}'],
      ['rejects.csv', 'file\n'],
    ]);
    mkdirSync(`${out}.rejected`);
    writeFileSync(`${out}.rejected/rejects.csv`, 'mine');
    expect(() => writeRejected(out, files)).toThrow(
      /invalid output folder .*out\.rejected: it holds something else/,
    );
    expect(readFileSync(`${out}.rejected/rejects.csv`, 'utf8')).toBe('mine');
    rmSync(`${out}.rejected`, { recursive: true });
    writeRejected(out, files);
    writeRejected(out, files.set('rejects.csv', 'file,line\n'));
    expect(readFileSync(`${out}.rejected/rejects.csv`, 'utf8')).toBe('file,line\n');
  });

  it('drops the rejects of a failed attempt once a run succeeds', () => {
    const out = fill('out', 'old');
    writeRejected(
      out,
      new Map([
        ['intake.json', '{"schema":"returnfall/intake/1"}'],
        ['rejects.csv', 'file\n'],
      ]),
    );
    expect(existsSync(`${out}.rejected/rejects.csv`)).toBe(true);
    const folder = openOutput(out, openScope());
    folder.write('run.json', '{"schema":"returnfall/run/1"}');
    folder.commit();
    expect(existsSync(`${out}.rejected`)).toBe(false);
  });
});
