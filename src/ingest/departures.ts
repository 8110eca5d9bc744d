import type { ShippedLot } from './fleet.js';
import type { Leaving } from './leavings.js';

/** The returns and withdrawals, read before the shipments stream past them. */
export interface Departures {
  /** By serial; the rows of one unit are linked by `next`. */
  readonly units: Map<string, Leaving>;
  /** Rows that count units of a product and ship date. */
  readonly counted: Leaving[];
  /** Units whose shipments contradict each other. */
  readonly conflicting: Set<string>;
  /** One bit a unit, by fingerprint: spares most shipments the search in `units`. */
  readonly sieve: Uint8Array;
}

const sieveBits = 24;

export function newDepartures(): Departures {
  const sieve = new Uint8Array(1 << (sieveBits - 3));
  return { units: new Map(), counted: [], conflicting: new Set(), sieve };
}

/** Keeps a row. @param print fingerprint of its unit, 0 without one. */
export function addLeaving({ units, counted, sieve }: Departures, leaving: Leaving, print: number): void {
  if (leaving.unit === null) {
    counted.push(leaving);
    return;
  }
  leaving.next = units.get(leaving.unit) ?? null;
  units.set(leaving.unit, leaving);
  sieve[placeOf(print)] = (sieve[placeOf(print)] as number) | bitOf(print);
}

/** Gives the rows of a unit that left its shipment. @param print fingerprint of the unit. */
export function meetShipment(
  { units, sieve }: Departures,
  unit: string,
  print: number,
  lot: ShippedLot,
): void {
  if (((sieve[placeOf(print)] as number) & bitOf(print)) === 0) return;
  for (let row = units.get(unit) ?? null; row !== null; row = row.next) row.lot = lot;
}

/** Marks a unit whose shipments contradict each other: none of them counts. */
export function markConflict({ units, conflicting }: Departures, unit: string): void {
  conflicting.add(unit);
  for (let row = units.get(unit) ?? null; row !== null; row = row.next) row.lot = null;
}

function placeOf(print: number): number {
  return (print >>> 0) & ((1 << (sieveBits - 3)) - 1);
}

function bitOf(print: number): number {
  return 1 << (print >>> 29);
}
