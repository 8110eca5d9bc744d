import { type DayRange, type PeriodKind, periodLabel, periodOf, periodsIn } from '../calendar.js';
import type { Cell, NevadaTable, ProductRecords, TableRow } from '../records.js';

/**
 * The Nevada-style table of a product: a row for every period with shipments, a column for every period from the first of them to
 * the as-of date. Cohorts and cells belong to the period that holds them; ingest refuses those that none holds.
 */
export function nevadaTable(records: ProductRecords, kind: PeriodKind, cutOff: number): NevadaTable {
  const first = records.cohorts[0];
  if (first === undefined) return { periods: [], rows: [] };
  const columns = periodsIn({ from: first.from, to: cutOff }, kind);
  const column = new Map(columns.map(({ from }, i) => [from, i]));
  const rows = new Map<number, RowInTheMaking>();
  const rowOf = records.cohorts.map(({ from, shipped }) => {
    const period = periodOf(from, kind);
    const row = rows.get(period.from) ?? emptyRow(period, columns.length);
    rows.set(period.from, row);
    row.shipped += shipped;
    return row;
  });
  const place = (kindOfCell: 'returned' | 'withdrawn', cell: Cell) => {
    const counts = (rowOf[cell.cohort] as RowInTheMaking)[kindOfCell];
    const at = column.get(periodOf(cell.to - 1, kind).from) as number;
    counts[at] = (counts[at] as number) + cell.quantity;
  };
  for (const cell of records.returned) place('returned', cell);
  for (const cell of records.withdrawn) place('withdrawn', cell);
  return {
    periods: columns.map(({ from }) => periodLabel(from, kind)),
    rows: [...rows.values()].map((row) => finished(row, kind)),
  };
}

interface RowInTheMaking {
  readonly period: DayRange;
  shipped: number;
  readonly returned: number[];
  readonly withdrawn: number[];
}

function emptyRow(period: DayRange, width: number): RowInTheMaking {
  const zeros = () => new Array<number>(width).fill(0);
  return { period, shipped: 0, returned: zeros(), withdrawn: zeros() };
}

function finished({ period, shipped, returned, withdrawn }: RowInTheMaking, kind: PeriodKind): TableRow {
  const left = [...returned, ...withdrawn].reduce((sum, units) => sum + units, 0);
  const shippedIn = periodLabel(period.from, kind);
  return {
    from: period.from,
    to: period.to,
    shippedIn,
    shipped,
    returned,
    withdrawn,
    survivors: shipped - left,
  };
}
