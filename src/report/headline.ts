/** The answer first: sentences and key figures of a forecast. */
import type { PredictedCount } from '../records.js';
import type { ChartPeriod } from './forecast-chart.js';
import { betweenText } from './intervals.js';
import { expectedText, moneyText } from './numbers.js';
import type { PeriodWords } from './period-words.js';

/** A period with what has come in up to its end. */
export interface HeadlinePeriod extends ChartPeriod {
  readonly to: string | null;
  readonly cumulative: PredictedCount;
}

export interface HeadlineInput {
  readonly periods: readonly HeadlinePeriod[];
  readonly untilWarrantyEnds: PredictedCount | null;
  /** The first is the one that the headline uses. */
  readonly levels: readonly number[];
  /** In words, null without a calendar. */
  readonly asOf: string | null;
  readonly costs: readonly { readonly currency: string; readonly expectedCost: number }[];
  readonly words: PeriodWords;
}

/** View of partials/headline.hbs; null when nothing is forecast. */
export function headline(input: HeadlineInput) {
  const next = input.periods.find((period) => !period.partial) ?? input.periods[0];
  const last = input.periods.at(-1);
  if (next === undefined || last === undefined) return null;
  const count = input.periods.filter((period) => !period.partial).length;
  const over = input.words.over(count, last.to);
  return {
    lead: leadSentence(input, next, last, over),
    further: [...restSentence(input), ...warrantySentence(input), ...plannedSentence(input)],
    figures: [
      figure(input, next, capital(input.words.during(next.period, next.partial))),
      ...(last === next ? [] : [figure(input, last.cumulative, capital(over))]),
      ...(input.untilWarrantyEnds === null
        ? []
        : [figure(input, input.untilWarrantyEnds, 'Until warranty ends, units shipped so far')]),
      ...costFigure(input, over),
    ],
  };
}

function leadSentence(
  input: HeadlineInput,
  next: HeadlinePeriod,
  last: HeadlinePeriod,
  over: string,
): string {
  const [level] = input.levels;
  const first = `Expect ${returns(next)} ${input.words.during(next.period, next.partial)}, ${betweenText(next, level ?? 0)}`;
  if (last === next) return `${first}.`;
  return `${first}, and ${expectedText(last.cumulative.expected)} ${over}, ${betweenText(last.cumulative, level ?? 0)}.`;
}

function restSentence({ periods, words, levels }: HeadlineInput): readonly string[] {
  const [first, second] = periods;
  if (first === undefined || second === undefined || !first.partial) return [];
  const count = `${returns(first)}, ${betweenText(first, levels[0] ?? 0)}`;
  return [
    `The as-of date falls inside a ${words.noun}: ${words.during(first.period, true)} expect ${count}, counted in the sum.`,
  ];
}

function warrantySentence({ untilWarrantyEnds, levels, asOf }: HeadlineInput): readonly string[] {
  if (untilWarrantyEnds === null) return [];
  const shipped = asOf === null ? 'in service' : `shipped by ${asOf}`;
  const interval = betweenText(untilWarrantyEnds, levels[0] ?? 0);
  return [
    `Until warranty ends, the units ${shipped} are expected to bring ${returns(untilWarrantyEnds)}, ${interval}.`,
  ];
}

function plannedSentence({ periods }: HeadlineInput): readonly string[] {
  const planned = periods.reduce((sum, period) => sum + period.planned.expected, 0);
  if (planned === 0) return [];
  return [
    `Planned shipments, taken as certain, bring ${expectedText(planned)} of the returns in the horizon.`,
  ];
}

function figure({ levels }: HeadlineInput, count: PredictedCount, label: string) {
  return {
    label,
    values: [expectedText(count.expected)],
    detail: betweenText(count, levels[0] ?? 0),
    money: false,
  };
}

function costFigure({ costs }: HeadlineInput, over: string) {
  if (costs.length === 0) return [];
  const values = costs.map((cost) => moneyText(cost.expectedCost, cost.currency));
  const detail = 'expected returns at the cost per return in force';
  return [{ label: `Expected cost ${over}`, values, detail, money: true }];
}

function returns(count: PredictedCount): string {
  const text = expectedText(count.expected);
  return `${text} ${text === '1' ? 'return' : 'returns'}`;
}

function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
