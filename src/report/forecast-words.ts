/** The legend and the description of the forecast chart. */
import { max } from 'd3-array';
import type { ChartPeriod, ForecastChartInput } from './forecast-chart.js';
import { betweenText } from './intervals.js';
import { countText, expectedText, percentText } from './numbers.js';

/** What the marks of the chart mean; a band is drawn once for each wider one that lies beneath it. */
export function forecastLegend(input: ForecastChartInput, planned: boolean) {
  const fitted = input.history.some((h) => h.fitted !== null);
  const outward = input.levels.map((level, i) => ({
    kind: 'band',
    depth: Array.from({ length: input.levels.length - i }, (_, layer) => layer),
    label: `${percentText(level)} interval`,
  }));
  const entry = (kind: string, label: string, shown: boolean) => (shown ? [{ kind, depth: [0], label }] : []);
  const ahead = input.periods.length > 0;
  return [
    ...entry('bar', 'returns recorded', input.history.length > 0),
    ...entry('fitted', 'expected by the fitted distribution', fitted),
    ...entry('expected', 'forecast, expected returns', ahead),
    ...(ahead ? outward : []),
    ...entry('planned', 'part of it from planned shipments', planned),
  ];
}

/** What the chart shows, for readers who do not see it. */
export function describeForecast(input: ForecastChartInput): string {
  const sentences: string[] = [];
  const [first, last] = [input.history[0], input.history.at(-1)];
  if (first !== undefined && last !== undefined) {
    const most = countText(max(input.history, (h) => h.returned) ?? 0);
    const range = `${input.words.name(first.period, false)} to ${input.words.name(last.period, false)}`;
    sentences.push(`Bars show returns recorded by ${input.words.noun}, ${range}, at most ${most}.`);
  }
  const [next, end] = [input.periods[0], input.periods.at(-1)];
  if (next !== undefined && end !== undefined) {
    const point = (p: ChartPeriod) =>
      `${expectedText(p.expected)} ${input.words.during(p.period, p.partial)}, ${betweenText(p, input.levels[0] ?? 0)}`;
    sentences.push(`The line with its bands shows the forecast: ${point(next)}; ${point(end)}.`);
  }
  return sentences.join(' ');
}
