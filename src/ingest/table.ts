import type { Config } from '../config.js';
import type { Finding, ProductRecords, Progress, Sources } from '../records.js';
import { cutOffOrOpen, type DatedQuantity, missingAsOf } from './asof.js';
import { assemble } from './assemble.js';
import type { Claim } from './claim.js';
import type { ProductClaims } from './claims.js';
import { addShipment, newFleet } from './fleet.js';
import { readPlans } from './plan.js';
import type { Reading } from './reading.js';
import { readCohortRows } from './tablefile.js';
import { unitsBy, usableCohorts, usableWithdrawals } from './tablerooms.js';
import type { CohortRow } from './tablerow.js';

/**
 * Reads a Nevada-style table and the withdrawals beside it, one row a cohort; rows of the same product and ship period add up. A
 * row is used or rejected whole, so cells after the as-of date and returns out of bounds are told by findings.
 * @throws UserError exit 2 without an as-of date, exit 3 for files that cannot be used.
 */
export async function readTables(config: Config, sources: Sources, progress: Progress): Promise<Reading> {
  const cutOff = cutOffOrOpen(config);
  const table = await readCohortRows(config, sources.table, 'table', progress);
  const beside = sources['table-withdrawn'];
  const withdrawn = await readCohortRows(config, beside, 'table-withdrawn', progress);
  if (config.asOf === null) throw missingAsOf(config.period, datesOf([...table.rows, ...withdrawn.rows]));
  const fleet = newFleet();
  const cohorts = usableCohorts(table.rows, cutOff);
  for (const { product, shippedIn, shipped } of cohorts) {
    if (shipped > 0) addShipment(fleet, { product, unit: '', shipped: shippedIn, quantity: shipped });
  }
  const left = usableWithdrawals(withdrawn.rows, cohorts, fleet, cutOff);
  const plan = await readPlans(config, sources.plan, cutOff, fleet, progress);
  const claims = [...claimsOf('returned', cohorts, cutOff), ...claimsOf('withdrawn', left, cutOff)];
  const parts = { fleet, claims: sorted(claims), plans: plan.plans, returnsFiles: table.tallies };
  const products = assemble(config, parts, cutOff);
  return {
    products,
    tallies: [...table.tallies, ...withdrawn.tallies, ...plan.tallies],
    findings: [
      ...plan.findings,
      ...lateCells('returns', cohorts, cutOff),
      ...lateCells('withdrawals', left, cutOff),
      ...outOfBounds(claims, products),
    ],
  };
}

function claimsOf(kind: Claim['kind'], rows: readonly CohortRow[], cutOff: number): Claim[] {
  return rows.flatMap(({ product, shippedIn, cells }) =>
    cells
      .filter(({ when }) => when.from < cutOff)
      .map(({ when, quantity }) => ({ kind, product, shipped: shippedIn, when, quantity, rows: [] })),
  );
}

function sorted(claims: readonly Claim[]): Map<string, ProductClaims> {
  const products = new Map<string, ProductClaims>();
  for (const claim of claims) {
    const ofProduct = products.get(claim.product);
    if (ofProduct === undefined) products.set(claim.product, { units: [], counted: [claim] });
    else ofProduct.counted.push(claim);
  }
  return products;
}

function* datesOf(rows: readonly CohortRow[]): Generator<DatedQuantity> {
  for (const { shippedIn, shipped, cells } of rows) {
    yield { range: shippedIn, quantity: shipped };
    for (const { when, quantity } of cells) yield { range: when, quantity };
  }
}

function lateCells(what: string, rows: readonly CohortRow[], cutOff: number): Finding[] {
  const late = rows.reduce((sum, row) => sum + unitsBy(row, Infinity) - unitsBy(row, cutOff), 0);
  const message = `${late} ${what} in columns of the table after the as-of date are not used`;
  return late === 0 ? [] : [{ code: 'after-as-of', severity: 'note', message }];
}

function outOfBounds(claims: readonly Claim[], products: readonly ProductRecords[]): Finding[] {
  const claimed = claims.reduce((sum, { kind, quantity }) => sum + (kind === 'returned' ? quantity : 0), 0);
  const cells = products.flatMap(({ returned }) => returned);
  const outside = claimed - cells.reduce((sum, { quantity }) => sum + quantity, 0);
  const message = `${outside} returns in the table lie within the delay or beyond warranty; their units are censored there and count among the withdrawn`;
  return outside === 0 ? [] : [{ code: 'table-out-of-bounds', severity: 'warning', message }];
}
