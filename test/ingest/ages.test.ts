import { expect, test } from 'vitest';
import { plainRules } from '../support/data.js';
import { ingestText } from '../support/memory.js';

const header = 'product,outcome,quantity,age,age_from,age_to\n';

test('exact, interval, left-censored and surviving ages in one file', async () => {
  const ages = `${header}A,returned,1,12.5,,\nA,Returned,2,,10,20\nA,returned,,,0,5\nA,surviving,40,30,,\nA,surviving,2,,30,\nA,returned,3,12.5,,\nB,surviving,7,1e3,,\n`;
  const intake = await ingestText({ ages }, { asOf: null });
  expect(intake.rejects).toEqual([]);
  expect(
    intake.products.map(({ product, resolution, cohorts }) => [product, resolution, cohorts.length]),
  ).toEqual([
    ['A', 'age', 0],
    ['B', 'age', 0],
  ]);
  expect(intake.products[0]?.ages).toEqual([
    { outcome: 'returned', from: 0, to: 5, exact: false, quantity: 1 },
    { outcome: 'returned', from: 10, to: 20, exact: false, quantity: 2 },
    { outcome: 'returned', from: 12.5, to: 12.5, exact: true, quantity: 4 },
    { outcome: 'surviving', from: 30, to: 30, exact: true, quantity: 42 },
  ]);
  expect(intake.products[1]?.ages).toEqual([
    { outcome: 'surviving', from: 1000, to: 1000, exact: true, quantity: 7 },
  ]);
});

test('columns may be fewer', async () => {
  const exact = await ingestText({ ages: 'item,outcome,age\nA,returned,3\nA,surviving,4\n' }, { asOf: null });
  expect(exact.products[0]?.ages.map(({ quantity }) => quantity)).toEqual([1, 1]);
  const interval = await ingestText(
    { ages: 'item,outcome,age from,age to\nA,returned,3,4\n' },
    { asOf: null },
  );
  expect(interval.products[0]?.ages).toMatchObject([{ from: 3, to: 4, exact: false }]);
});

test.each([
  ['A,broken,1,5,,', 'missing-value', 'outcome'],
  ['A,,1,5,,', 'missing-value', 'outcome'],
  [',returned,1,5,,', 'missing-value', 'product'],
  ['A,returned,0,5,,', 'bad-quantity', 'quantity'],
  ['A,returned,1.5,5,,', 'bad-quantity', 'quantity'],
  ['A,returned,1,0,,', 'bad-quantity', 'age'],
  ['A,returned,1,-1,,', 'bad-quantity', 'age'],
  ['A,returned,1,"1,5",,', 'bad-quantity', 'age'],
  ['A,returned,1,Infinity,,', 'bad-quantity', 'age'],
  ['A,returned,1,5,4,6', 'bad-quantity', 'age'],
  ['A,returned,1,,,', 'missing-value', 'age'],
  ['A,returned,1,,4,', 'missing-value', 'age_to'],
  ['A,returned,1,,,6', 'missing-value', 'age_from'],
  ['A,returned,1,,6,6', 'bad-quantity', 'age_to'],
  ['A,returned,1,,x,6', 'bad-quantity', 'age_from'],
  ['A,surviving,1,,,', 'missing-value', 'age'],
  ['A,surviving,1,,4,6', 'bad-quantity', 'age_to'],
  ['A,surviving,1,old,,', 'bad-quantity', 'age'],
  ['A,surviving,1,,old,', 'bad-quantity', 'age_from'],
  ['A,surviving,1,5', 'wrong-width', ''],
])('%s is rejected as %s', async (row, code, column) => {
  const { rejects } = await ingestText({ ages: `${header}A,returned,1,5,,\n${row}\n` }, { asOf: null });
  expect(rejects).toMatchObject([{ line: 3, kind: 'rejected', code, column }]);
});

test('an unknown outcome is named with those that are allowed', async () => {
  const { rejects } = await ingestText({ ages: `${header}A,broken,1,5,,\n` }, { asOf: null });
  expect(rejects[0]?.message).toBe('missing outcome, broken is none: it must be returned or surviving');
});

test('returns beyond warranty or within the delay survive to their age', async () => {
  const ages = `${header}A,returned,1,100,,\nA,returned,2,,100,120\nA,returned,4,,90,120\nA,returned,1,10,,\nA,returned,1,10.5,,\nA,returned,1,,0,10\n`;
  const everyProduct = { ...plainRules, warrantyDays: 100, delayDays: 10, delayReason: 'transport' };
  const { products, rejects } = await ingestText({ ages }, { asOf: null, everyProduct });
  expect(rejects.map(({ line, kind, code }) => `${line} ${kind} ${code}`)).toEqual([
    '2 set-aside beyond-warranty',
    '3 set-aside beyond-warranty',
    '5 set-aside before-delay',
    '7 set-aside before-delay',
  ]);
  expect([rejects[0]?.message, rejects[2]?.message]).toEqual([
    'returned after the end of warranty; its unit is censored there and counts among the surviving',
    'returned within the delay of 10 days; its unit is censored there and counts among the surviving',
  ]);
  expect(products[0]?.ages.map(({ outcome, from, quantity }) => `${outcome} ${from} ${quantity}`)).toEqual([
    'returned 10.5 1',
    'returned 90 4',
    'surviving 0 1',
    'surviving 10 1',
    'surviving 100 3',
  ]);
});
