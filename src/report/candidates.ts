/** The table of candidate distributions. */
import { familyLabel } from '../family-label.js';
import type { CandidateFit, CandidateForecast, FitProduct, ParameterInterval } from '../records.js';
import {
  criterionText,
  expectedColumn,
  measureText,
  percentColumn,
  percentText,
  weightText,
} from './numbers.js';
import { plural } from './period-words.js';

/** What tells one candidate from another. */
type Candidate = Pick<CandidateFit, 'family' | 'atRisk'>;

/** `Weibull`, `lognormal with a share at risk`. */
export function candidateName(candidate: Candidate): string {
  const name = familyLabel(candidate.family);
  return candidate.atRisk === null ? name : `${name} with a share at risk`;
}

/** Whether this is the candidate that was chosen: the best of its family that is not ruled out. */
export function isChosen(fit: FitProduct, candidate: Candidate): boolean {
  const best = fit.candidates.find((c) => c.family === fit.chosen && c.ruledOut === null);
  return best !== undefined && same(best, candidate);
}

/** Rows of partials/candidates.hbs, in the order of the fit. @param ageUnit unit of the ages, `day`. */
export function candidateRows(fit: FitProduct, forecasts: readonly CandidateForecast[], ageUnit: string) {
  const own = fit.candidates.map((candidate) => forecasts.find((forecast) => same(forecast, candidate)));
  const next = expectedColumn(own.map((forecast) => forecast?.nextPeriod ?? null));
  const horizon = expectedColumn(own.map((forecast) => forecast?.horizon ?? null));
  const until = expectedColumn(own.map((forecast) => forecast?.untilWarrantyEnds ?? null));
  const chosenShare = percentColumn(fit.candidates.map((candidate) => candidate.chosenShare));
  return fit.candidates.map((candidate, i) => ({
    name: candidateName(candidate),
    chosen: isChosen(fit, candidate),
    parameters: parameterTexts(candidate, ageUnit),
    logLikelihood: criterionText(candidate.logLikelihood),
    aicc: criterionText(candidate.aicc),
    weight: candidate.ruledOut === null ? weightText(candidate.weight) : 'none',
    chosenShare: chosenShare(candidate.chosenShare),
    nextPeriod: next(own[i]?.nextPeriod ?? null),
    horizon: horizon(own[i]?.horizon ?? null),
    untilWarrantyEnds: until(own[i]?.untilWarrantyEnds ?? null),
    ruledOut: candidate.ruledOut?.message ?? null,
  }));
}

/** `95 %`, the level of the intervals of the parameters; null where there is none. */
export function parameterLevel(fit: FitProduct): string | null {
  const levels = fit.candidates.flatMap((candidate) =>
    Object.values(candidate.intervals).map((interval) => interval.level),
  );
  return levels[0] === undefined ? null : percentText(levels[0]);
}

function same(a: Candidate, b: Candidate): boolean {
  return a.family === b.family && (a.atRisk === null) === (b.atRisk === null);
}

function parameterTexts(candidate: CandidateFit, ageUnit: string) {
  const values = Object.entries(candidate.parameters).sort(shapeFirst);
  const share =
    candidate.atRisk === null || 'atRisk' in candidate.parameters ? [] : [['atRisk', candidate.atRisk]];
  return [...values, ...(share as [string, number][])].map(([name, value]) => {
    const interval = candidate.intervals[name];
    return {
      name: parameterName(candidate.family, name),
      value: measureText(value),
      unit: parameterUnit(candidate.family, name, plural(ageUnit)),
      interval: interval === undefined ? null : boundsText(interval),
    };
  });
}

/** An interval that may be open on either side. */
function boundsText({ lower, upper }: ParameterInterval): string {
  if (lower === null) return upper === null ? 'not bounded' : `below ${measureText(upper)}`;
  return upper === null ? `above ${measureText(lower)}` : `${measureText(lower)} to ${measureText(upper)}`;
}

/** A Weibull and a gamma distribution are read shape before scale; the others keep the order of the fit. */
function shapeFirst([a]: readonly [string, number], [b]: readonly [string, number]): number {
  return a === 'scale' && b === 'shape' ? 1 : a === 'shape' && b === 'scale' ? -1 : 0;
}

function parameterName(family: string, parameter: string): string {
  if (parameter === 'atRisk') return 'share at risk';
  return family === 'weibull' && parameter === 'scale' ? 'scale (characteristic life)' : parameter;
}

/** The scale of some families is an age; lognormal and loglogistic are set on the logarithm of age. */
function parameterUnit(family: string, parameter: string, ages: string): string {
  if (['lognormal', 'loglogistic'].includes(family) && parameter !== 'atRisk') return `(of log ${ages})`;
  const ofAge = ['exponential', 'weibull', 'gamma'].includes(family);
  return parameter === 'scale' && ofAge ? ages : '';
}
