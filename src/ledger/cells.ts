import { isoDate } from '../calendar.js';
import { csvLine } from '../csv.js';
import type { Cell, Cohort, ProductRecords } from '../records.js';
import { segmentText } from '../segment.js';

/** Columns of `cells.csv`. */
export const cellColumns = [
  'product',
  'segment',
  'ship_from',
  'ship_to',
  'kind',
  'from',
  'to',
  'quantity',
] as const;

/**
 * `cells.csv`: cohorts, returns and withdrawals without loss. Dates are ISO 8601, `ship_to` and `to` the last day that
 * belongs; a row of kind `shipped` has no `from` and `to`.
 */
export function cellsCsv(products: readonly ProductRecords[]): string {
  return csvLine(cellColumns) + products.map(productLines).join('');
}

function productLines(records: ProductRecords): string {
  const name = [records.product, segmentText(records.segment)];
  const shipped = records.cohorts.map((cohort) =>
    csvLine([...name, ...days(cohort), 'shipped', null, null, cohort.shipped]),
  );
  const left = (kind: string, cells: readonly Cell[]) =>
    cells.map((cell) => {
      const cohort = records.cohorts[cell.cohort] as Cohort;
      return csvLine([...name, ...days(cohort), kind, ...days(cell), cell.quantity]);
    });
  return [...shipped, ...left('returned', records.returned), ...left('withdrawn', records.withdrawn)].join(
    '',
  );
}

function days({ from, to }: { readonly from: number; readonly to: number }): [string, string] {
  return [isoDate(from), isoDate(to - 1)];
}
