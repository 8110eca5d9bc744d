import * as z from 'zod';
import type { Config, InputConfig, ProductRules } from '../config.js';
import { exitCodes, UserError } from '../errors.js';
import { type Flags, flagName, flagPlace, readFlags } from './flags.js';
import { settingKeys } from './keys.js';
import { pathText } from './path.js';

/**
 * The configuration that a run left in its run.json.
 * @param file as messages name it.
 * @throws UserError exit 3 when it is not one of this version.
 */
export function readStoredConfig(settings: unknown, file: string): Config {
  const result = config.safeParse(settings);
  if (result.success) return result.data;
  const path = pathText(['settings', ...(result.error.issues[0]?.path.map((step) => String(step)) ?? [])]);
  throw new UserError(
    { code: 'altered-file', message: `invalid ${path}, not settings that this version wrote`, file, remedy },
    exitCodes.unusableInput,
  );
}

/**
 * A stored configuration for the stages that are still to come: horizon, levels, draws, seed and candidates of the
 * flags over it.
 * @throws UserError exit 2 for a faulty flag, and for one that stages already behind us would have had to obey.
 */
export function overrideStored(stored: Config, flags: Flags): Config {
  const read = readFlags(flags);
  const { horizon, levels, draws, seed, candidates, ...early } = { ...read.settings, ...read.rules };
  const faults = [
    ...read.complaints.map(({ path, at: _, ...fault }) => ({ ...fault, ...flagPlace(path) })),
    ...Object.keys(early).map((key) => ({
      code: 'conflicting-input',
      message: `invalid ${flagName(key)}, not allowed beside --from`,
      column: flagName(key),
      remedy: 'run from the records again',
    })),
  ];
  if (faults.length > 0) throw new UserError(faults, exitCodes.unusableSettings);
  return {
    ...stored,
    horizon: horizon ?? stored.horizon,
    levels: levels === undefined ? stored.levels : [...levels].sort((a, b) => a - b),
    draws: draws ?? stored.draws,
    seed: seed ?? stored.seed,
    candidates: candidates ?? stored.candidates,
  };
}

const remedy = 'run from the records again';

const input: z.ZodType<InputConfig> = z.strictObject({
  files: z.array(z.string()),
  columns: z.record(z.string(), z.string()),
  dateFormat: z.string().nullable(),
  encoding: z.string().nullable(),
});

const rules: z.ZodType<ProductRules> = z.strictObject({
  warrantyMonths: z.number().nullable(),
  warrantyDays: z.number().nullable(),
  delayDays: z.number(),
  delayReason: z.string().nullable(),
  costPerReturn: z.array(z.strictObject({ from: z.string().nullable(), amount: z.number() })),
  currency: z.string().nullable(),
});

const config: z.ZodType<Config> = z.strictObject({
  title: settingKeys.title,
  asOf: settingKeys.asOf.nullable(),
  period: settingKeys.period,
  horizon: settingKeys.horizon,
  levels: settingKeys.levels,
  draws: settingKeys.draws,
  seed: settingKeys.seed,
  candidates: settingKeys.candidates,
  maxRejectShare: settingKeys.maxRejectShare,
  ageUnit: settingKeys.ageUnit,
  ageStep: settingKeys.ageStep.nullable(),
  shipments: input,
  returns: input,
  withdrawals: input,
  plan: input,
  table: input,
  tableWithdrawn: input,
  ages: input,
  everyProduct: rules,
  namedProducts: z.array(z.strictObject({ product: z.string(), rules })),
});
