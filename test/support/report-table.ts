/** Intake and history of the report fixture. */
import { addMonths, isoDate, periodLabel, periodOf } from '../../src/calendar.js';
import type { HistoryPeriod, IntakeProduct, NevadaTable, TableRow } from '../../src/records.js';
import { asOfEnd, type FixtureProduct, shareReturned } from './report-products.js';

/** What ingest would say of a product. */
export function intakeProduct(product: FixtureProduct): IntakeProduct {
  const table = nevadaTable(product);
  const units = table.rows.reduce((sum, row) => sum + row.shipped, 0);
  const survivors = table.rows.reduce((sum, row) => sum + row.survivors, 0);
  const withdrawn = table.rows.reduce((sum, row) => sum + row.withdrawn.reduce((a, b) => a + b, 0), 0);
  const planned = [{ from: '2026-11-01', to: '2026-11-30', quantity: product.planned }];
  return {
    product: product.product,
    segment: null,
    resolution: 'period',
    units,
    returns: units - survivors - withdrawn,
    withdrawn,
    survivors,
    firstShipped: isoDate(addMonths(asOfEnd, -product.months)),
    lastShipped: '2026-10-31',
    planned: product.planned === 0 ? [] : planned,
    rejectedReturns: product.planned === 0 ? 0 : 3,
    unusable: null,
    table,
    ages: [],
  };
}

/** Recorded and fitted returns by month. */
export function historyOf(product: FixtureProduct, table: NevadaTable): readonly HistoryPeriod[] {
  return table.periods.map((period, j) => {
    const range = periodOf((table.rows[j] as TableRow).from, 'month');
    const fitted = table.rows.reduce((sum, row) => {
      const share =
        shareReturned(product, range.from + 15 - row.from) -
        shareReturned(product, range.from - 15 - row.from);
      return sum + row.shipped * share;
    }, 0);
    return {
      period,
      from: isoDate(range.from),
      to: isoDate(range.to - 1),
      shipped: (table.rows[j] as TableRow).shipped,
      returned: table.rows.reduce((sum, row) => sum + (row.returned[j] as number), 0),
      fitted,
    };
  });
}

/** A deterministic wobble of ±25 % in place of chance. */
function wobble(i: number): number {
  return 1 + 0.25 * Math.sin(i * 12.9898);
}

function nevadaTable(product: FixtureProduct): NevadaTable {
  const starts = Array.from({ length: product.months }, (_, i) => addMonths(asOfEnd, i - product.months));
  return {
    periods: starts.map((day) => periodLabel(day, 'month')),
    rows: starts.map((_, i) => tableRow(product, starts, i)),
  };
}

function tableRow(product: FixtureProduct, starts: readonly number[], i: number): TableRow {
  const from = starts[i] as number;
  const shipped = Math.round(product.perMonth * wobble(i));
  const upTo = (j: number) => {
    const share = shareReturned(product, (starts[j] as number) + 15 - from);
    return j < i ? 0 : Math.round(shipped * share * (1 + 0.03 * Math.sin(3 * j + i)));
  };
  const returned = starts.map((_, j) => (j === 0 ? upTo(0) : Math.max(0, upTo(j) - upTo(j - 1))));
  const withdrawn = starts.map((_, j) => (j === i + 2 && i % 5 === 0 && product.perMonth > 100 ? 1 : 0));
  const survivors = shipped - [...returned, ...withdrawn].reduce((a, b) => a + b, 0);
  return {
    shippedIn: periodLabel(from, 'month'),
    from,
    to: addMonths(from, 1),
    shipped,
    returned,
    withdrawn,
    survivors,
  };
}
