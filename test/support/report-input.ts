/** Plausible finished documents for the report. Nothing here is a forecast. */
import { addMonths } from '../../src/calendar.js';
import type { Config, ProductRules } from '../../src/config.js';
import type { FitProduct, ForecastProduct, IntakeProduct } from '../../src/records.js';
import type { ReportInput } from '../../src/report/report.js';
import { fixtureCandidates, fixtureCurves, fixturePoints } from './report-fit.js';
import { forecastProduct, forecastTotal } from './report-forecast.js';
import { asOfEnd, type FixtureProduct, fixtureProducts, horizon, plain } from './report-products.js';
import { intakeProduct } from './report-table.js';

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
      total: forecastTotal(forecasts),
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
  const unlimited = { history: [], untilWarrantyEnds: null };
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
            products: [{ ...forecast, ...unlimited, periods, byCandidate }],
            total: {
              ...base.forecast.total,
              ...unlimited,
              periods: periods.map((period) => ({ ...period, costs: [] })),
            },
          },
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
    nonparametricLevel: 0.95,
    curves: product.missing ? [] : fixtureCurves(product.shape, product.scale, product.months),
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
