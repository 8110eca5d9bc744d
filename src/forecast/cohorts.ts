import type { DayRange } from '../calendar.js';
import { type Config, cutOffOf, rulesOf, warrantyLimit } from '../config.js';
import { survivorsByCohort } from '../counts.js';
import type { Precision } from '../exposure/grid.js';
import { type BothSides, momentsOf } from '../exposure/moments.js';
import { returnedBy } from '../exposure/window.js';
import type { ProductRecords } from '../records.js';
import type { Column } from './columns.js';
import type { Exposed, ExposedGroup } from './exposed.js';

/**
 * The survivors of every cohort, and planned shipments, over the columns of the forecast. Each distinct moment
 * of a cohort's life is evaluated once a distribution.
 */
export function exposedCohorts(
  config: Config,
  records: ProductRecords,
  columns: readonly Column[],
  precision: Precision,
): Exposed {
  const rules = rulesOf(config, records.product);
  const shipped = survivors(records);
  const cohorts = [
    ...shipped,
    ...records.planned.map((cohort) => ({ cohort, units: cohort.shipped, planned: true })),
  ];
  const limited = rules.warrantyMonths !== null || rules.warrantyDays !== null;
  const ends = [cutOffOf(config), ...columns.map((column) => column.days.to)];
  const horizon = ends.at(-1) as number;
  const windows = cohorts.map(({ cohort }) => {
    const limit = warrantyLimit(rules, cohort.from);
    const last = limited ? Math.max(cohort.to + limit, horizon) : horizon;
    return [...ends, last].map((moment) => returnedBy(cohort, moment, limit));
  });
  const moments = momentsOf(windows, rules.delayDays, precision);
  const width = columns.length + 1;
  const chances = new Float64Array(cohorts.length * width);
  return {
    groups: cohorts.map(({ units, planned }): ExposedGroup => ({ units, planned })),
    periods: columns.length,
    columns: width,
    limited,
    chances: (jets) => {
      const probabilities = moments.evaluate(jets);
      moments.rows.forEach((row, g) => {
        conditional(row, probabilities, chances, g * width);
      });
      return chances;
    },
  };
}

/** Chances by column given survival to the first moment, from whichever side of the cdf is the smaller. */
function conditional(
  row: readonly number[],
  { inside, outside }: BothSides,
  out: Float64Array,
  at: number,
): void {
  const alive = outside[row[0] as number] as number;
  for (let j = 1; j < row.length; j++) {
    const [before, after] = [row[j - 1] as number, row[j] as number];
    const late = (outside[before] as number) < 0.5;
    const gained = late
      ? (outside[before] as number) - (outside[after] as number)
      : (inside[after] as number) - (inside[before] as number);
    out[at + j - 1] = alive > 0 ? Math.max(0, gained) / alive : j === 1 ? 1 : 0;
  }
}

/** Survivors by cohort; cohorts without any are left out. */
function survivors(records: ProductRecords): { cohort: DayRange; units: number; planned: boolean }[] {
  const left = survivorsByCohort(records);
  return records.cohorts
    .map((cohort, i) => ({ cohort, units: left[i] as number, planned: false }))
    .filter(({ units }) => units > 0);
}
