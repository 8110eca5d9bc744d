import type { PeriodKind } from '../calendar.js';
import { type Claim, compareLeaving, originOf } from './claim.js';
import type { Dated } from './dated.js';
import type { Departures } from './departures.js';
import type { Fleet, ShippedLot } from './fleet.js';
import { isInOrder, type Leaving } from './leavings.js';
import { netReversals } from './reversals.js';
import { rejectRow, setAsideRow } from './tally.js';

/** What is claimed of one product. */
export interface ProductClaims {
  /** Rows that name a unit, one a unit. */
  readonly units: Leaving[];
  /** Rows that count units, netted. */
  readonly counted: Claim[];
}

/**
 * Sorts returns and withdrawals by product; what cannot be a claim goes into the tallies of its rows.
 * @param period within which reversals net.
 */
export function claimsByProduct(
  departures: Departures,
  fleet: Fleet,
  period: PeriodKind,
): Map<string, ProductClaims> {
  const products = new Map<string, ProductClaims>();
  const claimsOf = (product: string) => {
    const claims = products.get(product) ?? { units: [], counted: [] };
    products.set(product, claims);
    return claims;
  };
  for (const [unit, rows] of departures.units) {
    const first = earliest(rows, fleet, departures.conflicting.has(unit));
    if (first !== null) claimsOf(originOf(first).product).units.push(first);
  }
  const known = departures.counted.filter((leaving) => isKnownProduct(leaving, fleet));
  for (const claim of netReversals(known, period)) claimsOf(claim.product).counted.push(claim);
  return products;
}

/** Of the rows of one unit the earliest that fits its shipment; the later ones are set aside. */
function earliest(rows: Leaving, fleet: Fleet, conflicting: boolean): Leaving | null {
  const fitting: Leaving[] = [];
  for (let row: Leaving | null = rows; row !== null; row = row.next) {
    if (row.lot === null ? fitsCounted(row, conflicting, fleet) : fitsShipment(row, row.lot))
      fitting.push(row);
  }
  if (fitting.length > 1) fitting.sort(compareLeaving);
  const [first, ...later] = fitting;
  if (first === undefined) return null;
  for (const row of later) setAsideRow(row, 'repeat-return', 'unit', `the unit was ${first.kind} before`);
  return first;
}

/** True when a row agrees with the shipment of its unit; otherwise it is rejected. */
function fitsShipment(leaving: Leaving, { product, shipped }: ShippedLot): boolean {
  if (leaving.product !== null && leaving.product !== product) {
    const message = `unit ${leaving.unit} was shipped as ${product}, not as ${leaving.product}`;
    rejectRow(leaving, 'unknown-unit', 'product', message);
    return false;
  }
  if (leaving.shipped !== null && !overlap(leaving.shipped, shipped)) {
    rejectRow(leaving, 'unknown-unit', 'ship_date', `unit ${leaving.unit} was shipped at another time`);
    return false;
  }
  return isInOrder(leaving, product, shipped);
}

/** A unit that no shipment names can still be one of a counted lot, when its row says which; otherwise the row is rejected. */
function fitsCounted(leaving: Leaving, conflicting: boolean, fleet: Fleet): boolean {
  const { product, shipped, unit } = leaving;
  if (product !== null && !isKnownProduct(leaving, fleet)) return false;
  const counted = product !== null && fleet.products.get(product)?.counted === true;
  if (counted && shipped !== null && !conflicting) return true;
  const why = conflicting
    ? 'has several shipments that contradict each other'
    : 'was not shipped by the as-of date';
  rejectRow(leaving, 'unknown-unit', 'unit', `unit ${unit} ${why}`);
  return false;
}

function isKnownProduct(leaving: Leaving, fleet: Fleet): boolean {
  if (fleet.products.has(leaving.product ?? '')) return true;
  rejectRow(
    leaving,
    'unknown-product',
    'product',
    `product ${leaving.product} was not shipped by the as-of date`,
  );
  return false;
}

function overlap(a: Dated, b: Dated): boolean {
  return a.from < b.to && b.from < a.to;
}
