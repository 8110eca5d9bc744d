import { type DayRange, parsePeriod } from '../calendar.js';
import { csvLine } from '../csv.js';
import type { IntakeDocument, TableRow } from '../records.js';

/**
 * `table.csv`: the Nevada-style table of every product that has a calendar, `product,shipped_in,shipped,<period>…`,
 * one row a ship period, a column for each return period of any product, empty where it ends before the shipment. It
 * reads back as `--table`.
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
  const lines = [csvLine(['product', 'shipped_in', 'shipped', ...periods.map(({ label }) => label)])];
  for (const { product, table } of document.products) {
    if (table === null) continue;
    const column = new Map(table.periods.map((period, i) => [period, i]));
    for (const row of table.rows) {
      const quantities = periods.map(({ label, to }) =>
        to <= row.from ? null : (cells(row)[column.get(label) ?? -1] ?? 0),
      );
      lines.push(csvLine([product, row.shippedIn, row.shipped, ...quantities]));
    }
  }
  return lines.join('');
}

/** The return periods of all products, in the order of the calendar. */
function allPeriods(document: IntakeDocument): readonly (DayRange & { readonly label: string })[] {
  const labels = new Set(document.products.flatMap(({ table }) => table?.periods ?? []));
  return [...labels]
    .flatMap((label) => {
      const days = parsePeriod(label);
      return days === null ? [] : [{ label, ...days }];
    })
    .sort((a, b) => a.from - b.from);
}
