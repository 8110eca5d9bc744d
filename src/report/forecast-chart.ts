/** Actual and forecast returns by period, ready to draw. */
import { max } from 'd3-array';
import { scaleLinear } from 'd3-scale';
import { area, line } from 'd3-shape';
import type { HistoryPeriod, PredictedCount } from '../records.js';
import { frame, periodTicks, roomFor, svgNumber, type Tick } from './axis.js';
import { describeForecast, forecastLegend } from './forecast-words.js';
import { betweenText, intervalOf } from './intervals.js';
import { countText, expectedText } from './numbers.js';
import type { PeriodWords } from './period-words.js';

/** What the chart needs of a period to come. */
export interface ChartPeriod extends PredictedCount {
  readonly period: string;
  readonly partial: boolean;
  readonly planned: { readonly expected: number };
}

export interface ForecastChartInput {
  /** Name of the chart, the root of its ids. */
  readonly id: string;
  readonly title: string;
  readonly history: readonly HistoryPeriod[];
  readonly periods: readonly ChartPeriod[];
  readonly levels: readonly number[];
  /** The as-of date in words, null without a calendar. */
  readonly asOf: string | null;
  readonly words: PeriodWords;
}

/** A bar of the chart, in its slot. */
export interface Bar {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
  /** Read out where the pointer rests. */
  readonly label: string;
}

/** View of charts/forecast.hbs; null when there is nothing to draw. */
export function forecastChart(input: ForecastChartInput) {
  const slots = input.history.length + input.periods.length;
  if (slots === 0) return null;
  const place = placing(input, slots);
  const planned = input.periods.some((p) => p.planned.expected > 0);
  const yTicks = countTicks(place);
  return {
    id: input.id,
    title: input.title,
    description: describeForecast(input),
    frame,
    yTicks,
    room: roomFor(yTicks),
    axis: input.words.axis,
    xTicks: periodTicks([...input.history, ...input.periods].map((p) => p.period)),
    bars: historyBars(input, place),
    fitted: fittedPath(input, place),
    bands: bands(input, place),
    planned: planned ? plannedBars(input, place) : [],
    expected: expectedPath(input, place),
    dots: expectedDots(input, place),
    asOf: asOfMark(input, place),
    legend: forecastLegend(input, planned),
  };
}

interface Placing {
  /** Edge of a slot in percent of the width. */
  readonly x: (slot: number) => number;
  readonly y: ReturnType<typeof scaleLinear<number, number>>;
  readonly firstForecast: number;
}

function placing(input: ForecastChartInput, slots: number): Placing {
  const past = input.history.flatMap((h) => [h.returned, h.fitted ?? 0]);
  const ahead = input.periods.flatMap((p) => [p.expected, ...Object.values(p.quantiles)]);
  const top = max([...past, ...ahead]) ?? 0;
  const y = scaleLinear([0, Math.max(1, top)], [frame.bottom, frame.top]).nice(5);
  return { x: (slot) => (slot / slots) * 100, y, firstForecast: input.history.length };
}

function countTicks({ y }: Placing): readonly Tick[] {
  const whole = y.ticks(5).filter(Number.isInteger);
  return whole.map((value) => ({ at: svgNumber(y(value)), label: countText(value), wideOnly: false }));
}

function historyBars(input: ForecastChartInput, place: Placing): readonly Bar[] {
  return input.history.map((h, i) => {
    const label = `${input.words.name(h.period, false)}: ${countText(h.returned)} returned`;
    return bar(place, i, h.returned, 0.12, label);
  });
}

function plannedBars(input: ForecastChartInput, place: Placing): readonly Bar[] {
  return input.periods.map((p, i) => {
    const label = `${input.words.name(p.period, p.partial)}: ${expectedText(p.planned.expected)} from planned shipments`;
    return bar(place, place.firstForecast + i, p.planned.expected, 0.2, label);
  });
}

/** A bar in its slot, with `gap` of the slot left free on either side. */
function bar({ x, y }: Placing, slot: number, value: number, gap: number, label: string): Bar {
  return {
    x: svgNumber(x(slot + gap)),
    width: svgNumber(x(1 - 2 * gap)),
    y: svgNumber(y(value)),
    height: svgNumber(y(0) - y(value)),
    label,
  };
}

function fittedPath(input: ForecastChartInput, { x, y }: Placing): string | null {
  return line<HistoryPeriod>()
    .defined((h) => h.fitted !== null)
    .x((_, i) => across(x(i + 0.5)))
    .y((h) => y(h.fitted ?? 0))
    .digits(2)(input.history);
}

/** One stepped band a level, the widest first, so that the inner ones lie darker on top. */
function bands(input: ForecastChartInput, { x, y, firstForecast }: Placing): readonly (string | null)[] {
  const edges = input.periods.flatMap((p, i) =>
    [0, 1].map((side) => ({ p, slot: firstForecast + i + side })),
  );
  return input.levels.toReversed().map((level) => {
    const within = (edge: (typeof edges)[number]) => intervalOf(edge.p, level);
    return area<(typeof edges)[number]>()
      .x((edge) => across(x(edge.slot)))
      .y0((edge) => y(within(edge).lower ?? edge.p.expected))
      .y1((edge) => y(within(edge).upper ?? edge.p.expected))
      .digits(2)(edges);
  });
}

function expectedPath(input: ForecastChartInput, { x, y, firstForecast }: Placing): string | null {
  return line<ChartPeriod>()
    .x((_, i) => across(x(firstForecast + i + 0.5)))
    .y((p) => y(p.expected))
    .digits(2)(input.periods);
}

function expectedDots(input: ForecastChartInput, { x, y, firstForecast }: Placing) {
  return input.periods.map((p, i) => ({
    x: svgNumber(x(firstForecast + i + 0.5)),
    y: svgNumber(y(p.expected)),
    label: `${input.words.name(p.period, p.partial)}: ${expectedText(p.expected)} expected, ${betweenText(p, input.levels[0] ?? 0)}`,
  }));
}

function asOfMark(input: ForecastChartInput, { x, firstForecast }: Placing) {
  if (input.asOf === null) return null;
  const at = svgNumber(x(firstForecast));
  return { at, label: `as of ${input.asOf}`, anchor: at < 50 ? 'start' : 'end', offset: at < 50 ? 6 : -6 };
}

function across(percent: number): number {
  return (percent / 100) * frame.pathWidth;
}
