/**
 * The records that pass between stages, and the documents that a run leaves behind. Types only. Days are day numbers of
 * calendar.ts (day d is [d, d + 1)); ages are in days from the start of exposure, or in `ageUnit` where there is no calendar.
 */
import type { DayRange, PeriodKind } from './calendar.js';

// ---------------------------------------------------------------- what goes in

/** A file that can be read more than once (standard input is spooled by cli/). */
export interface Source {
  /** How reports name it: relative to the settings file, `/` as separator; `-` is standard input. */
  readonly name: string;
  /** Its bytes, decompressed when the name ends in `.gz`. */
  readonly open: () => AsyncIterable<Uint8Array>;
  /** Size and SHA-256 (hex) of the file as it lies on disk. */
  readonly digest: () => Promise<{ readonly bytes: number; readonly sha256: string }>;
}

/** The opened inputs by role, each list in the order to read it. */
export type Sources = Readonly<Record<InputRole, readonly Source[]>>;

/** Tells that `done` of `total` of a step is behind us; `total` 0 when it is not known. */
export type Progress = (step: string, done: number, total: number) => void;

// ---------------------------------------------------------------- what ingest makes of the files

/** What splits a product, column by column; always null until `segmentBy` is built. */
export type Segment = Readonly<Record<string, string>>;

/** Units shipped within [from, to); each of them on a day that is uniform over the range. */
export interface Cohort extends DayRange {
  /** Units, a whole number above 0. */
  readonly shipped: number;
}

/** Units of one cohort that came back (or were withdrawn) within [from, to), cut at the end of the as-of day. */
export interface Cell extends DayRange {
  /** Index into `cohorts`. */
  readonly cohort: number;
  /** Units, a whole number above 0. */
  readonly quantity: number;
}

/** Units whose age is known without a calendar. */
export interface AgeGroup {
  readonly outcome: 'returned' | 'surviving';
  /** Exact: from = to. Interval: from < to. Left-censored: from = 0 < to. Surviving: from = to. In `ageUnit`. */
  readonly from: number;
  readonly to: number;
  readonly exact: boolean;
  readonly quantity: number;
}

/** Why a product has no forecast, or a candidate is ruled out; the code is stable. */
export interface NotForecast {
  readonly code: string;
  readonly message: string;
}

/** All that the later stages know of one product (and segment). */
export interface ProductRecords {
  readonly product: string;
  readonly segment: Segment | null;
  /** `day`: every cohort and every cell is a single day; `period`: some are wider; `age`: no calendar. */
  readonly resolution: 'day' | 'period' | 'age';
  /** Sorted by from, then to; no two are equal. */
  readonly cohorts: readonly Cohort[];
  /** Sorted by cohort, from, to; no two are equal. A cohort's returned and withdrawn never exceed its shipped. */
  readonly returned: readonly Cell[];
  readonly withdrawn: readonly Cell[];
  /** Shipments after the as-of date, taken as certain. Sorted like cohorts. */
  readonly planned: readonly Cohort[];
  /** Only with `resolution: 'age'`, and then alone. Sorted by outcome, from, to. */
  readonly ages: readonly AgeGroup[];
  /** Returned units among the rejected rows that name this product. */
  readonly rejectedReturns: number;
  /** Set when the records themselves forbid a forecast, such as returns before the delay. */
  readonly unusable: NotForecast | null;
}

export type RejectCode =
  | 'unreadable-date'
  | 'ambiguous-date'
  | 'missing-value'
  | 'bad-quantity'
  | 'wrong-width'
  | 'unknown-product'
  | 'unknown-unit'
  | 'return-before-shipment'
  | 'duplicate-unit'
  | 'conflicting-unit'
  | 'returns-exceed-shipped'
  | 'unmatched-reversal'
  | 'field-too-long';

export type SetAsideCode =
  | 'after-as-of'
  | 'repeat-return'
  | 'beyond-warranty'
  | 'before-delay'
  /** A plan for a period that is over. */
  | 'before-as-of';

/** A row that is not used, kept in rejects.csv. */
export interface RejectRow {
  /** Relative to the settings file, `/` as separator. */
  readonly file: string;
  /** First physical line of the row, 1-based. */
  readonly line: number;
  readonly kind: 'rejected' | 'set-aside';
  readonly code: RejectCode | SetAsideCode;
  /** Header of the column at fault, empty when it is the whole row. */
  readonly column: string;
  readonly message: string;
  /** The row as CSV, comma separated. */
  readonly row: string;
}

export type InputRole =
  | 'shipments'
  | 'returns'
  | 'withdrawals'
  | 'plan'
  | 'table'
  | 'table-withdrawn'
  | 'ages';

/** The account of one file: read = used + rejected + setAside. */
export interface FileAccount {
  readonly file: string;
  readonly role: InputRole;
  readonly bytes: number;
  /** Hex digest of the file as it lies on disk. */
  readonly sha256: string;
  readonly read: number;
  readonly used: number;
  readonly rejected: number;
  readonly setAside: number;
  /** Rows by reject or set-aside code, sorted by code. */
  readonly codes: Readonly<Record<string, number>>;
  /** Headers that were read and not used. */
  readonly unusedColumns: readonly string[];
}

