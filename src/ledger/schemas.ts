import * as z from 'zod';
import type { Finding, NotForecast, Segment } from '../records.js';

/** A whole number of 0 or more. */
export const count = z.int().min(0);

/** A number; null, which stands for a non-finite one in JSON, reads as NaN. */
export const real = z
  .number()
  .nullable()
  .transform((value) => value ?? Number.NaN);

export const nullableText = z.string().nullable();
export const nullableNumber = z.number().nullable();

export const segment: z.ZodType<Segment | null> = z.record(z.string(), z.string()).nullable();

export const notForecast: z.ZodType<NotForecast | null> = z
  .looseObject({ code: z.string(), message: z.string() })
  .nullable();

export const findings: z.ZodType<readonly Finding[]> = z.array(
  z.looseObject({ code: z.string(), severity: z.enum(['note', 'warning']), message: z.string() }),
);

export const resolution = z.enum(['day', 'period', 'age']);
export const periodKind = z.enum(['week', 'month', 'quarter']);
export const inputRole = z.enum([
  'shipments',
  'returns',
  'withdrawals',
  'plan',
  'table',
  'table-withdrawn',
  'ages',
]);
