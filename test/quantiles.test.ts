import { expect, test } from 'vitest';
import { intervalKeys, quantileKey } from '../src/quantiles.js';

test('keys of quantiles are rounded to six decimals without trailing zeros', () => {
  expect([(1 - 0.8) / 2, 0.5, (1 + 0.95) / 2, 0.1 + 0.2, 0.0000049, 0.999999].map(quantileKey)).toEqual([
    '0.1',
    '0.5',
    '0.975',
    '0.3',
    '0.000005',
    '0.999999',
  ]);
});

test('the ends of an interval leave the same probability outside', () => {
  expect([0.8, 0.95, 0.999].map(intervalKeys)).toEqual([
    ['0.1', '0.9'],
    ['0.025', '0.975'],
    ['0.0005', '0.9995'],
  ]);
});