/** What ingest hands on. */
export interface Intake {
  /** Sorted by product (code points), then segment. */
  readonly products: readonly ProductRecords[];
  readonly files: readonly FileAccount[];
  /** Sorted by file and line. */
  readonly rejects: readonly RejectRow[];
  readonly findings: readonly Finding[];
}

// ---------------------------------------------------------------- documents

/** Something a reader should know; the code is stable. */
export interface Finding {
  readonly code: string;
  readonly severity: 'note' | 'warning';
  readonly message: string;
}

/** One row of the Nevada-style table. */
export interface TableRow extends DayRange {
  /** Label of the ship period, `2026-11`. */
  readonly shippedIn: string;
  readonly shipped: number;
  /** Units by return period, aligned with `periods`. */
  readonly returned: readonly number[];
  readonly withdrawn: readonly number[];
  readonly survivors: number;
}

/** The Nevada-style table of a product, ship period by return period. */
export interface NevadaTable {
  /** Labels of the return periods, first shipment to as-of date. */
  readonly periods: readonly string[];
  readonly rows: readonly TableRow[];
}

/** A product and what became of its units: units = returns + withdrawn + survivors. */
export interface ProductCounts {
  readonly product: string;
  readonly segment: Segment | null;
  readonly resolution: ProductRecords['resolution'];
  readonly units: number;
  readonly returns: number;
  readonly withdrawn: number;
  readonly survivors: number;
}

/** What intake.json says of a product. */
export interface IntakeProduct extends ProductCounts {
  /** ISO dates; null without a calendar. */
  readonly firstShipped: string | null;
  readonly lastShipped: string | null;
  readonly planned: readonly { readonly from: string; readonly to: string; readonly quantity: number }[];
  readonly rejectedReturns: number;
  readonly unusable: NotForecast | null;
  /** Null without a calendar. */
  readonly table: NevadaTable | null;
  readonly ages: readonly AgeGroup[];
}

/** `intake.json` */
export interface IntakeDocument {
  readonly schema: 'returnfall/intake/1';
  readonly title: string;
  readonly asOf: string | null;
  readonly period: PeriodKind;
  readonly ageUnit: string;
  readonly files: readonly FileAccount[];
  readonly products: readonly IntakeProduct[];
  readonly findings: readonly Finding[];
}

export interface ParameterInterval {
  readonly level: number;
  readonly lower: number | null;
  readonly upper: number | null;
  readonly method: 'likelihood-ratio';
}

/** One candidate distribution fitted to one product. */
export interface CandidateFit {
  readonly family: string;
  /** Share at risk; null when every unit can be returned. */
  readonly atRisk: number | null;
  readonly parameters: Readonly<Record<string, number>>;
  readonly standardErrors: Readonly<Record<string, number | null>>;
  readonly intervals: Readonly<Record<string, ParameterInterval>>;
  readonly logLikelihood: number | null;
  readonly parameterCount: number;
  readonly aicc: number | null;
  readonly bic: number | null;
  /** Akaike weight among the candidates that are not ruled out, 0 for the others. */
  readonly weight: number;
  readonly converged: boolean;
  readonly ruledOut: NotForecast | null;
  /** Share of the refits to randomly weighted data that would have chosen this candidate; null when not computed. */
  readonly chosenShare: number | null;
}

/** A point of the nonparametric estimate of the share returned by an age. */
export interface NonparametricPoint {
  readonly age: number;
  readonly probability: number;
  readonly lower: number;
  readonly upper: number;
  /** Expected number of units at risk just before the age. */
  readonly atRisk: number;
}

/** Share returned by age under one candidate. */
export interface Curve {
  readonly family: string;
  readonly atRisk: number | null;
  readonly ages: readonly number[];
  readonly probability: readonly number[];
}

export interface FitProduct extends ProductCounts {
  readonly oldestAge: number;
  readonly delayDays: number;
  readonly delayReason: string | null;
  readonly warrantyMonths: number | null;
  readonly warrantyDays: number | null;
  /** Family name, null when nothing could be chosen. */
  readonly chosen: string | null;
  readonly notForecast: NotForecast | null;
  readonly findings: readonly Finding[];
  /** Best first (AICc), the ruled-out ones last. */
  readonly candidates: readonly CandidateFit[];
  readonly nonparametric: readonly NonparametricPoint[];
  /** Level of its pointwise interval. */
  readonly nonparametricLevel: number;
  readonly curves: readonly Curve[];
}

/** `fit.json` */
export interface FitDocument {
  readonly schema: 'returnfall/fit/1';
  readonly asOf: string | null;
  readonly ageUnit: string;
  readonly products: readonly FitProduct[];
}

