import * as z from 'zod';
import type { CandidateForecast, ForecastDocument, ForecastProduct, ForecastTotal } from '../records.js';
import {
  count,
  findings,
  notForecast,
  nullableNumber,
  nullableText,
  periodKind,
  real,
  segment,
} from './schemas.js';

const predicted = { expected: real, plugIn: real, quantiles: z.record(z.string(), real) };

const totalPeriod = {
  period: z.string(),
  from: nullableText,
  to: nullableText,
  partial: z.boolean(),
  ...predicted,
  cumulative: z.looseObject(predicted),
  planned: z.looseObject({ expected: real, plugIn: real }),
};

const costs = z.array(z.looseObject({ currency: z.string(), expectedCost: real }));

const history = z.array(
  z.looseObject({
    period: z.string(),
    from: z.string(),
    to: z.string(),
    shipped: real,
    returned: real,
    fitted: nullableNumber,
  }),
);

const candidate: z.ZodType<CandidateForecast> = z.looseObject({
  family: z.string(),
  atRisk: nullableNumber,
  weight: real,
  ruledOut: notForecast,
  nextPeriod: real,
  horizon: real,
  untilWarrantyEnds: nullableNumber,
});

const product: z.ZodType<ForecastProduct> = z.looseObject({
  product: z.string(),
  segment,
  chosen: nullableText,
  notForecast,
  method: z
    .looseObject({
      draws: count,
      parameters: z.enum(['pivotal', 'direct']),
      restarted: count,
      counts: z.literal('multinomial'),
      assumes: z.string(),
    })
    .nullable(),
  currency: nullableText,
  periods: z.array(z.looseObject({ ...totalPeriod, expectedCost: nullableNumber })),
  untilWarrantyEnds: z.looseObject(predicted).nullable(),
  byCandidate: z.array(candidate),
  history,
  ifRejectedWereReal: nullableNumber,
  findings,
});

const total: z.ZodType<ForecastTotal> = z.looseObject({
  periods: z.array(z.looseObject({ ...totalPeriod, costs })),
  untilWarrantyEnds: z.looseObject(predicted).nullable(),
  productsIncluded: z.array(z.string()),
  productsMissing: z.array(z.string()),
  costs,
  history,
});

/** `forecast.json` */
export const forecastSchema: z.ZodType<ForecastDocument> = z.looseObject({
  schema: z.literal('returnfall/forecast/1'),
  asOf: z.iso.date().nullable(),
  period: periodKind,
  horizon: count,
  levels: z.array(z.number()),
  products: z.array(product),
  total,
});
