/** The answer first: sentences and key figures of a forecast. */
import type { ForecastTotal, PredictedCount } from '../records.js';
import { costFigure, countFigure } from './figures.js';
import type { ChartPeriod } from './forecast-chart.js';
import { betweenText, intervalOf, probablyText } from './intervals.js';
import { expectedText } from './numbers.js';
import type { PeriodWords } from './period-words.js';

/** A period with what has come in up to its end. */
export interface HeadlinePeriod extends ChartPeriod {
  readonly from: string | null;
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
  readonly costs: ForecastTotal['costs'];
  /** Names of forecast products whose cost is not, or not wholly, in `costs`. */
  readonly costless: readonly string[];
  /** `25 of 53 products` where some are not forecast, else null. */
  readonly scope: string | null;
  /** Units that can still be returned or have outlived their warranty. */
  readonly survivors: number;
  readonly words: PeriodWords;
}

/** View of partials/headline.hbs; null when nothing is forecast. */
export function headline(input: HeadlineInput) {
  const next = input.periods.find((period) => !period.partial) ?? input.periods[0];
  const last = input.periods.at(-1);
  if (next === undefined || last === undefined) return null;
  const over = overText(input, last);
  const [level = 0] = input.levels;
  const figure = (count: PredictedCount, label: string) => countFigure(count, level, label);
  const until = input.untilWarrantyEnds;
  return {
    lead: noneLeft(input, last, over) ?? leadSentence(input, next, last, over),
    further: [...restSentence(input), ...plannedSentence(input)],
    /** The same with what the figures tell, where these are not shown. */
    sentences: [...restSentence(input), ...warrantySentence(input), ...plannedSentence(input)],
    figures: [
      figure(next, input.words.during(next.period, next.partial)),
      ...(last === next ? [] : [figure(last.cumulative, over)]),
      ...(until === null ? [] : [figure(until, `until warranty ends, ${input.words.standing}`)]),
      ...costFigure(input.costs, input.costless, over),
    ],
  };
}

function overText({ periods, words }: HeadlineInput, last: HeadlinePeriod): string {
  const [first] = periods;
  return words.over({
    periods: periods.filter((period) => !period.partial).length,
    lastDay: last.to,
    partialFrom: first?.partial === true ? first.from : null,
  });
}

/** What to say where no survivor can be returned; null where one can. */
function noneLeft(input: HeadlineInput, last: HeadlinePeriod, over: string): string | null {
  const { survivors, untilWarrantyEnds, levels } = input;
  const { upper } = intervalOf(last.cumulative, levels.at(-1) ?? 0);
  if (last.cumulative.expected > 0 || (upper ?? 0) > 0) return null;
  const none = `expect no returns ${over}`;
  if (survivors === 0) return `${scoped(input, 'No unit is left that could be returned')}: ${none}.`;
  if (untilWarrantyEnds?.expected !== 0) return null;
  return `${scoped(input, 'All survivors are past their warranty')}: ${none}.`;
}

function leadSentence(
  input: HeadlineInput,
  next: HeadlinePeriod,
  last: HeadlinePeriod,
  over: string,
): string {
  const [level = 0] = input.levels;
  const expected = scoped(input, `Expect ${returns(next)}`);
  const first = `${expected} ${input.words.during(next.period, next.partial)}, ${probablyText(next, level)}`;
  if (last === next) return `${first}.`;
  return `${first}, and ${expectedText(last.cumulative.expected)} ${over}, ${betweenText(last.cumulative, level)}.`;
}

/** `For 25 of 53 products, expect …`. */
function scoped({ scope }: HeadlineInput, text: string): string {
  return scope === null ? text : `For ${scope}, ${text.charAt(0).toLowerCase()}${text.slice(1)}`;
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

function plannedSentence({ periods, untilWarrantyEnds }: HeadlineInput): readonly string[] {
  const planned = periods.reduce((sum, period) => sum + period.planned.expected, 0);
  if (planned === 0) return [];
  const none = untilWarrantyEnds === null ? '' : ' and none of those until warranty ends';
  return [
    `Planned shipments, taken as certain, bring ${expectedText(planned)} of the returns in the horizon${none}.`,
  ];
}

function returns(count: PredictedCount): string {
  return `${expectedText(count.expected)} returns`;
}
