import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { UserError } from '../../src/errors.js';
import { jsonText } from '../../src/ledger/json.js';
import { outputFiles } from '../../src/ledger/outputs.js';
import { reopen, reopenRun } from '../../src/ledger/reopen.js';
import { runDocument } from '../../src/ledger/run.js';
import type { FileAccount, FitDocument, MonthEnd, RejectRow } from '../../src/records.js';
import { resolveConfig } from '../../src/settings.js';
import {
  count,
  forecastDocument,
  forecastProduct,
  hostileNames,
  monthEndOf,
  period,
  records,
} from './examples.js';

const config = resolveConfig(null, { asOf: '2026-10-31', shipments: ['s.csv'] });

const account: FileAccount = {
  file: 'returns.csv',
  role: 'returns',
  bytes: 10,
  sha256: 'ab',
  read: 22,
  used: 0,
  rejected: hostileNames.length,
  setAside: 0,
  codes: { 'unknown-unit': hostileNames.length },
  unusedColumns: ['note'],
};

const rejects = hostileNames.map(
  (row, i): RejectRow => ({
    file: 'returns.csv',
    line: i + 2,
    kind: 'rejected',
    code: 'unknown-unit',
    column: '',
    message: row,
    row,
  }),
);

const example = fc.sample(records, { seed: 4, numRuns: 40 }).find((products) => {
  return (
    products.length > 1 &&
    products.some(({ returned, withdrawn }) => returned.length > 1 && withdrawn.length > 1)
  );
});
if (example === undefined) throw new Error('no example drawn');

const fit: FitDocument = {
  schema: 'returnfall/fit/1',
  asOf: '2026-10-31',
  ageUnit: 'day',
  products: example.map(({ product }) => ({
    product,
    segment: null,
    resolution: 'period',
    units: 9,
    returns: 1,
    withdrawn: 0,
    survivors: 8,
    oldestAge: 100.5,
    delayDays: 0,
    delayReason: null,
    warrantyMonths: 24,
    warrantyDays: null,
    chosen: 'weibull',
    notForecast: null,
    findings: [],
    candidates: [
      {
        family: 'weibull',
        atRisk: null,
        parameters: { shape: 1 / 3, scale: Number.NaN },
        standardErrors: { shape: 0.1, scale: null },
        intervals: { shape: { level: 0.95, lower: null, upper: 2, method: 'likelihood-ratio' } },
        logLikelihood: -12.3456789012345,
        parameterCount: 2,
        aicc: 1e300,
        bic: null,
        weight: 1,
        converged: true,
        ruledOut: null,
        chosenShare: null,
      },
    ],
    nonparametric: [{ age: 5, probability: 0.1, lower: 0, upper: 0.3, atRisk: 9 }],
    nonparametricLevel: 0.95,
    curves: [{ family: 'weibull', atRisk: null, ages: [1, 2], probability: [0.1, 0.2] }],
  })),
};

const forecast = forecastDocument(
  example.map(({ product }) =>
    forecastProduct(product, {
      periods: [period('2026-11', 20_760, 3.25, 3.25)],
      untilWarrantyEnds: count(9),
    }),
  ),
);

const full: MonthEnd = { ...monthEndOf(example, { files: [account], rejects }), fit, forecast };

function withRun(files: ReadonlyMap<string, string>): Map<string, string> {
  const run = runDocument({ version: '1.2.3', command: 'run', config, files: [account], outputs: files });
  return new Map([...files, ['run.json', jsonText(run)]]);
}

/** The message of the fault that `files` are refused with. */
function refusal(files: ReadonlyMap<string, string>): string {
  try {
    reopen(files);
    return 'reopened';
  } catch (error) {
    if (!(error instanceof UserError) || error.exitCode !== 3) throw error;
    return error.message;
  }
}

describe('reopen', () => {
  test('gives back any records as they were', () => {
    fc.assert(
      fc.property(records, (products) => {
        const left = monthEndOf(products);
        expect(reopen(outputFiles(left))).toEqual(left);
      }),
      { numRuns: 60 },
    );
  });

  test('gives back every stage, rejects and findings too', () => {
    expect(reopen(withRun(outputFiles(full)))).toEqual(full);
  });

  test('gives back texts that write the same files again', () => {
    const files = outputFiles(full);
    expect(outputFiles(reopen(files))).toEqual(files);
  });

  test('keeps keys that a later program may have added', () => {
    const files = new Map(outputFiles(full));
    const document = { ...JSON.parse(files.get('fit.json') ?? ''), extra: 1 };
    expect(reopen(files.set('fit.json', jsonText(document))).fit).toHaveProperty('extra', 1);
  });

  test.each(['intake.json', 'cells.csv', 'rejects.csv'])('refuses a folder without %s', (name) => {
    const files = new Map(outputFiles(full));
    files.delete(name);
    expect(refusal(files)).toBe(
      `${name}: missing ${name}, which an earlier stage leaves there; run the earlier stage again`,
    );
  });

  test('refuses a folder that lacks what its run.json lists', () => {
    const files = withRun(outputFiles(full));
    files.delete('fit.json');
    expect(refusal(files)).toMatch(/^fit.json: missing fit.json/);
  });

  test.each(['intake.json', 'cells.csv', 'rejects.csv', 'fit.json', 'forecast.json'])(
    'notices by the hash that %s was altered',
    (name) => {
      const files = withRun(outputFiles(full));
      files.set(name, `${files.get(name)} `);
      expect(refusal(files)).toBe(
        `${name}: invalid ${name}, it was altered after the run that run.json describes; run the earlier stage again`,
      );
    },
  );
});

