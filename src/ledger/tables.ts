import { parsePeriod } from '../calendar.js';
import { csvLine } from '../csv.js';
import type { IntakeDocument, TableRow } from '../records.js';

/**
 * `table.csv`: the Nevada-style table of every product that has a calendar, `product,shipped_in,shipped,<period>…`,
 * one row a ship period, a column for each return period of any product. It reads back as `--table`.
 */
export function tableCsv(document: IntakeDocument): string {
  return nevadaCsv(document, ({ returned }) => returned);
}

/** `table-withdrawn.csv`: the withdrawals in the layout of `tableCsv`; null when there are none. */
export function tableWithdrawnCsv(document: IntakeDocument): string | null {
  const any = document.products.some(({ withdrawn }) => withdrawn > 0);
  return any ? nevadaCsv(document, ({ withdrawn }) => withdrawn) : null;
}

function nevadaCsv(document: IntakeDocument, cells: (row: TableRow) => readonly number[]): string {
  const periods = allPeriods(document);
  const lines = [csvLine(['product', 'shipped_in', 'shipped', ...periods])];
  for (const { product, table } of document.products) {
    if (table === null) continue;
    const columns = periods.map((period) => table.periods.indexOf(period));
    for (const row of table.rows) {
      const quantities = columns.map((column) => cells(row)[column] ?? 0);
      lines.push(csvLine([product, row.shippedIn, row.shipped, ...quantities]));
    }
  }
  return lines.join('');
}

/** Labels of the return periods of all products, in the order of the calendar. */
function allPeriods(document: IntakeDocument): readonly string[] {
  const labels = new Set(document.products.flatMap(({ table }) => table?.periods ?? []));
  const firstDay = (label: string) => parsePeriod(label)?.from ?? Infinity;
  return [...labels].sort((a, b) => firstDay(a) - firstDay(b));
}
