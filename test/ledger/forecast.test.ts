import { describe, expect, test } from 'vitest';
import { dayNumber } from '../../src/calendar.js';
import { forecastCsv } from '../../src/ledger/forecast.js';
import { count, forecastDocument, forecastProduct, period } from './examples.js';

const [november, december] = [dayNumber(2026, 11, 1), dayNumber(2026, 12, 1)];

const header =
  'product,segment,period,expected,lower_80,upper_80,cumulative_expected,cumulative_lower_80,cumulative_upper_80,' +
  'expected_cost,currency,status';

/** Ends of the interval of every count here: five below, rounded down, and five above, rounded up. */
const fan = forecastProduct('Fan', {
  currency: 'EUR',
  periods: [
    period('2026-11', november, 10.004, 10.004, 10.004 * 38.5),
    period('2026-12', december, 20.004, 30.008, 20.004 * 38.5),
  ],
  untilWarrantyEnds: count(512.345),
});

const pump = forecastProduct('=Pump', {
  currency: 'EUR',
  periods: [period('2026-11', november, 1.006, 1.006, 0.1), period('2026-12', december, 2.006, 3.012, 0.126)],
  untilWarrantyEnds: count(7),
});

const total = {
  periods: [period('2026-11', november, 11.01, 11.01), period('2026-12', december, 22.01, 33.02)],
  untilWarrantyEnds: count(519.345),
};

const lines = (csv: string) => csv.trimEnd().split('\n');

