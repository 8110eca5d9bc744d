import * as z from 'zod';
import type { RunDocument } from '../records.js';
import { count, inputRole } from './schemas.js';

/** `run.json`; its settings are for the reader of settings to check. */
export const runSchema: z.ZodType<RunDocument> = z.looseObject({
  schema: z.literal('returnfall/run/1'),
  version: z.string(),
  command: z.string(),
  seed: count,
  settings: z.unknown(),
  inputs: z.array(
    z.looseObject({
      file: z.string(),
      role: inputRole,
      bytes: count,
      sha256: z.string(),
    }),
  ),
  outputs: z.array(z.looseObject({ file: z.string(), bytes: count, sha256: z.string() })),
});
