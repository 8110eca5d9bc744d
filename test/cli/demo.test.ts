/** The month end on the sample data, as `npm run demo` runs it: it ends with the report and numbers of forecast.json. */
import { execFileSync } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, expect, test } from 'vitest';
import type { ForecastDocument, PredictedCount } from '../../src/records.js';

const root = new URL('../..', import.meta.url).pathname;
const folder = mkdtempSync(join(tmpdir(), 'returnfall-demo-'));
afterAll(() => rmSync(folder, { recursive: true }));

test('npm run demo ends with the path of the report and the headline numbers of forecast.json', () => {
  const { demo } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8')).scripts as { demo: string };
  const out = join(folder, 'out');
  const [program, ...words] = demo.replace('--out returnfall-out', '').trim().split(/\s+/);
  expect(demo).toContain('--out returnfall-out');
  const printed = execFileSync(program as string, [...words, '--out', out, '--quiet'], {
    cwd: root,
    encoding: 'utf8',
  });
  const lines = printed.split('\n');
  expect(lines[0]).toBe(join(out, 'index.html'));
  expect(existsSync(lines[0] as string)).toBe(true);
  const { total } = JSON.parse(readFileSync(join(out, 'forecast.json'), 'utf8')) as ForecastDocument;
  const [next, last] = [total.periods[0], total.periods.at(-1)];
  const shown = (count: PredictedCount, label: string) => {
    const { quantiles: q } = count;
    const interval = `(80 %: ${q['0.1']} to ${q['0.9']}; 95 %: ${q['0.025']} to ${q['0.975']})`;
    const line = lines.find((text) => text.includes(label) && text.includes('(80 %'));
    expect(line?.replaceAll(/\s+/g, ' ').trim()).toBe(`${label} ${Math.round(count.expected)} ${interval}`);
  };
  shown(next as PredictedCount, next?.period as string);
  shown(last?.cumulative as PredictedCount, `through ${last?.period}`);
  shown(total.untilWarrantyEnds as PredictedCount, 'until warranty ends');
});
