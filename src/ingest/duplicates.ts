import type { Config } from '../config.js';
import { compareText } from '../csv.js';
import { exitCodes, UserError } from '../errors.js';
import { refOf } from './cells.js';
import { fingerprint } from './fingerprints.js';
import { readShipments, type ShipmentRow } from './shipments.js';
import { type FileTally, newTally, type RowRef, rejectRow } from './tally.js';

/** More units than this that seem to come twice are no slips: a file is given twice, or the column is no serial. */
const mostSuspects = 250_000;

interface Suspect {
  readonly shipment: ShipmentRow;
  readonly ref: RowRef;
}

/** What is to be taken back once the real serials have been compared. */
export interface Duplicates {
  /** Rows that were counted and are rejected. */
  readonly removed: readonly ShipmentRow[];
  /** Units of which no row counts. */
  readonly conflicting: readonly string[];
}

/**
 * Reads the shipments again for the units whose fingerprint came more than once, compares their serials, and rejects: of rows
 * that say the same, all but the first by text; of rows that contradict each other, all.
 * @throws UserError exit 3 when more than 250,000 units come more than once.
 */
export async function findDuplicates(
  config: Config,
  tallies: readonly FileTally[],
  cutOff: number,
  suspects: ReadonlySet<number>,
): Promise<Duplicates> {
  const removed: ShipmentRow[] = [];
  const conflicting: string[] = [];
  if (suspects.size === 0) return { removed, conflicting };
  if (suspects.size > mostSuspects) throw tooMany(suspects.size);
  const groups = await readSuspects(config, tallies, cutOff, suspects);
  for (const [unit, rows] of groups) {
    if (rows.length < 2) continue;
    const agree = rows.every((row) => sameShipment(row.shipment, (rows[0] as Suspect).shipment));
    if (!agree) conflicting.push(unit);
    for (const row of agree ? allButFirst(rows) : rows) {
      rejectSuspect(row, agree);
      removed.push(row.shipment);
    }
  }
  return { removed, conflicting };
}

async function readSuspects(
  config: Config,
  tallies: readonly FileTally[],
  cutOff: number,
  suspects: ReadonlySet<number>,
): Promise<Map<string, Suspect[]>> {
  const groups = new Map<string, Suspect[]>();
  for (const tally of tallies) {
    const again = newTally(tally.source, tally.role);
    const handle: Parameters<typeof readShipments>[3] = (shipment, row) => {
      if (shipment.unit === '' || !suspects.has(fingerprint(shipment.unit))) return;
      const suspect = { shipment, ref: refOf(tally, row) };
      const group = groups.get(shipment.unit);
      if (group === undefined) groups.set(shipment.unit, [suspect]);
      else group.push(suspect);
    };
    await readShipments(config, again, cutOff, handle, () => {});
  }
  return groups;
}

function sameShipment(a: ShipmentRow, b: ShipmentRow): boolean {
  return a.product === b.product && a.shipped.key === b.shipped.key;
}

function allButFirst(rows: readonly Suspect[]): Suspect[] {
  return [...rows].sort((a, b) => compareText(a.ref.text, b.ref.text)).slice(1);
}

function rejectSuspect({ shipment, ref }: Suspect, agree: boolean): void {
  if (agree)
    rejectRow(ref, 'duplicate-unit', 'unit', `unit ${shipment.unit} was shipped in another row already`);
  else
    rejectRow(
      ref,
      'conflicting-unit',
      'unit',
      `unit ${shipment.unit} has several shipments that contradict each other`,
    );
}

function tooMany(count: number): UserError {
  const message = `invalid shipments: ${count} units come more than once`;
  const remedy = 'look for a file that is given twice, or for a column that is no serial number';
  return new UserError({ code: 'too-many-duplicates', message, remedy }, exitCodes.unusableInput);
}
