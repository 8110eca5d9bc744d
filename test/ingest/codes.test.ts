import { expect, test } from 'vitest';
import type { ProductRules } from '../../src/config.js';
import type { Intake } from '../../src/records.js';
import { plainRules } from '../support/data.js';
import { type Given, ingestText, inputWith } from '../support/memory.js';

/** `file:line kind code column` of every row that was not used. */
const refused = ({ rejects }: Intake) =>
  rejects.map((row) => `${row.file}:${row.line} ${row.kind} ${row.code} ${row.column}`.trim());

const unitsIn = (cells: readonly { readonly quantity: number }[] = []) =>
  cells.reduce((sum, { quantity }) => sum + quantity, 0);

const counted = 'product,ship_date,quantity\nA,2026-01,10\n';
const byUnit = 'serial no,model,shipped\nu1,A,2026-01-05\nu2,A,2026-01-05\nu3,B,2026-02-01\n';
const origin = 'product,ship_date,return_date,quantity\n';

async function check(given: Given, expected: string[], rules: Partial<ProductRules> = {}): Promise<Intake> {
  const intake = await ingestText(given, { everyProduct: { ...plainRules, ...rules } });
  expect(refused(intake)).toEqual(expected);
  for (const file of intake.files) expect(file.read).toBe(file.used + file.rejected + file.setAside);
  return intake;
}

test('unreadable-date and ambiguous-date', async () => {
  const returns = `${origin}A,2026-01,soon,1\nA,2026-01,03/04/2026,1\nA,31.01.2026,2026-02,1\nA,2026-01,2026-02,1\n`;
  const intake = await check({ shipments: counted, returns }, [
    'returns.csv:2 rejected unreadable-date return_date',
    'returns.csv:3 rejected ambiguous-date return_date',
    'returns.csv:4 rejected unreadable-date ship_date',
  ]);
  expect(intake.rejects[1]).toMatchObject({ row: 'A,2026-01,03/04/2026,1' });
  expect(intake.files[1]).toMatchObject({ read: 4, used: 1, rejected: 3, setAside: 0 });
  expect(intake.files[1]?.codes).toEqual({ 'ambiguous-date': 1, 'unreadable-date': 2 });
  expect(intake.products[0]?.rejectedReturns).toBe(3);
});

test('missing-value', async () => {
  const shipments =
    'product,unit,ship_date,qty\nA,,2026-01-05,\n,u1,2026-01-05,\nA,u2,,\nA,u3,2026-01-05,\nA,,2026-01-05,4\n';
  const returns =
    'unit,product,ship_date,return_date\n,A,2026-01-05,2026-02-01\n,,2026-01-05,2026-02-01\n,A,,2026-02-01\nu3,,,\nu3,,,2026-02-01\n';
  const intake = await check({ shipments, returns }, [
    'returns.csv:3 rejected missing-value product',
    'returns.csv:4 rejected missing-value ship_date',
    'returns.csv:5 rejected missing-value return_date',
    'shipments.csv:2 rejected missing-value qty',
    'shipments.csv:3 rejected missing-value product',
    'shipments.csv:4 rejected missing-value ship_date',
  ]);
  expect(intake.products[0]?.cohorts).toMatchObject([{ shipped: 5 }]);
  expect(unitsIn(intake.products[0]?.returned)).toBe(2);
});

test.each(['0', '1.5', '-3', 'ten', '1e3', '1,000'])('bad-quantity: %s shipped', async (quantity) => {
  const shipments = `${counted}A;2026-02;${quantity}\n`.replace(
    /^.*\n.*\n/,
    'product;ship_date;quantity\nA;2026-01;10\n',
  );
  await check({ shipments, returns: `${origin}A,2026-01,2026-02,1\n` }, [
    'shipments.csv:3 rejected bad-quantity quantity',
  ]);
});

