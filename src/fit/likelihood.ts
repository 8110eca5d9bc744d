import { integralsOn, windowProbability } from '../exposure/integrals.js';
import type { LaidWindows } from '../exposure/window.js';
import { type Family, type Jets, jetSize } from '../families/family.js';
import { type Surface, withinBounds } from '../math/maximise.js';
import type { AgeGroup } from '../records.js';
import type { LaidTerms, Terms } from './terms.js';

/** A Weibull shape between 0.01 and 100 where ages are grouped; beyond it no grid of ages resolves the distribution. */
const groupedSpread = { narrowest: 0.01, widest: 100 };
/** Exact ages need no grid. */
const exactSpread = { narrowest: 1e-5, widest: 100 };

/** The log likelihood (README, Method 2) in the free coordinates of a family; `counts` may be replaced between evaluations. */
export interface LogLikelihood extends Surface {
  /** Units (or random weights) behind each term, in the order of the terms. */
  readonly counts: Float64Array;
  /**
   * Where a maximum may lie: spreads of log age that the data can resolve, numbers that can be computed. A likelihood that
   * rises to the edge has no maximum worth the name.
   */
  readonly inside: (point: Float64Array) => boolean;
  /** The gradient of the log of each term for one unit: k numbers a term. */
  readonly scores: (point: Float64Array) => Float64Array;
}

/**
 * The log likelihood with gradient and Hessian: Σ r log P + Σ w log S_w + Σ survivors log S, and for known ages log density,
 * log (F(b) − F(a)) or log survival. Evaluation allocates nothing but what the family allocates.
 */
export function logLikelihood(terms: Terms, laid: LaidTerms, family: Family): LogLikelihood {
  const k = family.parameterNames.length;
  const counts = Float64Array.from(terms.counts);
  const gradient = new Float64Array(k);
  const hessian = new Float64Array(k * k);
  const integrals = integralsOn(laid.grid, k, laid.returned.curved || laid.kept.curved);
  const jet = new Float64Array(Math.max(16, jetSize(k)));
  const other = new Float64Array(jet.length);
  const logTo = Float64Array.from(terms.aged, (group) => Math.log(group.to));
  const eachWindow = (windows: LaidWindows, first: number, wanted: 'inside' | 'outside', visit: Visit) => {
    for (let w = 0; w < windows.count; w++) {
      windowProbability(windows, w, integrals, wanted, jet);
      takeLog(jet, k);
      visit(first + w, jet);
    }
  };
  const eachTerm = (point: Float64Array, visit: Visit) => {
    const jets = family.jetsAt(point);
    const first = laid.returned.count + laid.kept.count;
    if (first > 0) {
      integrals.evaluate(jets);
      eachWindow(laid.returned, 0, 'inside', visit);
      eachWindow(laid.kept, laid.returned.count, 'outside', visit);
    }
    for (let a = 0; a < terms.aged.length; a++) {
      agedTerm(terms.aged[a] as AgeGroup, logTo[a] as number, jets, k, jet, other);
      visit(first + a, jet);
    }
  };
  let value = 0;
  const add: Visit = (term) => {
    value += addJet(jet, counts[term] as number, k, gradient, hessian);
  };
  const evaluate = (point: Float64Array): number => {
    value = 0;
    gradient.fill(0);
    hessian.fill(0);
    eachTerm(point, add);
    mirror(hessian, k);
    return value;
  };
  const scores = (point: Float64Array): Float64Array => {
    const all = new Float64Array(counts.length * k);
    eachTerm(point, (term) => all.set(jet.subarray(1, 1 + k), term * k));
    return all;
  };
  const { narrowest, widest } = laid.returned.count > 0 ? groupedSpread : exactSpread;
  const inside = (point: Float64Array) => {
    const spread = family.spread(point);
    return spread > narrowest && spread < widest && withinBounds(point);
  };
  return { size: k, gradient, hessian, counts, inside, evaluate, scores };
}

/** Is shown every term with the jet of the log of its probability. */
type Visit = (term: number, jet: Float64Array) => void;

/** Turns the jet of a probability into the jet of its log. */
function takeLog(jet: Float64Array, k: number): void {
  const inverse = 1 / jet[0]!;
  for (let i = 1; i <= k; i++) jet[i] = jet[i]! * inverse;
  let second = 1 + k;
  for (let i = 1; i <= k; i++) {
    for (let j = i; j <= k; j++, second++) jet[second] = jet[second]! * inverse - jet[i]! * jet[j]!;
  }
  jet[0] = Math.log(jet[0]!);
}

/** Adds units times a jet that is a log already. */
function addJet(
  jet: Float64Array,
  units: number,
  k: number,
  gradient: Float64Array,
  hessian: Float64Array,
): number {
  let second = 1 + k;
  for (let i = 0; i < k; i++) {
    gradient[i] = (gradient[i] as number) + units * (jet[1 + i] as number);
    for (let j = i; j < k; j++, second++) {
      hessian[i * k + j] = (hessian[i * k + j] as number) + units * (jet[second] as number);
    }
  }
  return units * (jet[0] as number);
}

/** The jet of the log likelihood of one unit of a group, ages counted from the end of the delay. */
function agedTerm(
  group: AgeGroup,
  logTo: number,
  jets: Jets,
  k: number,
  out: Float64Array,
  other: Float64Array,
): void {
  if (group.outcome === 'surviving') jets.logSurvival(group.to, logTo, out);
  else if (group.exact) jets.logDensity(group.to, logTo, out);
  else betweenJet(group, logTo, jets, k, out, other);
}

/** log(F(b) − F(a)) = log S(a) + log(1 − exp(log S(b) − log S(a))); S(0) is 1. */
function betweenJet(
  group: AgeGroup,
  logTo: number,
  jets: Jets,
  k: number,
  out: Float64Array,
  other: Float64Array,
): void {
  jets.logSurvival(group.to, logTo, other);
  if (group.from > 0) jets.logSurvival(group.from, Math.log(group.from), out);
  else out.fill(0, 0, jetSize(k));
  const drop = (other[0] as number) - (out[0] as number);
  const ratio = Math.exp(drop);
  const missing = -Math.expm1(drop);
  const slope = -ratio / missing;
  const curve = slope / missing;
  let second = 1 + k;
  for (let i = 0; i < k; i++) {
    const di = (other[1 + i] as number) - (out[1 + i] as number);
    for (let j = i; j < k; j++, second++) {
      const dj = (other[1 + j] as number) - (out[1 + j] as number);
      const bent = (other[second] as number) - (out[second] as number);
      out[second] = (out[second] as number) + slope * bent + curve * di * dj;
    }
  }
  for (let i = 0; i < k; i++) {
    out[1 + i] = (out[1 + i] as number) + slope * ((other[1 + i] as number) - (out[1 + i] as number));
  }
  out[0] = (out[0] as number) + Math.log(missing);
}

function mirror(hessian: Float64Array, k: number): void {
  for (let i = 0; i < k; i++) for (let j = 0; j < i; j++) hessian[i * k + j] = hessian[j * k + i] as number;
}
