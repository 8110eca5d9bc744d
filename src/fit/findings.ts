import { freeOf } from '../families/family.js';
import { familyNamed } from '../families/index.js';
import { familyLabel } from '../family-label.js';
import type { CandidateFit, Finding, NonparametricPoint } from '../records.js';
import { nonparametricLevel } from './nonparametric.js';

/** Share of the ages outside the nonparametric interval from which on a curve is said to leave it. */
const noticed = 0.2;
/** The interval is stretched by this for the purpose: by itself it holds 95 % at one age, not at all of them together. */
const stretch = 1.4;
/** Log likelihood by which a candidate that is ruled out may be ahead of the chosen one before it is said, or forbids. */
const ahead = { said: 3, forbidding: 10 };

/** A candidate that is ruled out for its fit, and how far its log likelihood is above the best one that stands. */
export interface BetterRuledOut {
  readonly candidate: CandidateFit;
  readonly by: number;
  /** So far that a forecast without it would mislead. */
  readonly forbids: boolean;
}

/** The best of the candidates that were ruled out although they follow the records better; null when none does. */
export function betterRuledOut(candidates: readonly CandidateFit[]): BetterRuledOut | null {
  const best = candidates.find((candidate) => candidate.ruledOut === null)?.logLikelihood ?? null;
  if (best === null) return null;
  const others = candidates
    .filter(({ ruledOut }) => ruledOut !== null && ruledOut.code !== 'too-few-returns')
    .map((candidate) => ({ candidate, by: (candidate.logLikelihood ?? -Infinity) - best }))
    .sort((a, b) => b.by - a.by);
  const first = others[0];
  return first === undefined || first.by <= ahead.said
    ? null
    : { ...first, forbids: first.by > ahead.forbidding };
}

/** Says that a candidate which was ruled out follows the records better than the chosen one. */
export function ruledOutAhead(candidates: readonly CandidateFit[]): Finding[] {
  const better = betterRuledOut(candidates);
  if (better === null) return [];
  const { candidate, by } = better;
  const message =
    `the ${familyLabel(candidate.family)} distribution was ruled out (${candidate.ruledOut?.message}) and yet follows the records ` +
    `better than any that stands, by ${by.toFixed(1)} in log likelihood: look at the curves before using the forecast`;
  return [{ code: 'ruled-out-fits-better', severity: 'warning', message }];
}

/** A Weibull shape above 20 is more often a fault of the data than of the units (common practice). */
export function steepShape(candidates: readonly CandidateFit[]): Finding[] {
  const shape = candidates.find((candidate) => candidate.family === 'weibull')?.parameters.shape;
  if (shape === undefined || shape <= 20) return [];
  const message =
    `the Weibull shape is ${shape.toFixed(1)}, above 20: look for a wrong time origin, mixed units or too few returns, ` +
    'and prefer a normal or lognormal distribution (common practice)';
  return [{ code: 'steep-shape', severity: 'warning', message }];
}

/**
 * The chosen curve lies outside the interval of the nonparametric estimate at many ages: it does not follow the records.
 * @param fromAge ages up to this one are not judged: the estimate is rough where ages are known to a month only.
 */
export function leavesEstimate(
  best: CandidateFit | undefined,
  points: readonly NonparametricPoint[],
  delay: number,
  fromAge: number,
): Finding[] {
  if (best === undefined || best.ruledOut !== null) return [];
  const family = familyNamed(best.family);
  const life = family.at(freeOf(family, best.parameters));
  const share = (age: number) => (age > delay ? Math.exp(life.logCdf(age - delay)) : 0);
  const judged = points.filter((point) => point.upper > point.lower && point.age > fromAge);
  const outside = judged.filter(({ age, probability, lower, upper }) => {
    const distance = share(age) - probability;
    return distance < stretch * (lower - probability) || distance > stretch * (upper - probability);
  });
  if (outside.length < 2 || outside.length < noticed * judged.length) return [];
  const message =
    `the chosen ${familyLabel(best.family)} distribution lies well outside the ${Math.round(100 * nonparametricLevel)} % interval of the nonparametric estimate at ` +
    `${outside.length} of ${judged.length} ages: the records have another shape than any candidate, such as a share of the ` +
    'units that alone can fail, or units of several kinds; look at the curves before using the forecast';
  return [{ code: 'curve-leaves-estimate', severity: 'warning', message }];
}
