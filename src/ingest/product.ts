import type { DayRange } from '../calendar.js';
import { type Config, rulesOf } from '../config.js';
import type { Cohort, NotForecast, ProductRecords } from '../records.js';
import { unitClaim } from './claim.js';
import type { ProductClaims } from './claims.js';
import { cohortsOf } from './cohorts.js';
import type { ShippedProduct } from './fleet.js';
import { type Placed, placeClaims } from './placing.js';

/** All that is known of one product before it is put together. */
export interface ProductParts {
  readonly product: string;
  readonly shipped: ShippedProduct;
  readonly claims: ProductClaims;
  readonly planned: readonly Cohort[];
}

/** Puts a product together: cohorts, cells, and whether they allow a forecast. Claims that do not fit are rejected on the way. */
export function productRecords(
  config: Config,
  parts: ProductParts,
  cutOff: number,
): Omit<ProductRecords, 'rejectedReturns'> {
  const { product, planned } = parts;
  const claims = [...parts.claims.units.map(unitClaim), ...parts.claims.counted];
  const shipDates = claims.map((claim) => claim.shipped);
  const cohorts = cohortsOf(product, parts.shipped, shipDates, cutOff);
  const placed = placeClaims(claims, cohorts, rulesOf(config, product), cutOff);
  const { returned, withdrawn } = placed;
  return {
    product,
    segment: null,
    resolution: [...cohorts.list, ...returned, ...withdrawn].every(isDay) ? 'day' : 'period',
    cohorts: cohorts.list,
    returned,
    withdrawn,
    planned,
    ages: [],
    unusable: tooManyBeforeDelay(config, product, placed),
  };
}

/** Why returns before the delay forbid a forecast, null when they are few enough. */
export function tooManyBeforeDelay(
  config: Config,
  product: string,
  { beforeDelay, returns }: Pick<Placed, 'beforeDelay' | 'returns'>,
): NotForecast | null {
  if (beforeDelay <= config.maxRejectShare * returns) return null;
  const { delayDays } = rulesOf(config, product);
  const found = `${beforeDelay} of ${returns} returns came within the delay of ${delayDays} days`;
  return { code: 'returns-before-delay', message: `${found}; lower delayDays of ${product}` };
}

function isDay({ from, to }: DayRange): boolean {
  return to - from === 1;
}
