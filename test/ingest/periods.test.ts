import { expect, test } from 'vitest';
import type { PeriodKind } from '../../src/calendar.js';
import { UserError } from '../../src/errors.js';
import { historyOf } from '../../src/forecast/history.js';
import { intakeDocument } from '../../src/ingest/document.js';
import { configWith } from '../support/data.js';
import { type Given, ingestText } from '../support/memory.js';

const shipped = 'product,ship_date,quantity\n';
const origin = 'product,ship_date,return_date\n';
const quarterly = 'product,shipped_in,shipped,2026-Q1,2026-Q2\nA,2026-Q1,90,1,2\nA,2026-Q2,90,,1\n';

test.each<[string, PeriodKind, Given, string]>([
  [
    'a quarterly table by month',
    'month',
    { table: quarterly },
    'invalid period month: the records of A have one for 2026-01-01 to 2026-03-31, which is within no single month; ' +
      'the records of A are by quarter; set period to quarter',
  ],
  [
    'monthly counts by week',
    'week',
    { shipments: `${shipped}B,2026-02,9\n`, returns: `${origin}B,2026-02,2026-04-05\n` },
    'invalid period week: the records of B have one for 2026-02-01 to 2026-02-28, which is within no single week; ' +
      'the records of B are by month; set period to month',
  ],
  [
    'weekly records by month',
    'month',
    { shipments: `${shipped}A,2026-W03,9\nA,2026-W05,9\n`, returns: `${origin}A,2026-W03,2026-W03\n` },
    'invalid period month: the records of A have one for 2026-01-26 to 2026-02-01, which is within no single month; ' +
      'the records of A are by week; set period to week',
  ],
  [
    'a return alone, by quarter',
    'month',
    { shipments: `${shipped}A,2026-01-05,9\n`, returns: `${origin}A,2026-01-05,2026-Q2\n` },
    'invalid period month: the records of A have one for 2026-04-01 to 2026-06-30, which is within no single month; ' +
      'the records of A are by quarter; set period to quarter',
  ],
  [
    'a withdrawal alone, by month; another product by quarter',
    'week',
    {
      shipments: `${shipped}A,2026-01-05,9\nB,2026-Q1,9\n`,
      returns: `${origin}A,2026-01-05,2026-04-05\n`,
      withdrawals: 'product,ship_date,date\nA,2026-01-05,2026-03\n',
    },
    'invalid period week: the records of A have one for 2026-03-01 to 2026-03-31, which is within no single week; ' +
      'set period to quarter, the finest that holds every record',
  ],
  [
    'weeks beside months, which no period holds',
    'month',
    { shipments: `${shipped}A,2026-01,9\n`, returns: `${origin}A,2026-01,2026-W14\n` },
    'invalid period month: the records of A have one for 2026-03-30 to 2026-04-05, which is within no single month; ' +
      'give the dates by day, or all by the same kind of period',
  ],
])('%s is refused', async (_, period, given, message) => {
  const error = await ingestText(given, { period }).catch((thrown: unknown) => thrown);
  expect(error).toBeInstanceOf(UserError);
  expect(error).toMatchObject({ exitCode: 2, faults: [{ code: 'period-too-fine' }], message });
});

test.each<[string, PeriodKind, Given]>([
  [
    'days and months by quarter',
    'quarter',
    {
      shipments: `${shipped}A,2026-01,9\nA,2026-05,9\nB,2026-06-30,7\nB,2026-07-01,5\n`,
      returns: `${origin}A,2026-01,2026-03\nA,2026-05,2026-07\nB,2026-06-30,2026-09-30\n`,
    },
  ],
  ['a quarterly table', 'quarter', { table: quarterly }],
  [
    'weeks that the as-of date cuts',
    'week',
    {
      shipments: `${shipped}A,2026-W03,9\nA,2026-W44,9\n`,
      returns: `${origin}A,2026-W03,2026-W05\nA,2026-W44,2026-W44\n`,
    },
  ],
])('table and history agree: %s', async (_, period, given) => {
  const config = configWith({ asOf: '2026-10-28', period });
  const intake = await ingestText(given, { asOf: '2026-10-28', period });
  const { products } = intakeDocument(config, intake);
  for (const [p, { table }] of products.entries()) {
    const history = historyOf(config, intake.products[p] as (typeof intake.products)[0], null);
    expect(history.map((past) => past.period)).toEqual(table?.periods);
    for (const [j, past] of history.entries()) {
      const rows = table?.rows ?? [];
      const shippedIn = rows.filter((row) => row.shippedIn === past.period);
      expect(past.shipped).toBe(shippedIn.reduce((sum, row) => sum + row.shipped, 0));
      expect(past.returned).toBe(rows.reduce((sum, row) => sum + (row.returned[j] ?? 0), 0));
    }
  }
});

test('a plan may be coarser, since it stands in no table', async () => {
  const plan = 'product,ship_period,quantity\nA,2027-Q1,30\n';
  const given = { shipments: `${shipped}A,2026-01,9\n`, returns: `${origin}A,2026-01,2026-04\n`, plan };
  expect((await ingestText(given)).products[0]?.planned).toMatchObject([{ shipped: 30 }]);
});
