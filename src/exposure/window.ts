import type { DayRange } from '../calendar.js';
import { type AgeGrid, knotAt } from './grid.js';

/**
 * The chance that a unit which returns at a given age is counted in a window: the mean over the unknown day of
 * shipment, as a function of age. At most quadratic between its knots; ages beyond `cap` never count.
 */
export interface Window {
  readonly knots: readonly number[];
  /** From 0 up to this age the weight is 1 (0 when it is nowhere 1 from the start on). */
  readonly full: number;
  /** Between these ages it is neither 1 nor nothing; from `end` on it is 0. */
  readonly rampFrom: number;
  readonly end: number;
  readonly weight: (age: number) => number;
  /** True when the weight is quadratic between its knots, false when it is linear. */
  readonly curved: boolean;
  /** Two windows with the same key are equal. */
  readonly key: string;
}

/** Returns up to the moment `until`, of units shipped within `shipped`, with warranty to age `cap`. */
export function returnedBy(shipped: DayRange, until: number, cap: number): Window {
  const [near, far] = [until - shipped.to, until - shipped.from];
  return {
    knots: [near, far, cap],
    full: Math.min(near, cap),
    rampFrom: Math.min(near, cap),
    end: Math.min(far, cap),
    weight: (age) => clamp((far - age) / (far - near)),
    curved: false,
    key: `b ${near} ${far} ${far <= cap ? '' : cap}`,
  };
}

/** Returns within the moments `range`. */
export function returnedWithin(shipped: DayRange, range: DayRange, cap: number): Window {
  const before = returnedBy(shipped, range.from, cap);
  const after = returnedBy(shipped, range.to, cap);
  return {
    knots: [...before.knots, ...after.knots],
    full: 0,
    rampFrom: range.from - shipped.to,
    end: after.end,
    weight: (age) => after.weight(age) - before.weight(age),
    curved: false,
    key: `c ${range.from - shipped.from} ${after.key}`,
  };
}

/** Returns before a withdrawal that happens at a moment uniform over `range`. */
export function returnedBeforeExit(shipped: DayRange, range: DayRange, cap: number): Window {
  const [near, far] = [range.from - shipped.to, range.to - shipped.from];
  const widths = (shipped.to - shipped.from) * (range.to - range.from);
  const corners = [range.from - shipped.from, range.to - shipped.to];
  const square = (x: number) => (x > 0 ? (x * x) / 2 : 0);
  return {
    knots: [near, ...corners, far, cap],
    full: Math.min(Math.max(0, near), cap),
    rampFrom: Math.min(near, cap),
    end: Math.min(far, cap),
    weight: (age) =>
      clamp(
        (square(far - age) -
          square((corners[0] as number) - age) -
          square((corners[1] as number) - age) +
          square(near - age)) /
          widths,
      ),
    curved: true,
    key: `w ${near} ${corners[0]} ${corners[1]} ${far} ${far <= cap ? '' : cap}`,
  };
}

/** Returns up to a known age. */
export function returnedUntilAge(age: number): Window {
  return {
    knots: [age],
    full: age,
    rampFrom: age,
    end: age,
    weight: (t) => (t < age ? 1 : 0),
    curved: false,
    key: `a ${age}`,
  };
}

/** Weight 1 at `age`, falling to 0 at the ages before and after. */
export function hat(before: number, age: number, after: number): Window {
  return {
    knots: [before, age, after],
    full: 0,
    rampFrom: before,
    end: after,
    weight: (t) => clamp(t < age ? (t - before) / (age - before) : (after - t) / (after - age)),
    curved: false,
    key: `h ${age}`,
  };
}

/** Windows laid on a grid: weight 1 on the first `full` intervals, then one row of three coefficients an interval. */
export interface LaidWindows {
  readonly count: number;
  /** By window: intervals with weight 1 from the start, and the rows that follow them. */
  readonly full: Int32Array;
  /** Row r of window w is interval firstInterval[w] + (r − firstRow[w]). */
  readonly firstRow: Int32Array;
  readonly firstInterval: Int32Array;
  /** By row: coefficients of the left, right and middle integrals. */
  readonly left: Float64Array;
  readonly right: Float64Array;
  readonly middle: Float64Array;
  /** False when every middle coefficient is 0. */
  readonly curved: boolean;
}

/** Lays windows on a grid whose knots hold all of theirs. */
export function layWindows(windows: readonly Window[], grid: AgeGrid): LaidWindows {
  const full = new Int32Array(windows.length);
  const firstRow = new Int32Array(windows.length + 1);
  const firstInterval = new Int32Array(windows.length);
  const rows: Rows = { left: [], right: [], middle: [] };
  windows.forEach((window, w) => {
    full[w] = window.full > grid.delay ? knotAt(grid, window.full) : 0;
    firstRow[w] = rows.left.length;
    firstInterval[w] = layOne(window, grid, full[w] as number, rows);
  });
  firstRow[windows.length] = rows.left.length;
  return {
    count: windows.length,
    full,
    firstRow,
    firstInterval,
    left: Float64Array.from(rows.left),
    right: Float64Array.from(rows.right),
    middle: Float64Array.from(rows.middle),
    curved: rows.middle.some((coefficient) => coefficient !== 0),
  };
}

interface Rows {
  readonly left: number[];
  readonly right: number[];
  readonly middle: number[];
}

/**
 * Adds the rows of one window: its weights at the ends of each interval, and what the middle has above their mean.
 * @returns the first interval that has a row; those of weight 0 before it are left out.
 */
function layOne(window: Window, grid: AgeGrid, from: number, rows: Rows): number {
  const last = window.end > grid.delay ? knotAt(grid, window.end) : 0;
  let first = from;
  let left = last > from ? window.weight(grid.knots[from] as number) : 0;
  for (let interval = from; interval < last; interval++) {
    const [a, b] = [grid.knots[interval] as number, grid.knots[interval + 1] as number];
    const right = window.weight(b);
    const bulge = window.curved ? window.weight(0.5 * (a + b)) - 0.5 * (left + right) : 0;
    const middle = Math.abs(bulge) < 1e-12 ? 0 : bulge;
    if (interval === first && left === 0 && right === 0 && middle === 0) first++;
    else {
      rows.left.push(left);
      rows.right.push(right);
      rows.middle.push(middle);
    }
    left = right;
  }
  return first;
}

function clamp(x: number): number {
  return Math.max(0, Math.min(1, x));
}
