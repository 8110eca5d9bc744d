import type { Dated } from './dated.js';
import type { ShipmentRow } from './shipments.js';

/** Units shipped on one date as the records give it. */
export interface ShippedLot {
  readonly product: string;
  readonly shipped: Dated;
  quantity: number;
}

/** What was shipped of one product by the cut-off. */
export interface ShippedProduct {
  /** By `Dated.key`; no lot is empty. */
  readonly lots: Map<number, ShippedLot>;
  /** True when some row counts units instead of naming them. */
  counted: boolean;
}

/** All that was shipped by the cut-off, by product. */
export interface Fleet {
  readonly products: Map<string, ShippedProduct>;
  /** Rows that name a unit. */
  unitRows: number;
}

export function newFleet(): Fleet {
  return { products: new Map(), unitRows: 0 };
}

/** Adds a shipment and returns the lot that holds it. */
export function addShipment(fleet: Fleet, { product, unit, shipped, quantity }: ShipmentRow): ShippedLot {
  let entry = fleet.products.get(product);
  if (entry === undefined) {
    entry = { lots: new Map(), counted: false };
    fleet.products.set(product, entry);
  }
  let lot = entry.lots.get(shipped.key);
  if (lot === undefined) {
    lot = { product, shipped, quantity: 0 };
    entry.lots.set(shipped.key, lot);
  }
  lot.quantity += quantity;
  if (unit === '') entry.counted = true;
  else fleet.unitRows++;
  return lot;
}

/** Takes a shipment that was added out again; a product of which nothing is left was never shipped. */
export function removeShipment(fleet: Fleet, { product, shipped, quantity }: ShipmentRow): void {
  const entry = fleet.products.get(product);
  const lot = entry?.lots.get(shipped.key);
  if (entry === undefined || lot === undefined) return;
  lot.quantity -= quantity;
  if (lot.quantity === 0) entry.lots.delete(shipped.key);
  if (entry.lots.size === 0) fleet.products.delete(product);
}