describe('forecast.csv', () => {
  test('with one currency: products, then the total with the intervals of the document', () => {
    expect(lines(forecastCsv(forecastDocument([pump, fan], total)))).toEqual([
      header,
      "'=Pump,,2026-11,1.01,-4,7,1.01,-4,7,0.10,EUR,ok",
      "'=Pump,,2026-12,2.01,-3,8,3.02,-2,9,0.13,EUR,ok",
      "'=Pump,,(until warranty ends),7.00,2,12,,,,,EUR,ok",
      'Fan,,2026-11,10.00,5,16,10.00,5,16,385.15,EUR,ok',
      'Fan,,2026-12,20.00,15,26,30.00,25,36,770.15,EUR,ok',
      // 30.008 is 30.01, but the rows above add up to 30.00; the ledger's sum is that of its rows.
      'Fan,,(until warranty ends),512.35,507,518,,,,,EUR,ok',
      '(total),,2026-11,11.01,6,17,11.01,6,17,385.25,EUR,ok',
      '(total),,2026-12,22.01,17,28,33.02,28,39,770.28,EUR,ok',
      '(total),,(until warranty ends),519.35,514,525,,,,,EUR,ok',
    ]);
  });

  test('with several currencies: a block a currency, without intervals, and one for products without a cost', () => {
    const yen = forecastProduct('Yen', {
      currency: 'JPY',
      periods: [period('2026-11', november, 2, 2, 1234.5), period('2026-12', december, 3, 5, 1851.75)],
      untilWarrantyEnds: count(9),
    });
    const dinar = forecastProduct('Dinar', {
      currency: 'KWD',
      periods: [period('2026-11', november, 2, 2, 1.23456), period('2026-12', december, 3, 5, 2)],
    });
    const free = forecastProduct('Free', {
      periods: [period('2026-11', november, 4, 4), period('2026-12', december, 4, 8)],
      untilWarrantyEnds: count(8),
    });
    const rows = lines(forecastCsv(forecastDocument([dinar, free, yen, pump, fan], total)));
    expect(rows.filter((row) => row.startsWith('Yen'))[0]).toBe(
      'Yen,,2026-11,2.00,-3,7,2.00,-3,7,1235,JPY,ok',
    );
    expect(rows.filter((row) => row.startsWith('(total)'))).toEqual([
      '(total),,2026-11,11.01,,,11.01,,,385.25,EUR,ok',
      '(total),,2026-12,22.01,,,33.02,,,770.28,EUR,ok',
      '(total),,(until warranty ends),519.35,,,,,,,EUR,ok',
      '(total),,2026-11,2.00,,,2.00,,,1235,JPY,ok',
      '(total),,2026-12,3.00,,,5.00,,,1852,JPY,ok',
      '(total),,(until warranty ends),9.00,,,,,,,JPY,ok',
      '(total),,2026-11,2.00,,,2.00,,,1.235,KWD,ok',
      '(total),,2026-12,3.00,,,5.00,,,2.000,KWD,ok',
      '(total),,(until warranty ends),,,,,,,,KWD,no-warranty-limit',
      '(total),,2026-11,4.00,,,4.00,,,,,ok',
      '(total),,2026-12,4.00,,,8.00,,,,,ok',
      '(total),,(until warranty ends),8.00,,,,,,,,ok',
    ]);
  });

  test('a product that is not forecast has one row with its code, and the total says that it lacks products', () => {
    const silent = forecastProduct('Silent', {
      chosen: null,
      notForecast: { code: 'no-returns', message: 'none' },
    });
    const rows = lines(
      forecastCsv(forecastDocument([fan, silent], { ...total, productsMissing: ['Silent'] })),
    );
    expect(rows.filter((row) => row.startsWith('Silent'))).toEqual(['Silent,,,,,,,,,,,no-returns']);
    expect(rows.filter((row) => row.startsWith('(total)')).map((row) => row.split(',').at(-1))).toEqual([
      'products-missing',
      'products-missing',
      'products-missing',
    ]);
  });

  test('a total in which some products have no cost says so', () => {
    const free = forecastProduct('Free', { periods: [period('2026-11', november, 4, 4)] });
    const rows = lines(forecastCsv(forecastDocument([fan, free], { periods: total.periods.slice(0, 1) })));
    expect(rows.slice(-2)).toEqual([
      '(total),,2026-11,14.00,6,17,14.00,6,17,385.15,EUR,cost-incomplete',
      '(total),,(until warranty ends),,,,,,,,EUR,no-warranty-limit',
    ]);
  });

  test('the rest of a period is marked, in products and in the total, and is part of the cumulative sums', () => {
    const rest = { ...period('2026-11', november, 3, 3), partial: true };
    const periods = [rest, period('2026-12', december, 5, 8)];
    const rows = lines(forecastCsv(forecastDocument([forecastProduct('Rest', { periods })], { periods })));
    expect(rows.slice(1)).toEqual([
      'Rest,,2026-11,3.00,-2,8,3.00,-2,8,,,partial-period',
      'Rest,,2026-12,5.00,0,10,8.00,3,13,,,ok',
      'Rest,,(until warranty ends),,,,,,,,,no-warranty-limit',
      '(total),,2026-11,3.00,-2,8,3.00,-2,8,,,partial-period',
      '(total),,2026-12,5.00,0,10,8.00,3,13,,,ok',
      '(total),,(until warranty ends),,,,,,,,,no-warranty-limit',
    ]);
  });

  test('levels head their columns in percent, and a segment is written column by column', () => {
    const quantiles = { '0.0225': 1, '0.25': 2, '0.5': 3, '0.75': 4, '0.9775': 5 };
    const month = { ...period('2026-11', november, 3, 3), quantiles };
    const product = forecastProduct('A', { segment: { plant: 'X', region: 'Y,Z' }, periods: [month] });
    const [head, row] = lines(forecastCsv({ ...forecastDocument([product]), levels: [0.5, 0.955] }));
    expect(head?.split(',').slice(3, 12)).toEqual([
      'expected',
      'lower_50',
      'upper_50',
      'lower_95.5',
      'upper_95.5',
      'cumulative_expected',
      'cumulative_lower_50',
      'cumulative_upper_50',
      'cumulative_lower_95.5',
    ]);
    expect(row).toMatch(/^A,"plant=X; region=Y,Z",2026-11,3.00,2,4,1,5,3.00,/);
  });
});
