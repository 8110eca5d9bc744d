/** Worked predictions of counts, typed. README.md beside says what the marks mean. */
import { type Parameters, readJson } from './load.js';

/** `memory`: recalled from the literature, and computed anew from the data; `computed`: no published figure seen. */
export interface Marked {
  readonly mark: 'memory' | 'computed';
}

/** Bounds for a count, one-sided, of 95 %, by the way in which the parameters are drawn. */
export type Bounds = Readonly<
  Record<'plugIn' | 'calibrated' | 'direct' | 'pivotal', Marked & { readonly count: number }>
>;

/** Units of one age, of which some have failed, and how many fail in the months that follow under a Weibull fit. */
export interface OneAge {
  readonly name: string;
  readonly units: number;
  readonly failures: number;
  readonly ageMonths: number;
  readonly nextMonths: number;
  /** Printed by the source, the scale in months. */
  readonly parameters: Parameters;
  readonly conditionalProbability: number;
  readonly expected: number;
  readonly upper95: Bounds;
  readonly lower95: Bounds;
}

/** A sample of fits.json, and how many of its units fail in the hours that follow under its Weibull fit. */
export interface ManyAges {
  readonly name: string;
  readonly dataSet: string;
  readonly nextHours: number;
  readonly atRisk: readonly (readonly [hours: number, units: number])[];
  readonly conditionalProbabilities: Marked & { readonly values: readonly number[] };
  readonly conditionalProbabilitiesPrinted: Marked & { readonly values: readonly number[] };
  readonly expected: Marked & { readonly value: number };
  readonly expectedPublished: Marked & { readonly value: number };
  readonly countDistribution: Marked & { readonly from: number; readonly cdf: readonly number[] };
  readonly upper95: Bounds;
}

/** The same sample over a long horizon, where the families part. */
export interface ByFamily {
  readonly name: string;
  readonly dataSet: string;
  readonly nextHours: number;
  readonly expected: Parameters;
  readonly akaikeWeights: Parameters;
  readonly logLikelihoodDifference: number;
}

/** One-sided 95 % limits for the failures of the next exposure, `exposureRatio` times that of the past. */
export interface RateLimits {
  readonly exposureRatio: number;
  readonly byFailures: readonly (readonly [failures: number, lower: number, upper: number])[];
}

/** The examples of predictions.json, each under a name of its own. */
export function loadPredictions(): {
  readonly oneAge: OneAge;
  readonly manyAges: ManyAges;
  readonly byFamily: ByFamily;
  readonly constantRate: readonly RateLimits[];
} {
  const { examples, constantRate } = readJson<Stored>('predictions.json');
  const [oneAge, manyAges, byFamily] = examples;
  return { oneAge, manyAges, byFamily, constantRate: constantRate.limits };
}

interface Stored {
  readonly examples: readonly [OneAge, ManyAges, ByFamily];
  readonly constantRate: { readonly limits: readonly RateLimits[] };
}
