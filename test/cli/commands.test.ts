import { readFileSync } from 'node:fs';
import { gzipSync } from 'node:zlib';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { intervalKeys } from '../../src/quantiles.js';
import type { ForecastDocument } from '../../src/records.js';
import { contentsOf, digestsOf, openWorkplace, type Workplace } from './program.js';
import { asOf, returnsCsv, shipmentsCsv } from './records.js';

const choices = [
  '--as-of',
  asOf,
  '--warranty-months',
  '36',
  '--draws',
  '200',
  '--candidates',
  'weibull,exponential',
];
const month = ['--shipments', 's.csv', '--returns', 'r.csv', ...choices];

let place: Workplace;
beforeAll(async () => {
  place = openWorkplace();
  place.put('s.csv', shipmentsCsv());
  place.put('r.csv', returnsCsv());
  expect(await place.run(['run', ...month, '--out', 'whole'])).toMatchObject({
    code: 0,
  });
});
afterAll(() => place.remove());

function compared(name: string): Map<string, string> {
  return digestsOf(place.path(name));
}

function forecastOf(name: string): ForecastDocument {
  return JSON.parse(readFileSync(place.path(`${name}/forecast.json`), 'utf8'));
}

describe('returnfall run', () => {
  it('writes every file of the month end, and run.json knows their bytes', () => {
    const files = contentsOf(place.path('whole'));
    expect([...files.keys()].filter((name) => !name.startsWith('products/'))).toEqual([
      'cells.csv',
      'fit.json',
      'forecast.csv',
      'forecast.json',
      'index.html',
      'intake.json',
      'rejects.csv',
      'run.json',
      'table.csv',
      'timing.json',
    ]);
    const run = JSON.parse(files.get('run.json') ?? '');
    for (const output of run.outputs) expect(files.get(output.file)?.length).toBe(output.bytes);
    expect(run.outputs.length).toBe(files.size - 2);
    expect(files.get('run.json')).not.toContain(place.path('.').replace(/\/\.?$/, ''));
  });

  it('ends with the path of the report and the numbers of forecast.json', async () => {
    const ended = await place.run(['run', ...month, '--out', 'again']);
    const { total } = forecastOf('again');
    const next = total.periods[0];
    const [lower, upper] = intervalKeys(0.8).map((key) => next?.quantiles[key]);
    expect(ended.stdout.split('\n')[0]).toBe('again/index.html');
    expect(ended.stdout).toContain(`2027-01`);
    expect(ended.stdout).toContain(`80 %: ${lower} to ${upper}`);
    expect(ended.stderr).toMatch(
      /^returnfall run: 2 products, 14,400 units, .* returns, 0 rows rejected, 0 set aside; written to again$/m,
    );
  });

  it.each([
    ['UTC', 'C', '1'],
    ['America/Los_Angeles', 'de_DE.UTF-8', '2'],
    ['Pacific/Apia', 'tr_TR.UTF-8', '2'],
  ])('writes the same bytes under TZ=%s, LANG=%s with %s workers', async (TZ, LANG, workers) => {
    const words = ['run', ...month, '--out', 'same', '--workers', workers];
    expect((await place.run(words, { env: { TZ, LANG, LC_ALL: LANG } })).code).toBe(0);
    expect(compared('same')).toEqual(compared('whole'));
  });

  it('--single-file puts everything into index.html', async () => {
    await place.run(['run', ...month, '--single-file', '--out', 'single']);
    expect([...contentsOf(place.path('single')).keys()].filter((name) => name.endsWith('.html'))).toEqual([
      'index.html',
    ]);
  });

  it('takes settings from returnfall.json, with paths relative to it', async () => {
    const settings = {
      asOf,
      draws: 200,
      candidates: ['weibull', 'exponential'],
      shipments: { files: ['s.csv'] },
      returns: { files: ['r.csv'] },
      products: { '*': { warrantyMonths: 36 } },
    };
    place.put('returnfall.json', JSON.stringify(settings));
    expect((await place.run(['run', '--out', 'by-settings'])).code).toBe(0);
    expect(compared('by-settings').get('forecast.json')).toBe(compared('whole').get('forecast.json'));
    place.put('month/returnfall.json', JSON.stringify(settings).replaceAll('.csv"', '.nowhere"'));
    const words = [
      'run',
      '--settings',
      'month/returnfall.json',
      '--shipments',
      's.csv',
      '--returns',
      '*r.csv',
      '--out',
      'moved',
    ];
    expect((await place.run(words)).code).toBe(0);
    const run = JSON.parse(readFileSync(place.path('moved/run.json'), 'utf8'));
    expect(run.inputs.map((input: { file: string }) => input.file)).toEqual(['../r.csv', '../s.csv']);
    place.put('returnfall.json', '{}');
  });

  it('reads standard input and gzip', async () => {
    place.put('r.csv.gz', gzipSync(returnsCsv()));
    const words = ['run', ...choices, '--shipments', '-', '--returns', 'r.csv.gz', '--out', 'piped'];
    expect((await place.run(words, { stdin: shipmentsCsv() })).code).toBe(0);
    expect(compared('piped').get('forecast.json')).toBe(compared('whole').get('forecast.json'));
  });
});

