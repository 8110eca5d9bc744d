import fc from 'fast-check';
import { type DayRange, isoDate, periodOf } from '../../src/calendar.js';
import { intakeDocument } from '../../src/ingest/document.js';
import type {
  AgeGroup,
  Cell,
  Cohort,
  ForecastDocument,
  ForecastProduct,
  Intake,
  MonthEnd,
  PredictedCount,
  ProductRecords,
} from '../../src/records.js';
import { resolveConfig } from '../../src/settings.js';

/** Names that have broken CSV or objects somewhere. */
export const hostileNames = [
  ...[
    '__proto__',
    'constructor',
    '=1+1',
    '+a',
    '-a',
    '@a',
    '\ta',
    '\ra',
    "'a",
    "''a",
    '"',
    'a,b',
    'a\nb',
    'a\r\nb',
  ],
  ...['', ' ', 'a b ', '(x)', '<b>', '1e5', 'Ω', '😀'],
];

const name = fc.oneof(fc.constantFrom(...hostileNames), fc.string({ unit: 'binary' }), fc.string());

const range = fc
  .tuple(fc.integer({ min: 19_000, max: 19_060 }), fc.integer({ min: 1, max: 40 }))
  .map(([from, days]) => ({ from, to: from + days }));

const byDays = (a: DayRange, b: DayRange) => a.from - b.from || a.to - b.to;
const daysKey = ({ from, to }: DayRange) => `${from}/${to}`;

/** Units that left a cohort, by ranges of days later than any cohort, without doubles. */
const leavings = fc.uniqueArray(
  fc.record({ days: range, quantity: fc.integer({ min: 1, max: 9 }) }).map(({ days, quantity }) => ({
    days: { from: days.from + 100, to: days.to + 100 },
    quantity,
  })),
  { selector: ({ days }) => daysKey(days), maxLength: 6 },
);

const drawnCohorts = fc.uniqueArray(fc.record({ days: range, returned: leavings, withdrawn: leavings }), {
  selector: ({ days }) => daysKey(days),
  maxLength: 4,
});

/** Cohorts with returns and withdrawals that never exceed what was shipped, sorted as records are. */
const dated = drawnCohorts.map((drawn) => {
  const sorted = [...drawn].sort((a, b) => byDays(a.days, b.days));
  const cells = (kind: 'returned' | 'withdrawn') =>
    sorted.flatMap((one, cohort) =>
      one[kind].map(({ days, quantity }): Cell => ({ cohort, ...days, quantity })).sort(byDays),
    );
  const cohorts = sorted.map(({ days, returned, withdrawn }): Cohort => {
    const left = [...returned, ...withdrawn].reduce((sum, { quantity }) => sum + quantity, 0);
    return { ...days, shipped: left + 1 };
  });
  return { cohorts, returned: cells('returned'), withdrawn: cells('withdrawn'), ages: [] };
});

const aged = fc
  .array(
    fc.record({
      outcome: fc.constantFrom('returned' as const, 'surviving' as const),
      from: fc.double({ min: 0, max: 1e4, noNaN: true }),
      quantity: fc.integer({ min: 1, max: 1000 }),
    }),
  )
  .map((groups) => ({
    cohorts: [],
    returned: [],
    withdrawn: [],
    ages: groups.map((group): AgeGroup => ({ ...group, to: group.from, exact: true })),
  }));

/** Records of products with different names. */
export const records: fc.Arbitrary<readonly ProductRecords[]> = fc.uniqueArray(
  fc
    .record({
      product: name,
      planned: fc.array(range),
      rejectedReturns: fc.nat(5),
      body: fc.oneof(dated, aged),
    })
    .map(
      ({ product, planned, rejectedReturns, body }): ProductRecords => ({
        product,
        segment: null,
        resolution: body.ages.length > 0 ? 'age' : 'period',
        ...body,
        planned: planned.map((days) => ({ ...days, shipped: 5 })),
        rejectedReturns,
        unusable: rejectedReturns > 3 ? { code: 'returns-before-delay', message: product } : null,
      }),
    ),
  { selector: ({ product }) => product, maxLength: 5 },
);

/** A finished `table` stage over records. */
export function monthEndOf(products: readonly ProductRecords[], more: Partial<Intake> = {}): MonthEnd {
  const config = resolveConfig(null, { asOf: '2026-10-31', shipments: ['s.csv'] });
  const intake: Intake = { products, files: [], rejects: [], findings: [], ...more };
  return { intake, table: intakeDocument(config, intake), fit: null, forecast: null };
}

/** A count whose interval at 0.8 is expected − 5 to expected + 5, rounded. */
export function count(expected: number): PredictedCount {
  const [lower, upper] = [Math.floor(expected - 5), Math.ceil(expected + 5)];
  return {
    expected,
    plugIn: expected,
    quantiles: { '0.1': lower, '0.5': Math.round(expected), '0.9': upper },
  };
}

export function forecastProduct(product: string, more: Partial<ForecastProduct> = {}): ForecastProduct {
  return {
    product,
    segment: null,
    chosen: 'weibull',
    notForecast: null,
    method: null,
    currency: null,
    periods: [],
    untilWarrantyEnds: null,
    byCandidate: [],
    history: [],
    ifRejectedWereReal: null,
    findings: [],
    ...more,
  };
}

export function forecastDocument(
  products: readonly ForecastProduct[],
  total: Partial<ForecastDocument['total']> = {},
): ForecastDocument {
  return {
    schema: 'returnfall/forecast/1',
    asOf: '2026-10-31',
    period: 'month',
    horizon: 2,
    levels: [0.8],
    products,
    total: {
      periods: [],
      untilWarrantyEnds: null,
      productsIncluded: [],
      productsMissing: [],
      costs: [],
      history: [],
      ...total,
    },
  };
}

/** A period of a forecast, a month that begins on `from`. */
export function period(
  label: string,
  from: number,
  expected: number,
  cumulative: number,
  cost: number | null = null,
) {
  const days = periodOf(from, 'month');
  return {
    period: label,
    from: isoDate(days.from),
    to: isoDate(days.to - 1),
    partial: false,
    ...count(expected),
    cumulative: count(cumulative),
    planned: { expected: 0, plugIn: 0 },
    expectedCost: cost,
    costs: [],
  };
}
