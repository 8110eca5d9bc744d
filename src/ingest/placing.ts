import type { DayRange } from '../calendar.js';
import { type ProductRules, warrantyLimit } from '../config.js';
import type { Cell, Cohort } from '../records.js';
import { type OutOfBounds, outOfBounds, outOfBoundsText } from './bounds.js';
import { newCells } from './cellmap.js';
import { type Claim, compareLeaving } from './claim.js';
import type { Cohorts } from './cohorts.js';
import { dateField } from './leavings.js';
import { rejectRow, setAsideRow } from './tally.js';

/** What the claims on a product's cohorts come to. */
export interface Placed {
  readonly returned: readonly Cell[];
  readonly withdrawn: readonly Cell[];
  /** Units returned before the delay, which count as withdrawn. */
  readonly beforeDelay: number;
  /** Units returned in all, those out of bounds included. */
  readonly returns: number;
}

/**
 * Puts claims into cells. Where a cohort cannot hold all that is claimed of it, the earliest claims count and those that do not
 * fit any more are rejected. Returns that are out of bounds are set aside and their units counted as withdrawn, which
 * censors them at the bound, since the distribution is flat there.
 */
export function placeClaims(
  claims: readonly Claim[],
  cohorts: Cohorts,
  rules: ProductRules,
  cutOff: number,
): Placed {
  const [returned, withdrawn] = [newCells(), newCells()];
  let [beforeDelay, returns] = [0, 0];
  for (const [index, ofCohort] of claimsByCohort(claims, cohorts)) {
    const cohort = cohorts.list[index] as Cohort;
    const limit = warrantyLimit(rules, cohort.from);
    for (const claim of fitting(ofCohort, cohort.shipped)) {
      const range = cutAt(claim.when, cutOff);
      const outside = claim.kind === 'returned' ? outOfBounds(range, cohort, limit, rules.delayDays) : null;
      if (outside !== null) setClaimAside(claim, outside, rules);
      if (outside === 'before-delay') beforeDelay += claim.quantity;
      if (claim.kind === 'returned') returns += claim.quantity;
      const cells = claim.kind === 'returned' && outside === null ? returned : withdrawn;
      cells.add(index, range, claim.quantity);
    }
  }
  return { returned: returned.list(), withdrawn: withdrawn.list(), beforeDelay, returns };
}

/** A stretch of days without what lies after the cut-off. */
function cutAt(range: DayRange, cutOff: number): DayRange {
  return { from: range.from, to: Math.min(range.to, cutOff) };
}

function claimsByCohort(claims: readonly Claim[], cohorts: Cohorts): Map<number, Claim[]> {
  const groups = new Map<number, Claim[]>();
  for (const claim of claims) {
    const index = cohorts.find(claim.shipped);
    if (index < 0) rejectClaim(claim, 'nothing of this product was shipped then', 'ship_date');
    else if (!groups.get(index)?.push(claim)) groups.set(index, [claim]);
  }
  return groups;
}

/** The claims that a cohort of `shipped` units can meet, earliest first; the others are rejected. */
function fitting(claims: readonly Claim[], shipped: number): readonly Claim[] {
  const claimed = claims.reduce((sum, claim) => sum + claim.quantity, 0);
  if (claimed <= shipped) return claims;
  let left = shipped;
  return claims
    .map((claim) => ({ ...claim, claim, text: textOf(claim) }))
    .sort((a, b) => compareLeaving(a, b))
    .flatMap(({ claim }) => {
      if (claim.quantity <= left) {
        left -= claim.quantity;
        return [claim];
      }
      rejectClaim(claim, `${claimed} units are said to have left where ${shipped} were shipped`, 'quantity');
      return [];
    });
}

function textOf(claim: Claim): string {
  return claim.rows
    .map((row) => row.text)
    .sort()
    .join('\n');
}

function rejectClaim(claim: Claim, message: string, field: string): void {
  for (const row of claim.rows)
    rejectRow({ ...row, product: claim.product }, 'returns-exceed-shipped', field, message);
}

function setClaimAside(claim: Claim, code: OutOfBounds, rules: ProductRules): void {
  const message = outOfBoundsText(code, rules, 'withdrawn');
  for (const row of claim.rows) setAsideRow(row, code, dateField(claim.kind), message);
}
