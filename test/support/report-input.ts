/** Plausible finished documents for the report: an invented maker of garden pumps. Nothing here is a forecast. */
import { addMonths, dayNumber, isoDate, type PeriodKind, periodLabel, periodOf } from '../../src/calendar.js';
import type { Config, ProductRules } from '../../src/config.js';
import type {
  FitProduct,
  ForecastPeriod,
  ForecastProduct,
  HistoryPeriod,
  IntakeProduct,
  NevadaTable,
  PredictedCount,
  TableRow,
} from '../../src/records.js';
import type { ReportInput } from '../../src/report/report.js';
import { fixtureCandidates, fixtureCurves, fixturePoints } from './report-fit.js';

/** A product of the fixture. */
export interface FixtureProduct {
  readonly product: string;
  readonly perMonth: number;
  readonly months: number;
  readonly shape: number;
  readonly scale: number;
  readonly cost: number | null;
  readonly currency: string | null;
  readonly planned: number;
  readonly missing: boolean;
}

export const hostileName = `<script>alert("x")</script> & 'quoted' {{braces}} <img src=x onerror="alert(1)"> ${'pump '.repeat(9)}`;

const plain = { months: 36, cost: null, currency: null, planned: 0, missing: false };

/** Wearing out with planned shipments, failing early in francs, one with few returns, one hostile, one not forecast. */
export const fixtureProducts: readonly FixtureProduct[] = [
  {
    ...plain,
    product: 'Brook 40',
    perMonth: 420,
    shape: 1.6,
    scale: 3200,
    cost: 38.5,
    currency: 'EUR',
    planned: 9000,
  },
  { ...plain, product: 'Brook 60 S', perMonth: 150, shape: 0.7, scale: 9000, cost: 61, currency: 'CHF' },
  { ...plain, product: 'Spring 5', perMonth: 60, months: 8, shape: 1.2, scale: 6000 },
  { ...plain, product: hostileName, perMonth: 90, shape: 1.1, scale: 5000, cost: 12, currency: 'EUR' },
  { ...plain, product: 'Well 9', perMonth: 25, months: 3, shape: 1, scale: 1e9, missing: true },
];

const asOfEnd = dayNumber(2026, 11, 1);
const horizon = 12;

/** The report of all fixture products, monthly, as of 31 October 2026. */
export function reportInput(products: readonly FixtureProduct[] = fixtureProducts): ReportInput {
  const sorted = products.toSorted((a, b) => (a.product < b.product ? -1 : 1));
  const tables = sorted.map(intakeProduct);
  const forecasts = sorted.map((product, i) => forecastProduct(product, tables[i]?.table ?? null));
  return {
    version: '0.1.0',
    settings: settings(),
    table: {
      schema: 'returnfall/intake/1',
      title: 'Pump returns, invented',
      asOf: '2026-10-31',
      period: 'month',
      ageUnit: 'day',
      files: files(),
      products: tables,
      findings: [
        { code: 'unused-column', severity: 'note', message: 'column plant of shipments.csv was not used' },
      ],
    },
    fit: {
      schema: 'returnfall/fit/1',
      asOf: '2026-10-31',
      ageUnit: 'day',
      products: sorted.map((product, i) => fitProduct(product, tables[i] as IntakeProduct)),
    },
    forecast: {
      schema: 'returnfall/forecast/1',
      asOf: '2026-10-31',
      period: 'month',
      horizon,
      levels: [0.8, 0.95],
      products: forecasts,
      total: total(forecasts),
    },
  };
}

/** Ages in hours, without a calendar: one product, forecast over six steps of 500 hours. */
export function agesInput(): ReportInput {
  const base = reportInput([{ ...plain, product: 'Brook 40', perMonth: 40, shape: 1.6, scale: 3200 }]);
  const product = base.table.products[0] as IntakeProduct;
  const forecast = base.forecast?.products[0] as ForecastProduct;
  const periods = forecast.periods
    .slice(0, 6)
    .map((period, i) => ({ ...period, period: String(i + 1), from: null, to: null }));
  const ages = [
    { outcome: 'returned', from: 0, to: 200, exact: false, quantity: 3 },
    { outcome: 'returned', from: 812, to: 812, exact: true, quantity: 1 },
    { outcome: 'surviving', from: 1500, to: 1500, exact: true, quantity: 140 },
  ] as const;
  const noCalendar = { firstShipped: null, lastShipped: null, resolution: 'age', table: null, ages } as const;
  const byCandidate = forecast.byCandidate.map((own) => ({ ...own, untilWarrantyEnds: null }));
  const unlimited = { periods, history: [], untilWarrantyEnds: null };
  return {
    ...base,
    settings: {
      ...base.settings,
      namedProducts: [],
      everyProduct: { ...base.settings.everyProduct, warrantyMonths: null },
      asOf: null,
      ageUnit: 'hour',
      ageStep: 500,
      horizon: 6,
    },
    table: { ...base.table, asOf: null, ageUnit: 'hour', products: [{ ...product, ...noCalendar }] },
    fit:
      base.fit === null
        ? null
        : {
            ...base.fit,
            asOf: null,
            ageUnit: 'hour',
            products: base.fit.products.map((fit) => ({ ...fit, warrantyMonths: null })),
          },
    forecast:
      base.forecast === null
        ? null
        : {
            ...base.forecast,
            asOf: null,
            horizon: 6,
            products: [{ ...forecast, ...unlimited, byCandidate }],
            total: { ...base.forecast.total, ...unlimited },
          },
  };
}

