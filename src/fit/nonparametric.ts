import { type DayRange, daysPerMonth } from '../calendar.js';
import { type Config, cutOffOf, rulesOf, warrantyLimit } from '../config.js';
import { normalQuantile } from '../math/chi-square.js';
import type { NonparametricPoint, ProductRecords } from '../records.js';

/** Units that share one kernel: the chance, by bin of age, that a return at that age is compatible with what was seen. */
interface Observed {
  readonly units: number;
  /** First bin with a chance above 0, and the chances from there on. */
  readonly first: number;
  readonly kernel: readonly number[];
  /** True for a survivor: from bin first + kernel.length on every age is compatible. */
  readonly open: boolean;
}

const level = 0.95;

/**
 * Self-consistent estimate of the share returned by age (SPEC 6.7): a density that is constant within each bin of age, in
 * which each cell and survivor contributes its kernel, by the EM algorithm. With exact ages it is the product-limit
 * estimate (Kaplan & Meier 1958). The interval is Greenwood's on the log(−log) scale with the expected returns and
 * units at risk of the last step.
 */
export function nonparametricEstimate(config: Config, records: ProductRecords): NonparametricPoint[] {
  const dated = records.resolution !== 'age';
  const edges = dated ? monthlyEdges(config, records) : ageEdges(records);
  const observed = dated ? fromCohorts(config, records, edges) : fromAges(records, edges);
  if (edges.length < 2) return [];
  return pointsOf(edges, selfConsistent(observed, edges.length - 1));
}

interface BinCounts {
  readonly returned: Float64Array;
  readonly atRisk: Float64Array;
}

/** Iterates expected returns and units at risk by bin until the shares returned stand still. */
function selfConsistent(observed: readonly Observed[], bins: number): BinCounts {
  let mass: Float64Array = new Float64Array(bins).fill(1 / (bins + 1));
  for (let iteration = 0; ; iteration++) {
    const counts = expectedCounts(observed, mass);
    const next = massOf(counts);
    const change = next.reduce((most, p, i) => Math.max(most, Math.abs(p - (mass[i] as number))), 0);
    mass = next;
    if (change < 1e-12 || iteration === 20000) return counts;
  }
}

/** One E-step. A survivor beyond its last partial bin is censored there: at risk before it and silent after it. */
function expectedCounts(observed: readonly Observed[], mass: Float64Array): BinCounts {
  const bins = mass.length;
  const returned = new Float64Array(bins);
  const leaving = new Float64Array(bins + 1);
  const survival = survivalOf(mass);
  for (const { units, first, kernel, open } of observed) {
    const end = first + kernel.length;
    const beyond = open ? (survival[end] as number) : 0;
    let total = beyond;
    for (let i = 0; i < kernel.length; i++) total += (kernel[i] as number) * (mass[first + i] as number);
    if (total <= 0) continue;
    for (let i = 0; i < kernel.length; i++) {
      const share = (units * (kernel[i] as number) * (mass[first + i] as number)) / total;
      returned[first + i] = (returned[first + i] as number) + share;
      leaving[first + i + 1] = (leaving[first + i + 1] as number) + share;
    }
    leaving[end] = (leaving[end] as number) + (units * beyond) / total;
  }
  const atRisk = new Float64Array(bins);
  let risk = observed.reduce((sum, o) => sum + o.units, 0);
  for (let i = 0; i < bins; i++) {
    risk -= leaving[i] as number;
    atRisk[i] = Math.max(0, risk);
  }
  return { returned, atRisk };
}

function massOf({ returned, atRisk }: BinCounts): Float64Array {
  let survival = 1;
  return returned.map((d, i) => {
    const hazard = (atRisk[i] as number) > 0 ? Math.min(1, d / (atRisk[i] as number)) : 0;
    const mass = survival * hazard;
    survival *= 1 - hazard;
    return mass;
  });
}

/** Survival at the start of each bin, and at the end of the last. */
function survivalOf(mass: Float64Array): Float64Array {
  const survival = new Float64Array(mass.length + 1);
  survival[0] = 1;
  for (let i = 0; i < mass.length; i++) survival[i + 1] = (survival[i] as number) - (mass[i] as number);
  return survival;
}

