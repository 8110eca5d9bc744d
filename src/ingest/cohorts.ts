import { periodOf } from '../calendar.js';
import { exitCodes, UserError } from '../errors.js';
import type { Cohort } from '../records.js';
import { type Dated, type Grain, grains } from './dated.js';
import type { ShippedProduct } from './fleet.js';

/** The cohorts of a product and how a ship date finds its own. */
export interface Cohorts {
  /** Sorted by first day. */
  readonly list: readonly Cohort[];
  /** Index of the cohort that a ship date belongs to, -1 when nothing was shipped then. */
  readonly find: (shipped: Dated) => number;
}

/**
 * Groups what was shipped of a product as finely as the coarsest ship date among its records allows.
 * @param others ship dates that its returns and withdrawals give.
 * @throws UserError exit 3 when weeks meet months or quarters, which do not hold whole weeks.
 */
export function cohortsOf(
  product: string,
  entry: ShippedProduct,
  others: readonly Dated[],
  cutOff: number,
): Cohorts {
  const lots = [...entry.lots.values()];
  const grain = coarsest(product, [...lots.map((lot) => lot.shipped), ...others]);
  const shippedFrom = new Map<number, number>();
  for (const { shipped, quantity } of lots) {
    const from = widened(shipped, grain).from;
    shippedFrom.set(from, (shippedFrom.get(from) ?? 0) + quantity);
  }
  const starts = [...shippedFrom.keys()].sort((a, b) => a - b);
  const list = starts.map((from) => ({
    from,
    to: Math.min(endOf(from, grain), cutOff),
    shipped: shippedFrom.get(from) as number,
  }));
  const index = new Map(starts.map((from, i) => [from, i]));
  return { list, find: (shipped) => index.get(widened(shipped, grain).from) ?? -1 };
}

function coarsest(product: string, dates: readonly Dated[]): Grain {
  const present = new Set(dates.map((date) => date.grain));
  if (present.has('week') && (present.has('month') || present.has('quarter'))) throw mixedPeriods(product);
  return grains.findLast((grain) => present.has(grain)) ?? 'day';
}

function widened(shipped: Dated, grain: Grain): { from: number } {
  return grain === shipped.grain || grain === 'day' ? shipped : periodOf(shipped.from, grain);
}

function endOf(from: number, grain: Grain): number {
  return grain === 'day' ? from + 1 : periodOf(from, grain).to;
}

function mixedPeriods(product: string): UserError {
  const message = `invalid ship dates of ${product}: some are weeks and some are months or quarters`;
  const remedy = 'give its ship dates by day, or all by the same period';
  return new UserError({ code: 'mixed-ship-periods', message, remedy }, exitCodes.unusableInput);
}
