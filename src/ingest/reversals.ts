import { type PeriodKind, periodOf } from '../calendar.js';
import { compareText } from '../csv.js';
import type { Claim } from './claim.js';
import type { Dated } from './dated.js';
import type { Leaving } from './leavings.js';
import { rejectRow } from './tally.js';

/**
 * Claims of rows that count units. A negative row is a reversal: it nets against rows of the same product, ship date and period,
 * those of its own date first, then the latest. Reversals are taken from the smallest up; one that exceeds what is left to
 * net is rejected.
 */
export function netReversals(rows: readonly Leaving[], period: PeriodKind): Claim[] {
  const placeOf = ({ kind, product, shipped, when }: Leaving) =>
    `${kind} ${shipped?.key} ${periodOf(when.to - 1, period).from} ${product}`;
  const reversed = new Set(rows.filter((row) => row.quantity < 0).map(placeOf));
  const groups = new Map<string, Leaving[]>();
  const claims: Claim[] = [];
  for (const row of rows) {
    const place = reversed.size === 0 ? '' : placeOf(row);
    if (!reversed.has(place)) claims.push(claimOf({ when: row.when, left: row.quantity, rows: [row] }));
    else if (!groups.get(place)?.push(row)) groups.set(place, [row]);
  }
  return [...claims, ...[...groups.values()].flatMap(net)];
}

/** The rows of one date, and what reversals leave of their units. */
interface Pool {
  readonly when: Dated;
  left: number;
  readonly rows: Leaving[];
}

function net(group: readonly Leaving[]): Claim[] {
  const pools = poolsOf(group.filter((row) => row.quantity > 0));
  const reversals = group.filter((row) => row.quantity < 0);
  reversals.sort((a, b) => b.quantity - a.quantity || byTime(a, b) || compareText(a.text, b.text));
  for (const row of reversals) {
    const left = pools.reduce((sum, pool) => sum + pool.left, 0);
    if (left + row.quantity >= 0) take(row, pools);
    else {
      const message = `a reversal of ${-row.quantity} where ${left} are left of the same product, ship date and period`;
      rejectRow(row, 'unmatched-reversal', 'quantity', message);
    }
  }
  return pools.filter((pool) => pool.left > 0).map(claimOf);
}

/** Latest first. */
function poolsOf(rows: readonly Leaving[]): Pool[] {
  const pools = new Map<number, Pool>();
  for (const row of rows) {
    const pool = pools.get(row.when.key) ?? { when: row.when, left: 0, rows: [] };
    pools.set(row.when.key, pool);
    pool.left += row.quantity;
    pool.rows.push(row);
  }
  return [...pools.values()].sort((a, b) => byTime(b, a));
}

function take(reversal: Leaving, pools: readonly Pool[]): void {
  const own = pools.filter((pool) => pool.when.key === reversal.when.key);
  let due = -reversal.quantity;
  for (const pool of [...own, ...pools]) {
    const taken = Math.min(due, pool.left);
    if (taken === 0) continue;
    if (due === -reversal.quantity) pool.rows.push(reversal);
    pool.left -= taken;
    due -= taken;
  }
}

function byTime(a: { readonly when: Dated }, b: { readonly when: Dated }): number {
  return a.when.from - b.when.from || a.when.to - b.when.to;
}

function claimOf({ when, left, rows }: Pool): Claim {
  const { kind, product, shipped } = rows[0] as Leaving & { product: string; shipped: Dated };
  return { kind, product, shipped, when, quantity: left, rows };
}
