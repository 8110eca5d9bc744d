import { familyNamed } from '../families/index.js';
import type { CandidateFit, Finding, NonparametricPoint } from '../records.js';

/** Share of the ages outside the nonparametric interval from which on a curve is said to leave it. */
const noticed = 0.2;

/** A Weibull shape above 20 is more often a fault of the data than of the units (common practice). */
export function steepShape(candidates: readonly CandidateFit[]): Finding[] {
  const shape = candidates.find((candidate) => candidate.family === 'weibull')?.parameters.shape;
  if (shape === undefined || shape <= 20) return [];
  const message =
    `the Weibull shape is ${shape.toFixed(1)}, above 20: look for a wrong time origin, mixed units or too few returns, ` +
    'and prefer a normal or lognormal distribution (common practice)';
  return [{ code: 'steep-shape', severity: 'warning', message }];
}

/** The chosen curve lies outside the interval of the nonparametric estimate at many ages: it does not follow the records. */
export function leavesEstimate(
  best: CandidateFit | undefined,
  points: readonly NonparametricPoint[],
  delay: number,
): Finding[] {
  if (best === undefined || best.ruledOut !== null) return [];
  const family = familyNamed(best.family);
  const life = family.at(family.free(family.parameterNames.map((name) => best.parameters[name] as number)));
  const share = (age: number) => (age > delay ? Math.exp(life.logCdf(age - delay)) : 0);
  const judged = points.filter((point) => point.upper > point.lower);
  const outside = judged.filter(({ age, lower, upper }) => share(age) < lower || share(age) > upper);
  if (outside.length < 2 || outside.length < noticed * judged.length) return [];
  const message =
    `the chosen ${best.family} distribution lies outside the 95 % interval of the nonparametric estimate at ` +
    `${outside.length} of ${judged.length} ages: the records have another shape than any candidate, such as a share of the ` +
    'units that alone can fail, or units of several kinds; look at the curves before using the forecast';
  return [{ code: 'curve-leaves-estimate', severity: 'warning', message }];
}
