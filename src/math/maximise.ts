import { cholesky, solveCholesky } from './linear.js';

/** A function's value, gradient and Hessian at a point, in buffers that the function owns and overwrites. */
export interface Surface {
  /** Number of coordinates, k. */
  readonly size: number;
  /** Evaluates at `point`; −Infinity or NaN outside the domain. */
  readonly evaluate: (point: Float64Array) => number;
  /** k values, set by `evaluate`. */
  readonly gradient: Float64Array;
  /** k × k values, row-major, set by `evaluate`. */
  readonly hessian: Float64Array;
}

export interface Maximum {
  readonly point: Float64Array;
  readonly value: number;
  readonly converged: boolean;
  /** Why not, in words for a reader; empty when converged. */
  readonly reason: string;
  readonly iterations: number;
}

export interface MaximiseOptions {
  /** Coordinates that stay as they are; default none. */
  readonly fixed?: readonly boolean[];
  /** Newton decrement (twice the expected gain) below which the next step is the last; default 1e-9. */
  readonly tolerance?: number;
  /** Default 100. */
  readonly maxIterations?: number;
  /** Where a maximum may lie; default every coordinate within [−650, 650]. */
  readonly inside?: (point: Float64Array) => boolean;
  /**
   * Takes the last step without evaluating at its end; the value is then the quadratic prediction, good to the square of
   * the tolerance, and gradient and Hessian belong to the point before. For many maxima of which only the place matters.
   */
  readonly predictLast?: boolean;
}

const longestStep = 2;

/**
 * The maximum of a smooth function by Newton's method with step halving; where the Hessian is not negative definite
 * its diagonal is raised until it is (Nocedal & Wright 2006, section 3.4). Not converging is a result.
 */
export function maximise(surface: Surface, start: Float64Array, options: MaximiseOptions = {}): Maximum {
  const { tolerance = 1e-9, maxIterations = 100, inside = withinBounds } = options;
  const free = freeCoordinates(surface.size, options.fixed);
  let point: Float64Array = Float64Array.from(start);
  let value = surface.evaluate(point);
  if (!Number.isFinite(value)) return failed(point, value, 'the likelihood is zero at the start values', 0);
  if (free.length === 0) return { point, value, converged: true, reason: '', iterations: 0 };
  for (let iteration = 1; iteration <= maxIterations; iteration++) {
    const step = newtonStep(surface, free);
    if (step === null) return failed(point, value, 'the likelihood has no usable slope', iteration);
    const last = step.decrement < Math.max(tolerance, 1e-11 * Math.abs(value));
    if (last && options.predictLast === true) {
      const end = point.map((x, i) => x + (step.direction[i] as number));
      const predicted = value + 0.5 * step.decrement;
      return { point: end, value: predicted, converged: true, reason: '', iterations: iteration };
    }
    const moved = walk(surface, point, value, step, last);
    if (moved === null) {
      surface.evaluate(point);
      if (last) return { point, value, converged: true, reason: '', iterations: iteration };
      return failed(point, value, 'no step along the slope raised the likelihood', iteration);
    }
    ({ point, value } = moved);
    if (!inside(point)) {
      return failed(
        point,
        value,
        'the likelihood rises without end as a parameter goes to its limit',
        iteration,
      );
    }
    if (last) return { point, value, converged: true, reason: '', iterations: iteration };
  }
  return failed(point, value, `no maximum after ${maxIterations} steps`, maxIterations);
}

interface Step {
  readonly direction: Float64Array;
  /** gᵀ (−H)⁻¹ g. */
  readonly decrement: number;
}

function newtonStep(surface: Surface, free: readonly number[]): Step | null {
  const k = free.length;
  const information = new Float64Array(k * k);
  const gradient = new Float64Array(k);
  let largest = 0;
  for (let i = 0; i < k; i++) {
    gradient[i] = surface.gradient[free[i] as number] as number;
    for (let j = 0; j < k; j++) {
      const entry = -(surface.hessian[(free[i] as number) * surface.size + (free[j] as number)] as number);
      information[i * k + j] = entry;
      if (i === j) largest = Math.max(largest, Math.abs(entry));
    }
  }
  const solution = solveRaised(information, gradient, k, largest);
  if (solution === null) return null;
  const direction = new Float64Array(surface.size);
  let decrement = 0;
  for (let i = 0; i < k; i++) {
    direction[free[i] as number] = solution[i] as number;
    decrement += (solution[i] as number) * (gradient[i] as number);
  }
  return Number.isFinite(decrement) ? { direction, decrement } : null;
}

/** Solves information · x = gradient, raising the diagonal as little as needed. */
function solveRaised(
  information: Float64Array,
  gradient: Float64Array,
  k: number,
  largest: number,
): Float64Array | null {
  if (!(largest < Infinity)) return null;
  let raise = 0;
  for (let attempt = 0; attempt < 60; attempt++) {
    const raised = Float64Array.from(information);
    for (let i = 0; i < k; i++) raised[i * k + i] = (raised[i * k + i] as number) + raise;
    const factor = cholesky(raised, k);
    if (factor !== null) return solveCholesky(factor, gradient, k);
    raise = raise === 0 ? 1e-3 * largest + 1e-12 : raise * 4;
  }
  return null;
}

/** The first of ever shorter steps that raises the value, or null. */
function walk(
  surface: Surface,
  point: Float64Array,
  value: number,
  step: Step,
  last: boolean,
): { point: Float64Array; value: number } | null {
  const longest = step.direction.reduce((most, x) => Math.max(most, Math.abs(x)), 0);
  let length = Math.min(1, longestStep / longest);
  const slack = 1e-12 * Math.max(1, Math.abs(value));
  for (let halving = 0; halving < 40; halving++) {
    const next = point.map((x, i) => x + length * (step.direction[i] as number));
    const nextValue = surface.evaluate(next);
    const enough = last ? value - slack : value + 1e-4 * length * step.decrement;
    if (nextValue >= enough) return { point: next, value: nextValue };
    length *= 0.5;
  }
  return null;
}

/** Coordinates are often logs: beyond this their exponentials overflow. */
export function withinBounds(point: Float64Array): boolean {
  return point.every((x) => Math.abs(x) <= 650);
}

function freeCoordinates(size: number, fixed: readonly boolean[] | undefined): number[] {
  const all = Array.from({ length: size }, (_, i) => i);
  return fixed === undefined ? all : all.filter((i) => fixed[i] !== true);
}

function failed(point: Float64Array, value: number, reason: string, iterations: number): Maximum {
  return { point, value, converged: false, reason, iterations };
}
