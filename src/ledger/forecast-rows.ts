import { intervalKeys } from '../quantiles.js';
import type { ForecastPeriod, ForecastProduct, PredictedCount } from '../records.js';
import { segmentText } from '../segment.js';
import { minorDigits, toUnits } from './money.js';

/** A row of forecast.csv before it is written. */
export interface ForecastRow {
  readonly product: string;
  readonly segment: string;
  readonly period: string;
  /** Hundredths of a return. */
  readonly expected: number | null;
  /** Lower and upper end, level by level. */
  readonly interval: readonly (number | null)[];
  /** Hundredths of a return. */
  readonly cumulative: number | null;
  readonly cumulativeInterval: readonly (number | null)[];
  /** Minor units of `currency`. */
  readonly cost: number | null;
  readonly currency: string | null;
  /** Nothing means that all is well. */
  readonly status: readonly string[];
}

/** Period of the row that looks to the end of warranty. */
export const untilWarrantyEnds = '(until warranty ends)';

/** The rows of one product: its periods and `(until warranty ends)`, or the one that says why there are none. */
export function productRows(product: ForecastProduct, levels: readonly number[]): readonly ForecastRow[] {
  const empty = emptyRow(product, levels);
  if (product.notForecast !== null) return [{ ...empty, status: [product.notForecast.code] }];
  const until = product.untilWarrantyEnds;
  const last = {
    ...empty,
    period: untilWarrantyEnds,
    expected: until === null ? null : toUnits(until.expected, 2),
    interval: intervalOf(until, levels),
    status: until === null ? ['no-warranty-limit'] : [],
  };
  return [...withCumulative(product.periods.map((period) => periodRow(empty, period, levels))), last];
}

/** Ends of the intervals of a count, level by level; null without a count. */
export function intervalOf(
  count: Pick<PredictedCount, 'quantiles'> | null,
  levels: readonly number[],
): readonly (number | null)[] {
  return levels.flatMap(intervalKeys).map((key) => count?.quantiles[key] ?? null);
}

/** The rows with `cumulative` as the sum of `expected` so far. */
export function withCumulative(rows: readonly ForecastRow[]): readonly ForecastRow[] {
  let sum = 0;
  return rows.map((row) => {
    sum += row.expected ?? 0;
    return { ...row, cumulative: sum };
  });
}

function periodRow(empty: ForecastRow, period: ForecastPeriod, levels: readonly number[]): ForecastRow {
  const { expectedCost } = period;
  const { currency } = empty;
  const priceless = currency !== null && expectedCost === null;
  return {
    ...empty,
    period: period.period,
    expected: toUnits(period.expected, 2),
    interval: intervalOf(period, levels),
    cumulativeInterval: intervalOf(period.cumulative, levels),
    cost: expectedCost === null || currency === null ? null : toUnits(expectedCost, minorDigits(currency)),
    status: [...(period.partial ? ['partial-period'] : []), ...(priceless ? ['cost-incomplete'] : [])],
  };
}

function emptyRow(product: ForecastProduct, levels: readonly number[]): ForecastRow {
  return {
    product: product.product,
    segment: segmentText(product.segment),
    period: '',
    expected: null,
    interval: intervalOf(null, levels),
    cumulative: null,
    cumulativeInterval: intervalOf(null, levels),
    cost: null,
    currency: product.currency,
    status: [],
  };
}
