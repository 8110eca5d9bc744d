import { type Config, rulesOf } from '../config.js';
import { normalQuantile } from '../math/chi-square.js';
import type { NonparametricPoint, ProductRecords } from '../records.js';
import { ageEdges, binEdges, fromAges, fromCohorts, type Observed, oldestAtRisk } from './kernels.js';
import { cappedAges } from './terms.js';

/** Level of the pointwise interval. */
export const nonparametricLevel = 0.95;

/**
 * Self-consistent estimate of the share returned by age (after Turnbull 1976): a density that is constant within each bin of age, in
 * which each cell and survivor contributes its kernel, by the EM algorithm. With exact ages it is the product-limit
 * estimate (Kaplan & Meier 1958). The interval is Greenwood's on the log(−log) scale with the expected returns and
 * units at risk of the last step.
 */
export function nonparametricEstimate(config: Config, records: ProductRecords): NonparametricPoint[] {
  if (records.resolution === 'age') {
    const ages = cappedAges(records.ages, rulesOf(config, records.product).warrantyDays ?? Infinity);
    const edges = ageEdges(ages);
    return pointsOf(edges, Infinity, selfConsistent(fromAges(ages, edges), edges.length - 1));
  }
  const edges = binEdges(config, records);
  const counts = selfConsistent(fromCohorts(config, records, edges), edges.length - 1);
  return pointsOf(edges, oldestAtRisk(config, records), counts);
}

interface BinCounts {
  /** Expected returns and units at risk, those included that are only imputed to a bin in which a unit was lost from sight. */
  readonly returned: Float64Array;
  readonly atRisk: Float64Array;
  /** Units at risk that were really watched: a unit lost from sight within a bin counts for the part before. */
  readonly watched: Float64Array;
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
  const unseen = new Float64Array(bins);
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
      if (!open) continue;
      const reached = (units * (kernel[i] as number) * (survival[first + i] as number)) / total;
      unseen[first + i] = (unseen[first + i] as number) + Math.min(units, reached);
    }
    leaving[end] = (leaving[end] as number) + (units * beyond) / total;
  }
  const atRisk = new Float64Array(bins);
  let risk = observed.reduce((sum, o) => sum + o.units, 0);
  for (let i = 0; i < bins; i++) {
    risk -= leaving[i] as number;
    atRisk[i] = Math.max(0, risk);
  }
  const watched = atRisk.map((n, i) => Math.max(0, n - (unseen[i] as number)));
  return { returned, atRisk, watched };
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

function pointsOf(edges: readonly number[], oldest: number, counts: BinCounts): NonparametricPoint[] {
  const z = normalQuantile(0.5 + nonparametricLevel / 2);
  let logSurvival = 0;
  let variance = 0;
  const points: NonparametricPoint[] = [];
  for (let i = 0; i + 1 < edges.length && (edges[i + 1] as number) <= oldest; i++) {
    const hazard = (counts.returned[i] as number) / (counts.atRisk[i] as number);
    const watched = counts.watched[i] as number;
    if (!(watched >= 0.5 && hazard < 1)) break;
    logSurvival += Math.log1p(-hazard);
    variance += hazard / (watched * (1 - hazard));
    const spread = logSurvival === 0 ? 0 : (z * Math.sqrt(variance)) / Math.abs(logSurvival);
    points.push({
      age: edges[i + 1] as number,
      probability: -Math.expm1(logSurvival),
      lower: -Math.expm1(logSurvival * Math.exp(-spread)),
      upper: -Math.expm1(logSurvival * Math.exp(spread)),
      atRisk: watched,
    });
  }
  return points;
}
