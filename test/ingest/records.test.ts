import { describe, expect, test } from 'vitest';
import { isoDate } from '../../src/calendar.js';
import { ingest } from '../../src/ingest/ingest.js';
import type { Cell, Cohort, Intake } from '../../src/records.js';
import { configWith } from '../support/data.js';
import { ingestText, memorySource, sourcesOf } from '../support/memory.js';

const days = ({ from, to }: { from: number; to: number }) => `${isoDate(from)}..${isoDate(to - 1)}`;
const cohort = (cohort: Cohort) => `${days(cohort)} ${cohort.shipped}`;
const cell = (cell: Cell) => `${cell.cohort}: ${days(cell)} ${cell.quantity}`;

function shape(intake: Intake) {
  return intake.products.map(({ product, resolution, cohorts, returned, withdrawn }) => ({
    product,
    resolution,
    cohorts: cohorts.map(cohort),
    returned: returned.map(cell),
    withdrawn: withdrawn.map(cell),
  }));
}

describe('cohorts', () => {
  test('dated units stay by day', async () => {
    const shipments = 'unit,product,ship_date\nu1,A,2026-01-05\nu2,A,2026-01-05\nu3,A,2026-01-07\n';
    const intake = await ingestText({
      shipments,
      returns: 'unit,return_date\nu2,2026-02-01\n',
      withdrawals: 'unit,date\nu3,2026-03-01\n',
    });
    expect(shape(intake)).toEqual([
      {
        product: 'A',
        resolution: 'day',
        cohorts: ['2026-01-05..2026-01-05 2', '2026-01-07..2026-01-07 1'],
        returned: ['0: 2026-02-01..2026-02-01 1'],
        withdrawn: ['1: 2026-03-01..2026-03-01 1'],
      },
    ]);
  });

  test('are as fine as the coarsest ship date among shipments, returns and withdrawals of the product alone', async () => {
    const shipments =
      'product,ship_date,quantity\nA,2026-01-05,10\nA,2026-01-20,5\nA,2026-02-20,5\nB,2026-01-05,1\nC,2026-01-05,3\nC,2026-03-05,3\n';
    const returns =
      'product,ship_date,return_date\nA,2026-01,2026-03-02\nA,2026-01-20,2026-03-02\nC,2026-01-05,2026-05-01\n';
    const withdrawals = 'product,ship_date,date,quantity\nC,2026-Q1,2026-06,2\n';
    expect(shape(await ingestText({ shipments, returns, withdrawals }, { period: 'quarter' }))).toEqual([
      {
        product: 'A',
        resolution: 'period',
        cohorts: ['2026-01-01..2026-01-31 15', '2026-02-01..2026-02-28 5'],
        returned: ['0: 2026-03-02..2026-03-02 2'],
        withdrawn: [],
      },
      { product: 'B', resolution: 'day', cohorts: ['2026-01-05..2026-01-05 1'], returned: [], withdrawn: [] },
      {
        product: 'C',
        resolution: 'period',
        cohorts: ['2026-01-01..2026-03-31 6'],
        returned: ['0: 2026-05-01..2026-05-01 1'],
        withdrawn: ['0: 2026-06-01..2026-06-30 2'],
      },
    ]);
  });

  test('and cells are cut at the end of the as-of day', async () => {
    const shipments = 'product,ship_date,quantity\nA,2026-09,10\nA,2026-10,4\n';
    const returns = 'product,ship_date,return_date\nA,2026-09,2026-09\nA,2026-10,2026-10\n';
    expect(shape(await ingestText({ shipments, returns }, { asOf: '2026-10-12' }))).toMatchObject([
      {
        cohorts: ['2026-09-01..2026-09-30 10', '2026-10-01..2026-10-12 4'],
        returned: ['0: 2026-09-01..2026-09-30 1', '1: 2026-10-01..2026-10-12 1'],
      },
    ]);
  });

  test('by week', async () => {
    const shipments = 'product,ship_date,quantity\nA,2026-W01,10\nA,2026-01-06,4\n';
    const returns = 'product,ship_date,return_date\nA,2026-W01,2026-W03\n';
    expect(shape(await ingestText({ shipments, returns }, { period: 'week' }))).toMatchObject([
      {
        cohorts: ['2025-12-29..2026-01-04 10', '2026-01-05..2026-01-11 4'],
        returned: ['0: 2026-01-12..2026-01-18 1'],
      },
    ]);
  });
});