describe('without hashes reopen still refuses', () => {
  const edited = (name: string, edit: (text: string) => string) => {
    const files = new Map(outputFiles(full));
    const text = files.get(name) ?? '';
    expect(edit(text)).not.toBe(text);
    return refusal(files.set(name, edit(text)));
  };

  test('what is not JSON', () => {
    expect(edited('intake.json', (text) => text.slice(0, -5))).toMatch(
      /^intake.json: invalid JSON, the file is damaged/,
    );
  });

  test('another schema', () => {
    expect(edited('fit.json', (text) => text.replace('fit/1', 'fit/2'))).toMatch(
      /^fit.json: invalid schema "returnfall\/fit\/2", allowed "returnfall\/fit\/1"/,
    );
    expect(edited('intake.json', () => '[]')).toMatch(/^intake.json: invalid schema null/);
  });

  test('a document that lacks something', () => {
    expect(edited('fit.json', (text) => text.replace('"chosen": "weibull"', '"chosen": 3'))).toMatch(
      /^fit.json: invalid products.0.chosen, not as returnfall\/fit\/1 has it/,
    );
    expect(edited('forecast.json', (text) => text.replace('"plugIn"', '"plug"'))).toMatch(
      /^forecast.json: invalid products.0.periods.0.plugIn/,
    );
  });

  test('documents of another day or of other products', () => {
    const message = 'its products or its as-of date are not those of intake.json';
    expect(edited('fit.json', (text) => text.replace('2026-10-31', '2026-09-30'))).toContain(message);
    const fewer = jsonText({ ...forecast, products: forecast.products.slice(1) });
    expect(edited('forecast.json', () => fewer)).toContain(message);
  });

  test.each([
    ['a header', (text: string) => text.replace('segment', 'part'), 'cells.csv:1: invalid header'],
    ['a row with a cell too many', (text: string) => `${text}a,b\n`, 'cells.csv: invalid CSV: '],
    [
      'an unknown product',
      (text: string) => `${text}no such product,,2020-01-01,2020-01-01,shipped,,,1\n`,
      'unknown product no such product',
    ],
    ['another quantity', (text: string) => text.replace(/,shipped,,,(\d+)/, ',shipped,,,1$1'), 'and 1'],
    [
      'a quantity that is none',
      (text: string) => text.replace(/,shipped,,,\d+/, ',shipped,,,1.5'),
      'invalid quantity "1.5"',
    ],
    ['a kind', (text: string) => text.replace(',returned,', ',lost,'), 'invalid kind lost'],
    [
      'a date',
      (text: string) => text.replace(/20\d\d-\d\d-\d\d,shipped/, '2022-02-30,shipped'),
      'to "2022-02-30"',
    ],
    [
      'a ship date without shipment',
      (text: string) =>
        text.replace(/,20\d\d-\d\d-\d\d,(20\d\d-\d\d-\d\d),returned/, ',1999-01-01,$1,returned'),
      'invalid ship_from 1999-01-01',
    ],
  ])('cells with %s', (_, edit, message) => {
    expect(edited('cells.csv', edit)).toContain(message);
  });

  test('a cohort that lost more than it had, though the sums are right', () => {
    const records = example[0] as (typeof example)[0];
    const [first, second] = [
      { from: 20_000, to: 20_001 },
      { from: 20_001, to: 20_002 },
    ];
    const cohorts = [
      { ...first, shipped: 1 },
      { ...second, shipped: 9 },
    ];
    const cells = { cohorts, returned: [{ cohort: 0, ...second, quantity: 2 }] };
    const overdrawn = monthEndOf([{ ...records, ...cells, withdrawn: [], ages: [], resolution: 'day' }]);
    expect(refusal(outputFiles(overdrawn))).toContain('more left than was shipped, or one stands twice');
  });

  test('rejects that are not as many as the account says', () => {
    expect(edited('rejects.csv', (text) => text.slice(0, text.indexOf('\n') + 1))).toContain(
      `invalid number of rows, 0 here and ${hostileNames.length} in intake.json`,
    );
    expect(edited('rejects.csv', (text) => text.replace(',rejected,', ',lost,'))).toMatch(
      /^rejects.csv:2: invalid row/,
    );
  });
});

describe('run.json', () => {
  const files = withRun(
    new Map([
      ['b.csv', 'x'],
      ['a/ü.html', 'ü'],
    ]),
  );

  test('lists inputs and outputs by name, with size and hash', () => {
    // SHA-256 of "x" and of the two bytes of "ü": sha256sum of GNU coreutils 9.1
    expect(reopenRun(files)).toMatchObject({
      version: '1.2.3',
      command: 'run',
      seed: 1,
      settings: JSON.parse(JSON.stringify(config)),
      inputs: [{ file: 'returns.csv', role: 'returns', bytes: 10, sha256: 'ab' }],
      outputs: [
        {
          file: 'a/ü.html',
          bytes: 2,
          sha256: '607474ca475a9724d7360aba71a56d5df77e61350e3f724cfa1f46e857e2d85f',
        },
        {
          file: 'b.csv',
          bytes: 1,
          sha256: '2d711642b726b04401627ca9fbac32f5c8530fb1903cc4db02258717921a4881',
        },
      ],
    });
  });

  test('is refused when it is not there', () => {
    expect(() => reopenRun(new Map())).toThrow('run.json: missing run.json');
  });
});
