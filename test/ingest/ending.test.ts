import { expect, test } from 'vitest';
import type { Config } from '../../src/config.js';
import { type Given, ingestText } from '../support/memory.js';

const shipments = 'product,ship_date,quantity\nA,2026-01,10\nA,2026-08-30,10\n';
const returns = 'product,ship_date,return_date\nA,2026-01,2026-05\nA,2026-01,2026-12-24\n';
const table = (last: string) =>
  `product,shipped_in,shipped,2026-07,2026-08,2026-09\nA,2026-07,10,1,2,${last}\n`;

const early = async (given: Given, changes: Partial<Config>) =>
  (await ingestText(given, changes)).findings.filter(({ code }) => code === 'records-end-early');

test('a whole period without a shipment or return before the as-of date is a warning', async () => {
  const withdrawals = 'product,ship_date,date\nA,2026-01,2026-09-30\n';
  expect(await early({ shipments, returns, withdrawals }, { asOf: '2026-09-30' })).toEqual([
    {
      code: 'records-end-early',
      severity: 'warning',
      message:
        'the records end early: none is of 2026-09, the last complete period by the as-of date 2026-09-30, ' +
        'and the last shipment or return is of 2026-08-30; check that the files are up to date',
    },
  ]);
});

test.each<[string, Given, Partial<Config>, number]>([
  ['in the middle of the period after that', { shipments, returns }, { asOf: '2026-10-20' }, 1],
  ['in the middle of the next period', { shipments, returns }, { asOf: '2026-09-29' }, 0],
  [
    'at the end of a quarter that holds some',
    { shipments, returns },
    { asOf: '2026-09-30', period: 'quarter' },
    0,
  ],
  ['with the last record in another file', { shipments, returns }, { asOf: '2026-12-31' }, 0],
  [
    'with the last row rejected for another fault than its date',
    { shipments, returns: `${returns}B,2026-01,2026-09-01\n` },
    { asOf: '2026-09-30' },
    0,
  ],
  ['a table with an empty last column', { table: table('') }, { asOf: '2026-09-30' }, 1],
  ['a table that says that nothing came back', { table: table('0') }, { asOf: '2026-09-30' }, 0],
  ['a table with columns after the as-of date', { table: table('1') }, { asOf: '2026-08-31' }, 0],
  ['ages', { ages: 'product,outcome,age\nA,returned,5\n' }, { asOf: null }, 0],
])('an as-of date %s', async (_, given, changes, count) => {
  expect(await early(given, changes)).toHaveLength(count);
});
