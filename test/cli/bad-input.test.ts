import { existsSync, mkdirSync, readFileSync } from 'node:fs';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { contentsOf, type Ended, openWorkplace, type Workplace } from './program.js';
import { asOf, returnsCsv, shipmentsCsv } from './records.js';

const month = [
  '--shipments',
  's.csv',
  '--returns',
  'r.csv',
  '--as-of',
  asOf,
  '--draws',
  '200',
  '--candidates',
  'weibull,exponential',
];

let place: Workplace;
beforeEach(() => {
  place = openWorkplace();
  place.put('s.csv', shipmentsCsv());
  place.put('r.csv', returnsCsv());
});
afterEach(() => place.remove());

/** Exit code, the line that says what is wrong, and no stack and no output. */
function expectFault(ended: Ended, code: number, message: RegExp): void {
  expect(ended.stderr).toMatch(message);
  expect(ended.stderr).not.toMatch(/^ {4}at /m);
  expect(ended.stdout).toBe('');
  expect(ended.code).toBe(code);
}

/** A folder that an earlier run might have left. @returns what is in it. */
function putOldOutput(): Map<string, string> {
  place.put('returnfall-out/run.json', '{"schema":"returnfall/run/1"}');
  place.put('returnfall-out/products/alpha.html', 'old');
  return contentsOf(place.path('returnfall-out'));
}

describe('input that cannot be used', () => {
  const cases: [string, () => void, number, RegExp][] = [
    ['a missing file', () => {}, 3, /^returnfall: gone\.csv: missing file; /m],
    ['an empty file', () => place.put('gone.csv', ''), 3, /^returnfall: gone\.csv(:\d+)*: .*; /m],
    [
      'a header and nothing else',
      () => place.put('gone.csv', 'product,ship_date,quantity\n'),
      3,
      /gone\.csv/,
    ],
    [
      'an unknown header',
      () => place.put('gone.csv', 'thing,ship_date,quantity\nA,2025-01,3\n'),
      3,
      /gone\.csv.*product/,
    ],
    [
      'a doubled header',
      () => place.put('gone.csv', 'product,item,ship_date,quantity\nA,A,2025-01,3\n'),
      3,
      /gone\.csv.*item/,
    ],
  ];
  it.each(cases)('%s', async (_, make, code, message) => {
    make();
    const words = ['run', '--shipments', 'gone.csv', '--returns', 'r.csv', '--as-of', asOf];
    expectFault(await place.run(words), code, message);
    expect(existsSync(place.path('returnfall-out'))).toBe(false);
  });

  it('an as-of date before the first shipment', async () => {
    expectFault(await place.run(['run', ...month, '--as-of', '2024-12-31']), 3, /2024-12-31/);
  });

  it('no as-of date: the message proposes one', async () => {
    const words = ['run', '--shipments', 's.csv', '--returns', 'r.csv'];
    expectFault(await place.run(words), 2, /as-?of.*2026-1[12]-3[01]/i);
  });

  it('more rejected rows than allowed: output stays, rejects and account are kept beside it', async () => {
    const before = putOldOutput();
    place.put(
      'r.csv',
      `${returnsCsv()}Alpha,2025-01,31.02.2026,1\n`.repeat(1) + 'Alpha,2025-01,soon,1\n'.repeat(40),
    );
    expectFault(await place.run(['run', ...month]), 3, /returnfall-out\.rejected/);
    expect(contentsOf(place.path('returnfall-out'))).toEqual(before);
    const kept = contentsOf(place.path('returnfall-out.rejected'));
    expect([...kept.keys()]).toEqual(['intake.json', 'rejects.csv']);
    expect(
      kept
        .get('rejects.csv')
        ?.split('\n')
        .filter((line) => line.startsWith('r.csv,')),
    ).toHaveLength(41);
    expect(existsSync(place.path(`returnfall-out.previous`))).toBe(false);
  });
});

describe('settings that cannot be used', () => {
  it('an unknown key, with line, column and the nearest known one', async () => {
    place.put('returnfall.json', '{\n  "asOf": "2026-12-31",\n  "horizn": 6\n}\n');
    expectFault(await place.run(['run']), 2, /^returnfall: returnfall\.json:3:3: unknown .*horizn.*horizon/m);
  });

  it('a missing settings file', async () => {
    expectFault(
      await place.run(['run', '--settings', 'none.json']),
      2,
      /^returnfall: none\.json: missing settings file; /m,
    );
  });

  it('neither settings nor inputs: help', async () => {
    expectFault(await place.run(['fit']), 2, /Usage: returnfall fit[\s\S]*missing input: fit has neither/);
    expectFault(await place.run([]), 2, /Usage: returnfall COMMAND/);
  });

  it.each([
    [['run', '--horizn', '3'], /unknown option '--horizn'; did you mean --horizon\?/],
    [['runn'], /unknown command 'runn'; did you mean run\?/],
    [['backtest', '--origins', '3'], /unknown command backtest: this version does not have it/],
    [['run', '--fail-on', 'slope'], /unknown option --fail-on: this version does not have it/],
    [['run', '--workers', 'many'], /invalid --workers many, allowed whole numbers/],
    [['run', '--shipments'], /invalid command line: option '--shipments <file...>' argument missing/],
    [['run', '--from', 'x', '--settings', 'y'], /invalid --settings, not allowed beside --from/],
  ])('%j', async (words, message) => {
    expectFault(await place.run(words), 2, message);
  });
});

