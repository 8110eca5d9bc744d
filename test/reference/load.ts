/** The committed reference numbers, typed. README.md beside says where they come from and how they are recomputed. */
import { readFileSync } from 'node:fs';
import type { PeriodKind } from '../../src/calendar.js';
import type { AgeGroup } from '../../src/records.js';

export type Parameters = Readonly<Record<string, number>>;

/** A maximum of a likelihood. `aicc` and `bic` take the number of returned units as sample size. */
export interface ReferenceFit {
  readonly family: string;
  readonly parameters: Parameters;
  readonly standardErrors: Parameters;
  readonly logLikelihood: number;
  readonly aicc: number;
  readonly bic: number;
}

/** One sample of ages with its fits. */
export interface DataSet {
  readonly name: string;
  readonly title: string;
  readonly unit: string;
  /** Where the data were published, and the printed values that the fits were compared with. */
  readonly source: string;
  /** Ages as the records hold them: sorted by outcome, from, to. */
  readonly ages: readonly AgeGroup[];
  /** What the source itself prints, to the digits it prints. */
  readonly printed: readonly {
    readonly family: string;
    readonly parameters: Parameters;
    readonly from: string;
  }[];
  /** `intervals95` (likelihood ratio, [lower, upper]) only with the Weibull distribution. */
  readonly fits: readonly (ReferenceFit & {
    readonly intervals95?: Readonly<Record<string, readonly [number, number]>>;
  })[];
}

/** The six samples of fits.json. */
export function loadFits(): readonly DataSet[] {
  const file = readJson<{ readonly dataSets: readonly StoredDataSet[] }>('fits.json');
  return file.dataSets.map(({ exact, between, surviving, ...rest }) => ({
    ...rest,
    ages: [
      ...between.map(([from, to, quantity]) => ageGroup('returned', from, to, false, quantity)),
      ...exact.map(([age, quantity]) => ageGroup('returned', age, age, true, quantity)),
    ]
      .sort((a, b) => a.from - b.from || a.to - b.to)
      .concat(surviving.map(([age, quantity]) => ageGroup('surviving', age, age, true, quantity))),
  }));
}

/** Count at a probability: `cdf` at the count, `cdfBelow` at the count before it. */
export type Percentiles = Readonly<
  Record<string, { readonly count: number; readonly cdf: number; readonly cdfBelow: number }>
>;

/** The Nevada-style table of grouped.json. Triangular lists: row i begins with the month of cohort i. */
export interface GroupedTable {
  readonly asOf: string;
  readonly shipMonths: readonly string[];
  readonly forecastMonths: readonly string[];
  readonly shipped: readonly number[];
  readonly returned: readonly (readonly number[])[];
  readonly survivors: readonly number[];
  readonly fits: readonly (ReferenceFit & {
    readonly cellProbabilities: readonly (readonly number[])[];
    readonly survivorProbabilities: readonly number[];
    readonly expectedByMonth: readonly number[];
    readonly expectedTotal: number;
    readonly varianceTotal: number;
    readonly percentilesByMonth: readonly Percentiles[];
    readonly percentilesTotal: Percentiles;
  })[];
}

export function loadGrouped(): GroupedTable {
  return readJson<GroupedTable>('grouped.json');
}

/** Values at exactly the age `x`, the double nearest to `quantile`; `p` is of the named tail. */
export interface TailRow {
  readonly tail: 'lower' | 'upper';
  readonly p: number;
  readonly x: number;
  readonly quantile: number;
  readonly logCdf: number;
  readonly logSurvival: number;
  readonly logDensity: number;
  readonly hazard: number;
  readonly logHazard: number;
}

/** The rows of tails.json by distribution. */
export function loadTails(): readonly {
  readonly family: string;
  readonly parameters: Parameters;
  readonly rows: readonly TailRow[];
}[] {
  const file = readJson<{ columns: string[]; families: StoredTails[] }>('tails.json');
  return file.families.map(({ rows, ...rest }) => ({
    ...rest,
    rows: rows.map(
      (row) => Object.fromEntries(file.columns.map((name, i) => [name, row[i]])) as unknown as TailRow,
    ),
  }));
}

/** Probabilities of one cohort in an awkward region; ranges are half-open [from, to) whole days, ages in days. */
export interface CellCase {
  readonly name: string;
  readonly family: string;
  readonly parameters: Parameters;
  readonly cohort: readonly [number, number];
  readonly cutOff: number;
  readonly cells: readonly (readonly [number, number])[];
  readonly delay: number;
  /** Null is without a limit. */
  readonly warranty: number | null;
  readonly cellProbabilities: readonly number[];
  readonly survivorProbability: number;
  readonly logSurvivorProbability: number;
}

export function loadCells(): readonly CellCase[] {
  return readJson<{ readonly cases: readonly CellCase[] }>('cells.json').cases;
}

/** Days [from, to) and units shipped. */
type StoredCohort = readonly [from: number, to: number, shipped: number];
type StoredCell = readonly [cohort: number, from: number, to: number, quantity: number];

/** Records with a warranty limit, and what follows from them at given parameters. Ranges are half-open day numbers. */
export interface WarrantyScenario {
  readonly name: string;
  readonly period: PeriodKind;
  readonly asOf: string;
  readonly warrantyMonths: number | null;
  readonly warrantyDays: number | null;
  readonly delayDays: number;
  readonly horizon: number;
  readonly cohorts: readonly StoredCohort[];
  readonly returned: readonly StoredCell[];
  readonly withdrawn: readonly StoredCell[];
  readonly planned: readonly StoredCohort[];
  /** The periods after and before the cut-off, to which `expected` and `planned`, and `fitted`, belong. */
  readonly ahead: readonly (readonly [from: number, to: number])[];
  readonly past: readonly (readonly [from: number, to: number])[];
  readonly answers: readonly {
    readonly family: string;
    readonly parameters: Parameters;
    readonly logLikelihood: number;
    readonly expected: readonly number[];
    readonly planned: readonly number[];
    readonly untilWarrantyEnds: number;
    /** Of the count at these very parameters. */
    readonly untilWarrantyEndsVariance: number;
    readonly fitted: readonly number[];
  }[];
}

export function loadWarranty(): readonly WarrantyScenario[] {
  return readJson<{ readonly scenarios: readonly WarrantyScenario[] }>('warranty.json').scenarios;
}

interface StoredDataSet extends Omit<DataSet, 'ages'> {
  readonly exact: readonly (readonly [age: number, quantity: number])[];
  readonly between: readonly (readonly [from: number, to: number, quantity: number])[];
  readonly surviving: readonly (readonly [age: number, quantity: number])[];
}

interface StoredTails {
  readonly family: string;
  readonly parameters: Parameters;
  readonly rows: readonly (readonly (string | number)[])[];
}

function ageGroup(
  outcome: AgeGroup['outcome'],
  from: number,
  to: number,
  exact: boolean,
  quantity: number,
): AgeGroup {
  return { outcome, from, to, exact, quantity };
}

/** The content of a file of this folder. */
export function readJson<T>(name: string): T {
  return JSON.parse(readFileSync(new URL(name, import.meta.url), 'utf8')) as T;
}
