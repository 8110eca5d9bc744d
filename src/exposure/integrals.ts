import { type Jet, type Jets, jetSize } from '../families/family.js';
import type { AgeGrid } from './grid.js';
import type { LaidWindows } from './window.js';

/**
 * Integrals of a density (and of its derivatives by the free coordinates) over every interval of a grid. Each quantity is a
 * block of `size` numbers: the value, then the first, then the second derivatives, in the order of a jet.
 */
export interface Integrals {
  readonly size: number;
  /** Against the three basis functions of the grid, by interval. */
  readonly left: Float64Array;
  readonly right: Float64Array;
  readonly middle: Float64Array;
  /** Over all ages below knot i, and over all above it, to infinity: sums of positive terms in both directions. */
  readonly below: Float64Array;
  readonly above: Float64Array;
  /** Recomputes everything for a distribution. */
  readonly evaluate: (jets: Jets) => void;
}

/**
 * Buffers for the integrals on a grid.
 * @param k free coordinates whose derivatives are wanted; 0 for values only. @param curved whether `middle` is needed.
 */
export function integralsOn(grid: AgeGrid, k: number, curved: boolean): Integrals {
  const size = jetSize(k);
  const intervals = grid.knots.length - 1;
  const left = new Float64Array(intervals * size);
  const right = new Float64Array(intervals * size);
  const middle = new Float64Array(curved ? intervals * size : 0);
  const below = new Float64Array((intervals + 1) * size);
  const above = new Float64Array((intervals + 1) * size);
  const jet = new Float64Array(Math.max(size, 16));
  const sums = { grid, k, size, jet, left, right, middle };
  const add = k === 0 ? addNodesOfNone : k === 2 ? addNodesOfTwo : addNodes;
  const evaluate = (jets: Jets) => {
    left.fill(0);
    right.fill(0);
    middle.fill(0);
    for (let i = 0; i < intervals; i++) {
      add(sums, i, jets.logDensity);
      const at = i * size;
      for (let j = at; j < at + size; j++) {
        below[j + size] = (below[j] as number) + (left[j] as number) + (right[j] as number);
      }
    }
    tail(grid, jets, jet, k);
    above.set(jet.subarray(0, size), intervals * size);
    for (let j = intervals * size - 1; j >= 0; j--) {
      above[j] = (above[j + size] as number) + (left[j] as number) + (right[j] as number);
    }
  };
  return { size, left, right, middle, below, above, evaluate };
}

/**
 * The probability that window w counts a return (`inside`), or that it does not (`outside`), with derivatives, into out. The
 * outside is one minus the inside while that is below one half, and is summed from the other side when it is more.
 */
export function windowProbability(
  windows: LaidWindows,
  w: number,
  integrals: Integrals,
  wanted: 'inside' | 'outside',
  out: Float64Array,
): void {
  const size = integrals.size;
  const from = windows.firstRow[w] as number;
  const to = windows.firstRow[w + 1] as number;
  const first = windows.firstInterval[w] as number;
  const full = windows.full[w] as number;
  for (let j = 0; j < size; j++) out[j] = full > 0 ? (integrals.below[full * size + j] as number) : 0;
  for (let row = from; row < to; row++) addRow(windows, row, first + row - from, integrals, 1, out);
  if (wanted === 'inside') return;
  if ((out[0] as number) < 0.5) {
    for (let j = 0; j < size; j++) out[j] = (j === 0 ? 1 : 0) - (out[j] as number);
    return;
  }
  const end = first + to - from;
  for (let j = 0; j < size; j++) out[j] = integrals.above[end * size + j] as number;
  for (let row = from; row < to; row++) {
    const interval = first + row - from;
    for (let j = 0; j < size; j++) {
      const at = interval * size + j;
      out[j] = (out[j] as number) + (integrals.left[at] as number) + (integrals.right[at] as number);
    }
    addRow(windows, row, interval, integrals, -1, out);
  }
}

