import { describe, expect, it } from 'vitest';
import { tableText } from '../../src/cli/print/table.js';
import {
  alignColumns,
  countText,
  measureText,
  numberText,
  plainNumber,
  printable,
  shorten,
} from '../../src/cli/print/text.js';
import type { IntakeDocument, TableRow } from '../../src/records.js';

const months = Array.from(
  { length: 36 },
  (_, i) => `${2024 + Math.floor(i / 12)}-${String((i % 12) + 1).padStart(2, '0')}`,
);

function nevada(product: string): IntakeDocument {
  const rows = months.map((shippedIn, i): TableRow => {
    const returned = months.map((_, j) => (j < i ? 0 : 1 + ((i + j) % 3)));
    const total = returned.reduce((a, b) => a + b, 0);
    const withdrawn = months.map((_, j) => (j === i ? 2 : 0));
    return { from: 0, to: 1, shippedIn, shipped: 12_345, returned, withdrawn, survivors: 12_345 - total - 2 };
  });
  const counts = { units: 444_420, returns: 1332, withdrawn: 72, survivors: 443_016, rejectedReturns: 0 };
  return {
    schema: 'returnfall/intake/1',
    title: 'Test',
    asOf: '2026-12-31',
    period: 'month',
    ageUnit: 'day',
    files: [],
    findings: [],
    products: [
      {
        ...counts,
        product,
        segment: null,
        resolution: 'period',
        firstShipped: '2024-01-01',
        lastShipped: '2026-12-31',
        planned: [],
        unusable: null,
        table: { periods: months, rows },
        ages: [],
      },
    ],
  };
}

/** The numbers of a printed row after its label. */
function numbers(line: string): number[] {
  return line
    .trim()
    .split(/\s+/)
    .slice(1)
    .map((cell) => (cell === '.' ? 0 : Number(cell.replaceAll(',', ''))));
}

describe('tableText', () => {
  it.each([80, 120, 200])('fits %i columns, and every row still adds up to what was shipped', (width) => {
    const lines = tableText(nevada('HV-200'), width).split('\n');
    expect(Math.max(...lines.map((line) => line.length))).toBeLessThanOrEqual(width);
    const rows = lines.filter((line) => /^20\d\d-\d\d /.test(line)).map(numbers);
    expect(rows).toHaveLength(36);
    for (const [shipped = 0, ...rest] of rows) expect(rest.reduce((a, b) => a + b, 0)).toBe(shipped);
  });

  it('keeps the newest periods, as many as fit, and says which are summed', () => {
    const text = tableText(nevada('HV-200'), 80);
    expect(text).toMatch(
      /^earlier: 29 return periods, 2024-01 to 2026-05 \(all in table\.csv, with --out\)$/m,
    );
    expect(tableText(nevada('HV-200'), 400)).not.toContain('earlier');
  });

  it('does not let a product name steer the terminal', () => {
    const text = tableText(nevada('\u001b[2J\u202eA\r\nB'), 80);
    expect(text.startsWith('\\u{1b}[2J\\u{202e}A\\u{d}\\nB: 444,420 units')).toBe(true);
  });
});

describe('texts', () => {
  it('pads by characters, not by UTF-16 units', () => {
    expect(
      alignColumns(
        [
          ['😀', '1'],
          ['abc', '22'],
        ],
        ['left', 'right'],
      ),
    ).toEqual(['😀     1', 'abc  22']);
    expect(printable('a\tb\u0000')).toBe('a\\tb\\u{0}');
    expect(shorten('ventilation', 5)).toBe('vent…');
  });

  it('writes numbers without a locale', () => {
    expect([numberText(1234567.891, 2), numberText(-0.4), numberText(-1234), numberText(Number.NaN)]).toEqual(
      ['1,234,567.89', '0', '-1,234', '-'],
    );
    expect([countText(9.94), countText(9.96), countText(1234.5)]).toEqual(['9.9', '10', '1,235']);
    expect([4210.512, 1.31, 0.42773, 12351.4, 1e-7, 0].map(measureText)).toEqual([
      '4,211',
      '1.310',
      '0.4277',
      '12,351',
      '1.000e-7',
      '0',
    ]);
    expect([1096, 95, 99.9, 0.1 + 0.2].map(plainNumber)).toEqual(['1096', '95', '99.9', '0.3']);
  });
});
