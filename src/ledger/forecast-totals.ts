import { compareText } from '../csv.js';
import type { ForecastDocument } from '../records.js';
import { type ForecastRow, intervalOf, untilWarrantyEnds, withCumulative } from './forecast-rows.js';
import { sumUnits } from './money.js';

/**
 * The `(total)` rows: one block over all products when they share a currency, else one block a currency.
 * @param products the rows of each product, in the order of the document.
 */
export function totalRows(
  document: ForecastDocument,
  products: readonly (readonly ForecastRow[])[],
): readonly ForecastRow[] {
  const forecast = products.filter((_, i) => document.products[i]?.notForecast === null);
  const currencies = [...new Set(forecast.map((rows) => rows[0]?.currency ?? null))];
  const named = currencies.filter((currency) => currency !== null).sort(compareText);
  if (named.length < 2) return block(document, forecast, named[0] ?? null, true);
  const blocks = currencies.includes(null) ? [...named, null] : named;
  return blocks.flatMap((currency) =>
    block(
      document,
      forecast.filter((rows) => (rows[0]?.currency ?? null) === currency),
      currency,
      false,
    ),
  );
}

/** @param whole true when `products` are all there are, so that the intervals of the document's total are theirs. */
function block(
  document: ForecastDocument,
  products: readonly (readonly ForecastRow[])[],
  currency: string | null,
  whole: boolean,
): readonly ForecastRow[] {
  const { levels, total } = document;
  const missing = total.productsMissing.length > 0 ? ['products-missing'] : [];
  const sumOf = (period: string) => sumRow(products, period, currency, levels);
  const periods = total.periods.map((period): ForecastRow => {
    const sum = sumOf(period.period);
    return {
      ...sum,
      interval: intervalOf(whole ? period : null, levels),
      cumulativeInterval: intervalOf(whole ? period.cumulative : null, levels),
      status: [...(period.partial ? ['partial-period'] : []), ...missing, ...sum.status],
    };
  });
  const until = sumOf(untilWarrantyEnds);
  const unlimited = until.expected === null && products.length > 0 ? ['no-warranty-limit'] : [];
  const last = {
    ...until,
    interval: intervalOf(whole && until.expected !== null ? total.untilWarrantyEnds : null, levels),
    status: [...unlimited, ...missing],
  };
  return [...withCumulative(periods), last];
}

/** Sums of the rounded rows of one period, without intervals. */
function sumRow(
  products: readonly (readonly ForecastRow[])[],
  period: string,
  currency: string | null,
  levels: readonly number[],
): ForecastRow {
  const rows = products.flatMap((product) => product.filter((row) => row.period === period));
  const costs = rows.map(({ cost }) => cost).filter((cost) => cost !== null);
  return {
    product: '(total)',
    segment: '',
    period,
    expected: sumUnits(rows.map(({ expected }) => expected)),
    interval: intervalOf(null, levels),
    cumulative: null,
    cumulativeInterval: intervalOf(null, levels),
    cost: sumUnits(costs),
    currency,
    status: currency !== null && costs.length < rows.length ? ['cost-incomplete'] : [],
  };
}
