/** The sum over products: headline, chart and tables. */
import type { ForecastTotal } from '../records.js';
import { dateText } from './dates.js';
import { forecastChart } from './forecast-chart.js';
import { forecastTable, historyRows } from './forecast-table.js';
import { headline } from './headline.js';
import type { ProductParts, ReportInput } from './parts.js';
import { periodWords } from './period-words.js';

/** View of the sum; `scope` names how many of the products it holds. */
export function totalView(input: ReportInput, total: ForecastTotal, products: readonly ProductParts[]) {
  const words = periodWords(input);
  const left = total.productsMissing.length;
  const included = total.productsIncluded.length;
  const scope = left === 0 ? null : `${included} of ${included + left} products`;
  const name = scope ?? 'all products';
  const shared = {
    periods: total.periods,
    untilWarrantyEnds: total.untilWarrantyEnds,
    levels: input.forecast?.levels ?? input.settings.levels,
    words,
    asOf: input.table.asOf === null ? null : dateText(input.table.asOf),
  };
  const forecast = products.filter((parts) => parts.forecast?.notForecast === null);
  return {
    headline: headline({
      ...shared,
      costs: total.costs,
      costless: forecast.filter(withoutCost).map((parts) => parts.name),
      scope: products.length > 1 ? scope : null,
      survivors: forecast.reduce((sum, parts) => sum + parts.table.survivors, 0),
    }),
    name: `${name.charAt(0).toUpperCase()}${name.slice(1)}`,
    chart: forecastChart({
      ...shared,
      id: 'forecast-total',
      title: `Returns per ${words.per}, ${name}`,
      history: total.history,
    }),
    table: forecastTable(shared),
    caption: `Expected returns of ${name}, with intervals`,
    history: historyRows(total.history, words),
    noun: words.noun,
    partial: left > 0,
  };
}

function withoutCost({ forecast }: ProductParts): boolean {
  return (forecast?.periods ?? []).some((period) => period.expectedCost === null);
}