function intakeProduct(product: FixtureProduct): IntakeProduct {
  const table = nevadaTable(product);
  const units = table.rows.reduce((sum, row) => sum + row.shipped, 0);
  const survivors = table.rows.reduce((sum, row) => sum + row.survivors, 0);
  const withdrawn = table.rows.reduce((sum, row) => sum + row.withdrawn.reduce((a, b) => a + b, 0), 0);
  const planned = [{ from: '2026-11-01', to: '2026-11-30', quantity: product.planned }];
  return {
    product: product.product,
    segment: null,
    resolution: 'period',
    units,
    returns: units - survivors - withdrawn,
    withdrawn,
    survivors,
    firstShipped: isoDate(addMonths(asOfEnd, -product.months)),
    lastShipped: '2026-10-31',
    planned: product.planned === 0 ? [] : planned,
    rejectedReturns: product.planned === 0 ? 0 : 3,
    unusable: null,
    table,
    ages: [],
  };
}

/** A deterministic wobble of ±25 % in place of chance. */
function wobble(i: number): number {
  return 1 + 0.25 * Math.sin(i * 12.9898);
}

function shareReturned(product: FixtureProduct, days: number): number {
  return days <= 0 ? 0 : -Math.expm1(-((days / product.scale) ** product.shape));
}

function nevadaTable(product: FixtureProduct): NevadaTable {
  const starts = Array.from({ length: product.months }, (_, i) => addMonths(asOfEnd, i - product.months));
  return {
    periods: starts.map((day) => periodLabel(day, 'month')),
    rows: starts.map((_, i) => tableRow(product, starts, i)),
  };
}

function tableRow(product: FixtureProduct, starts: readonly number[], i: number): TableRow {
  const from = starts[i] as number;
  const shipped = Math.round(product.perMonth * wobble(i));
  const upTo = (j: number) => {
    const share = shareReturned(product, (starts[j] as number) + 15 - from);
    return j < i ? 0 : Math.round(shipped * share * (1 + 0.03 * Math.sin(3 * j + i)));
  };
  const returned = starts.map((_, j) => (j === 0 ? upTo(0) : Math.max(0, upTo(j) - upTo(j - 1))));
  const withdrawn = starts.map((_, j) => (j === i + 2 && i % 5 === 0 && product.perMonth > 100 ? 1 : 0));
  const survivors = shipped - [...returned, ...withdrawn].reduce((a, b) => a + b, 0);
  return {
    shippedIn: periodLabel(from, 'month'),
    from,
    to: addMonths(from, 1),
    shipped,
    returned,
    withdrawn,
    survivors,
  };
}

function fitProduct(product: FixtureProduct, table: IntakeProduct): FitProduct {
  const { product: name, units, returns, withdrawn, survivors } = table;
  const oldestAge = asOfEnd - addMonths(asOfEnd, -product.months);
  const reason = {
    code: 'no-returns',
    message: 'no returns in the records; lend a shape or wait for returns',
  };
  return {
    ...{
      product: name,
      segment: null,
      resolution: 'period',
      units,
      returns,
      withdrawn,
      survivors,
      oldestAge,
    },
    delayDays: 0,
    delayReason: null,
    warrantyMonths: 24,
    warrantyDays: null,
    chosen: product.missing ? null : 'weibull',
    notForecast: product.missing ? reason : null,
    findings:
      product.perMonth === 60
        ? [{ code: 'few-returns', severity: 'warning', message: 'only 9 returns; the interval is wide' }]
        : [],
    candidates: product.missing ? [] : fixtureCandidates(product.shape, product.scale),
    nonparametric: product.missing ? [] : fixturePoints(product.shape, product.scale, product.months, units),
    curves: product.missing ? [] : fixtureCurves(product.shape, product.scale, product.months),
  };
}

