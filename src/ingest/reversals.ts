import { compareText } from '../csv.js';
import type { Claim } from './claim.js';
import type { Dated } from './dated.js';
import type { Leaving } from './leavings.js';
import { rejectRow } from './tally.js';

/**
 * Claims of rows that count units. A negative row is a reversal: it nets against the rows of the same product, ship date and
 * date. Reversals are taken from the smallest up while something is left to net; the others are rejected.
 */
export function netReversals(rows: readonly Leaving[]): Claim[] {
  const reversed = new Set(rows.filter((row) => row.quantity < 0).map(placeOf));
  const groups = new Map<string, Leaving[]>();
  const claims: Claim[] = [];
  for (const row of rows) {
    const place = placeOf(row);
    if (!reversed.has(place)) claims.push(claim([row], row.quantity));
    else if (!groups.get(place)?.push(row)) groups.set(place, [row]);
  }
  for (const group of groups.values()) {
    const netted = net(group);
    if (netted.quantity > 0) claims.push(claim(netted.rows, netted.quantity));
  }
  return claims;
}

function placeOf({ kind, product, shipped, when }: Leaving): string {
  return `${kind} ${shipped?.key} ${when.key} ${product}`;
}

function net(group: readonly Leaving[]): { rows: Leaving[]; quantity: number } {
  const rows = group.filter((row) => row.quantity > 0);
  let quantity = rows.reduce((sum, row) => sum + row.quantity, 0);
  const reversals = group.filter((row) => row.quantity < 0);
  reversals.sort((a, b) => b.quantity - a.quantity || compareText(a.text, b.text));
  for (const row of reversals) {
    if (quantity + row.quantity >= 0) {
      quantity += row.quantity;
      rows.push(row);
    } else {
      const message = `a reversal of ${-row.quantity} where ${quantity} are left of the same product, ship date and date`;
      rejectRow(row, 'unmatched-reversal', 'quantity', message);
    }
  }
  return { rows, quantity };
}

function claim(rows: readonly Leaving[], quantity: number): Claim {
  const { kind, product, shipped, when } = rows[0] as Leaving & { product: string; shipped: Dated };
  return { kind, product, shipped, when, quantity, rows };
}
