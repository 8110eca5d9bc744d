/** Fitted candidates, curves and nonparametric points of the report fixture. */
import type { CandidateFit, Curve, NonparametricPoint } from '../../src/records.js';

const month = 30.4375;

function share(days: number, shape: number, scale: number): number {
  return -Math.expm1(-((days / scale) ** shape));
}

/** Weibull chosen, lognormal beside it, exponential ruled out. */
export function fixtureCandidates(shape: number, scale: number): readonly CandidateFit[] {
  const common = { atRisk: null, parameterCount: 2, converged: true, chosenShare: null } as const;
  return [
    {
      ...common,
      family: 'weibull',
      parameters: { shape, scale },
      standardErrors: { shape: 0.06, scale: 310.2 },
      intervals: {
        shape: { level: 0.95, lower: shape * 0.92, upper: shape * 1.09, method: 'likelihood-ratio' },
        scale: { level: 0.95, lower: scale * 0.8, upper: scale * 1.3, method: 'likelihood-ratio' },
      },
      logLikelihood: -2871.4,
      aicc: 5746.8,
      bic: 5754.9,
      weight: 0.74,
      ruledOut: null,
      chosenShare: 0.7,
    },
    {
      ...common,
      family: 'lognormal',
      parameters: { location: Math.log(scale), scale: 1.2 },
      standardErrors: { location: 0.1, scale: null },
      intervals: { location: { level: 0.95, lower: 7.9, upper: null, method: 'likelihood-ratio' } },
      logLikelihood: -2872.45,
      aicc: 5748.9,
      bic: 5757,
      weight: 0.26,
      ruledOut: null,
      chosenShare: 0.3,
    },
    {
      ...common,
      family: 'exponential',
      parameters: { scale: scale * 1.5 },
      standardErrors: { scale: 400 },
      intervals: {},
      logLikelihood: -2890.1,
      parameterCount: 1,
      aicc: 5782.2,
      bic: 5786,
      weight: 0,
      ruledOut: { code: 'not-converged', message: 'the maximum was not found; try other candidates' },
    },
  ];
}

/** Shares returned on a grid of ages up to four months beyond the oldest unit. */
export function fixtureCurves(shape: number, scale: number, months: number): readonly Curve[] {
  const ages = Array.from({ length: 60 }, (_, i) => (i / 59) * (months + 4) * month);
  return [
    { family: 'weibull', atRisk: null, ages, probability: ages.map((age) => share(age, shape, scale)) },
    {
      family: 'lognormal',
      atRisk: null,
      ages,
      probability: ages.map((age) => 0.85 * share(age, shape * 0.9, scale)),
    },
    { family: 'exponential', atRisk: null, ages, probability: ages.map((age) => share(age, 1, scale * 1.5)) },
  ];
}

/** A point a month, its interval widening as fewer units are as old. */
export function fixturePoints(
  shape: number,
  scale: number,
  months: number,
  units: number,
): readonly NonparametricPoint[] {
  return Array.from({ length: months }, (_, i) => {
    const age = (i + 1) * month;
    const probability = share(age, shape, scale) * (1 + 0.04 * Math.sin(i));
    const atRisk = Math.round(units * (1 - i / months));
    const spread = 2 * Math.sqrt((probability * (1 - probability)) / Math.max(atRisk, 1));
    return {
      age,
      probability,
      lower: Math.max(0, probability - spread),
      upper: Math.min(1, probability + spread),
      atRisk,
    };
  });
}
