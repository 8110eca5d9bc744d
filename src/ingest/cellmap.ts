import type { DayRange } from '../calendar.js';
import type { Cell } from '../records.js';

/** Cells in the making: quantities of equal cohort and days add up. */
export interface Cells {
  readonly add: (cohort: number, range: DayRange, quantity: number) => void;
  /** Sorted by cohort, from, to. */
  readonly list: () => Cell[];
}

export function newCells(): Cells {
  const cells = new Map<string, Cell>();
  return {
    add(cohort, { from, to }, quantity) {
      const key = `${cohort} ${from} ${to}`;
      cells.set(key, { cohort, from, to, quantity: quantity + (cells.get(key)?.quantity ?? 0) });
    },
    list: () => [...cells.values()].sort((a, b) => a.cohort - b.cohort || a.from - b.from || a.to - b.to),
  };
}
