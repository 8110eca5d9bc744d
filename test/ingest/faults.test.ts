import { describe, expect, test } from 'vitest';
import { UserError } from '../../src/errors.js';
import { type Given, ingestText, inputWith, memorySource } from '../support/memory.js';

const shipments = 'product,ship_date,quantity\nA,2026-01,10\n';
const returns = 'product,ship_date,return_date,quantity\nA,2026-01,2026-02,1\n';
const table = 'product,shipped_in,shipped,2026-01\nA,2026-01,10,1\n';
const ages = 'product,outcome,age\nA,returned,5\n';

async function faultOf(given: Given, changes: Parameters<typeof ingestText>[1] = {}): Promise<UserError> {
  const error = await ingestText(given, changes).catch((thrown: unknown) => thrown);
  if (!(error instanceof UserError)) throw new Error(`no fault for the reader: ${String(error)}`);
  return error;
}

const codes = (error: UserError) => error.faults.map(({ code }) => code);

describe('exit 3: files that cannot be used', () => {
  test.each<[string, Given, string[]]>([
    ['an empty file', { shipments: '', returns }, ['empty-file']],
    ['a header only', { shipments, returns: 'unit,return_date\n' }, ['no-rows']],
    [
      'two headers for one field',
      { shipments: 'model,item,ship_date,qty\nA,A,2026-01,1\n', returns },
      ['doubled-header'],
    ],
    ['a missing column', { shipments: 'product,when,quantity\nA,2026-01,1\n', returns }, ['missing-column']],
    [
      'neither unit nor quantity',
      { shipments: 'product,ship_date\nA,2026-01\n', returns },
      ['missing-column'],
    ],
    [
      'returns without an origin',
      { shipments, returns: 'product,return_date\nA,2026-02\n' },
      ['missing-column'],
    ],
    [
      'a column not built yet',
      { shipments: 'product,ship_date,quantity,In-Service Date\nA,2026-01,1,x\n', returns },
      ['column-not-supported'],
    ],
    [
      'another',
      { shipments: 'product,ship_date,quantity,warranty_months\nA,2026-01,1,3\n', returns },
      ['column-not-supported'],
    ],
    [
      'every fault at once',
      { shipments: 'model,item,warranty months\nA,A,3\n', returns },
      ['doubled-header', 'missing-column', 'missing-column', 'column-not-supported'],
    ],
    [
      'units against counted shipments',
      { shipments, returns: 'unit,return_date\nu1,2026-02\nu2,2026-02\n' },
      ['units-not-shipped'],
    ],
    [
      'the name of totals as a product',
      { shipments: `${shipments}(total),2026-01,1\n`, returns },
      ['reserved-product'],
    ],
    ['weeks that meet months', { shipments: `${shipments}A,2026-W10,1\n`, returns }, ['mixed-ship-periods']],
    ['a table without periods', { table: 'product,shipped_in,shipped\nA,2026-01,1\n' }, ['missing-column']],
    [
      'a table with two columns of one period',
      { table: 'product,shipped_in,shipped,2026-01, 2026-01\nA,2026-01,9,1,1\n' },
      ['doubled-header'],
    ],
    [
      'a table with months beside their quarter',
      { table: 'product,shipped_in,shipped,2026-08,2026-Q3,2026-09,2026-10\nA,2026-08,9,1,1,1,1\n' },
      ['doubled-header', 'doubled-header'],
    ],
  ])('%s', async (_, given, expected) => {
    const error = await faultOf(given);
    expect(error.exitCode).toBe(3);
    expect(codes(error)).toEqual(expected);
  });

  test('a missing column names the headers that were found and the setting that helps', async () => {
    const error = await faultOf({ shipments: 'product,when,quantity\nA,2026-01,1\n', returns });
    expect(error.faults[0]).toEqual({
      code: 'missing-column',
      file: 'shipments.csv',
      line: 1,
      message: 'missing column ship_date; the headers are product, when, quantity',
      remedy: 'name the header that means ship_date in the setting columns: { "ship_date": "…" }',
    });
  });

  test('columns of a table that are no period and hold something are all named', async () => {
    const header = 'product,shipped_in,shipped,2026-01,2025-2,spare,foo,';
    const stray = await faultOf({ table: `${header}\nA,2026-01,10,1,0,, x ,\nA,2026-01,ten,,,,,7\n` });
    expect(stray.exitCode).toBe(3);
    const at = { code: 'unknown-column', file: 'table.csv', line: 1 };
    expect(stray.faults).toMatchObject([
      { ...at, message: 'invalid header 2025-2: it is no period, and the column holds something' },
      { ...at, message: 'invalid header foo: it is no period, and the column holds something' },
      { ...at, message: 'missing header of column 8: the column holds something' },
    ]);
    expect(stray.faults[0]?.remedy).toMatch(/^head the columns 2026-10, 2026-W45 or 2026-Q4/);
    const beside = await faultOf({ table, 'table-withdrawn': `${header}\nA,2026-01,10,0,,3,,\n` });
    expect(beside.faults).toMatchObject([{ code: 'unknown-column', file: 'table-withdrawn.csv' }]);
    const empty = await ingestText({ table: `${header}\nA,2026-01,10,1,,,,\n` });
    expect(empty.files[0]?.unusedColumns).toEqual(['2025-2', 'spare', 'foo']);
  });

  // ISO 8601: week 7 of 2024 is 12 to 18 February, week 5 is 29 January to 4 February
  test.each([
    ['2026-08,2026-Q3', '2026-Q3 and 2026-08 share days'],
    ['2024-W07,2024-02', '2024-02 and 2024-W07 share days'],
    ['2024-02,2024-W05', '2024-W05 and 2024-02 share days'],
    ['2024-01,2024-01', '2024-01 and 2024-01 are the same period'],
  ])('columns of a table headed %s', async (periods, what) => {
    const { faults } = await faultOf({ table: `product,shipped_in,shipped,${periods}\nA,2024-01,9,1,1\n` });
    const message = `invalid header: ${what}`;
    expect(faults).toMatchObject([{ code: 'doubled-header', file: 'table.csv', line: 1, message }]);
  });

  test('columns of a table that dateFormat cannot read are told by it', async () => {
    const german = 'product,shipped_in,shipped,01.2026,2026-02\nA,01.2026,10,1,1\n';
    const { faults } = await faultOf({ table: german }, { table: inputWith({ dateFormat: 'MM.yyyy' }) });
    expect(faults).toMatchObject([
      { code: 'unknown-column', remedy: 'head the columns as dateFormat MM.yyyy says' },
    ]);
  });

  test('a header that columns names must be there, and wins over a synonym', async () => {
    const mapped = { shipments: inputWith({ columns: { product: 'type' } }) };
    expect(codes(await faultOf({ shipments, returns }, mapped))).toEqual(['missing-column']);
    const both = 'type,product,ship_date,quantity\nA,x,2026-01,10\n';
    const intake = await ingestText({ shipments: both, returns }, mapped);
    expect(intake.products.map(({ product }) => product)).toEqual(['A']);
    expect(intake.files[0]?.unusedColumns).toEqual(['product']);
  });

  test('an as-of date before the first shipment keeps the account', async () => {
    const error = await faultOf({ shipments, returns }, { asOf: '2025-12-31' });
    expect([error.exitCode, codes(error)]).toEqual([3, ['as-of-before-first-shipment']]);
    expect(error.intake?.files.map(({ setAside }) => setAside)).toEqual([1, 1]);
  });

  test('too many rejected rows keep the account and name codes, counts and an example', async () => {
    const bad = `${returns}A,2026-01,soon,1\nA,2026-01,later,1\nB,2026-01,2026-02,1\n`;
    const error = await faultOf({ shipments, returns: bad }, { maxRejectShare: 0.7 });
    expect([error.exitCode, codes(error)]).toEqual([3, ['too-many-rejected']]);
    expect(error.faults[0]?.message).toBe(
      'invalid records: 3 of 4 rows were rejected (unknown-product 1, unreadable-date 2); the first is line 3: ' +
        'invalid date soon: it cannot be read as ISO 8601 (2026-10-31, 2026-10); set dateFormat',
    );
    expect(error.intake?.rejects).toHaveLength(3);
    const allowed = { asOf: '2026-02-28', maxRejectShare: 0.75 };
    expect((await ingestText({ shipments, returns: bad }, allowed)).findings).toMatchObject([
      { code: 'rows-rejected', severity: 'warning' },
    ]);
  });

  test('where most shipments are rejected, returns that only miss them are no fault of their own', async () => {
    const lost = `${shipments.replace('2026-01', '31.01.26')}B,31.01.26,10\nC,2026-01,4\n`;
    const late = `${returns}B,2026-01,2026-02,1\nC,2026-01,2026-02,5\n`;
    const withdrawals = 'product,ship_date,date\nC,2026-01,soon\nA,2026-01,2026-02\n';
    const given = { shipments: lost, returns: late, withdrawals };
    const error = await faultOf(given, { maxRejectShare: 0.1 });
    expect(error.faults.map(({ file }) => file)).toEqual(['shipments.csv', 'withdrawals.csv']);
    expect(error.intake?.files.map(({ rejected }) => rejected)).toEqual([2, 3, 2]);
    const half = { ...given, shipments: `${lost}C,2026-02,4\n` };
    const kept = await faultOf(half, { maxRejectShare: 0.1 });
    expect(kept.faults.map(({ file }) => file)).toEqual(['shipments.csv', 'returns.csv', 'withdrawals.csv']);
    const lenient = await faultOf(given, { maxRejectShare: 0.7 });
    expect(lenient.faults.map(({ file }) => file)).toEqual(['returns.csv', 'withdrawals.csv']);
  });

  test('of more than half a million bad rows the first are kept, all are counted, whatever the share', async () => {
    const rows = `${'A,soon,1\n'.repeat(500_001)}A,2026-01,0\nA,2026-12,1\nA,2026-01,10\n`;
    const error = await faultOf({ shipments: `product,ship_date,quantity\n${rows}`, returns });
    expect([error.exitCode, codes(error)]).toEqual([3, ['too-many-rejected']]);
    expect(error.message).toMatch(
      /^shipments.csv: invalid records: 500,002 of 500,004 rows were rejected \(bad-quantity 1, unreadable-date 500001\)/,
    );
    expect(error.message).toMatch(/; rejects.csv lists the first 500,000$/);
    const counts = { read: 500_004, used: 1, rejected: 500_002, setAside: 1 };
    const byCode = { 'after-as-of': 1, 'bad-quantity': 1, 'unreadable-date': 500_001 };
    expect(error.intake?.files[0]).toMatchObject({ ...counts, codes: byCode });
    const kept = error.intake?.rejects.filter(({ file }) => file === 'shipments.csv') ?? [];
    expect([kept.length, kept.at(-2)?.line, kept.at(-1)?.line]).toEqual([500_001, 500_001, 500_004]);
  });

  test('more than a quarter of a million repeated units are one fault', async () => {
    const rows = Array.from({ length: 500_004 }, (_, i) => `u${i % 250_002},A,2026-01-05`);
    const error = await faultOf({ shipments: `unit,product,ship_date\n${rows.join('\n')}`, returns });
    expect([error.exitCode, codes(error)]).toEqual([3, ['too-many-duplicates']]);
  });
});