test('bad-quantity: returns', async () => {
  const shipments = 'product,unit,ship_date,quantity\nA,u1,2026-01,1\nA,u2,2026-01,2\nA,,2026-01,10\n';
  const returns = `unit,${origin}u1,,,2026-02,1\nu1,,,2026-02,3\n,A,2026-01,2026-02,0\n,A,2026-01,2026-02,2.0\n`;
  const intake = await check({ shipments, returns }, [
    'returns.csv:3 rejected bad-quantity quantity',
    'returns.csv:4 rejected bad-quantity quantity',
    'shipments.csv:3 rejected bad-quantity quantity',
  ]);
  expect(unitsIn(intake.products[0]?.returned)).toBe(3);
});

test('wrong-width', async () => {
  await check(
    { shipments: `${counted}A,2026-01\nA,2026-01,3,\n`, returns: `${origin}A,2026-01,2026-02,1\n` },
    ['shipments.csv:3 rejected wrong-width', 'shipments.csv:4 rejected wrong-width'],
  );
});

test('field-too-long, cut in the list of rejects', async () => {
  const intake = await check(
    { shipments: counted, returns: `${origin}${'x'.repeat(5000)},2026-01,2026-02,1\n` },
    ['returns.csv:2 rejected field-too-long product'],
  );
  expect(intake.rejects[0]?.row.length).toBeLessThan(1100);
});

test('unknown-product', async () => {
  const plan = 'product,ship_period,quantity\nC,2026-11,5\nA,2026-11,5\n';
  await check({ shipments: counted, returns: `${origin}B,2026-01,2026-02,1\nA,2026-01,2026-02,1\n`, plan }, [
    'plan.csv:2 rejected unknown-product product',
    'returns.csv:2 rejected unknown-product product',
  ]);
});

test('unknown-unit: never shipped, or shipped as another product or at another time', async () => {
  const returns = `unit,product,ship_date,return_date\nu9,,,2026-03-01\nu9,C,,2026-03-01\nu1,B,,2026-03-01\nu2,A,2026-02,2026-03-01\nu3,B,2026-02,2026-03-01\n`;
  const intake = await check({ shipments: byUnit, returns }, [
    'returns.csv:2 rejected unknown-unit unit',
    'returns.csv:3 rejected unknown-product product',
    'returns.csv:4 rejected unknown-unit product',
    'returns.csv:5 rejected unknown-unit ship_date',
  ]);
  expect(intake.rejects[2]?.message).toBe('unit u1 was shipped as A, not as B');
  expect(intake.products.map((product) => unitsIn(product.returned))).toEqual([0, 1]);
  expect(intake.products.map((product) => product.rejectedReturns)).toEqual([1, 1]);
});

test('return-before-shipment, by unit and by origin; the day of shipment is not before', async () => {
  const returns =
    'unit,product,ship_date,return_date\nu1,,,2026-01-04\nu2,,,2026-01-05\n,B,2026-02,2026-01\nu3,,,2026-02\n';
  const intake = await check({ shipments: byUnit, returns }, [
    'returns.csv:2 rejected return-before-shipment return_date',
    'returns.csv:4 rejected return-before-shipment return_date',
  ]);
  expect(intake.products.map((product) => unitsIn(product.returned))).toEqual([1, 1]);
  expect(intake.products.map((product) => product.rejectedReturns)).toEqual([1, 1]);
});

test('duplicate-unit: one of equal rows is used', async () => {
  const shipments = `${byUnit}u1,A,2026-01-05T09:00\n`;
  const intake = await check({ shipments, returns: 'unit,return_date\nu1,2026-03-01\n' }, [
    'shipments.csv:5 rejected duplicate-unit serial no',
  ]);
  expect(intake.products[0]?.cohorts).toMatchObject([{ shipped: 2 }]);
  expect(unitsIn(intake.products[0]?.returned)).toBe(1);
});

