import { addMonths, type PeriodKind, parseIsoDate } from './calendar.js';

/** How the files of one kind of record are read. */
export interface InputConfig {
  /** Paths or patterns as written, relative to the settings file's folder; `-` is standard input. Empty when there are none. */
  readonly files: readonly string[];
  /** Our field name → the file's header, for headers that no synonym covers. Default none. */
  readonly columns: Readonly<Record<string, string>>;
  /** A date-fns pattern for every date of these files; null means ISO 8601. */
  readonly dateFormat: string | null;
  /** WHATWG label of the encoding; null means UTF-8, or UTF-16 with a byte-order mark. */
  readonly encoding: string | null;
}

/** An amount per return, in force from a date (ISO) on; `from: null` is since ever. */
export interface CostPerReturn {
  readonly from: string | null;
  readonly amount: number;
}

/** What the analyst says about a product. */
export interface ProductRules {
  /** Calendar months from the cohort's first day, or null. */
  readonly warrantyMonths: number | null;
  /** Days of age, or null; where both are set the earlier end counts. */
  readonly warrantyDays: number | null;
  /** Days after exposure begins in which a unit cannot be returned. Default 0. */
  readonly delayDays: number;
  /** Required where delayDays is above 0. */
  readonly delayReason: string | null;
  /** Sorted by `from`; empty when no cost is set. */
  readonly costPerReturn: readonly CostPerReturn[];
  /** ISO 4217 code; null when no cost is set. */
  readonly currency: string | null;
}

/** Everything a run needs, complete. Plain data: it is sent to workers and written into run.json. */
export interface Config {
  /** Default `Warranty return forecast`. */
  readonly title: string;
  /** ISO date of the last day whose records count; null with ages, or when the settings do not name one. */
  readonly asOf: string | null;
  /** Default `month`. */
  readonly period: PeriodKind;
  /** Whole periods to forecast, default 12, 1 to 240. */
  readonly horizon: number;
  /** Two-sided levels of the intervals, ascending, each in (0, 1). Default 0.8, 0.95. */
  readonly levels: readonly number[];
  /** Draws of the predictive distribution, default 4000, 100 to 100000. */
  readonly draws: number;
  /** Whole number, default 1. */
  readonly seed: number;
  /** Names of families; default all that are built. */
  readonly candidates: readonly string[];
  /** Share of a file's rows that may be rejected, default 0.01. */
  readonly maxRejectShare: number;
  /** Name of the unit of use of `ages`; default `day`. */
  readonly ageUnit: string;
  /** Length of one forecast step of use, in ageUnit; null forecasts nothing. Only with ages. */
  readonly ageStep: number | null;
  readonly shipments: InputConfig;
  readonly returns: InputConfig;
  readonly withdrawals: InputConfig;
  readonly plan: InputConfig;
  /** Nevada-style table in place of shipments and returns. At most one file. */
  readonly table: InputConfig;
  readonly tableWithdrawn: InputConfig;
  readonly ages: InputConfig;
  /** Rules of every product that is not named. */
  readonly everyProduct: ProductRules;
  /** Complete rules of the products that are named, `*` already merged in. Sorted by name. */
  readonly namedProducts: readonly { readonly product: string; readonly rules: ProductRules }[];
}

/** The rules of a product: its own where the settings name it, else those of every product. */
export function rulesOf(config: Config, product: string): ProductRules {
  return config.namedProducts.find((named) => named.product === product)?.rules ?? config.everyProduct;
}

/** Age in days at which warranty ends for a cohort whose first ship day is `shipFrom`; Infinity without a limit. */
export function warrantyLimit(rules: ProductRules, shipFrom: number): number {
  const months =
    rules.warrantyMonths === null ? Infinity : addMonths(shipFrom, rules.warrantyMonths) - shipFrom;
  return Math.min(months, rules.warrantyDays ?? Infinity);
}

/** The cut-off, the moment at which the as-of day ends, as a day number. @throws RangeError without an as-of date. */
export function cutOffOf(config: Config): number {
  const day = config.asOf === null ? null : parseIsoDate(config.asOf);
  if (day === null)
    throw new RangeError(`missing as-of date ${config.asOf}, records with a calendar need one`);
  return day + 1;
}
