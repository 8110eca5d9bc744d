import { type DayRange, daysPerMonth } from '../calendar.js';
import { type Config, cutOffOf, rulesOf, warrantyLimit } from '../config.js';
import { survivorsByCohort } from '../counts.js';
import type { AgeGroup, ProductRecords } from '../records.js';

/** Units that share one kernel: the chance, by bin of age, that a return at that age is compatible with what was seen. */
export interface Observed {
  readonly units: number;
  /** First bin with a chance above 0, and the chances from there on. */
  readonly first: number;
  readonly kernel: readonly number[];
  /** True for a survivor: from bin first + kernel.length on every age is compatible. */
  readonly open: boolean;
}

/** Width of a bin in days: a month, or the period of the records where that is a week or a quarter. */
export function binWidth(config: Config, records: ProductRecords): number {
  if (config.period === 'week') return 7;
  return config.period === 'quarter' && records.resolution === 'period' ? 3 * daysPerMonth : daysPerMonth;
}

/**
 * Bins that cover every age at risk; where the records know the day, quarters of them at first, since a density that starts
 * steeply is not constant over a month.
 */
export function binEdges(config: Config, records: ProductRecords): number[] {
  const width = binWidth(config, records);
  const whole = Array.from(
    { length: Math.ceil(oldestAtRisk(config, records) / width) + 1 },
    (_, i) => i * width,
  );
  if (records.resolution !== 'day' || whole.length < 3) return whole;
  return [...Array.from({ length: 8 }, (_, i) => (i * width) / 4), ...whole.slice(2)];
}

/** The oldest age at which a unit was still at risk. */
export function oldestAtRisk(config: Config, records: ProductRecords): number {
  const rules = rulesOf(config, records.product);
  const ages = records.cohorts.map(({ from }) =>
    Math.min(cutOffOf(config) - from, warrantyLimit(rules, from)),
  );
  return Math.max(0, ...ages);
}

/** Cells, withdrawn units and survivors of cohorts, with their kernels on the bins. */
export function fromCohorts(config: Config, records: ProductRecords, edges: readonly number[]): Observed[] {
  const limit = (cohort: DayRange) => warrantyLimit(rulesOf(config, records.product), cohort.from);
  const left = survivorsByCohort(records);
  const observed: Observed[] = [];
  for (const cell of records.returned) {
    const cohort = records.cohorts[cell.cohort] as DayRange;
    const within = (a: number, b: number) =>
      meanReturned(cohort, cell.to, a, b) - meanReturned(cohort, cell.from, a, b);
    observed.push(observe(edges, cell.quantity, cell.from - cohort.to, cell.to - cohort.from, within, false));
  }
  for (const cell of records.withdrawn) {
    const cohort = records.cohorts[cell.cohort] as DayRange;
    const age = Math.min(0.5 * (cell.from + cell.to - cohort.from - cohort.to), limit(cohort));
    const kept = (a: number, b: number) => 1 - meanReturned({ from: -0.5, to: 0.5 }, age, a, b);
    observed.push(observe(edges, cell.quantity, age - 0.5, age + 0.5, kept, true));
  }
  records.cohorts.forEach((cohort, i) => {
    const end = Math.min(cutOffOf(config), cohort.to + limit(cohort));
    const kept = (a: number, b: number) => 1 - meanReturned(cohort, end, a, b);
    observed.push(observe(edges, left[i] as number, end - cohort.to, end - cohort.from, kept, true));
  });
  return observed.filter((o) => o.units > 0);
}

/** Exact ages sit at the end of their bin; a survivor of that age is at risk in it. */
export function fromAges(ages: readonly AgeGroup[], edges: readonly number[]): Observed[] {
  const bin = (age: number) => edges.indexOf(age) - 1;
  return ages.map((group) => {
    if (group.outcome === 'surviving') {
      return { units: group.quantity, first: bin(group.to) + 1, kernel: [], open: true };
    }
    const first = group.exact ? bin(group.to) : bin(group.from) + 1;
    const kernel = Array.from({ length: bin(group.to) - first + 1 }, () => 1);
    return { units: group.quantity, first, kernel, open: false };
  });
}

/** Every age that occurs. */
export function ageEdges(ages: readonly AgeGroup[]): number[] {
  return [...new Set([0, ...ages.flatMap((group) => [group.from, group.to])])].sort((a, b) => a - b);
}

function observe(
  edges: readonly number[],
  units: number,
  from: number,
  to: number,
  chance: (a: number, b: number) => number,
  open: boolean,
): Observed {
  const first = Math.max(
    0,
    edges.findLastIndex((edge, i) => edge <= from && i < edges.length - 1),
  );
  const after = edges.findIndex((edge, i) => edge >= to && i >= first);
  const end = after < 0 ? edges.length - 1 : after;
  const kernel = Array.from({ length: end - first }, (_, i) =>
    Math.max(0, chance(edges[first + i] as number, edges[first + i + 1] as number)),
  );
  return { units, first, kernel, open };
}

/** Chance that a unit shipped within `shipped`, with its age at return uniform over [a, b), is returned by `until`. */
function meanReturned(shipped: DayRange, until: number, a: number, b: number): number {
  const width = shipped.to - shipped.from;
  const area = (x: number) => {
    if (x <= shipped.from) return 0;
    return x < shipped.to ? (x - shipped.from) ** 2 / (2 * width) : x - 0.5 * (shipped.from + shipped.to);
  };
  return (area(until - a) - area(until - b)) / (b - a);
}
