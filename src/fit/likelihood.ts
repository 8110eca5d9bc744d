import { integralsOn, windowProbability } from '../exposure/integrals.js';
import type { LaidWindows } from '../exposure/window.js';
import { type Family, type Jets, jetSize } from '../families/family.js';
import type { Surface } from '../math/maximise.js';
import type { AgeGroup } from '../records.js';
import type { LaidTerms, Terms } from './terms.js';

const narrowest = 0.01;

/** The log likelihood of SPEC 6.2 in the free coordinates of a family; `counts` may be replaced between evaluations. */
export interface LogLikelihood extends Surface {
  /** Units (or random weights) behind each term, in the order of the terms. */
  readonly counts: Float64Array;
  /**
   * Where a maximum may lie. A spread of log age below 0.01 (a Weibull shape of 100) is narrower than any grid of ages
   * resolves; a likelihood that rises to there has no maximum worth the name.
   */
  readonly inside: (point: Float64Array) => boolean;
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
  const block = new Float64Array(Math.max(16, jetSize(k)));
  const other = new Float64Array(block.length);
  const add = (units: number) => addLog(block, units, k, gradient, hessian);
  const windows = (laidOut: LaidWindows, first: number, wanted: 'inside' | 'outside') => {
    let sum = 0;
    for (let w = 0; w < laidOut.count; w++) {
      windowProbability(laidOut, w, integrals, wanted, block);
      sum += add(counts[first + w] as number);
    }
    return sum;
  };
  const evaluate = (point: Float64Array): number => {
    gradient.fill(0);
    hessian.fill(0);
    const jets = family.jetsAt(point);
    let value = 0;
    if (laid.returned.count + laid.kept.count > 0) {
      integrals.evaluate(jets);
      value += windows(laid.returned, 0, 'inside');
      value += windows(laid.kept, laid.returned.count, 'outside');
    }
    const first = laid.returned.count + laid.kept.count;
    for (let a = 0; a < terms.aged.length; a++) {
      agedTerm(terms.aged[a] as AgeGroup, jets, k, block, other);
      value += addJet(block, counts[first + a] as number, k, gradient, hessian);
    }
    mirror(hessian, k);
    return value;
  };
  const inside = (point: Float64Array) =>
    family.spread(point) > narrowest && point.every((x) => Math.abs(x) <= 80);
  return { size: k, gradient, hessian, counts, inside, evaluate };
}

/** Adds units · log P for a block holding P and its derivatives; returns the value's part. */
function addLog(
  block: Float64Array,
  units: number,
  k: number,
  gradient: Float64Array,
  hessian: Float64Array,
): number {
  const p = block[0] as number;
  const scaled = units / p;
  let second = 1 + k;
  for (let i = 0; i < k; i++) {
    const first = block[1 + i] as number;
    gradient[i] = (gradient[i] as number) + scaled * first;
    for (let j = i; j < k; j++, second++) {
      const bent = (block[second] as number) - (first * (block[1 + j] as number)) / p;
      hessian[i * k + j] = (hessian[i * k + j] as number) + scaled * bent;
    }
  }
  return units * Math.log(p);
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
function agedTerm(group: AgeGroup, jets: Jets, k: number, out: Float64Array, other: Float64Array): void {
  if (group.outcome === 'surviving') jets.logSurvival(group.to, Math.log(group.to), out);
  else if (group.exact) jets.logDensity(group.to, Math.log(group.to), out);
  else betweenJet(group, jets, k, out, other);
}

/** log(F(b) − F(a)) = log S(a) + log(1 − exp(log S(b) − log S(a))); S(0) is 1. */
function betweenJet(group: AgeGroup, jets: Jets, k: number, out: Float64Array, other: Float64Array): void {
  jets.logSurvival(group.to, Math.log(group.to), other);
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
