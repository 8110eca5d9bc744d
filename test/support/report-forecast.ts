/** Forecasts of the report fixture, from a trend and a rounded normal distribution. */
import { addMonths, isoDate, periodLabel } from '../../src/calendar.js';
import type {
  ForecastPeriod,
  ForecastProduct,
  ForecastTotal,
  HistoryPeriod,
  NevadaTable,
  PredictedCount,
} from '../../src/records.js';
import { asOfEnd, type FixtureProduct, horizon } from './report-products.js';
import { historyOf } from './report-table.js';

/** What the forecast would say of a product. */
export function forecastProduct(product: FixtureProduct, table: NevadaTable | null): ForecastProduct {
  const history = table === null ? [] : historyOf(product, table);
  const periods = product.missing ? [] : periodsOf(product, (history.at(-1)?.fitted ?? 1) * 1.04);
  return {
    product: product.product,
    segment: null,
    chosen: product.missing ? null : 'weibull',
    notForecast: product.missing
      ? { code: 'no-returns', message: 'no returns in the records; lend a shape or wait for returns' }
      : null,
    method: product.missing
      ? null
      : {
          draws: 4000,
          parameters: 'pivotal',
          restarted: 2,
          counts: 'multinomial',
          assumes: 'a rate that does not change',
        },
    currency: product.currency,
    periods,
    untilWarrantyEnds: product.missing ? null : predicted((periods.at(-1)?.cumulative.expected ?? 0) * 1.7),
    byCandidate: product.missing
      ? []
      : [
          {
            family: 'weibull',
            atRisk: null,
            weight: 0.74,
            ruledOut: null,
            nextPeriod: 31,
            horizon: 400.2,
            untilWarrantyEnds: 650.1,
          },
          {
            family: 'lognormal',
            atRisk: null,
            weight: 0.26,
            ruledOut: null,
            nextPeriod: 28.4,
            horizon: 361,
            untilWarrantyEnds: 540,
          },
        ],
    history,
    ifRejectedWereReal: product.planned === 0 ? 0 : 2.31,
    findings: [],
  };
}

/** The sum over products. */
export function forecastTotal(products: readonly ForecastProduct[]): ForecastTotal {
  const included = products.filter((p) => p.notForecast === null);
  const sum = (pick: (p: ForecastProduct) => number) => included.reduce((all, p) => all + pick(p), 0);
  const length = included[0]?.periods.length ?? 0;
  const longest = products.reduce<readonly HistoryPeriod[]>(
    (a, p) => (p.history.length > a.length ? p.history : a),
    [],
  );
  const currencies = [
    ...new Set(included.flatMap((p) => (p.currency === null ? [] : [p.currency]))),
  ].toSorted();
  const costsIn = (pick: (p: ForecastProduct) => readonly ForecastPeriod[]) =>
    currencies.map((currency) => ({
      currency,
      expectedCost: sum((p) =>
        p.currency === currency ? pick(p).reduce((cost, period) => cost + (period.expectedCost ?? 0), 0) : 0,
      ),
    }));
  return {
    periods: Array.from({ length }, (_, i) => {
      const first = included[0]?.periods[i] as ForecastPeriod;
      const planned = sum((p) => p.periods[i]?.planned.expected ?? 0);
      return {
        ...predicted(sum((p) => p.periods[i]?.expected ?? 0)),
        ...{ period: first.period, from: first.from, to: first.to, partial: false },
        cumulative: predicted(sum((p) => p.periods[i]?.cumulative.expected ?? 0)),
        planned: { expected: planned, plugIn: planned },
        costs: costsIn((p) => p.periods.slice(i, i + 1)),
      };
    }),
    untilWarrantyEnds: length === 0 ? null : predicted(sum((p) => p.untilWarrantyEnds?.expected ?? 0)),
    productsIncluded: included.map((p) => p.product),
    productsMissing: products.filter((p) => p.notForecast !== null).map((p) => p.product),
    costs: costsIn((p) => p.periods),
    history: longest.map((h) => {
      const same = (p: ForecastProduct) => p.history.find((other) => other.period === h.period);
      return {
        ...h,
        shipped: products.reduce((a, p) => a + (same(p)?.shipped ?? 0), 0),
        returned: products.reduce((a, p) => a + (same(p)?.returned ?? 0), 0),
        fitted: sum((p) => same(p)?.fitted ?? 0),
      };
    }),
  };
}

function periodsOf(product: FixtureProduct, start: number): readonly ForecastPeriod[] {
  let sum = 0;
  return Array.from({ length: horizon }, (_, i) => {
    const from = addMonths(asOfEnd, i);
    const planned = product.planned * 0.0008 * (i + 1);
    const expected = start * 1.03 ** i + planned;
    sum += expected;
    return {
      ...predicted(expected),
      period: periodLabel(from, 'month'),
      from: isoDate(from),
      to: isoDate(addMonths(from, 1) - 1),
      partial: false,
      cumulative: predicted(sum),
      planned: { expected: planned, plugIn: planned * 0.99 },
      expectedCost: product.cost === null ? null : expected * product.cost,
    };
  });
}

/** Quantiles of a rounded normal distribution that is a little wider than Poisson. */
function predicted(expected: number): PredictedCount {
  const spread = Math.sqrt(expected + (0.08 * expected) ** 2);
  const at = (z: number) => Math.max(0, Math.round(expected + z * spread));
  return {
    expected,
    plugIn: expected * 0.995,
    quantiles: { '0.025': at(-1.96), '0.1': at(-1.2816), '0.5': at(0), '0.9': at(1.2816), '0.975': at(1.96) },
  };
}