describe('returns', () => {
  test('by unit and with origin are mixed in one file, each row by what it gives', async () => {
    const shipments = [
      memorySource('units.csv', 'unit,product,ship_date\nu1,A,2026-01-05\nu2,A,2026-01-05\n'),
      memorySource('lots.csv', 'product,ship_date,quantity\nA,2026-01-05,8\nB,2026-01-09,8\n'),
    ];
    const returns =
      'unit,product,ship_date,return_date,quantity\nu1,,,2026-02-01,\n,A,2026-01-05,2026-02-01,3\nx7,B,2026-01-09,2026-02-01,\nx7,B,2026-01-09,2026-03-01,1\n';
    const intake = await ingestText({ shipments, returns });
    expect(shape(intake)).toMatchObject([
      { product: 'A', cohorts: ['2026-01-05..2026-01-05 10'], returned: ['0: 2026-02-01..2026-02-01 4'] },
      { product: 'B', cohorts: ['2026-01-09..2026-01-09 8'], returned: ['0: 2026-02-01..2026-02-01 1'] },
    ]);
    expect(intake.rejects.map(({ code, line }) => [code, line])).toEqual([['repeat-return', 5]]);
  });

  test('of counted shipments may name units when they give the origin too', async () => {
    const shipments = 'product,ship_date,quantity\nA,2026-01,8\n';
    const returns = 'serial,product,ship_date,return_date\nu1,A,2026-01,2026-02\nu2,A,2026-01,2026-02\n';
    expect(shape(await ingestText({ shipments, returns }))).toMatchObject([
      { returned: ['0: 2026-02-01..2026-02-28 2'] },
    ]);
  });

  test('a unit returned in the month of its shipment day is not before it', async () => {
    const shipments = 'unit,product,ship_date\nu1,A,2026-01-20\n';
    const intake = await ingestText({ shipments, returns: 'unit,return_date\nu1,2026-01\n' });
    expect(shape(intake)).toMatchObject([
      { resolution: 'period', returned: ['0: 2026-01-01..2026-01-31 1'] },
    ]);
  });

  test('without any return a product stands with its cohorts', async () => {
    const shipments = 'product,ship_date,quantity\nA,2026-01,8\nB,2026-01,8\n';
    const intake = await ingestText({
      shipments,
      returns: 'product,ship_date,return_date\nA,2026-01,2026-02\n',
    });
    expect(intake.products[1]).toMatchObject({ product: 'B', returned: [], unusable: null });
  });
});

describe('text', () => {
  test('product names are data, sorted by code point', async () => {
    const names = ['__proto__', 'constructor', '=1+1', '<b>&"x"', "d'A", '𝄞', 'ﬁ', 'a b'];
    const quoted = (name: string) => `"${name.replaceAll('"', '""')}"`;
    const shipments = `product,ship_date,quantity\n${names.map((name) => `${quoted(name)},2026-01,5`).join('\n')}\n`;
    const returns = `product,ship_date,return_date\n${names.map((name) => `${quoted(name)},2026-01,2026-02`).join('\n')}\n`;
    const intake = await ingestText({ shipments, returns });
    expect(intake.products.map(({ product }) => product)).toEqual([
      '<b>&"x"',
      '=1+1',
      '__proto__',
      'a b',
      'constructor',
      "d'A",
      'ﬁ',
      '𝄞',
    ]);
    expect(intake.products.every(({ returned }) => returned.length === 1)).toBe(true);
  });

  test('one leading apostrophe is removed, and only one', async () => {
    const shipments = "product,ship_date,quantity\n'=A,2026-01,5\n''B,2026-01,5\n C ,2026-01,5\n";
    const intake = await ingestText({
      shipments,
      returns: 'product,ship_date,return_date\n=A,2026-01,2026-02\n',
    });
    expect(intake.products.map(({ product }) => product)).toEqual(["'B", '=A', 'C']);
  });

  test('columns that are not used are listed', async () => {
    const shipments = 'plant,product,,ship_date,quantity\nX,A,,2026-01,5\n';
    const returns =
      'product,ship_date,return_date,recorded_date,cause,amount\nA,2026-01,2026-02,2026-03-01,fan,12.5\n';
    const { files } = await ingestText({ shipments, returns });
    expect(files.map(({ unusedColumns }) => unusedColumns)).toEqual([
      ['plant'],
      ['recorded_date', 'cause', 'amount'],
    ]);
  });
});

test('the account has name, role, size and digest of every file in the order of reading', async () => {
  const { files } = await ingestText({
    shipments: 'product,ship_date,quantity\nA,2026-01,5\n',
    returns: 'product,ship_date,return_date\nA,2026-01,2026-02\n',
  });
  // sha256sum of the two texts
  expect(files).toMatchObject([
    { file: 'shipments.csv', role: 'shipments', bytes: 39, read: 1, used: 1, codes: {} },
    { file: 'returns.csv', role: 'returns', bytes: 48, read: 1, used: 1, codes: {} },
  ]);
  expect(files.map(({ sha256 }) => sha256)).toEqual([
    'e15fd6fe70677179669472aa8617cc5bf98142ee3b1b5740aab6cc41dcaf65d7',
    'c8ce94e3408479c4052ddae3ae5c8c41bd5333661680f9ee617d06d1bb370ba3',
  ]);
});

test('progress ends at the size of each file, byte-order mark and all', async () => {
  const last = new Map<string, string>();
  const sources = sourcesOf({
    shipments: '\ufeffproduct,ship_date,quantity\nA,2026-01,5\n',
    returns: 'product,ship_date,return_date\nA,2026-01,2026-02\n',
  });
  await ingest(configWith({ asOf: '2026-10-31' }), sources, (step, done, total) =>
    last.set(step, `${done} of ${total}`),
  );
  expect(Object.fromEntries(last)).toEqual({
    'reading returns.csv': '48 of 48',
    'reading shipments.csv': '42 of 42',
  });
});