function addRow(
  windows: LaidWindows,
  row: number,
  interval: number,
  integrals: Integrals,
  sign: number,
  out: Float64Array,
): void {
  const { size, left, right, middle } = integrals;
  const l = sign * windows.left[row]!;
  const r = sign * windows.right[row]!;
  const m = sign * windows.middle[row]!;
  const at = interval * size;
  for (let j = 0; j < size; j++) out[j] = out[j]! + l * left[at + j]! + r * right[at + j]!;
  if (m === 0) return;
  for (let j = 0; j < size; j++) out[j] = out[j]! + m * middle[at + j]!;
}

interface Sums {
  readonly grid: AgeGrid;
  readonly k: number;
  readonly size: number;
  readonly jet: Float64Array;
  readonly left: Float64Array;
  readonly right: Float64Array;
  readonly middle: Float64Array;
}

/** Adds every node of interval i to its integrals: any number of coordinates, the readable form. */
function addNodes({ grid, k, size, jet, left, right, middle }: Sums, i: number, logDensity: Jet): void {
  const at = i * size;
  for (let n = grid.firstNode[i]!; n < grid.firstNode[i + 1]!; n++) {
    logDensity(grid.age[n]!, grid.logAge[n]!, jet);
    unlog(jet, k);
    addScaled(left, at, jet, grid.left[n]!, size);
    addScaled(right, at, jet, grid.right[n]!, size);
    if (middle.length > 0) addScaled(middle, at, jet, grid.middle[n]!, size);
  }
}

/** The same without derivatives: a forecast evaluates thousands of distributions. */
function addNodesOfNone({ grid, jet, left, right, middle }: Sums, i: number, logDensity: Jet): void {
  for (let n = grid.firstNode[i]!; n < grid.firstNode[i + 1]!; n++) {
    logDensity(grid.age[n]!, grid.logAge[n]!, jet);
    const f = Math.exp(jet[0]!);
    left[i] = left[i]! + f * grid.left[n]!;
    right[i] = right[i]! + f * grid.right[n]!;
    if (middle.length > 0) middle[i] = middle[i]! + f * grid.middle[n]!;
  }
}

/** The same for two coordinates, written out: most of the time of a fit is spent here. */
function addNodesOfTwo({ grid, jet, left, right, middle }: Sums, i: number, logDensity: Jet): void {
  const at = i * 6;
  for (let n = grid.firstNode[i]!; n < grid.firstNode[i + 1]!; n++) {
    logDensity(grid.age[n]!, grid.logAge[n]!, jet);
    const f = Math.exp(jet[0]!);
    const a = jet[1]!;
    const b = jet[2]!;
    jet[0] = f;
    jet[1] = f * a;
    jet[2] = f * b;
    jet[3] = f * (jet[3]! + a * a);
    jet[4] = f * (jet[4]! + a * b);
    jet[5] = f * (jet[5]! + b * b);
    const l = grid.left[n]!;
    const r = grid.right[n]!;
    for (let j = 0; j < 6; j++) {
      const value = jet[j]!;
      left[at + j] = left[at + j]! + l * value;
      right[at + j] = right[at + j]! + r * value;
    }
    if (middle.length > 0) addScaled(middle, at, jet, grid.middle[n]!, 6);
  }
}

/** Turns a jet of log f into the jet of f. */
function unlog(jet: Float64Array, k: number): void {
  const value = Math.exp(jet[0] as number);
  let second = 1 + k;
  for (let i = 0; i < k; i++) {
    for (let j = i; j < k; j++, second++) {
      jet[second] = value * ((jet[second] as number) + (jet[1 + i] as number) * (jet[1 + j] as number));
    }
  }
  for (let i = 0; i < k; i++) jet[1 + i] = value * (jet[1 + i] as number);
  jet[0] = value;
}

/** Survival at the last knot, with derivatives, into jet. */
function tail(grid: AgeGrid, jets: Jets, jet: Float64Array, k: number): void {
  const age = (grid.knots[grid.knots.length - 1] as number) - grid.delay;
  if (age <= 0) {
    jet.fill(0);
    jet[0] = 1;
    return;
  }
  jets.logSurvival(age, Math.log(age), jet);
  unlog(jet, k);
}

function addScaled(to: Float64Array, at: number, jet: Float64Array, factor: number, size: number): void {
  for (let j = 0; j < size; j++) to[at + j] = to[at + j]! + factor * jet[j]!;
}
