import { execFileSync } from 'node:child_process';
import { mkdtempSync, readdirSync, readFileSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { nodeEffects } from '../src/cli/effects.js';
import { monthEnd } from '../src/pipeline.js';
import { readSettings, resolveConfig } from '../src/settings.js';

const folder = fileURLToPath(new URL('../sample-data/', import.meta.url));
const readme = readFileSync(join(folder, 'README.md'), 'utf8');
const files = readdirSync(folder).filter((name) => name.endsWith('.csv'));

describe('the sample data', () => {
  let made = '';
  let summary = '';
  beforeAll(() => {
    made = mkdtempSync(join(tmpdir(), 'sample-'));
    const script = join(folder, 'make.mjs');
    summary = execFileSync(process.execPath, [script, made], {
      encoding: 'utf8',
      env: { TZ: 'Pacific/Apia', LC_ALL: 'de_DE.UTF-8' },
    });
  });
  afterAll(() => rmSync(made, { recursive: true }));

  it('are what the script makes, byte for byte, in another time zone too', () => {
    expect(readdirSync(made).sort()).toEqual([...files].sort());
    for (const name of files) {
      expect(readFileSync(join(made, name)).equals(readFileSync(join(folder, name))), name).toBe(true);
    }
  });

  it('have the counts that the README gives', () => {
    const counts = summary.matchAll(/^(\S+): (\d+) units, (\d+) returned by 2026-10-31, (\d+) withdrawn$/gm);
    const said = tableRows(/^QB-/).map((cells) => [cells[0], ...cells.slice(7)]);
    expect(said).toEqual([...counts].map((match) => match.slice(1)));
    expect(said.length).toBe(4);
  });

  it('have each planted fault on the line that the README names', () => {
    const planted = tableRows(/^`(shipments-\d+|returns)\.csv`$/);
    expect(planted.length).toBeGreaterThan(10);
    for (const [file = '', lines = '', what = ''] of planted) {
      const rows = readFileSync(join(folder, file.replaceAll('`', '')), 'utf8').split('\n');
      const named = what.match(/\d{3}-\d{5}|\d{2}[./]\d{2}[./]\d{4}|\d{4}-\d{2}(-\d{2})?/g) ?? [];
      expect(named.length, what).toBeGreaterThan(0);
      for (const line of lines.split(', ')) {
        const row = rows[Number(line) - 1] ?? '';
        expect(
          named.some((text) => row.includes(text)),
          `${file} ${line}: ${row}`,
        ).toBe(true);
      }
      const everyLine = lines.split(', ').map((line) => rows[Number(line) - 1] ?? '');
      expect(
        named.every((text) => everyLine.some((row) => row.includes(text))),
        what,
      ).toBe(true);
    }
  });

  it('are read with exactly the planted faults, and every other row is used', async () => {
    const settings = readFileSync(join(folder, 'returnfall.json'), 'utf8');
    const effects = nodeEffects({ base: folder });
    const config = resolveConfig(readSettings(settings, 'returnfall.json'), {});
    const { intake } = await monthEnd(config, 'table', effects);
    effects.close();
    const planted = tableRows(/^`.*\.csv`$/).flatMap(([file = '', lines = '', , code = '']) =>
      lines.split(', ').map((line) => `${file.slice(1, -1)}:${line} ${code.slice(1, -1)}`),
    );
    const found = intake.rejects.map(({ file, line, code }) => `${file}:${line} ${code}`);
    expect(found.sort()).toEqual(planted.sort());
    const rows = files.map(
      (name) => readFileSync(join(folder, name), 'utf8').trimEnd().split('\n').length - 1,
    );
    const read = intake.files.map((file) => file.read);
    expect(read.reduce((sum, n) => sum + n, 0)).toBe(rows.reduce((sum, n) => sum + n, 0));
  });

  it('stay small', () => {
    const bytes = readdirSync(folder).map((name) => statSync(join(folder, name)).size);
    expect(bytes.reduce((sum, size) => sum + size, 0)).toBeLessThan(1_500_000);
  });
});

/** Cells of the README's table rows whose first cell matches. */
function tableRows(first: RegExp): string[][] {
  return readme
    .split('\n')
    .filter((line) => line.startsWith('| '))
    .map((line) =>
      line
        .slice(1, -1)
        .split('|')
        .map((cell) => cell.trim()),
    )
    .filter(([cell = '']) => first.test(cell));
}