function forecastProduct(product: FixtureProduct, table: NevadaTable | null): ForecastProduct {
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

function historyOf(product: FixtureProduct, table: NevadaTable): readonly HistoryPeriod[] {
  return table.periods.map((period, j) => {
    const range = periodOf((table.rows[j] as TableRow).from, 'month');
    const fitted = table.rows.reduce((sum, row) => {
      const share =
        shareReturned(product, range.from + 15 - row.from) -
        shareReturned(product, range.from - 15 - row.from);
      return sum + row.shipped * share;
    }, 0);
    return {
      period,
      from: isoDate(range.from),
      to: isoDate(range.to - 1),
      shipped: (table.rows[j] as TableRow).shipped,
      returned: table.rows.reduce((sum, row) => sum + (row.returned[j] as number), 0),
      fitted,
    };
  });
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
      period: periodLabel(from, 'month' satisfies PeriodKind),
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

function total(products: readonly ForecastProduct[]) {
  const included = products.filter((p) => p.notForecast === null);
  const sum = (pick: (p: ForecastProduct) => number) => included.reduce((total, p) => total + pick(p), 0);
  const length = included[0]?.periods.length ?? 0;
  const longest = products.reduce<readonly HistoryPeriod[]>(
    (a, p) => (p.history.length > a.length ? p.history : a),
    [],
  );
  const currencies = [
    ...new Set(included.flatMap((p) => (p.currency === null ? [] : [p.currency]))),
  ].toSorted();
  return {
    periods: Array.from({ length }, (_, i) => {
      const first = included[0]?.periods[i] as ForecastPeriod;
      const planned = sum((p) => p.periods[i]?.planned.expected ?? 0);
      return {
        ...predicted(sum((p) => p.periods[i]?.expected ?? 0)),
        ...{ period: first.period, from: first.from, to: first.to, partial: false },
        cumulative: predicted(sum((p) => p.periods[i]?.cumulative.expected ?? 0)),
        planned: { expected: planned, plugIn: planned },
      };
    }),
    untilWarrantyEnds: length === 0 ? null : predicted(sum((p) => p.untilWarrantyEnds?.expected ?? 0)),
    productsIncluded: included.map((p) => p.product),
    productsMissing: products.filter((p) => p.notForecast !== null).map((p) => p.product),
    costs: currencies.map((currency) => ({
      currency,
      expectedCost: sum((p) =>
        p.currency === currency
          ? p.periods.reduce((cost, period) => cost + (period.expectedCost ?? 0), 0)
          : 0,
      ),
    })),
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

function files() {
  const sha256 = '5e884898da28047151d0e56f8dc6292773603d0d6aabbdd62a11ef721d1542d8';
  const account = {
    bytes: 184_220,
    sha256,
    read: 4012,
    used: 4007,
    rejected: 3,
    setAside: 2,
    unusedColumns: ['plant'],
  };
  return [
    {
      ...account,
      file: 'returns.csv',
      role: 'returns',
      codes: { 'after-as-of': 2, 'return-before-shipment': 1, 'unreadable-date': 2 },
    },
    {
      ...account,
      file: 'shipments.csv',
      role: 'shipments',
      read: 25_104,
      used: 25_104,
      rejected: 0,
      setAside: 0,
      codes: {},
    },
  ] as const;
}

function settings(): Config {
  const none = { files: [], columns: {}, dateFormat: null, encoding: null };
  const rules: ProductRules = {
    ...{ warrantyMonths: 24, warrantyDays: null },
    delayDays: 0,
    delayReason: null,
    costPerReturn: [],
    currency: null,
  };
  const brook: ProductRules = {
    ...rules,
    delayDays: 12,
    delayReason: 'transport, logistics contract',
    costPerReturn: [
      { from: null, amount: 36 },
      { from: '2026-01-01', amount: 38.5 },
    ],
    currency: 'EUR',
  };
  return {
    ...{ title: 'Pump returns, invented', asOf: '2026-10-31', period: 'month', horizon, levels: [0.8, 0.95] },
    ...{ draws: 4000, seed: 1, candidates: ['exponential', 'gamma', 'loglogistic', 'lognormal', 'weibull'] },
    ...{ maxRejectShare: 0.01, ageUnit: 'day', ageStep: null, everyProduct: rules },
    ...{
      shipments: none,
      returns: none,
      withdrawals: none,
      plan: none,
      table: none,
      tableWithdrawn: none,
      ages: none,
    },
    namedProducts: [{ product: 'Brook 40', rules: brook }],
  };
}
