import { describe, expect, it } from 'vitest';
import { periodTicks } from '../../src/report/axis.js';
import { dateText, periodText } from '../../src/report/dates.js';
import { betweenText } from '../../src/report/intervals.js';
import { productName, slugOf } from '../../src/report/names.js';
import * as numbers from '../../src/report/numbers.js';

describe('numbers for people', () => {
  it('shows expected counts below 10 with one decimal, else whole, with thousands separated', () => {
    const texts = [0, 0.04, 1, 9.94, 9.95, 9.96, 10.4, 1234.5, 1_234_567].map(numbers.expectedText);
    expect(texts).toEqual(['0.0', '0.0', '1.0', '9.9', '9.9', '10', '10', '1,235', '1,234,567']);
  });

  it('has a dash where there is no number', () => {
    expect([numbers.countText(null), numbers.expectedText(null), numbers.moneyText(1, null)]).toEqual([
      '–',
      '–',
      '–',
    ]);
  });

  it('shows amounts with their currency, small ones to the cent', () => {
    expect(numbers.moneyText(38.5, 'EUR')).toBe('EUR\u00a038.50');
    expect(numbers.moneyText(21_402.7, 'CHF')).toBe('CHF\u00a021,403');
  });

  it('shows an amount that was set as it was set', () => {
    const rates = [1138.5, 185, 0.125, 11.9].map((amount) => numbers.rateText(amount, 'EUR'));
    expect(rates).toEqual(['EUR\u00a01,138.50', 'EUR\u00a0185', 'EUR\u00a00.125', 'EUR\u00a011.90']);
  });

  it('shows a column in one precision', () => {
    expect([8.04, 1200.4, null].map(numbers.expectedColumn([8.04, 1200.4, null]))).toEqual([
      '8.0',
      '1,200.4',
      '–',
    ]);
    expect([12.5, 1200.4].map(numbers.expectedColumn([12.5, 1200.4]))).toEqual(['13', '1,200']);
    const money = numbers.moneyColumn([38.5, 1200.4]);
    expect([money(38.5, 'EUR'), money(1200.4, 'EUR')]).toEqual(['EUR\u00a038.50', 'EUR\u00a01,200.40']);
    expect([0.0005, 0.123].map(numbers.percentColumn([0.0005, 0.123]))).toEqual([
      '0.1\u00a0%',
      '12.3\u00a0%',
    ]);
  });

  it('shows shares to three digits and tiny weights as a bound', () => {
    expect(numbers.percentText(0.8)).toBe('80\u00a0%');
    expect(numbers.percentText(0.000412)).toBe('0.0412\u00a0%');
    expect(numbers.weightText(1e-12)).toBe('below 0.1\u00a0%');
  });
});

describe('dates and periods', () => {
  it('puts them into words', () => {
    expect(dateText('2026-10-31')).toBe('31 October 2026');
    expect(['2026-11', '2026-W45', '2026-Q4', '3'].map(periodText)).toEqual([
      'November 2026',
      'week 45 of 2026',
      'quarter 4 of 2026',
      'step 3',
    ]);
  });

  it('labels an axis with at most ten ticks, four of them where the page is narrow', () => {
    const months = Array.from(
      { length: 60 },
      (_, i) => `${2022 + Math.floor(i / 12)}-${String((i % 12) + 1).padStart(2, '0')}`,
    );
    const ticks = periodTicks(months);
    expect(ticks.length).toBeLessThanOrEqual(10);
    expect(ticks[0]).toEqual({ at: 0.83, label: 'Jan 2022', wideOnly: false });
    expect(ticks.filter((tick) => !tick.wideOnly).map((tick) => tick.label)).toEqual([
      'Jan 2022',
      'Jan 2024',
      'Jan 2026',
    ]);
  });
});

describe('intervals', () => {
  const count = {
    expected: 31.2,
    plugIn: 31,
    quantiles: { '0.025': 20, '0.1': 24, '0.9': 39, '0.975': 43, '0.166667': 26, '0.833333': 37 },
  };

  it('reads them from the quantiles', () => {
    expect(betweenText(count, 0.8)).toBe('between 24 and 39 (80\u00a0%)');
    expect(betweenText(count, 0.95)).toBe('between 20 and 43 (95\u00a0%)');
  });

  it('finds the keys of levels that have no short decimal', () => {
    expect(betweenText(count, 2 / 3)).toContain('between 26 and 37');
  });
});

describe('names', () => {
  // Digests by coreutils: printf %s 'HV-200' | sha256sum, and so on.
  it('makes slugs of letters, digits and a digest', () => {
    expect(slugOf('HV-200', null)).toBe('hv-200-949b8a1f');
    expect(slugOf('産品', null)).toBe('product-33862c5e');
    expect(slugOf(`${'Ab/'.repeat(40)}`, null)).toMatch(/^(ab-){19}ab-[0-9a-f]{8}$/);
  });

  it('tells segments and near namesakes apart', () => {
    expect(slugOf('A', { plant: 'X' })).not.toBe(slugOf('A', { plant: 'Y' }));
    expect(slugOf('A B', null)).not.toBe(slugOf('a-b', null));
    expect(productName('A', { plant: 'X', region: 'Y' })).toBe('A, plant=X; region=Y');
  });
});
