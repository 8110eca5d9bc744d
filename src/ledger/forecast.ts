import { csvLine } from '../csv.js';
import type { ForecastDocument } from '../records.js';
import { type ForecastRow, productRows } from './forecast-rows.js';
import { totalRows } from './forecast-totals.js';
import { minorDigits, unitsText } from './money.js';

/**
 * `forecast.csv`, for a ledger: `product,segment,period,expected,lower_80,upper_80,…,cumulative_expected,
 * cumulative_lower_80,cumulative_upper_80,…,expected_cost,currency,status`.
 *
 * - One row a product and period, the rest of a partial period first. `expected` has two decimals, interval ends are
 *   whole numbers of the document (`lower_80` and `upper_80` its quantiles 0.1 and 0.9), `expected_cost` has the
 *   decimals of its currency's minor unit and is empty where no cost is set.
 * - `cumulative_expected` is the sum of the rounded `expected` of the rows so far; the cumulative interval is the
 *   document's.
 * - The last row of a product is `(until warranty ends)`, of units shipped by the as-of date only, without cumulative
 *   and without cost; without a warranty limit its numbers are empty and its status says `no-warranty-limit`.
 * - A product that is not forecast has one row with empty numbers and its code as status.
 * - `(total)` rows follow: sums of the rounded products, with the intervals of the document's own total, which are
 *   never summed. With several currencies there is one block a currency (and one for products without a cost), sums of
 *   the products in that currency, and then no intervals.
 * - Status is `ok`, or words with spaces between: `partial-period` (the rest of the period the as-of date falls into),
 *   `no-warranty-limit`, `cost-incomplete` (no cost is in force yet, or some products of the sum have none), and in totals
 *   `products-missing` (some are not forecast).
 */
export function forecastCsv(document: ForecastDocument): string {
  const products = document.products.map((product) => productRows(product, document.levels));
  const rows = [...products.flat(), ...totalRows(document, products)];
  return csvLine(header(document.levels)) + rows.map((row) => csvLine(cells(row))).join('');
}

function header(levels: readonly number[]): readonly string[] {
  const ends = levels.flatMap((level) => [`lower_${percent(level)}`, `upper_${percent(level)}`]);
  const cumulative = ['expected', ...ends].map((name) => `cumulative_${name}`);
  return [
    'product',
    'segment',
    'period',
    'expected',
    ...ends,
    ...cumulative,
    'expected_cost',
    'currency',
    'status',
  ];
}

/** `80`, `95.5`; levels have five decimals at most. */
function percent(level: number): string {
  return String(Number((level * 100).toFixed(3)));
}

function cells(row: ForecastRow): readonly (string | number | null)[] {
  return [
    row.product,
    row.segment,
    row.period,
    unitsText(row.expected, 2),
    ...row.interval,
    unitsText(row.cumulative, 2),
    ...row.cumulativeInterval,
    row.currency === null ? null : unitsText(row.cost, minorDigits(row.currency)),
    row.currency,
    row.status.length === 0 ? 'ok' : row.status.join(' '),
  ];
}
