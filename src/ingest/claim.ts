import { compareText } from '../csv.js';
import type { Dated } from './dated.js';
import type { Leaving } from './leavings.js';

/** Units that are said to have left a cohort; its rows are used or rejected together. */
export interface Claim {
  readonly kind: Leaving['kind'];
  readonly product: string;
  readonly shipped: Dated;
  readonly when: Dated;
  /** Above 0. */
  readonly quantity: number;
  /** In no order. */
  readonly rows: readonly Leaving[];
}

/** The claim of a row that names a unit. */
export function unitClaim(leaving: Leaving): Claim {
  const { product, shipped } = originOf(leaving);
  const { kind, when } = leaving;
  return { kind, product, shipped, when, quantity: 1, rows: [leaving] };
}

/** Product and ship date of a row that fits: those of its unit's shipment, else its own. */
export function originOf({ lot, product, shipped }: Leaving): Pick<Claim, 'product' | 'shipped'> {
  if (lot !== null) return lot;
  if (product === null || shipped === null) throw new RangeError('missing origin of a unit');
  return { product, shipped };
}

/** Orders what left: earlier first, a return before a withdrawal of the same time, then by what the row says. */
export function compareLeaving(
  a: Pick<Claim, 'when' | 'kind'> & { readonly text: string },
  b: Pick<Claim, 'when' | 'kind'> & { readonly text: string },
): number {
  return (
    a.when.from - b.when.from ||
    a.when.to - b.when.to ||
    compareText(a.kind, b.kind) ||
    compareText(a.text, b.text)
  );
}