function pointsOf(edges: readonly number[], { returned, atRisk }: BinCounts): NonparametricPoint[] {
  const z = normalQuantile(0.5 + level / 2);
  let logSurvival = 0;
  let variance = 0;
  const points: NonparametricPoint[] = [];
  for (let i = 0; i + 1 < edges.length; i++) {
    const [d, n] = [returned[i] as number, atRisk[i] as number];
    if (n < 0.5 || d >= n) break;
    logSurvival += Math.log1p(-d / n);
    variance += d / (n * (n - d));
    const spread = logSurvival === 0 ? 0 : (z * Math.sqrt(variance)) / Math.abs(logSurvival);
    points.push({
      age: edges[i + 1] as number,
      probability: -Math.expm1(logSurvival),
      lower: -Math.expm1(logSurvival * Math.exp(-spread)),
      upper: -Math.expm1(logSurvival * Math.exp(spread)),
      atRisk: n,
    });
  }
  return points;
}

/** Bins of one month (of one week where the periods are weeks) up to the oldest age at risk. */
function monthlyEdges(config: Config, records: ProductRecords): number[] {
  const rules = rulesOf(config, records.product);
  const cutOff = cutOffOf(config);
  const width = config.period === 'week' ? 7 : daysPerMonth;
  const oldest = records.cohorts.reduce(
    (age, cohort) => Math.max(age, Math.min(cutOff - cohort.from, warrantyLimit(rules, cohort.from))),
    0,
  );
  return Array.from({ length: Math.ceil(oldest / width) + 1 }, (_, i) => i * width);
}

function fromCohorts(config: Config, records: ProductRecords, edges: readonly number[]): Observed[] {
  const limit = (cohort: DayRange) => warrantyLimit(rulesOf(config, records.product), cohort.from);
  const left = records.cohorts.map((cohort) => cohort.shipped);
  const observed: Observed[] = [];
  for (const cell of records.returned) {
    const cohort = records.cohorts[cell.cohort] as DayRange;
    const within = (a: number, b: number) =>
      meanReturned(cohort, cell.to, a, b) - meanReturned(cohort, cell.from, a, b);
    observed.push(observe(edges, cell.quantity, cell.from - cohort.to, cell.to - cohort.from, within, false));
    left[cell.cohort] = (left[cell.cohort] as number) - cell.quantity;
  }
  for (const cell of records.withdrawn) {
    const cohort = records.cohorts[cell.cohort] as DayRange;
    const age = Math.min(0.5 * (cell.from + cell.to - cohort.from - cohort.to), limit(cohort));
    const kept = (a: number, b: number) => 1 - meanReturned({ from: -0.5, to: 0.5 }, age, a, b);
    observed.push(observe(edges, cell.quantity, age - 0.5, age + 0.5, kept, true));
    left[cell.cohort] = (left[cell.cohort] as number) - cell.quantity;
  }
  records.cohorts.forEach((cohort, i) => {
    const end = Math.min(cutOffOf(config), cohort.to + limit(cohort));
    const kept = (a: number, b: number) => 1 - meanReturned(cohort, end, a, b);
    observed.push(observe(edges, left[i] as number, end - cohort.to, end - cohort.from, kept, true));
  });
  return observed.filter((o) => o.units > 0);
}

/** Exact ages sit at the end of their bin; a survivor of that age is at risk in it. */
function fromAges(records: ProductRecords, edges: readonly number[]): Observed[] {
  const bin = (age: number) => edges.indexOf(age) - 1;
  return records.ages.map((group) => {
    if (group.outcome === 'surviving') {
      return { units: group.quantity, first: bin(group.to) + 1, kernel: [], open: true };
    }
    const first = group.exact ? bin(group.to) : bin(group.from) + 1;
    const kernel = Array.from({ length: bin(group.to) - first + 1 }, () => 1);
    return { units: group.quantity, first, kernel, open: false };
  });
}

function ageEdges(records: ProductRecords): number[] {
  return [...new Set([0, ...records.ages.flatMap((group) => [group.from, group.to])])].sort((a, b) => a - b);
}

function observe(
  edges: readonly number[],
  units: number,
  from: number,
  to: number,
  chance: (a: number, b: number) => number,
  open: boolean,
): Observed {
  const bins = edges.length - 1;
  const width = (edges[1] as number) - (edges[0] as number);
  const first = Math.max(0, Math.min(bins - 1, Math.floor(from / width)));
  const end = Math.max(first, Math.min(bins, Math.ceil(to / width)));
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