test('conflicting-unit: none is used, and its return has no unit', async () => {
  const shipments = `${byUnit}u1,B,2026-01-05\nu1,A,2026-01-05\n`;
  const intake = await check({ shipments, returns: 'unit,return_date\nu1,2026-03-01\nu2,2026-03-01\n' }, [
    'returns.csv:2 rejected unknown-unit unit',
    'shipments.csv:2 rejected conflicting-unit serial no',
    'shipments.csv:5 rejected conflicting-unit serial no',
    'shipments.csv:6 rejected conflicting-unit serial no',
  ]);
  expect(intake.products.map(({ cohorts }) => cohorts.map(({ shipped }) => shipped))).toEqual([[1], [1]]);
});

test('returns-exceed-shipped: the earliest that fit are used, rows whole', async () => {
  const returns = `${origin}A,2026-01,2026-05,4\nA,2026-01,2026-02,5\nA,2026-01,2026-04,6\nA,2026-03,2026-04,1\nA,2026-01,2026-06,1\n`;
  const withdrawals = 'product,ship_date,date\nA,2026-01,2026-07\n';
  const intake = await check({ shipments: counted, returns, withdrawals }, [
    'returns.csv:4 rejected returns-exceed-shipped quantity',
    'returns.csv:5 rejected returns-exceed-shipped ship_date',
    'withdrawals.csv:2 rejected returns-exceed-shipped',
  ]);
  expect(intake.products[0]?.returned.map(({ quantity }) => quantity)).toEqual([5, 4, 1]);
  expect(intake.products[0]?.rejectedReturns).toBe(7);
});

test('unmatched-reversal: within the period reversals net, elsewhere they do not', async () => {
  const returns = `${origin}A,2026-01,2026-02-03,4\nA,2026-01,2026-02-20,-1\nA,2026-01,2026-03-01,-1\nA,2026-01,2026-02-03,-9\nA,2026-01,2026-02-03,-2\nA,2026-01,2026-04-01,1\nA,2026-01,2026-04-02,-1\n`;
  const intake = await check({ shipments: counted, returns }, [
    'returns.csv:4 rejected unmatched-reversal quantity',
    'returns.csv:5 rejected unmatched-reversal quantity',
  ]);
  expect(intake.products[0]?.returned).toMatchObject([{ quantity: 1 }]);
  expect(intake.files[1]).toMatchObject({ read: 7, used: 5, rejected: 2 });
});

test('after-as-of: shipments, returns and withdrawals', async () => {
  const shipments = `${byUnit}u4,A,2026-11-01\n`;
  const returns = 'unit,return_date\nu1,2026-10-31\nu2,2026-11-01\n';
  const intake = await check({ shipments, returns, withdrawals: 'unit,scrap_date\nu3,2026-11\n' }, [
    'returns.csv:3 set-aside after-as-of return_date',
    'shipments.csv:5 set-aside after-as-of shipped',
    'withdrawals.csv:2 set-aside after-as-of scrap_date',
  ]);
  expect(intake.products.map(({ returned, withdrawn }) => [unitsIn(returned), unitsIn(withdrawn)])).toEqual([
    [1, 0],
    [0, 0],
  ]);
});

test('repeat-return: the earliest counts, a return before a withdrawal of the same day', async () => {
  const returns = 'unit,return_date\nu1,2026-05-01\nu1,2026-04-01\nu2,2026-06-01\nu3,2026-07-02\n';
  const withdrawals = 'unit,date\nu2,2026-06-01\nu3,2026-07-01\nu3,2026-08-01\n';
  const intake = await check({ shipments: byUnit, returns, withdrawals }, [
    'returns.csv:2 set-aside repeat-return unit',
    'returns.csv:5 set-aside repeat-return unit',
    'withdrawals.csv:2 set-aside repeat-return unit',
    'withdrawals.csv:4 set-aside repeat-return unit',
  ]);
  expect(intake.products.map(({ returned, withdrawn }) => [unitsIn(returned), unitsIn(withdrawn)])).toEqual([
    [2, 0],
    [0, 1],
  ]);
});

