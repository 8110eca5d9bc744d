/** The table of candidate distributions. */
import type { CandidateFit, CandidateForecast, FitProduct, ParameterInterval } from '../records.js';
import { criterionText, expectedText, measureText, percentText, weightText } from './numbers.js';

/** What tells one candidate from another. */
type Candidate = Pick<CandidateFit, 'family' | 'atRisk'>;

/** `Weibull`, `lognormal with a share at risk`. */
export function candidateName(candidate: Candidate): string {
  const name = candidate.family === 'weibull' ? 'Weibull' : candidate.family.replaceAll('-', ' ');
  return candidate.atRisk === null ? name : `${name} with a share at risk`;
}

/** Whether this is the candidate that was chosen: the best of its family that is not ruled out. */
export function isChosen(fit: FitProduct, candidate: Candidate): boolean {
  const best = fit.candidates.find((c) => c.family === fit.chosen && c.ruledOut === null);
  return best !== undefined && same(best, candidate);
}

/** Rows of partials/candidates.hbs, in the order of the fit. @param ageUnit unit of the ages, `day`. */
export function candidateRows(fit: FitProduct, forecasts: readonly CandidateForecast[], ageUnit: string) {
  return fit.candidates.map((candidate) => {
    const own = forecasts.find((forecast) => same(forecast, candidate));
    return {
      name: candidateName(candidate),
      chosen: isChosen(fit, candidate),
      parameters: parameterTexts(candidate, ageUnit),
      logLikelihood: criterionText(candidate.logLikelihood),
      aicc: criterionText(candidate.aicc),
      weight: candidate.ruledOut === null ? weightText(candidate.weight) : 'none',
      chosenShare: percentText(candidate.chosenShare),
      nextPeriod: expectedText(own?.nextPeriod ?? null),
      horizon: expectedText(own?.horizon ?? null),
      untilWarrantyEnds: expectedText(own?.untilWarrantyEnds ?? null),
      ruledOut: candidate.ruledOut?.message ?? null,
    };
  });
}

function same(a: Candidate, b: Candidate): boolean {
  return a.family === b.family && (a.atRisk === null) === (b.atRisk === null);
}

function parameterTexts(candidate: CandidateFit, ageUnit: string) {
  const values = Object.entries(candidate.parameters);
  const share =
    candidate.atRisk === null || 'atRisk' in candidate.parameters ? [] : [['atRisk', candidate.atRisk]];
  return [...values, ...(share as [string, number][])].map(([name, value]) => {
    const interval = candidate.intervals[name];
    return {
      name: name === 'atRisk' ? 'share at risk' : name,
      value: measureText(value),
      unit: hasAgeUnit(candidate.family, name) ? `${ageUnit}s` : '',
      interval: interval === undefined ? null : boundsText(interval),
      level: interval === undefined ? null : percentText(interval.level),
    };
  });
}

/** An interval that may be open on either side. */
function boundsText({ lower, upper }: ParameterInterval): string {
  if (lower === null) return upper === null ? 'not bounded' : `below ${measureText(upper)}`;
  return upper === null ? `above ${measureText(lower)}` : `${measureText(lower)} to ${measureText(upper)}`;
}

/** The families whose scale is an age; the others have theirs on the logarithm of age. */
function hasAgeUnit(family: string, parameter: string): boolean {
  return parameter === 'scale' && ['exponential', 'weibull', 'gamma', 'birnbaum-saunders'].includes(family);
}
