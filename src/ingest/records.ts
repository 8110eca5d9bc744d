import type { Config } from '../config.js';
import { exitCodes, UserError } from '../errors.js';
import type { Progress, Sources } from '../records.js';
import { cutOffOrOpen, type DatedQuantity, missingAsOf } from './asof.js';
import { assemble } from './assemble.js';
import { claimsByProduct } from './claims.js';
import { addLeaving, type Departures, markConflict, meetShipment, newDepartures } from './departures.js';
import { findDuplicates } from './duplicates.js';
import { fingerprint, newFingerprints } from './fingerprints.js';
import { addShipment, type Fleet, newFleet, removeShipment } from './fleet.js';
import { type Leaving, readLeavings } from './leavings.js';
import { readPlans } from './plan.js';
import { byteProgress } from './progress.js';
import type { Reading } from './reading.js';
import { readShipments } from './shipments.js';
import { type FileTally, newTally } from './tally.js';

/**
 * Reads shipments, returns, withdrawals and plan. Returns and withdrawals are held in memory; the shipments stream past
 * them, and of a unit that did not come back no more is kept than 8 bytes (16 for a moment).
 * @throws UserError exit 2 without an as-of date, exit 3 for files that cannot be used.
 */
export async function readRecords(config: Config, sources: Sources, progress: Progress): Promise<Reading> {
  const cutOff = cutOffOrOpen(config);
  const tallies = (role: 'shipments' | 'returns' | 'withdrawals') =>
    sources[role].map((source) => newTally(source, role));
  const leavingFiles = [...tallies('returns'), ...tallies('withdrawals')];
  const departures = newDepartures();
  for (const tally of leavingFiles) {
    const bytes = await byteProgress(tally, progress);
    await readLeavings(config, tally, cutOff, (row) => keepLeaving(departures, row), bytes);
  }
  const shipmentFiles = tallies('shipments');
  const fleet = await readFleet(config, shipmentFiles, cutOff, departures, progress);
  checkUnits(fleet, departures, leavingFiles);
  if (config.asOf === null) throw missingAsOf(config.period, datesOf(fleet, departures));
  const claims = claimsByProduct(departures, fleet, config.period);
  const plan = await readPlans(config, sources.plan, cutOff, fleet, progress);
  const products = assemble(config, { fleet, claims, plans: plan.plans, returnsFiles: leavingFiles }, cutOff);
  return { products, tallies: [...shipmentFiles, ...leavingFiles, ...plan.tallies], findings: plan.findings };
}

async function readFleet(
  config: Config,
  tallies: readonly FileTally[],
  cutOff: number,
  departures: Departures,
  progress: Progress,
): Promise<Fleet> {
  const fleet = newFleet();
  const fingerprints = newFingerprints();
  for (const tally of tallies) {
    const handle: Parameters<typeof readShipments>[3] = (shipment) => {
      const lot = addShipment(fleet, shipment);
      if (shipment.unit === '') return;
      const print = fingerprint(shipment.unit);
      fingerprints.add(print);
      meetShipment(departures, shipment.unit, print, lot);
    };
    await readShipments(config, tally, cutOff, handle, await byteProgress(tally, progress));
  }
  const { removed, conflicting } = await findDuplicates(config, tallies, cutOff, fingerprints.takeRepeated());
  for (const shipment of removed) removeShipment(fleet, shipment);
  for (const unit of conflicting) markConflict(departures, unit);
  return fleet;
}

function keepLeaving(departures: Departures, leaving: Leaving): void {
  addLeaving(departures, leaving, leaving.unit === null ? 0 : fingerprint(leaving.unit));
}

/** @throws UserError exit 3 when returns name units alone and no shipment names any. */
function checkUnits(fleet: Fleet, departures: Departures, files: readonly FileTally[]): void {
  if (fleet.unitRows > 0 || fleet.products.size === 0) return;
  const alone = new Set<FileTally>();
  for (const { product, shipped, tally } of leavingsIn(departures)) {
    if (product === null || shipped === null) alone.add(tally);
  }
  const first = files.find((tally) => alone.has(tally));
  if (first === undefined) return;
  const message = 'invalid rows: they name only a unit, and the shipments do not name units';
  const remedy = 'give shipments by unit, or product and ship_date in these rows';
  throw new UserError(
    { code: 'units-not-shipped', file: first.source.name, message, remedy },
    exitCodes.unusableInput,
  );
}

function* datesOf(fleet: Fleet, departures: Departures): Generator<DatedQuantity> {
  for (const { lots } of fleet.products.values()) {
    for (const { shipped, quantity } of lots.values()) yield { range: shipped, quantity };
  }
  for (const { when, quantity } of leavingsIn(departures)) yield { range: when, quantity };
}

function* leavingsIn({ units, counted }: Departures): Generator<Leaving> {
  yield* counted;
  for (const first of units.values()) {
    for (let row: Leaving | null = first; row !== null; row = row.next) yield row;
  }
}
