import { compareText } from '../csv.js';
import type { Dated } from './dated.js';
import type { Fleet } from './fleet.js';
import type { Departures, UnitHistory } from './histories.js';
import { isInOrder, type Leaving } from './leavings.js';
import { netReversals } from './reversals.js';
import { rejectRow, setAsideRow } from './tally.js';

/** Units that are said to have left a cohort; its rows are used or rejected together. */
export interface Claim {
  readonly kind: Leaving['kind'];
  readonly product: string;
  readonly shipped: Dated;
  readonly when: Dated;
  /** Above 0. */
  readonly quantity: number;
  /** In no order. */
  readonly rows: readonly Leaving[];
}

/** Turns returns and withdrawals into claims on cohorts; what cannot be one goes into the tallies of its rows. */
export function claimsOf(departures: Departures, fleet: Fleet): Claim[] {
  const claims: Claim[] = [];
  for (const history of departures.units.values()) {
    const claim = unitClaim(history, fleet);
    if (claim !== null) claims.push(claim);
  }
  const known = departures.counted.filter((leaving) => isKnownProduct(leaving, fleet));
  return [...claims, ...netReversals(known)];
}

/** Orders what left: earlier first, a return before a withdrawal of the same time, then by what the row says. */
export function compareLeaving(
  a: Pick<Claim, 'when' | 'kind'> & { readonly text: string },
  b: Pick<Claim, 'when' | 'kind'> & { readonly text: string },
): number {
  return (
    a.when.from - b.when.from ||
    a.when.to - b.when.to ||
    compareText(a.kind, b.kind) ||
    compareText(a.text, b.text)
  );
}

function unitClaim(history: UnitHistory, fleet: Fleet): Claim | null {
  const fitting = history.leavings.flatMap((leaving) => matched(leaving, history, fleet) ?? []);
  if (fitting.length > 1) fitting.sort((a, b) => compareLeaving(a.leaving, b.leaving));
  const [first, ...later] = fitting;
  if (first === undefined) return null;
  for (const { leaving } of later) setAsideRow(leaving, 'repeat-return', 'unit', leftBefore(first.leaving));
  const { kind, when } = first.leaving;
  return { kind, when, product: first.product, shipped: first.shipped, quantity: 1, rows: [first.leaving] };
}

interface Matched {
  readonly leaving: Leaving;
  readonly product: string;
  readonly shipped: Dated;
}

/** The row with the origin of its unit; null when there is none or they do not fit, and then the row is rejected. */
function matched(leaving: Leaving, history: UnitHistory, fleet: Fleet): Matched | null {
  const { product, shipped } = history;
  if (product === null || shipped === null) return matchedByOrigin(leaving, history.conflicting, fleet);
  if (leaving.product !== null && leaving.product !== product) {
    const message = `unit ${leaving.unit} was shipped as ${product}, not as ${leaving.product}`;
    rejectRow(leaving, 'unknown-unit', 'product', message);
    return null;
  }
  if (leaving.shipped !== null && !overlap(leaving.shipped, shipped)) {
    rejectRow(leaving, 'unknown-unit', 'ship_date', `unit ${leaving.unit} was shipped at another time`);
    return null;
  }
  return isInOrder({ ...leaving, product }, shipped) ? { leaving, product, shipped } : null;
}

/** A unit that no shipment names can still be one of a counted lot, when its row says which. */
function matchedByOrigin(leaving: Leaving, conflicting: boolean, fleet: Fleet): Matched | null {
  const { product, shipped, unit } = leaving;
  if (product !== null && !isKnownProduct(leaving, fleet)) return null;
  const counted = product !== null && fleet.products.get(product)?.counted === true;
  if (counted && shipped !== null && !conflicting) return { leaving, product, shipped };
  const why = conflicting ? 'has several shipments that contradict each other' : 'was never shipped';
  rejectRow(leaving, 'unknown-unit', 'unit', `unit ${unit} ${why}`);
  return null;
}

function isKnownProduct(leaving: Leaving, fleet: Fleet): boolean {
  if (fleet.products.has(leaving.product ?? '')) return true;
  rejectRow(leaving, 'unknown-product', 'product', `product ${leaving.product} was never shipped`);
  return false;
}

function overlap(a: Dated, b: Dated): boolean {
  return a.from < b.to && b.from < a.to;
}

function leftBefore(first: Leaving): string {
  return first.kind === 'returned' ? 'the unit was returned before' : 'the unit was withdrawn before';
}
