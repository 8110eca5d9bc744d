import type { DayRange } from '../calendar.js';
import { type Config, cutOffOf, rulesOf, warrantyLimit } from '../config.js';
import { ageGrid, type Precision } from '../exposure/grid.js';
import { integralsOn, windowProbability } from '../exposure/integrals.js';
import { layWindows, returnedBy, type Window } from '../exposure/window.js';
import type { Jets } from '../families/family.js';
import type { ProductRecords } from '../records.js';
import type { Column } from './columns.js';
import type { Exposed, ExposedGroup } from './exposed.js';

/**
 * The survivors of every cohort, and planned shipments, over the columns of the forecast (SPEC 6.5). Each distinct moment
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
  const moments = [cutOffOf(config), ...columns.map((column) => column.days.to)];
  const windows = distinctWindows();
  const indices = cohorts.map(({ cohort }) => {
    const limit = warrantyLimit(rules, cohort.from);
    const last = limited ? cohort.to + limit : (moments.at(-1) as number);
    return [...moments, Math.max(last, moments.at(-1) as number)].map((moment) =>
      windows.index(returnedBy(cohort, moment, limit)),
    );
  });
  const both = boundaryProbabilities(windows.list, rules.delayDays, precision);
  const width = columns.length + 1;
  const chances = new Float64Array(cohorts.length * width);
  return {
    groups: cohorts.map(({ units, planned }): ExposedGroup => ({ units, planned })),
    periods: columns.length,
    columns: width,
    limited,
    chances: (jets) => {
      const probabilities = both(jets);
      indices.forEach((row, g) => {
        conditional(row, probabilities, chances, g * width);
      });
      return chances;
    },
  };
}

/** Windows kept once each, and the index of any that is asked for. */
function distinctWindows(): { readonly list: Window[]; readonly index: (window: Window) => number } {
  const list: Window[] = [];
  const places = new Map<string, number>();
  const index = (window: Window) => {
    const place = places.get(window.key) ?? list.push(window) - 1;
    places.set(window.key, place);
    return place;
  };
  return { list, index };
}

interface BothSides {
  readonly inside: Float64Array;
  readonly outside: Float64Array;
}

/** The probability of a return by each moment, and of none, each to its own relative accuracy. */
function boundaryProbabilities(
  windows: readonly Window[],
  delay: number,
  precision: Precision,
): (jets: Jets) => BothSides {
  const grid = ageGrid(
    windows.flatMap((window) => window.knots),
    delay,
    precision,
  );
  const laid = layWindows(windows, grid);
  const integrals = integralsOn(grid, 0, false);
  const inside = new Float64Array(windows.length);
  const outside = new Float64Array(windows.length);
  const block = new Float64Array(1);
  return (jets) => {
    integrals.evaluate(jets);
    for (let w = 0; w < windows.length; w++) {
      windowProbability(laid, w, integrals, 'inside', block);
      inside[w] = block[0] as number;
      windowProbability(laid, w, integrals, 'outside', block);
      outside[w] = block[0] as number;
    }
    return { inside, outside };
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
  const left = records.cohorts.map((cohort) => cohort.shipped);
  for (const cell of [...records.returned, ...records.withdrawn]) {
    left[cell.cohort] = (left[cell.cohort] as number) - cell.quantity;
  }
  return records.cohorts
    .map((cohort, i) => ({ cohort, units: left[i] as number, planned: false }))
    .filter(({ units }) => units > 0);
}