describe('exit 2: settings and command line', () => {
  test.each<[string, Given, string]>([
    ['nothing', {}, 'missing-input'],
    ['no returns', { shipments }, 'missing-input'],
    ['no shipments', { returns }, 'missing-input'],
    ['a table and records', { table, returns }, 'mixed-inputs'],
    ['ages and a plan', { ages, plan: 'product,ship_period,quantity\nA,2026-11,1\n' }, 'mixed-inputs'],
    ['withdrawals of no table', { 'table-withdrawn': table }, 'missing-input'],
  ])('%s', async (_, given, code) => {
    const error = await faultOf(given);
    expect([error.exitCode, codes(error)]).toEqual([2, [code]]);
  });

  test('a field that columns does not know', async () => {
    const error = await faultOf({ shipments, returns }, { returns: inputWith({ columns: { colour: 'x' } }) });
    expect([error.exitCode, codes(error)]).toEqual([2, ['unknown-field']]);
    expect(error.message).toContain('use one of return_date, unit, product, ship_date, quantity');
  });
});

test.each([
  [{ product: 'model', ship_date: 'Model' }, 'header model is taken for product and ship_date'],
  [{ quantity: 'ship date' }, 'header ship_date is taken for ship_date and quantity'],
])('a header that columns gives to two fields: %j', async (columns, what) => {
  const given = { shipments: 'model,ship_date,qty\nA,2026-01,10\n', returns };
  const error = await faultOf(given, { shipments: inputWith({ columns }) });
  expect([error.exitCode, codes(error)]).toEqual([2, ['shared-header']]);
  expect(error.message).toBe(
    `shipments.csv: invalid columns: ${what}; name a header of its own for each field`,
  );
});