/** Draws of a candidate's parameters: what the fit leaves open, and what the predictive counts start from. */
export interface ParameterDraws {
  readonly family: string;
  /** Draw b is free coordinates b·k … b·k + k − 1. */
  readonly free: Float64Array;
  readonly k: number;
  readonly kind: 'pivotal' | 'direct';
  /** Refits that failed and were made again. */
  readonly restarted: number;
  /** Seed words of the product, for the draws that follow. */
  readonly seed: readonly (string | number)[];
  /** What a reader should know of how the draws were made. */
  readonly findings: readonly Finding[];
}

/** A count to come. Keys of `quantiles` are probabilities, `"0.025"`. */
export interface PredictedCount {
  /** Mean of the predictive distribution. */
  readonly expected: number;
  /** Expectation with the parameters at their maximum. */
  readonly plugIn: number;
  readonly quantiles: Readonly<Record<string, number>>;
}

export interface ForecastPeriod extends PredictedCount {
  /** `2026-11`; without a calendar the steps of use, `1`, `2`, … */
  readonly period: string;
  /** First and last day, ISO; null without a calendar. */
  readonly from: string | null;
  readonly to: string | null;
  /** True for the rest of a period that the as-of date falls into; it does not count in the horizon. */
  readonly partial: boolean;
  readonly cumulative: PredictedCount;
  /** The part of `expected` that comes from planned shipments. */
  readonly planned: { readonly expected: number; readonly plugIn: number };
  /** `expected` at the cost per return in force, in `currency`; null where no cost is set. */
  readonly expectedCost: number | null;
}

export interface HistoryPeriod {
  readonly period: string;
  readonly from: string;
  readonly to: string;
  readonly shipped: number;
  readonly returned: number;
  /** What the chosen distribution expects of the units as they stood; null when nothing was chosen. */
  readonly fitted: number | null;
}

export interface CandidateForecast {
  readonly family: string;
  readonly atRisk: number | null;
  readonly weight: number;
  readonly ruledOut: NotForecast | null;
  /** Plug-in expectations, without interval. */
  readonly nextPeriod: number;
  readonly horizon: number;
  readonly untilWarrantyEnds: number | null;
}

export interface ForecastProduct {
  readonly product: string;
  readonly segment: Segment | null;
  readonly chosen: string | null;
  readonly notForecast: NotForecast | null;
  readonly method: ForecastMethod | null;
  readonly currency: string | null;
  /** The rest of a partial period first, if any, then `horizon` whole periods. */
  readonly periods: readonly ForecastPeriod[];
  /** Units shipped by the as-of date only; null without a warranty limit. */
  readonly untilWarrantyEnds: PredictedCount | null;
  readonly byCandidate: readonly CandidateForecast[];
  readonly history: readonly HistoryPeriod[];
  /** By about how many returns over the horizon the forecast would rise if the rejected returns were real. */
  readonly ifRejectedWereReal: number | null;
  readonly findings: readonly Finding[];
}

export interface ForecastMethod {
  readonly draws: number;
  /** `pivotal` (generalised pivotal quantity) or `direct` (the weighted refits themselves). */
  readonly parameters: ParameterDraws['kind'];
  /** Draws that failed and were made again. */
  readonly restarted: number;
  readonly counts: 'multinomial';
  readonly assumes: string;
}

/** A period of the sum over products. */
export interface TotalPeriod extends Omit<ForecastPeriod, 'expectedCost'> {
  /** Expected cost of the period, one entry a currency, sorted. */
  readonly costs: ForecastTotal['costs'];
}

export interface ForecastTotal {
  readonly periods: readonly TotalPeriod[];
  readonly untilWarrantyEnds: PredictedCount | null;
  readonly productsIncluded: readonly string[];
  readonly productsMissing: readonly string[];
  /** Expected cost of the horizon, one entry a currency, sorted. */
  readonly costs: readonly { readonly currency: string; readonly expectedCost: number }[];
  readonly history: readonly HistoryPeriod[];
}

/** `forecast.json` */
export interface ForecastDocument {
  readonly schema: 'returnfall/forecast/1';
  readonly asOf: string | null;
  readonly period: PeriodKind;
  readonly horizon: number;
  readonly levels: readonly number[];
  readonly products: readonly ForecastProduct[];
  readonly total: ForecastTotal;
}

/** What a month end knows when it ends; the stages not asked for are null. */
export interface MonthEnd {
  readonly intake: Intake;
  readonly table: IntakeDocument;
  readonly fit: FitDocument | null;
  readonly forecast: ForecastDocument | null;
}

/** `run.json`: enough to reproduce a run; no clock, no absolute path, no worker count. */
export interface RunDocument {
  readonly schema: 'returnfall/run/1';
  readonly version: string;
  readonly command: string;
  readonly seed: number;
  readonly settings: unknown;
  readonly inputs: readonly {
    readonly file: string;
    readonly role: InputRole;
    readonly bytes: number;
    readonly sha256: string;
  }[];
  readonly outputs: readonly { readonly file: string; readonly bytes: number; readonly sha256: string }[];
}
