import * as z from 'zod';
import type { FileAccount, IntakeDocument, IntakeProduct, NevadaTable } from '../records.js';
import {
  count,
  findings,
  inputRole,
  notForecast,
  nullableText,
  periodKind,
  resolution,
  segment,
} from './schemas.js';

const files: z.ZodType<readonly FileAccount[]> = z.array(
  z.looseObject({
    file: z.string(),
    role: inputRole,
    bytes: count,
    sha256: z.string(),
    read: count,
    used: count,
    rejected: count,
    setAside: count,
    codes: z.record(z.string(), count),
    unusedColumns: z.array(z.string()),
  }),
);

const table: z.ZodType<NevadaTable> = z.looseObject({
  periods: z.array(z.string()),
  rows: z.array(
    z.looseObject({
      shippedIn: z.string(),
      from: z.int(),
      to: z.int(),
      shipped: count,
      returned: z.array(count),
      withdrawn: z.array(count),
      survivors: count,
    }),
  ),
});

const product: z.ZodType<IntakeProduct> = z.looseObject({
  product: z.string(),
  segment,
  resolution,
  units: count,
  returns: count,
  withdrawn: count,
  survivors: count,
  firstShipped: nullableText,
  lastShipped: nullableText,
  planned: z.array(z.looseObject({ from: z.iso.date(), to: z.iso.date(), quantity: count })),
  rejectedReturns: count,
  unusable: notForecast,
  table: table.nullable(),
  ages: z.array(
    z.looseObject({
      outcome: z.enum(['returned', 'surviving']),
      from: z.number(),
      to: z.number(),
      exact: z.boolean(),
      quantity: count,
    }),
  ),
});

/** `intake.json` */
export const intakeSchema: z.ZodType<IntakeDocument> = z.looseObject({
  schema: z.literal('returnfall/intake/1'),
  title: z.string(),
  asOf: z.iso.date().nullable(),
  period: periodKind,
  ageUnit: z.string(),
  files,
  products: z.array(product),
  findings,
});
