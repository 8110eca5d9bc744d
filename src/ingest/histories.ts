import type { Dated } from './dated.js';
import type { Leaving } from './leavings.js';
import type { ShipmentRow } from './shipments.js';

/** What is known of a unit that came back or was withdrawn. */
export interface UnitHistory {
  readonly leavings: Leaving[];
  /** From its shipment, null until that is met. */
  product: string | null;
  shipped: Dated | null;
  /** True when its shipments contradict each other. */
  conflicting: boolean;
}

/** The returns and withdrawals, read before the shipments stream past them. */
export interface Departures {
  /** By serial. */
  readonly units: Map<string, UnitHistory>;
  /** Rows that count units of a product and ship date. */
  readonly counted: Leaving[];
}

export function newDepartures(): Departures {
  return { units: new Map(), counted: [] };
}

export function addLeaving(departures: Departures, leaving: Leaving): void {
  if (leaving.unit === null) {
    departures.counted.push(leaving);
    return;
  }
  const history = departures.units.get(leaving.unit);
  if (history !== undefined) history.leavings.push(leaving);
  else {
    const leavings = [leaving];
    departures.units.set(leaving.unit, { leavings, product: null, shipped: null, conflicting: false });
  }
}

/** Gives a unit that left its shipment. */
export function meetShipment(departures: Departures, { unit, product, shipped }: ShipmentRow): void {
  const history = departures.units.get(unit);
  if (history === undefined) return;
  history.product = product;
  history.shipped = shipped;
}

/** Marks a unit whose shipments contradict each other: none of them counts. */
export function markConflict(departures: Departures, unit: string): void {
  const history = departures.units.get(unit);
  if (history === undefined) return;
  history.product = null;
  history.shipped = null;
  history.conflicting = true;
}
