import { describe, expect, test } from 'vitest';
import { dayNumber } from '../../src/calendar.js';
import { cellsCsv } from '../../src/ledger/cells.js';
import { rejectsCsv } from '../../src/ledger/rejects.js';
import { tableCsv, tableWithdrawnCsv } from '../../src/ledger/tables.js';
import type { ProductRecords, RejectRow } from '../../src/records.js';
import { monthEndOf } from './examples.js';

const march = { from: dayNumber(2026, 3, 1), to: dayNumber(2026, 4, 1) };
const april = { from: march.to, to: dayNumber(2026, 5, 1) };

const fan: ProductRecords = {
  product: 'Fan, 2"',
  segment: null,
  resolution: 'period',
  cohorts: [
    { ...march, shipped: 100 },
    { ...april, shipped: 50 },
  ],
  returned: [
    { cohort: 0, ...march, quantity: 1 },
    { cohort: 0, ...april, quantity: 2 },
  ],
  withdrawn: [],
  planned: [],
  ages: [],
  rejectedReturns: 0,
  unusable: null,
};

const late: ProductRecords = {
  ...fan,
  product: '=late',
  cohorts: [{ ...april, shipped: 7 }],
  returned: [],
  withdrawn: [{ cohort: 0, from: april.to - 1, to: april.to, quantity: 3 }],
};

/** The as-of date of the examples is in October. */
const months = ['2026-03', '2026-04', '2026-05', '2026-06', '2026-07', '2026-08', '2026-09', '2026-10'];

describe('table.csv', () => {
  const { table } = monthEndOf([late, fan]);

  test('has a row a ship period, a column a return period of any product, and nothing before the shipment', () => {
    expect(tableCsv(table)).toBe(
      [
        `product,shipped_in,shipped,${months.join()}`,
        "'=late,2026-04,7,,0,0,0,0,0,0,0",
        '"Fan, 2""",2026-03,100,1,2,0,0,0,0,0,0',
        '"Fan, 2""",2026-04,50,,0,0,0,0,0,0,0',
        '',
      ].join('\n'),
    );
  });

  test('has withdrawals beside it in the same layout, where there are any', () => {
    expect(tableWithdrawnCsv(table)?.split('\n')[1]).toBe("'=late,2026-04,7,,3,0,0,0,0,0,0");
    expect(tableWithdrawnCsv(monthEndOf([fan]).table)).toBeNull();
  });
});

test('cells.csv names the last day that belongs, and no return dates for shipments', () => {
  expect(cellsCsv([fan, late])).toBe(
    [
      'product,segment,ship_from,ship_to,kind,from,to,quantity',
      '"Fan, 2""",,2026-03-01,2026-03-31,shipped,,,100',
      '"Fan, 2""",,2026-04-01,2026-04-30,shipped,,,50',
      '"Fan, 2""",,2026-03-01,2026-03-31,returned,2026-03-01,2026-03-31,1',
      '"Fan, 2""",,2026-03-01,2026-03-31,returned,2026-04-01,2026-04-30,2',
      "'=late,,2026-04-01,2026-04-30,shipped,,,7",
      "'=late,,2026-04-01,2026-04-30,withdrawn,2026-04-30,2026-04-30,3",
      '',
    ].join('\n'),
  );
});

test('rejects.csv quotes by RFC 4180 section 2 and protects what a spreadsheet would compute', () => {
  const reject: RejectRow = {
    file: 'returns.csv',
    line: 12,
    kind: 'rejected',
    code: 'bad-quantity',
    column: '-quantity',
    message: 'invalid quantity "1,5"',
    row: '@A,"two\nlines",1',
  };
  expect(rejectsCsv([reject])).toBe(
    'file,line,kind,code,column,message,row\n' +
      'returns.csv,12,rejected,bad-quantity,\'-quantity,"invalid quantity ""1,5""","\'@A,""two\nlines"",1"\n',
  );
});
