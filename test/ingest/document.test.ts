import { expect, test } from 'vitest';
import { intakeDocument } from '../../src/ingest/document.js';
import { configWith } from '../support/data.js';
import { type Given, ingestText } from '../support/memory.js';

async function documentOf(given: Given, changes: Parameters<typeof ingestText>[1] = {}) {
  const config = configWith({ asOf: '2026-10-31', maxRejectShare: 1, ...changes });
  return intakeDocument(config, await ingestText(given, changes));
}

const shipments = 'product,ship_date,quantity\nA,2026-08-30,10\nA,2026-08-31,10\nA,2026-10-01,5\n';
const returns =
  'product,ship_date,return_date,quantity\nA,2026-08-30,2026-08-31,1\nA,2026-08-31,2026-10,2\nA,2026-10-01,2026-10-31,1\n';
const withdrawals = 'product,ship_date,date\nA,2026-08-31,2026-09-30\n';
const plan = 'product,ship_period,quantity\nA,2026-12,30\n';

test('the Nevada-style table by month', async () => {
  const document = await documentOf({ shipments, returns, withdrawals, plan });
  const [product] = document.products;
  expect(product).toMatchObject({
    product: 'A',
    resolution: 'period',
    units: 25,
    returns: 4,
    withdrawn: 1,
    survivors: 20,
    firstShipped: '2026-08-30',
    lastShipped: '2026-10-01',
    planned: [{ from: '2026-12-01', to: '2026-12-31', quantity: 30 }],
    ages: [],
  });
  expect(product?.table?.periods).toEqual(['2026-08', '2026-09', '2026-10']);
  expect(product?.table?.rows).toMatchObject([
    { shippedIn: '2026-08', shipped: 20, returned: [1, 0, 2], withdrawn: [0, 1, 0], survivors: 16 },
    { shippedIn: '2026-10', shipped: 5, returned: [0, 0, 1], withdrawn: [0, 0, 0], survivors: 4 },
  ]);
});

test('by quarter and by week', async () => {
  const quarterly = await documentOf({ shipments, returns, withdrawals }, { period: 'quarter' });
  expect(quarterly.products[0]?.table).toMatchObject({
    periods: ['2026-Q3', '2026-Q4'],
    rows: [
      { shippedIn: '2026-Q3', shipped: 20, returned: [1, 2], withdrawn: [1, 0], survivors: 16 },
      { shippedIn: '2026-Q4', shipped: 5, returned: [0, 1], survivors: 4 },
    ],
  });
  const dated = returns.replace('2026-10,2', '2026-10-29,2');
  const weekly = await documentOf({ shipments, returns: dated, withdrawals }, { period: 'week' });
  const table = weekly.products[0]?.table;
  // 2026-08-30 is a Sunday (ISO week 35), 2026-10-31 a Saturday (week 44)
  expect([table?.periods[0], table?.periods.at(-1), table?.periods.length]).toEqual([
    '2026-W35',
    '2026-W44',
    10,
  ]);
  expect(table?.rows.map(({ shippedIn }) => shippedIn)).toEqual(['2026-W35', '2026-W36', '2026-W40']);
  expect(table?.rows[1]?.returned.indexOf(2)).toBe(9);
});

test('a period that the as-of date cuts is the last column', async () => {
  const { products } = await documentOf({ shipments, returns, withdrawals }, { asOf: '2026-10-05' });
  expect(products[0]?.table?.periods.at(-1)).toBe('2026-10');
  expect(products[0]).toMatchObject({ units: 25, returns: 3 });
});

test('ages have no table and no ship dates', async () => {
  const { products, asOf } = await documentOf(
    { ages: 'product,outcome,quantity,age\nA,returned,3,5\nA,surviving,10,9\n' },
    { asOf: null },
  );
  expect(asOf).toBeNull();
  expect(products).toMatchObject([
    {
      units: 13,
      returns: 3,
      withdrawn: 0,
      survivors: 10,
      firstShipped: null,
      lastShipped: null,
      table: null,
    },
  ]);
});
