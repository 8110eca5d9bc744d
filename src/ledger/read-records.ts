import type { Cell, Cohort, IntakeDocument, IntakeProduct, ProductRecords } from '../records.js';
import { productKey, segmentText } from '../segment.js';
import { alteredFile } from './altered.js';
import { cellColumns } from './cells.js';
import { readLeftCsv } from './read-csv.js';
import { byRange, type CellRow, quantityIn, rangeIn, rangeKey } from './read-range.js';

const file = 'cells.csv';

/**
 * The records of every product: cohorts and cells from cells.csv, the rest from intake.json.
 * @throws UserError exit 3 when the cells are damaged or do not add up to what intake.json counts.
 */
export function readRecords(cells: string, document: IntakeDocument): readonly ProductRecords[] {
  const keyOf = ({ product, segment }: IntakeProduct) => productKey(product, segmentText(segment));
  const byProduct = new Map<string, CellRow[]>(document.products.map((product) => [keyOf(product), []]));
  for (const row of readLeftCsv(file, cells, cellColumns)) {
    const list = byProduct.get(productKey(row.cells.product, row.cells.segment));
    if (list === undefined) {
      const message = `unknown product ${row.cells.product}, not in intake.json`;
      throw alteredFile(file, message, row.line);
    }
    list.push(row);
  }
  return document.products.map((product) => recordsOf(product, byProduct.get(keyOf(product)) ?? []));
}

function recordsOf(product: IntakeProduct, rows: readonly CellRow[]): ProductRecords {
  const kinds = { shipped: [] as CellRow[], returned: [] as CellRow[], withdrawn: [] as CellRow[] };
  for (const row of rows) kinds[kindOf(row)].push(row);
  const cohorts = kinds.shipped.map(cohortIn).sort(byRange);
  const position = new Map(cohorts.map((cohort, i) => [rangeKey(cohort), i]));
  const cellsIn = (list: readonly CellRow[]) =>
    list.map((row) => cellIn(row, position)).sort((a, b) => a.cohort - b.cohort || byRange(a, b));
  const records = {
    product: product.product,
    segment: product.segment,
    resolution: product.resolution,
    cohorts,
    returned: cellsIn(kinds.returned),
    withdrawn: cellsIn(kinds.withdrawn),
    planned: product.planned.map(({ from, to, quantity }) => ({
      ...rangeIn(file, from, to),
      shipped: quantity,
    })),
    ages: product.ages,
    rejectedReturns: product.rejectedReturns,
    unusable: product.unusable,
  };
  checkSums(product, records);
  return records;
}

function kindOf({ cells: { kind }, line }: CellRow): 'shipped' | 'returned' | 'withdrawn' {
  if (kind === 'shipped' || kind === 'returned' || kind === 'withdrawn') return kind;
  throw alteredFile(file, `invalid kind ${kind}, allowed shipped, returned or withdrawn`, line);
}

function cohortIn(row: CellRow): Cohort {
  const { ship_from, ship_to } = row.cells;
  return { ...rangeIn(file, ship_from, ship_to, row.line), shipped: quantityIn(file, row) };
}

function cellIn(row: CellRow, position: ReadonlyMap<string, number>): Cell {
  const { ship_from, ship_to, from, to } = row.cells;
  const cohort = position.get(rangeKey(rangeIn(file, ship_from, ship_to, row.line)));
  if (cohort === undefined) {
    throw alteredFile(file, `invalid ship_from ${ship_from}, no row says what was shipped then`, row.line);
  }
  return { cohort, ...rangeIn(file, from, to, row.line), quantity: quantityIn(file, row) };
}

/** Units, returns and withdrawals must be those that intake.json counts, and no cohort may lose more than it has. */
function checkSums(product: IntakeProduct, records: ProductRecords): void {
  const left = records.cohorts.map(({ shipped }) => shipped);
  for (const { cohort, quantity } of [...records.returned, ...records.withdrawn]) {
    left[cohort] = (left[cohort] ?? 0) - quantity;
  }
  const returnedAges = records.ages.filter(({ outcome }) => outcome === 'returned');
  const sums = [
    ['units', sum(records.cohorts, 'shipped') + sum(records.ages, 'quantity'), product.units],
    ['returns', sum(records.returned, 'quantity') + sum(returnedAges, 'quantity'), product.returns],
    ['withdrawals', sum(records.withdrawn, 'quantity'), product.withdrawn],
  ] as const;
  for (const [name, found, counted] of sums) {
    if (found !== counted) {
      const message = `invalid ${name} of ${product.product}: ${found} here and ${counted} in intake.json`;
      throw alteredFile(file, message);
    }
  }
  if (new Set(records.cohorts.map(rangeKey)).size < records.cohorts.length || left.some((n) => n < 0)) {
    throw alteredFile(
      file,
      `invalid cohorts of ${product.product}: more left than was shipped, or one stands twice`,
    );
  }
}

function sum<K extends string>(list: readonly Readonly<Record<K, number>>[], key: K): number {
  return list.reduce((total, item) => total + item[key], 0);
}
