import type { Config } from '../config.js';
import { exitCodes, UserError } from '../errors.js';
import type { Intake, Progress, Sources } from '../records.js';
import { readAges } from './ages.js';
import { endsEarly } from './ending.js';
import { checkInputs, checkRows } from './inputs.js';
import { checkPeriods } from './periodfit.js';
import type { Reading } from './reading.js';
import { readRecords } from './records.js';
import { readTables } from './table.js';
import { fileAccount } from './tally.js';
import { unknownInSettings } from './unknown.js';
import { checkRejectShare, compareRejects, fileFindings } from './verdict.js';

/**
 * Reads all inputs: records (shipments, returns, withdrawals, plan), or a Nevada-style table, or ages.
 * @returns the products, the account of every file, and every row that is not used. None of it depends on the order of
 * rows or on their division into files, but for line numbers.
 * @throws UserError exit 2 without shipments, returns or an as-of date, or for records that do not fit the period; exit 3 for
 * files that cannot be used; when too many rows are rejected it carries the intake.
 */
export async function ingest(config: Config, sources: Sources, progress: Progress): Promise<Intake> {
  checkInputs(sources);
  const { products, tallies, findings } = await read(config, sources, progress);
  const files = await Promise.all(tallies.map(fileAccount));
  checkRows(files);
  const rejects = tallies.flatMap((tally) => tally.rejects).sort(compareRejects);
  const all = [
    ...fileFindings(files),
    ...unknownInSettings(config, products),
    ...findings,
    ...endsEarly(config, tallies),
  ];
  const intake = { products, files, rejects, findings: all };
  checkAsOf(config, intake);
  checkRejectShare(intake, config.maxRejectShare);
  checkPeriods(config, products);
  return intake;
}

function read(config: Config, sources: Sources, progress: Progress): Promise<Reading> {
  if (sources.ages.length > 0) return readAges(config, sources.ages, progress);
  if (sources.table.length > 0) return readTables(config, sources, progress);
  return readRecords(config, sources, progress);
}

/** @throws UserError exit 3 when all that could be used was shipped after the as-of date. */
function checkAsOf({ asOf }: Config, intake: Intake): void {
  const shipped = intake.files.filter(({ role }) => role === 'shipments' || role === 'table');
  const late = shipped.some(({ codes }) => codes['after-as-of'] !== undefined);
  if (intake.products.length > 0 || !late) return;
  const message = `invalid asOf ${asOf}: nothing was shipped by then`;
  const remedy = 'set asOf to a day after the first shipment, or check the ship dates';
  throw new UserError(
    { code: 'as-of-before-first-shipment', message, remedy },
    exitCodes.unusableInput,
    intake,
  );
}
