import { expect, test } from 'vitest';
import { isoDate } from '../../src/calendar.js';
import type { Intake } from '../../src/records.js';
import { plainRules } from '../support/data.js';
import { ingestText } from '../support/memory.js';

const header = 'product,shipped_in,shipped,2026-08,2026-09,2026-10\n';

const cells = (intake: Intake, kind: 'returned' | 'withdrawn') =>
  intake.products.flatMap(({ product, cohorts, [kind]: list }) =>
    list.map(
      (cell) =>
        `${product} ${isoDate(cohorts[cell.cohort]?.from ?? 0)} ${isoDate(cell.from)} ${cell.quantity}`,
    ),
  );

const refused = (intake: Intake) =>
  intake.rejects.map(({ file, line, code, column }) => `${file}:${line} ${code} ${column}`.trim());

test('a table with withdrawals beside it', async () => {
  const table = `${header}A,2026-08,100,1,0,3\nA,2026-09,50,,2,\nB,2026-10,7,0,0,0\n`;
  const withdrawn = `${header}A,2026-08,100,0,4,0\n`;
  const intake = await ingestText({ table, 'table-withdrawn': withdrawn });
  expect(
    intake.products.map(({ product, cohorts }) => [product, ...cohorts.map(({ shipped }) => shipped)]),
  ).toEqual([
    ['A', 100, 50],
    ['B', 7],
  ]);
  expect(cells(intake, 'returned')).toEqual([
    'A 2026-08-01 2026-08-01 1',
    'A 2026-08-01 2026-10-01 3',
    'A 2026-09-01 2026-09-01 2',
  ]);
  expect(cells(intake, 'withdrawn')).toEqual(['A 2026-08-01 2026-09-01 4']);
  expect(intake.rejects).toEqual([]);
  expect(intake.files.map(({ role, used }) => [role, used])).toEqual([
    ['table', 3],
    ['table-withdrawn', 1],
  ]);
});

test('rows are used or rejected whole', async () => {
  const table = `${header}A,2026-08,100,1,0,3\nA,2026-09,5,0,3,3\nA,2026-09,5,1,0,0\nA,2026-10,ten,0,0,0\nA,2026-10,10,0,0,x\nA,2026-11,10,0,0,0\n,2026-10,10,0,0,0\nA,,10,0,0,0\nA,2026-10,,0,0,0\nA,2026-10,0,0,0,0\n`;
  const intake = await ingestText({ table });
  expect(refused(intake)).toEqual([
    'table.csv:3 returns-exceed-shipped',
    'table.csv:4 return-before-shipment 2026-08',
    'table.csv:5 bad-quantity shipped',
    'table.csv:6 bad-quantity 2026-10',
    'table.csv:7 after-as-of shipped_in',
    'table.csv:8 missing-value product',
    'table.csv:9 missing-value shipped_in',
    'table.csv:10 missing-value shipped',
  ]);
  expect(intake.products).toMatchObject([{ product: 'A', rejectedReturns: 7, cohorts: [{ shipped: 100 }] }]);
});

test('withdrawals of a table need room and a product', async () => {
  const table = `${header}A,2026-08,10,1,0,3\nA,2026-09,10,0,0,0\n`;
  const withdrawn = `${header}A,2026-08,10,0,0,7\nA,2026-08,10,0,0,6\nB,2026-08,10,1,0,0\nA,2026-10,10,0,0,1\n`;
  expect(refused(await ingestText({ table, 'table-withdrawn': withdrawn }))).toEqual([
    'table-withdrawn.csv:2 returns-exceed-shipped',
    'table-withdrawn.csv:4 unknown-product product',
    'table-withdrawn.csv:5 returns-exceed-shipped',
  ]);
});

