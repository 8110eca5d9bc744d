import type { Config } from '../config.js';
import type { Cohort, Finding, Progress, Source } from '../records.js';
import {
  badQuantity,
  dateOf,
  isWellFormed,
  missingValue,
  productAt,
  type Row,
  refOf,
  textAt,
  wholeNumber,
} from './cells.js';
import { findColumns } from './columns.js';
import { type DateReader, dateReader } from './dates.js';
import type { Fleet } from './fleet.js';
import { byteProgress } from './progress.js';
import { readRows } from './rows.js';
import { type FileTally, newTally, rejectRow, setAsideRow } from './tally.js';

/** Planned shipments by product, and the accounts of their files. */
export interface Plans {
  readonly plans: ReadonlyMap<string, readonly Cohort[]>;
  readonly tallies: readonly FileTally[];
  readonly findings: readonly Finding[];
}

/**
 * Reads the planned shipments. A period that the as-of day falls into is taken as its rest: the quantity is what is still to be
 * shipped. Periods that are over are set aside.
 */
export async function readPlans(
  config: Config,
  sources: readonly Source[],
  cutOff: number,
  fleet: Fleet,
  progress: Progress,
): Promise<Plans> {
  const plans = new Map<string, Cohort[]>();
  let rests = 0;
  const tallies = sources.map((source) => newTally(source, 'plan'));
  const readDate = dateReader(config.plan.dateFormat);
  for (const tally of tallies) {
    const begin = (header: string[]) => {
      tally.columns = findColumns('plan', tally.source.name, header, config.plan);
      return (cells: string[], line: number) => {
        const planned = readPlanned(tally, { cells, line }, cutOff, fleet, readDate);
        if (planned === null) return;
        const { product, cohort, isRest } = planned;
        if (isRest) rests++;
        if (!plans.get(product)?.push(cohort)) plans.set(product, [cohort]);
      };
    };
    tally.read = await readRows(
      tally.source,
      config.plan.encoding,
      begin,
      await byteProgress(tally, progress),
    );
  }
  const sorted = [...plans].map(([product, cohorts]) => [product, merged(cohorts)] as const);
  return { plans: new Map(sorted), tallies, findings: restFindings(rests) };
}

function restFindings(rests: number): Finding[] {
  const message = `${rests} planned rows are of a period that the as-of date cuts; their quantity is taken as still to be shipped`;
  return rests === 0 ? [] : [{ code: 'plan-of-cut-period', severity: 'note', message }];
}

/** Cohorts sorted, those of equal days as one. */
function merged(cohorts: readonly Cohort[]): Cohort[] {
  const sorted = [...cohorts].sort((a, b) => a.from - b.from || a.to - b.to);
  const list: Cohort[] = [];
  for (const cohort of sorted) {
    const last = list.at(-1);
    const same = last !== undefined && last.from === cohort.from && last.to === cohort.to;
    if (same) list[list.length - 1] = { ...last, shipped: last.shipped + cohort.shipped };
    else list.push(cohort);
  }
  return list;
}

function readPlanned(
  tally: FileTally,
  row: Row,
  cutOff: number,
  fleet: Fleet,
  readDate: DateReader,
): { product: string; cohort: Cohort; isRest: boolean } | null {
  if (!isWellFormed(tally, row)) return null;
  const at = (field: string) => tally.columns?.at(field) ?? -1;
  const product = productAt(tally, row, at('product'));
  if (product === '') return missingValue(tally, row, 'product');
  const period = dateOf(tally, row, 'ship_period', at('ship_period'), readDate);
  if (period === null) return null;
  const text = textAt(row, at('quantity'));
  if (text === '') return missingValue(tally, row, 'quantity');
  const shipped = wholeNumber(text);
  if (shipped === null || shipped <= 0) {
    return badQuantity(tally, row, 'quantity', text, 'it must be a whole number above 0');
  }
  if (period.to <= cutOff) {
    setAsideRow(refOf(tally, row), 'before-as-of', 'ship_period', 'the period ends by the as-of date');
    return null;
  }
  if (!fleet.products.has(product)) {
    rejectRow(
      refOf(tally, row),
      'unknown-product',
      'product',
      `product ${product} was not shipped by the as-of date`,
    );
    return null;
  }
  const cohort = { from: Math.max(period.from, cutOff), to: period.to, shipped };
  return { product, cohort, isRest: period.from < cutOff };
}