describe('the stages as commands', () => {
  it.each([
    ['table', 'intake'],
    ['fit', 'fit'],
    ['forecast', 'forecast'],
  ])(
    '%s --json prints %s.json, writes nothing, and says nothing else on standard output',
    async (command, document) => {
      const ended = await place.run([command, ...month, '--json']);
      expect(ended.stdout).toBe(readFileSync(place.path(`whole/${document}.json`), 'utf8'));
      expect(ended.code).toBe(0);
    },
  );

  it('go on from what an earlier one left, to the same bytes', async () => {
    await place.run(['table', ...month, '--out', 'stage']);
    await place.run(['fit', '--from', 'stage', '--out', 'stage']);
    await place.run(['forecast', '--from', 'stage', '--out', 'stage']);
    const ended = await place.run(['run', '--from', 'stage', '--out', 'stage']);
    expect(ended).toMatchObject({ code: 0 });
    expect(compared('stage')).toEqual(compared('whole'));
  });

  it('report --from renders what is there, and refuses choices', async () => {
    const ended = await place.run(['report', '--from', 'whole', '--out', 'rendered', '--json']);
    expect(ended.code).toBe(0);
    expect(JSON.parse(ended.stdout)).toMatchObject({ schema: 'returnfall/run/1', command: 'report' });
    expect(ended.stdout).toBe(readFileSync(place.path('rendered/run.json'), 'utf8'));
    const [rendered, whole] = [compared('rendered'), compared('whole')];
    for (const files of [rendered, whole]) files.delete('run.json');
    expect(rendered).toEqual(whole);
    const refused = await place.run(['report', '--from', 'whole', '--horizon', '3', '--out', 'rendered']);
    expect(refused).toMatchObject({ code: 2 });
    expect(refused.stderr).toMatch(/horizon/);
  });

  it('--from takes choices for later stages and refuses records', async () => {
    const ended = await place.run([
      'forecast',
      '--from',
      'whole',
      '--horizon',
      '3',
      '--levels',
      '0.5',
      '--json',
    ]);
    const document: ForecastDocument = JSON.parse(ended.stdout);
    expect(document.products[0]?.periods).toHaveLength(3);
    expect(Object.keys(document.products[0]?.periods[0]?.quantiles ?? {})).toEqual(['0.25', '0.5', '0.75']);
    expect(await place.run(['fit', '--from', 'whole', '--shipments', 's.csv'])).toMatchObject({ code: 2 });
    expect(await place.run(['fit', '--from', 'nowhere'])).toMatchObject({ code: 3 });
  });

  it('print tables for people', async () => {
    const table = await place.run(['table', ...month], { env: { COLUMNS: '100' } });
    expect(Math.max(...table.stdout.split('\n').map((line) => line.length))).toBeLessThanOrEqual(100);
    expect(table.stdout).toMatch(/^2026-12 +300 .* 300$|^2026-12 +300 /m);
    const fit = await place.run(['fit', ...month]);
    expect(fit.stdout).toMatch(/^\* \w+ +\w+ +[\d.]+/m);
    expect(fit.stdout).toContain('95 % likelihood-ratio interval');
    const forecast = await place.run(['forecast', ...month]);
    expect(forecast.stdout).toMatch(/^\(total\) of 2 products: expected returns$/m);
    expect(forecast.stdout.match(/^2027-\d\d /gm)).toHaveLength(36);
  });
});

describe('--json on failure', () => {
  it('prints the fault as an object, with its place', async () => {
    place.put('bad.json', '{\n  "horizn": 6 }');
    const ended = await place.run([
      'run',
      '--settings',
      'bad.json',
      '--shipments',
      's.csv',
      '--returns',
      'r.csv',
      '--json',
    ]);
    expect(ended.code).toBe(2);
    const { error } = JSON.parse(ended.stdout);
    expect(error).toMatchObject({ code: 'unknown-key', file: 'bad.json', line: 2, column: 3 });
    expect(Object.keys(error).slice(0, 6)).toEqual(['code', 'message', 'file', 'line', 'column', 'remedy']);
    const usage = JSON.parse((await place.run(['run', '--jsn', '--json'])).stdout);
    expect(usage.error).toMatchObject({ code: 'usage', line: null });
  });
});

describe('texts on request', () => {
  it('--version is the version of the package', async () => {
    const { version } = JSON.parse(readFileSync(new URL('../../package.json', import.meta.url), 'utf8'));
    for (const words of [['--version'], ['run', '--version']]) {
      expect(await place.run(words)).toEqual({ code: 0, stdout: `${version}\n`, stderr: '' });
    }
  });

  it.each([[], ['table'], ['fit'], ['forecast'], ['report'], ['run']])(
    '%s --help shows examples and exits 0',
    async (...words) => {
      const ended = await place.run([...words, '--help']);
      expect(ended).toMatchObject({ code: 0, stderr: '' });
      expect(ended.stdout).toMatch(/^Usage: returnfall /);
      expect(ended.stdout).toMatch(/^Examples:\n {2}returnfall /m);
    },
  );

  it('--quiet says nothing that was not asked for', async () => {
    const ended = await place.run(['table', ...month, '--quiet']);
    expect(ended).toMatchObject({ code: 0, stderr: '' });
  });
});
