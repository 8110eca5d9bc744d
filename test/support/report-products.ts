/** The products of the report fixture: an invented maker of garden pumps. */
import { dayNumber } from '../../src/calendar.js';

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

/** A long name that would break a careless page. */
export const hostileName = `<script>alert("x")</script> & 'quoted' {{braces}} <img src=x onerror="alert(1)"> ${'pump '.repeat(9)}`;

/** What most of them have in common. */
export const plain = { months: 36, cost: null, currency: null, planned: 0, missing: false };

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

/** The day after the as-of date. */
export const asOfEnd = dayNumber(2026, 11, 1);

/** Months to forecast. */
export const horizon = 12;

/** The share of a product that has come back by an age. */
export function shareReturned(product: FixtureProduct, days: number): number {
  return days <= 0 ? 0 : -Math.expm1(-((days / product.scale) ** product.shape));
}
