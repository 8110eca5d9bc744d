import { compareText } from '../../csv.js';
import type { AgeGroup, IntakeDocument, IntakeProduct, NevadaTable, TableRow } from '../../records.js';
import { nameOf } from './names.js';
import { type Align, alignColumns, numberText, plainNumber, printable } from './text.js';

/**
 * The Nevada-style table of every product, to be read on a terminal.
 * @param width characters a line; where the table is wider, the newest return periods are kept and the older are summed.
 */
export function tableText(document: IntakeDocument, width: number): string {
  const blocks = document.products.map((product) => [title(product), ...body(product, document, width)]);
  return blocks.map((lines) => `${lines.join('\n')}\n`).join('\n');
}

function title(product: IntakeProduct): string {
  const { units, returns, withdrawn, survivors } = product;
  const counts = `${numberText(units)} units, ${numberText(returns)} returns, ${numberText(withdrawn)} withdrawn`;
  return `${nameOf(product)}: ${counts}, ${numberText(survivors)} survivors`;
}

function body(product: IntakeProduct, document: IntakeDocument, width: number): string[] {
  if (product.table === null) return ageLines(product.ages, document.ageUnit);
  const kept = keptPeriods(product.table, width);
  const lines = tableLines(product.table, kept);
  const left = product.table.periods.length - kept;
  if (left === 0) return lines;
  const first = product.table.periods[0] ?? '';
  const last = product.table.periods[left - 1] ?? '';
  return [...lines, `earlier: ${left} return periods, ${first} to ${last} (all in table.csv, with --out)`];
}

/** The greatest number of newest periods whose table is no wider than `width`, at least one. */
function keptPeriods(table: NevadaTable, width: number): number {
  for (let kept = table.periods.length; kept > 1; kept--) {
    if (Math.max(...tableLines(table, kept).map((line) => line.length)) <= width) return kept;
  }
  return 1;
}

function tableLines(table: NevadaTable, kept: number): string[] {
  const left = table.periods.length - kept;
  const earlier = left > 0 ? ['earlier'] : [];
  const withdrawn = table.rows.some((row) => sum(row.withdrawn) > 0) ? ['withdrawn'] : [];
  const shown = table.periods.slice(left);
  const years = shown.map((label, at) =>
    label.slice(0, 4) === shown[at - 1]?.slice(0, 4) ? '' : label.slice(0, 4),
  );
  const heads = [
    ['', '', ...earlier.map(() => ''), ...years, ...withdrawn.map(() => ''), ''],
    ['shipped in', 'shipped', ...earlier, ...shown.map((p) => p.slice(5)), ...withdrawn, 'survivors'],
  ];
  const rows = table.rows.map((row) => cells(row, table.periods, left, withdrawn.length > 0));
  const aligns: Align[] = ['left', ...Array<Align>(heads[0]?.length ?? 1).fill('right')];
  return alignColumns([...heads, ...rows], aligns.slice(0, heads[0]?.length));
}

/** No unit can return before the period it was shipped in: those cells are blank, none returned is a dot. */
function cells(row: TableRow, periods: readonly string[], left: number, withdrawn: boolean): string[] {
  const cell = (count: number, at: number) => {
    if (count > 0) return numberText(count);
    return compareText(periods[left + at] ?? '', row.shippedIn) < 0 ? '' : '.';
  };
  return [
    row.shippedIn,
    numberText(row.shipped),
    ...(left > 0 ? [numberText(sum(row.returned.slice(0, left)))] : []),
    ...row.returned.slice(left).map(cell),
    ...(withdrawn ? [numberText(sum(row.withdrawn))] : []),
    numberText(row.survivors),
  ];
}

function ageLines(ages: readonly AgeGroup[], unit: string): string[] {
  const rows = ages.map((group) => [
    group.outcome,
    plainNumber(group.from),
    group.from === group.to ? '' : plainNumber(group.to),
    numberText(group.quantity),
  ]);
  const head = ['outcome', `age (${printable(unit)})`, 'to', 'quantity'];
  return alignColumns([head, ...rows], ['left', 'right', 'right', 'right']);
}

function sum(values: readonly number[]): number {
  return values.reduce((total, value) => total + value, 0);
}
