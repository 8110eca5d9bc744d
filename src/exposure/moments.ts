import type { Jets } from '../families/family.js';
import { ageGrid, type Precision } from './grid.js';
import { integralsOn, windowProbability } from './integrals.js';
import { layWindows, type Window } from './window.js';

/** The probability of a return by each moment, and of none, each to its own relative accuracy. */
export interface BothSides {
  readonly inside: Float64Array;
  readonly outside: Float64Array;
}

/** The moments of many units, each distinct one evaluated once a distribution. */
export interface Moments {
  /** Places of each unit's moments in `BothSides`, in the order given. */
  readonly rows: readonly (readonly number[])[];
  /** The buffers are overwritten by the next call. */
  readonly evaluate: (jets: Jets) => BothSides;
}

/** Prepares the moments of units. @param windows what has returned by each moment, unit by unit. @param delay in days. */
export function momentsOf(
  windows: readonly (readonly Window[])[],
  delay: number,
  precision: Precision,
): Moments {
  const list: Window[] = [];
  const places = new Map<string, number>();
  const place = (window: Window): number => {
    const known = places.get(window.key) ?? list.push(window) - 1;
    places.set(window.key, known);
    return known;
  };
  const rows = windows.map((unit) => unit.map(place));
  const grid = ageGrid(
    list.flatMap((window) => window.knots),
    delay,
    precision,
  );
  const laid = layWindows(list, grid);
  const integrals = integralsOn(grid, 0, false);
  const inside = new Float64Array(list.length);
  const outside = new Float64Array(list.length);
  const block = new Float64Array(1);
  const evaluate = (jets: Jets) => {
    integrals.evaluate(jets);
    for (let w = 0; w < list.length; w++) {
      windowProbability(laid, w, integrals, 'inside', block);
      inside[w] = block[0] as number;
      windowProbability(laid, w, integrals, 'outside', block);
      outside[w] = block[0] as number;
    }
    return { inside, outside };
  };
  return { rows, evaluate };
}
