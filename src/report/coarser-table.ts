/** A Nevada-style table that a page can hold: long ones are shown by quarter or by year. */
import { parsePeriod, periodLabel } from '../calendar.js';
import type { NevadaTable, TableRow } from '../records.js';

/** Columns a reader can still follow. */
const mostColumns = 48;

/** The table as it is, or summed to the first coarser period that has at most 48; `grouping` is then `quarter`, `year`. */
export function coarserTable(table: NevadaTable): { table: NevadaTable; grouping: string | null } {
  if (table.periods.length <= mostColumns) return { table, grouping: null };
  const byQuarter = summed(table, quarterOf);
  if (byQuarter.periods.length <= mostColumns) return { table: byQuarter, grouping: 'quarter' };
  return { table: summed(table, (label) => label.slice(0, 4)), grouping: 'year' };
}

/** The quarter that a period belongs to; a week belongs where its Thursday is. */
function quarterOf(label: string): string {
  const range = parsePeriod(label);
  return range === null ? label : periodLabel(Math.min(range.from + 3, range.to - 1), 'quarter');
}

function summed(table: NevadaTable, groupOf: (label: string) => string): NevadaTable {
  const periods = [...new Set(table.periods.map(groupOf))];
  const columnOf = table.periods.map((label) => periods.indexOf(groupOf(label)));
  const labels = [...new Set(table.rows.map((row) => groupOf(row.shippedIn)))];
  const rows = labels.map((label) => {
    const members = table.rows.filter((row) => groupOf(row.shippedIn) === label);
    return sumRows(label, members, columnOf, periods.length);
  });
  return { periods, rows };
}

function sumRows(
  shippedIn: string,
  rows: readonly TableRow[],
  columnOf: readonly number[],
  columns: number,
): TableRow {
  const total = (pick: (row: TableRow) => number) => rows.reduce((sum, row) => sum + pick(row), 0);
  const byColumn = (pick: (row: TableRow) => readonly number[]) => {
    const sums = new Array<number>(columns).fill(0);
    for (const row of rows) {
      for (const [i, units] of pick(row).entries())
        sums[columnOf[i] ?? 0] = (sums[columnOf[i] ?? 0] ?? 0) + units;
    }
    return sums;
  };
  return {
    shippedIn,
    from: Math.min(...rows.map((row) => row.from)),
    to: Math.max(...rows.map((row) => row.to)),
    shipped: total((row) => row.shipped),
    returned: byColumn((row) => row.returned),
    withdrawn: byColumn((row) => row.withdrawn),
    survivors: total((row) => row.survivors),
  };
}
