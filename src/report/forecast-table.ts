/** The forecast and the history as tables. */
import type { HistoryPeriod, PredictedCount } from '../records.js';
import type { HeadlinePeriod } from './headline.js';
import { intervalText } from './intervals.js';
import { countText, expectedText, moneyText, percentText } from './numbers.js';
import type { PeriodWords } from './period-words.js';

/** A period with its cost, where one is known. */
export interface TablePeriod extends HeadlinePeriod {
  readonly expectedCost?: number | null;
}

export interface ForecastTableInput {
  readonly periods: readonly TablePeriod[];
  readonly untilWarrantyEnds: PredictedCount | null;
  readonly levels: readonly number[];
  readonly currency: string | null;
  readonly words: PeriodWords;
}

/** View of partials/forecast-table.hbs; null when nothing is forecast. */
export function forecastTable(input: ForecastTableInput) {
  if (input.periods.length === 0) return null;
  const planned = input.periods.some((p) => p.planned.expected > 0);
  const costed = input.periods.some((p) => typeof p.expectedCost === 'number');
  return {
    noun: input.words.noun,
    levels: input.levels.map(percentText),
    groupSpan: input.levels.length + 1,
    planned,
    currency: costed ? input.currency : null,
    rows: input.periods.map((p) => ({
      period: input.words.name(p.period, p.partial),
      ...counts(p, input.levels),
      cumulative: counts(p.cumulative, input.levels),
      planned: planned ? expectedText(p.planned.expected) : null,
      cost: costed ? moneyText(p.expectedCost ?? null, input.currency) : null,
    })),
    untilWarrantyEnds:
      input.untilWarrantyEnds === null ? null : counts(input.untilWarrantyEnds, input.levels),
  };
}

/** Rows of the history, latest first. */
export function historyRows(history: readonly HistoryPeriod[], words: PeriodWords) {
  return history.toReversed().map((h) => ({
    period: words.name(h.period, false),
    shipped: countText(h.shipped),
    returned: countText(h.returned),
    fitted: expectedText(h.fitted),
  }));
}

function counts(count: PredictedCount, levels: readonly number[]) {
  return {
    expected: expectedText(count.expected),
    intervals: levels.map((level) => intervalText(count, level)),
  };
}
