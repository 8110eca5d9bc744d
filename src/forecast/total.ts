import type { Config } from '../config.js';
import { compareText } from '../csv.js';
import type {
  ForecastPeriod,
  ForecastProduct,
  ForecastTotal,
  HistoryPeriod,
  PredictedCount,
} from '../records.js';
import type { ProductDraws } from './product.js';
import { columnOf, cumulativeColumns, predictedCount, quantileProbabilities } from './summary.js';

/**
 * The sum over all products that are forecast. Draws of equal index are added, so that the quantiles are those of the sum;
 * products are drawn independently of one another. Until warranty ends is null unless every product has a limit.
 */
export function totalForecast(config: Config, results: readonly ProductDraws[]): ForecastTotal {
  const included = results.filter((result) => result.counts !== null);
  const products = included.map((result) => result.product);
  const missing = results.filter((result) => result.counts === null).map((result) => result.product);
  const { counts, columns } = sumCounts(included);
  const sums = cumulativeColumns(counts, columns, columns - 1);
  const probabilities = quantileProbabilities(config.levels);
  const limited = products.length > 0 && products.every((product) => product.untilWarrantyEnds !== null);
  return {
    periods: (products[0]?.periods ?? []).map(({ period, from, to, partial }, j) => {
      const parts = products.map((product) => product.periods[j] as ForecastPeriod);
      const whole = added(parts);
      const upTo = added(parts.map((part) => part.cumulative));
      const planned = parts.map((part) => part.planned);
      return {
        period,
        from,
        to,
        partial,
        ...predictedCount(whole.expected, whole.plugIn, columnOf(counts, columns, j), probabilities),
        cumulative: predictedCount(upTo.expected, upTo.plugIn, sums[j] as Float64Array, probabilities),
        planned: added(planned),
        costs: costsByCurrency(products, (product) => product.periods.slice(j, j + 1)),
      };
    }),
    untilWarrantyEnds: limited
      ? totalUntil(products, columnOf(counts, columns, columns - 1), probabilities)
      : null,
    productsIncluded: [...new Set(products.map((product) => product.product))],
    productsMissing: [...new Set(missing.map((product) => product.product))],
    costs: costsByCurrency(products, (product) => product.periods),
    history: addHistories((included.length > 0 ? included : results).map(({ product }) => product.history)),
  };
}

function sumCounts(included: readonly ProductDraws[]): { counts: Float64Array; columns: number } {
  const first = included[0]?.counts;
  if (first === undefined || first === null) return { counts: new Float64Array(0), columns: 1 };
  const counts = new Float64Array(first.counts.length);
  for (const result of included) {
    result.counts?.counts.forEach((count, i) => {
      counts[i] = (counts[i] as number) + count;
    });
  }
  return { counts, columns: first.columns };
}

function totalUntil(
  products: readonly ForecastProduct[],
  draws: Float64Array,
  probabilities: readonly number[],
): PredictedCount {
  const { expected, plugIn } = added(products.map((product) => product.untilWarrantyEnds as PredictedCount));
  return predictedCount(expected, plugIn, draws, probabilities);
}

function added(parts: readonly { readonly expected: number; readonly plugIn: number }[]) {
  return parts.reduce<{ expected: number; plugIn: number }>(
    (sum, part) => ({ expected: sum.expected + part.expected, plugIn: sum.plugIn + part.plugIn }),
    { expected: 0, plugIn: 0 },
  );
}

function costsByCurrency(
  products: readonly ForecastProduct[],
  periodsOf: (product: ForecastProduct) => readonly ForecastPeriod[],
): ForecastTotal['costs'] {
  const costs = new Map<string, number>();
  for (const product of products) {
    const { currency } = product;
    if (currency === null) continue;
    const cost = periodsOf(product).reduce((sum, period) => sum + (period.expectedCost ?? 0), 0);
    costs.set(currency, (costs.get(currency) ?? 0) + cost);
  }
  return [...costs]
    .sort(([a], [b]) => compareText(a, b))
    .map(([currency, expectedCost]) => ({ currency, expectedCost }));
}

/** Periods of the products put together; fitted is null in a period where some product has none. */
function addHistories(histories: readonly (readonly HistoryPeriod[])[]): HistoryPeriod[] {
  const byPeriod = new Map<string, HistoryPeriod>();
  for (const period of histories.flat()) {
    const known = byPeriod.get(period.period);
    byPeriod.set(period.period, known === undefined ? period : mergePeriods(known, period));
  }
  return [...byPeriod.values()].sort((a, b) => compareText(a.from, b.from));
}

function mergePeriods(a: HistoryPeriod, b: HistoryPeriod): HistoryPeriod {
  const fitted = a.fitted === null || b.fitted === null ? null : a.fitted + b.fitted;
  return { ...a, shipped: a.shipped + b.shipped, returned: a.returned + b.returned, fitted };
}
