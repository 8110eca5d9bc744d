import type { DayRange } from '../calendar.js';
import type { Family } from '../families/family.js';
import { ageGrid } from './grid.js';
import { integralsOn, windowProbability } from './integrals.js';
import { layWindows, returnedBy, returnedWithin, type Window } from './window.js';

/** The life distribution of one product as the records see it: family, parameters, delay and warranty limit. */
export interface Life {
  readonly family: Family;
  readonly free: Float64Array;
  /** Days. */
  readonly delay: number;
  /** Age in days at which warranty ends, Infinity without. */
  readonly limit: number;
}

/** P(cell): the probability that a unit shipped within `shipped` is returned within `range`; to 1e-9 relative. */
export function cellProbability(life: Life, shipped: DayRange, range: DayRange): number {
  return probability(life, returnedWithin(shipped, range, life.limit), 'inside');
}

/** S: the probability that a unit shipped within `shipped` is not returned by the moment `cutOff`. */
export function survivorProbability(life: Life, shipped: DayRange, cutOff: number): number {
  return probability(life, returnedBy(shipped, cutOff, life.limit), 'outside');
}

function probability(life: Life, window: Window, wanted: 'inside' | 'outside'): number {
  const grid = ageGrid(window.knots, life.delay, 'fit');
  const laid = layWindows([window], grid);
  const integrals = integralsOn(grid, 0, laid.curved);
  integrals.evaluate(life.family.jetsAt(life.free));
  const out = new Float64Array(1);
  windowProbability(laid, 0, integrals, wanted, out);
  return out[0] as number;
}
