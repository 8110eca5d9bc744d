import type { Config } from '../config.js';
import {
  badQuantity,
  dateOf,
  isWellFormed,
  missingValue,
  productAt,
  type Row,
  refOf,
  textAt,
  wholeNumber,
} from './cells.js';
import { findColumns } from './columns.js';
import type { Dated } from './dated.js';
import { dateReader } from './dates.js';
import { readRows } from './rows.js';
import { type FileTally, noteDays, setAsideRow } from './tally.js';

/** A row of a shipments file that could be read and counts. */
export interface ShipmentRow {
  readonly product: string;
  /** Serial, empty when the row counts units. */
  readonly unit: string;
  readonly shipped: Dated;
  readonly quantity: number;
}

/** Takes a row that counts, and the row as it was read. */
export type ShipmentHandler = (shipment: ShipmentRow, row: Row) => void;

/**
 * Reads one file of shipments, counted or by unit, and hands on what counts by the cut-off; the rest goes into the tally.
 * @param cutOff end of the as-of day, Infinity when it is not known.
 */
export async function readShipments(
  config: Config,
  tally: FileTally,
  cutOff: number,
  handle: ShipmentHandler,
  onBytes: (bytes: number) => void,
): Promise<void> {
  const { shipments: input } = config;
  const readDate = dateReader(input.dateFormat);
  tally.read = await readRows(
    tally.source,
    input.encoding,
    (header) => {
      const columns = findColumns('shipments', tally.source.name, header, input);
      tally.columns = columns;
      const at = {
        product: columns.at('product'),
        unit: columns.at('unit'),
        date: columns.at('ship_date'),
        quantity: columns.at('quantity'),
      };
      return (cells, line) => {
        const row = { cells, line };
        const shipment = readShipment(tally, row, at, readDate);
        if (shipment === null) return;
        noteDays(tally, shipment.shipped, cutOff);
        if (shipment.shipped.from < cutOff) handle(shipment, row);
        else setAsideRow(refOf(tally, row), 'after-as-of', 'ship_date', 'shipped after the as-of date');
      };
    },
    onBytes,
  );
}

interface Positions {
  readonly product: number;
  readonly unit: number;
  readonly date: number;
  readonly quantity: number;
}

function readShipment(
  tally: FileTally,
  row: Row,
  at: Positions,
  readDate: ReturnType<typeof dateReader>,
): ShipmentRow | null {
  if (!isWellFormed(tally, row)) return null;
  const product = productAt(tally, row, at.product);
  if (product === '') return missingValue(tally, row, 'product');
  const unit = textAt(row, at.unit);
  if (unit === '' && at.quantity < 0) return missingValue(tally, row, 'unit');
  const shipped = dateOf(tally, row, 'ship_date', at.date, readDate);
  if (shipped === null) return null;
  const quantity = shippedQuantity(tally, row, unit, at.quantity);
  return quantity === null ? null : { product, unit, shipped, quantity };
}

function shippedQuantity(tally: FileTally, row: Row, unit: string, at: number): number | null {
  const text = textAt(row, at);
  if (unit !== '')
    return text === '' || wholeNumber(text) === 1 ? 1 : badQuantity(tally, row, 'quantity', text, oneUnit);
  if (text === '') return missingValue(tally, row, 'quantity');
  const quantity = wholeNumber(text);
  return quantity !== null && quantity > 0 ? quantity : badQuantity(tally, row, 'quantity', text, aboveZero);
}

const oneUnit = 'a row with a unit stands for 1';
const aboveZero = 'it must be a whole number above 0';
