import * as z from 'zod';
import type { CandidateFit, FitDocument, FitProduct } from '../records.js';
import {
  count,
  findings,
  notForecast,
  nullableNumber,
  nullableText,
  real,
  resolution,
  segment,
} from './schemas.js';

const candidate: z.ZodType<CandidateFit> = z.looseObject({
  family: z.string(),
  atRisk: nullableNumber,
  parameters: z.record(z.string(), real),
  standardErrors: z.record(z.string(), nullableNumber),
  intervals: z.record(
    z.string(),
    z.looseObject({
      level: real,
      lower: nullableNumber,
      upper: nullableNumber,
      method: z.literal('likelihood-ratio'),
    }),
  ),
  logLikelihood: nullableNumber,
  parameterCount: count,
  aicc: nullableNumber,
  bic: nullableNumber,
  weight: real,
  converged: z.boolean(),
  ruledOut: notForecast,
  chosenShare: nullableNumber,
});

const product: z.ZodType<FitProduct> = z.looseObject({
  product: z.string(),
  segment,
  resolution,
  units: count,
  returns: count,
  withdrawn: count,
  survivors: count,
  oldestAge: real,
  delayDays: real,
  delayReason: nullableText,
  warrantyMonths: nullableNumber,
  warrantyDays: nullableNumber,
  chosen: nullableText,
  notForecast,
  findings,
  candidates: z.array(candidate),
  nonparametricLevel: z.number(),
  nonparametric: z.array(
    z.looseObject({ age: real, probability: real, lower: real, upper: real, atRisk: real }),
  ),
  curves: z.array(
    z.looseObject({
      family: z.string(),
      atRisk: nullableNumber,
      ages: z.array(real),
      probability: z.array(real),
    }),
  ),
});

/** `fit.json` */
export const fitSchema: z.ZodType<FitDocument> = z.looseObject({
  schema: z.literal('returnfall/fit/1'),
  asOf: z.iso.date().nullable(),
  ageUnit: z.string(),
  products: z.array(product),
});