test('withdrawals of a table repeat what was shipped, of the cohort or of one of its rows', async () => {
  const table = `${header}A,2026-08,60,1,0,3\nA,2026-08,40,0,0,0\nA,2026-09,10,0,0,0\n`;
  const withdrawn = `${header}A,2026-08,100,0,0,1\nA,2026-08,40,0,0,2\nA,2026-08,10,0,0,4\nA,2026-09,1,0,0,1\nA,2026-09,0,0,0,0\n`;
  const intake = await ingestText({ table, 'table-withdrawn': withdrawn });
  expect(refused(intake)).toEqual([
    'table-withdrawn.csv:4 bad-quantity shipped',
    'table-withdrawn.csv:5 bad-quantity shipped',
    'table-withdrawn.csv:6 bad-quantity shipped',
  ]);
  expect(intake.rejects[0]?.message).toBe(
    'invalid shipped 10: the table has 100 for this product and ship period',
  );
  expect(cells(intake, 'withdrawn')).toEqual(['A 2026-08-01 2026-10-01 3']);
});

test('cells after the as-of date are left out and said to be', async () => {
  const beside = `${header}A,2026-08,100,0,1,4\nA,2026-08,100,0,0,5\n`;
  const intake = await ingestText(
    { table: `${header}A,2026-08,100,1,2,3\n`, 'table-withdrawn': beside },
    { asOf: '2026-09-15' },
  );
  expect(cells(intake, 'returned')).toEqual(['A 2026-08-01 2026-08-01 1', 'A 2026-08-01 2026-09-01 2']);
  expect(intake.products[0]?.returned[1]?.to).toBe((intake.products[0]?.returned[1]?.from ?? 0) + 15);
  expect(intake.findings).toEqual([
    {
      code: 'after-as-of',
      severity: 'note',
      message: '3 returns in columns of the table after the as-of date are not used',
    },
    {
      code: 'after-as-of',
      severity: 'note',
      message: '9 withdrawals in columns of the table after the as-of date are not used',
    },
  ]);
});

// The youngest unit of August is 30 days old when October begins.
test('returns that the warranty forbids count as withdrawn, and a finding says so', async () => {
  const rules = { ...plainRules, warrantyDays: 30 };
  const intake = await ingestText({ table: `${header}A,2026-08,100,1,2,3\n` }, { everyProduct: rules });
  expect(cells(intake, 'withdrawn')).toEqual(['A 2026-08-01 2026-10-01 3']);
  expect(intake.findings).toEqual([
    {
      code: 'table-out-of-bounds',
      severity: 'warning',
      message:
        '3 returns in the table lie within the delay or beyond warranty; their units are censored there and count among the withdrawn',
    },
  ]);
});

test('weekly and quarterly tables, a plan beside, and columns by other names', async () => {
  const weekly = await ingestText(
    {
      table: 'product;shipped in;Shipped;2026-W01;2026-W02;note\nA;2026-W01;5;1;1; \n',
    },
    { period: 'week' },
  );
  expect(cells(weekly, 'returned')).toEqual(['A 2025-12-29 2025-12-29 1', 'A 2025-12-29 2026-01-05 1']);
  expect(weekly.files[0]?.unusedColumns).toEqual(['note']);
  const quarterly = await ingestText(
    {
      table: 'product,shipped_in,shipped,2026-Q2,2026-Q3\nA,2026-Q2,5,1,1\n',
      plan: 'product,ship_period,quantity\nA,2026-Q4,9\n',
    },
    { period: 'quarter' },
  );
  expect(cells(quarterly, 'returned')).toEqual(['A 2026-04-01 2026-04-01 1', 'A 2026-04-01 2026-07-01 1']);
  expect(quarterly.products[0]?.planned.map(({ from, shipped }) => [isoDate(from), shipped])).toEqual([
    ['2026-11-01', 9],
  ]);
});

test('a plan for the period that the as-of date cuts is for its rest, and a finding says so', async () => {
  const plan = 'product,ship_period,quantity\nA,2026-09,9\n';
  const { products, findings } = await ingestText(
    { table: `${header}A,2026-08,100,1,2,3\n`, plan },
    { asOf: '2026-09-15' },
  );
  expect(products[0]?.planned.map(({ from, to }) => [isoDate(from), isoDate(to - 1)])).toEqual([
    ['2026-09-16', '2026-09-30'],
  ]);
  expect(findings.map(({ code }) => code)).toEqual(['plan-of-cut-period', 'after-as-of']);
});
