import type { Family } from '../families/family.js';
import { doubleExponential, gaussLegendre, type Rule } from '../math/quadrature.js';

/**
 * A partition of age with quadrature nodes in every interval. On an interval [a, b] a window's weight is at most quadratic,
 * so that three integrals of the density serve every cell, survivor and boundary: against (b − t)/(b − a), against
 * (t − a)/(b − a), and against 4 (t − a)(b − t)/(b − a)².
 */
export interface AgeGrid {
  /** Days before which nothing can be returned; equal to knots[0]. */
  readonly delay: number;
  /** Ages from the start of exposure, ascending; interval i is [knots[i], knots[i + 1]). */
  readonly knots: Float64Array;
  /** Nodes of interval i are firstNode[i] … firstNode[i + 1] − 1. */
  readonly firstNode: Int32Array;
  /** Age beyond the delay, and its logarithm, by node. */
  readonly age: Float64Array;
  readonly logAge: Float64Array;
  /** Quadrature weight times each of the three basis functions, by node. */
  readonly left: Float64Array;
  readonly right: Float64Array;
  readonly middle: Float64Array;
}

/**
 * `fit` keeps cell probabilities above 1e-30 to 1e-9 relative, shapes up to 25; `draw` to about 1e-3, and most
 * of that alike for all ages: enough for a refit to randomly weighted data.
 */
export type Precision = 'fit' | 'draw';

/** Longest ratio of the ends of a piece, the shape it is made for, its tolerance, and the step of the rule at age 0. */
const precisions = {
  fit: { ratio: 1.15, shape: 60, tolerance: 1e-14, step: 1 / 9 },
  draw: { ratio: 1.6, shape: 4, tolerance: 1e-3, step: 1 / 4 },
};

/** The precision for draws about a distribution: one that is steep needs the fine grid even so. */
export function precisionFor(family: Family, free: Float64Array): Precision {
  return family.spread(free) < 0.3 ? 'fit' : 'draw';
}

/** The grid with the given knots; those at or below the delay are dropped and the delay itself is the first. */
export function ageGrid(knots: Iterable<number>, delay: number, precision: Precision): AgeGrid {
  const beyond = [...new Set(knots)].filter((knot) => knot > delay && knot < Infinity);
  const sorted = Float64Array.from([delay, ...beyond]).sort();
  const nodes: Nodes = { age: [], left: [], right: [], middle: [] };
  const firstNode = new Int32Array(sorted.length);
  for (let i = 0; i + 1 < sorted.length; i++) {
    firstNode[i] = nodes.age.length;
    addNodes((sorted[i] as number) - delay, (sorted[i + 1] as number) - delay, precision, nodes);
  }
  firstNode[sorted.length - 1] = nodes.age.length;
  return {
    delay,
    knots: sorted,
    firstNode,
    age: Float64Array.from(nodes.age),
    logAge: Float64Array.from(nodes.age).map(Math.log),
    left: Float64Array.from(nodes.left),
    right: Float64Array.from(nodes.right),
    middle: Float64Array.from(nodes.middle),
  };
}

interface Nodes {
  readonly age: number[];
  readonly left: number[];
  readonly right: number[];
  readonly middle: number[];
}

/** Adds the nodes of an interval with their three weights. */
function addNodes(a: number, b: number, precision: Precision, nodes: Nodes): void {
  for (const [from, to, rule] of pieces(a, b, precision)) {
    for (let j = 0; j < rule.nodes.length; j++) {
      const age = from + (to - from) * (rule.nodes[j] as number);
      const weight = (to - from) * (rule.weights[j] as number);
      const x = (age - a) / (b - a);
      nodes.age.push(age);
      nodes.left.push(weight * (1 - x));
      nodes.right.push(weight * x);
      nodes.middle.push(4 * weight * x * (1 - x));
    }
  }
}

/** Index of the knot at `age`, which must be one; ages at or below the delay are knot 0. */
export function knotAt(grid: AgeGrid, age: number): number {
  let [low, high] = [0, grid.knots.length - 1];
  while (low < high) {
    const middle = (low + high) >>> 1;
    if ((grid.knots[middle] as number) < age) low = middle + 1;
    else high = middle;
  }
  return low;
}

const zeroRules = new Map<number, Rule>();

/** The rule for the piece at age 0, made once. */
function atZero(step: number): Rule {
  const known = zeroRules.get(step) ?? doubleExponential(step);
  zeroRules.set(step, known);
  return known;
}

/** Pieces of [a, b] short enough for one rule each: a density may go like any power of age, so their ends keep a ratio. */
function pieces(a: number, b: number, precision: Precision): [number, number, Rule][] {
  const { ratio, shape, tolerance, step } = precisions[precision];
  if (a === 0) {
    const first = b / 8;
    return [[0, first, atZero(step)], ...pieces(first, b, precision)];
  }
  const count = Math.ceil(Math.log(b / a) / Math.log(ratio) - 1e-9);
  const rule = gaussLegendre(nodesFor((shape * Math.log(b / a)) / count, tolerance));
  const ends = Array.from({ length: count + 1 }, (_, i) => (i === count ? b : a * (b / a) ** (i / count)));
  return Array.from({ length: count }, (_, i) => [ends[i] as number, ends[i + 1] as number, rule]);
}

/**
 * Nodes that integrate exp over a range of length `range` within `tolerance`, by the error term of Gauss's rule
 * (Abramowitz & Stegun 25.4.30): 2^(2n+1) (n!)⁴ / ((2n + 1) (2n)!³) · (range/2)^(2n).
 */
function nodesFor(range: number, tolerance: number): number {
  let term = 1;
  for (let n = 1; n < 24; n++) {
    const factor = (4 * n ** 4) / ((2 * n) ** 3 * (2 * n - 1) ** 3);
    term *= factor * ((2 * n - 1) / (2 * n + 1)) * (range / 2) ** 2 * (n === 1 ? 2 : 1);
    if (term < tolerance) return n;
  }
  return 24;
}