describe('without an as-of date', () => {
  const days = (...dates: string[]) =>
    `unit,product,ship_date\n${dates.map((date, i) => `u${i},A,${date}`).join('\n')}\n`;
  test.each<[string, Given, string]>([
    ['records by month end with their month', { shipments, returns }, '2026-02-28'],
    [
      'records that stop in the middle of a month',
      { shipments: days('2026-01-05', '2026-03-17'), returns: 'unit,return_date\nu0,2026-03-20\n' },
      '2026-02-28',
    ],
    [
      'records to the last day',
      { shipments: days('2026-01-05', '2026-03-31'), returns: 'unit,return_date\nu0,2026-03-20\n' },
      '2026-03-31',
    ],
    [
      'a stray date far ahead does not count',
      {
        shipments: days(...Array<string>(200).fill('2026-01-31')),
        returns: 'unit,return_date\nu0,2062-01-31\n',
      },
      '2026-01-31',
    ],
    ['a table', { table: 'product,shipped_in,shipped,2026-01,2026-02\nA,2026-01,10,1,1\n' }, '2026-02-28'],
  ])('%s', async (_, given, proposed) => {
    const error = await faultOf(given, { asOf: null });
    expect([error.exitCode, codes(error)]).toEqual([2, ['missing-as-of']]);
    expect(error.faults[0]?.remedy).toContain(`set asOf to ${proposed}`);
  });
});

test('empty files of withdrawals and plan, and one of several of returns, are notes', async () => {
  const several = [memorySource('r1.csv', returns), memorySource('r2.csv', 'unit,return_date\n')];
  const given = {
    shipments,
    returns: several,
    withdrawals: 'unit,date\n',
    plan: 'product,ship_period,quantity\n',
  };
  const { findings } = await ingestText(given, { asOf: '2026-02-28' });
  expect(findings.map(({ code, message }) => `${code} ${message}`)).toEqual([
    'no-rows r2.csv has a header and no rows',
    'no-rows withdrawals.csv has a header and no rows',
    'no-rows plan.csv has a header and no rows',
  ]);
});
