import { type Config, cutOffOf, rulesOf, warrantyLimit } from '../config.js';
import { momentsOf } from '../exposure/moments.js';
import { returnedBy } from '../exposure/window.js';
import type { Family } from '../families/family.js';
import type { Cell, HistoryPeriod, ProductRecords } from '../records.js';
import { firstAndLast, pastColumns } from './columns.js';

/**
 * Shipped and returned units by period up to the as-of date, and what a distribution expects of the units as they stood
 * at the start of each period: Σ units at risk · P(period) / S(start). Null family: no expectation. A record counts in
 * the period that holds it; ingest refuses those that none holds.
 */
export function historyOf(
  config: Config,
  records: ProductRecords,
  chosen: { readonly family: Family; readonly free: Float64Array } | null,
): HistoryPeriod[] {
  const first = records.cohorts[0];
  if (first === undefined) return [];
  const columns = pastColumns(config, first.from);
  const periodAt = (day: number) => columns.findIndex(({ days }) => day < days.to);
  const shipped = new Float64Array(columns.length);
  const returned = new Float64Array(columns.length);
  for (const cohort of records.cohorts) add(shipped, periodAt(lastDay(config, cohort.to)), cohort.shipped);
  for (const cell of records.returned) add(returned, periodAt(lastDay(config, cell.to)), cell.quantity);
  const ends = [first.from, ...columns.map(({ days }) => days.to)];
  const fitted = chosen === null ? null : expectedByPeriod(config, records, chosen, ends);
  return columns.map(({ label, days }, j) => ({
    period: label,
    ...firstAndLast(days),
    shipped: shipped[j] as number,
    returned: returned[j] as number,
    fitted: fitted === null ? null : (fitted[j] as number),
  }));
}

function expectedByPeriod(
  config: Config,
  records: ProductRecords,
  chosen: { readonly family: Family; readonly free: Float64Array },
  ends: readonly number[],
): Float64Array {
  const expected = new Float64Array(ends.length - 1);
  const rules = rulesOf(config, records.product);
  const windows = records.cohorts.map((cohort) =>
    ends.map((end) => returnedBy(cohort, end, warrantyLimit(rules, cohort.from))),
  );
  const { rows, evaluate } = momentsOf(windows, rules.delayDays, 'fit');
  const { outside } = evaluate(chosen.family.jetsAt(chosen.free));
  const exits = exitsByCohort(records);
  records.cohorts.forEach((cohort, i) => {
    let atRisk = cohort.shipped;
    const gone = exits[i] as Cell[];
    for (let j = 0, next = 0; j + 1 < ends.length; j++) {
      for (; next < gone.length && (gone[next] as Cell).to <= (ends[j] as number); next++) {
        atRisk -= (gone[next] as Cell).quantity;
      }
      const [before, after] = [0, 1].map((step) => outside[rows[i]?.[j + step] as number]) as [
        number,
        number,
      ];
      if (before > 0) add(expected, j, (atRisk * (before - after)) / before);
    }
  });
  return expected;
}

/** Returned and withdrawn cells by cohort, in the order of their ends. */
function exitsByCohort(records: ProductRecords): Cell[][] {
  const exits: Cell[][] = records.cohorts.map(() => []);
  for (const cell of [...records.returned, ...records.withdrawn]) exits[cell.cohort]?.push(cell);
  for (const list of exits) list.sort((a, b) => a.to - b.to);
  return exits;
}

function lastDay(config: Config, to: number): number {
  return Math.min(to, cutOffOf(config)) - 1;
}

function add(to: Float64Array, j: number, value: number): void {
  to[j] = (to[j] as number) + value;
}
