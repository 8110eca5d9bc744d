/** The forecast and the history as tables. */
import type { ForecastTotal, HistoryPeriod, PredictedCount } from '../records.js';
import type { HeadlinePeriod } from './headline.js';
import { intervalText } from './intervals.js';
import { countText, expectedColumn, expectedText, moneyColumn, percentText } from './numbers.js';
import type { PeriodWords } from './period-words.js';

/** A period with its costs, at most one a currency. */
export interface TablePeriod extends HeadlinePeriod {
  readonly costs: ForecastTotal['costs'];
}

export interface ForecastTableInput {
  readonly periods: readonly TablePeriod[];
  readonly untilWarrantyEnds: PredictedCount | null;
  readonly levels: readonly number[];
  readonly words: PeriodWords;
}

/** Rows that a sheet of paper should not part. */
const togetherRows = 14;

/** View of partials/forecast-table.hbs; null when nothing is forecast. */
export function forecastTable(input: ForecastTableInput) {
  const { periods, levels, words, untilWarrantyEnds } = input;
  if (periods.length === 0) return null;
  const planned = periods.some((p) => p.planned.expected > 0);
  const single = expectedColumn(periods.map((p) => p.expected));
  const summed = expectedColumn(periods.map((p) => p.cumulative.expected));
  const fromPlan = expectedColumn(periods.map((p) => p.planned.expected));
  const money = costColumns(periods);
  return {
    noun: words.noun,
    levels: levels.map(percentText),
    groupSpan: levels.length + 1,
    planned,
    currencies: money.currencies,
    columns: 2 + 2 * levels.length + (planned ? 1 : 0) + money.currencies.length,
    together: periods.length <= togetherRows,
    rows: periods.map((p) => ({
      period: words.short(p.period, p.partial),
      expected: single(p.expected),
      intervals: levels.map((level) => intervalText(p, level)),
      cumulative: {
        expected: summed(p.cumulative.expected),
        intervals: levels.map((level) => intervalText(p.cumulative, level)),
      },
      planned: planned ? fromPlan(p.planned.expected) : null,
      costs: money.texts(p),
    })),
    untilWarrantyEnds: untilWarrantyEnds === null ? null : untilText(untilWarrantyEnds, levels),
    standing: words.standing,
  };
}

/** Rows of the history, latest first. */
export function historyRows(history: readonly HistoryPeriod[], words: PeriodWords) {
  const fitted = expectedColumn(history.map((h) => h.fitted));
  return history.toReversed().map((h) => ({
    period: words.short(h.period, false),
    shipped: countText(h.shipped),
    returned: countText(h.returned),
    fitted: fitted(h.fitted),
  }));
}

/** One column a currency, each in one precision. */
function costColumns(periods: readonly TablePeriod[]) {
  const currencies = [...new Set(periods.flatMap((p) => p.costs.map((cost) => cost.currency)))];
  const costIn = (p: TablePeriod, currency: string) =>
    p.costs.find((cost) => cost.currency === currency)?.expectedCost ?? null;
  const columns = currencies.map((currency) => moneyColumn(periods.map((p) => costIn(p, currency))));
  const texts = (p: TablePeriod) =>
    currencies.map((currency, i) => columns[i]?.(costIn(p, currency), currency) ?? '');
  return { currencies, texts };
}

/** `512 expected; 80 % interval 470 to 555; 95 % interval 430 to 600`. */
function untilText(count: PredictedCount, levels: readonly number[]) {
  const intervals = levels.map((level) => `${percentText(level)} interval ${intervalText(count, level)}`);
  return [`${expectedText(count.expected)} expected`, ...intervals].join('; ');
}