test('a return before the shipment does not hide a later one of the unit', async () => {
  const intake = await check(
    { shipments: byUnit, returns: 'unit,return_date\nu1,2025-12-01\nu1,2026-04-01\n' },
    ['returns.csv:2 rejected return-before-shipment return_date'],
  );
  expect(unitsIn(intake.products[0]?.returned)).toBe(1);
});

// Warranty of one month from 2026-01-05 ends at age 31: the unit of that day is at least 31 days old from 2026-02-06 on.
test('beyond-warranty: only where no return is possible, and the unit then counts as withdrawn', async () => {
  const returns = 'unit,return_date\nu1,2026-02-05\nu2,2026-02-06\n';
  const intake = await check(
    { shipments: byUnit, returns },
    ['returns.csv:3 set-aside beyond-warranty return_date'],
    { warrantyMonths: 1 },
  );
  expect(intake.products[0]).toMatchObject({ returned: [{ quantity: 1 }], withdrawn: [{ quantity: 1 }] });
  expect(intake.rejects[0]?.message).toBe(
    'returned after the end of warranty; its unit is censored there and counts among the withdrawn',
  );
  expect((intake.products[0]?.withdrawn[0]?.from ?? 0) - (intake.products[0]?.returned[0]?.from ?? 0)).toBe(
    1,
  );
});

// A unit shipped on day 0 and returned on day d is at most d + 1 days old.
test('before-delay: only where no return is possible; too many of them forbid a forecast', async () => {
  const returns = 'unit,return_date\nu1,2026-01-14\nu2,2026-01-15\nu3,2026-06-01\n';
  const intake = await check(
    { shipments: byUnit, returns },
    ['returns.csv:2 set-aside before-delay return_date'],
    { delayDays: 10, delayReason: 'transport' },
  );
  expect(intake.products.map(({ returned, withdrawn }) => [unitsIn(returned), unitsIn(withdrawn)])).toEqual([
    [1, 1],
    [1, 0],
  ]);
  expect(intake.rejects[0]?.message).toBe(
    'returned within the delay of 10 days; its unit is censored there and counts among the withdrawn',
  );
  expect(intake.products[0]?.unusable).toBeNull();
  const strict = await ingestText(
    { shipments: byUnit, returns },
    { maxRejectShare: 0.4, everyProduct: { ...plainRules, delayDays: 10, delayReason: 'transport' } },
  );
  expect(strict.products[0]?.unusable).toEqual({
    code: 'returns-before-delay',
    message: '1 of 2 returns came within the delay of 10 days; lower delayDays of A',
  });
  expect(strict.products[1]?.unusable).toBeNull();
});

test('before-as-of: a plan for what is over', async () => {
  const plan = 'product,ship_period,quantity\nA,2026-10,5\nA,2026-11,7\nA,2026-11,1\n';
  const intake = await check({ shipments: counted, returns: `${origin}A,2026-01,2026-02,1\n`, plan }, [
    'plan.csv:2 set-aside before-as-of ship_period',
  ]);
  expect(intake.products[0]?.planned).toMatchObject([{ shipped: 8 }]);
});

test('dates by a pattern, columns by name, and an encoding, together', async () => {
  const given = {
    shipments: 'Gerät;Los;am\nA;10;31.01.2026\n',
    returns: 'typ;am;zurück\nA;31.01.2026;01.02.2026\n',
  };
  const intake = await ingestText(given, {
    shipments: inputWith({
      dateFormat: 'dd.MM.yyyy',
      columns: { product: 'GERÄT', quantity: 'los', ship_date: 'am' },
    }),
    returns: inputWith({
      dateFormat: 'dd.MM.yyyy',
      columns: { product: 'Typ', ship_date: 'am', return_date: 'zurück' },
    }),
  });
  expect(intake.rejects).toEqual([]);
  expect(intake.products).toMatchObject([{ product: 'A', resolution: 'day', returned: [{ quantity: 1 }] }]);
});