describe('places that cannot be written', () => {
  it('a folder that is not ours stays as it is', async () => {
    place.put('letters/letter.txt', 'dear reader');
    const ended = await place.run(['run', ...month, '--out', 'letters']);
    expectFault(ended, 2, /invalid output folder letters: .*; choose another --out/);
    expect(contentsOf(place.path('letters'))).toEqual(new Map([['letter.txt', 'dear reader']]));
  });

  it('a place below a file', async () => {
    expectFault(
      await place.run(['run', ...month, '--out', 's.csv/out']),
      2,
      /s\.csv\/out: it cannot be written \(E/,
    );
    expectFault(await place.run(['run', ...month, '--out', 's.csv']), 2, /invalid output folder s\.csv/);
  });

  it('a folder that holds an input of the same run', async () => {
    mkdirSync(place.path('records'));
    place.put('records/run.json', '{"schema":"returnfall/run/1"}');
    place.put('records/s.csv', shipmentsCsv());
    const ended = await place.run(['run', ...month, '--shipments', 'records/s.csv', '--out', 'records']);
    expectFault(ended, 2, /it holds the input .*records\/s\.csv/);
    expect(readFileSync(place.path('records/s.csv'), 'utf8')).toBe(shipmentsCsv());
  });
});

describe('products that cannot be forecast', () => {
  it('one of several without returns: done, named, exit 4', async () => {
    place.put('s.csv', shipmentsCsv(['Alpha', 'Silent']));
    place.put('r.csv', returnsCsv(['Alpha']));
    const ended = await place.run(['run', ...month]);
    expect(ended.code).toBe(4);
    expect(ended.stderr).toMatch(/^not forecast: Silent: /m);
    const document = JSON.parse(readFileSync(place.path('returnfall-out/forecast.json'), 'utf8'));
    expect(document.products.map((p: { chosen: string | null }) => p.chosen === null)).toEqual([false, true]);
    expect(document.total.productsMissing).toEqual(['Silent']);
    expect(readFileSync(place.path('returnfall-out/index.html'), 'utf8')).toContain('Silent');
  });

  it('all without returns: exit 3, nothing written but the account', async () => {
    place.put('s.csv', shipmentsCsv(['Silent']));
    place.put('r.csv', 'product,ship_date,return_date,quantity\n');
    const ended = await place.run(['run', ...month]);
    expect(ended.code).toBe(3);
    expect(existsSync(place.path('returnfall-out'))).toBe(false);
  });
});

describe('a hostile product name', () => {
  const name = '=HYPERLINK("http://x.invalid")<script>alert(1)</script>\u001b[2J__proto__';
  it('is text in CSV, HTML and on the terminal', async () => {
    place.put('s.csv', shipmentsCsv(['__proto__', name]));
    place.put('r.csv', returnsCsv(['__proto__', name]));
    const ended = await place.run(['run', ...month]);
    expect(ended.code).toBe(0);
    const files = contentsOf(place.path('returnfall-out'));
    const pages = [...files].filter(([file]) => file.endsWith('.html'));
    expect(pages.length).toBe(3);
    for (const [, html] of pages) expect(html).not.toMatch(/<script/i);
    expect(files.get('forecast.csv')).toMatch(/^"'=HYPERLINK\(""http/m);
    expect(files.get('forecast.csv')).not.toMatch(/^"?=/m);
    expect(ended.stdout + ended.stderr).not.toContain('\u001b[2J');
    const document = JSON.parse(files.get('forecast.json') ?? '');
    expect(document.products.map((p: { product: string }) => p.product)).toEqual([name, '__proto__']);
  });
});

describe('a signal in the middle', () => {
  it.each([
    ['SIGINT', 130],
    ['SIGTERM', 143],
  ] as const)('%s: partial folder gone, old output as it was, exit %i', async (signal, code) => {
    const before = putOldOutput();
    const words = ['run', ...month, '--draws', '100000', '--out', 'returnfall-out'];
    const ended = await place.run(words, { interrupt: signal });
    expect(ended.code).toBe(code);
    expect(ended.stderr).toContain(`stopped by ${signal}`);
    expect(contentsOf(place.path('returnfall-out'))).toEqual(before);
    expect([...contentsOf(place.path('.')).keys()].filter((name) => name.includes('.partial-'))).toEqual([]);
  });
});
