/**
 * What Returnfall knows of a life distribution. Ages are above 0, in any one unit, counted from the end of the delay.
 *
 * Each family has two sets of coordinates: the *parameters* that people read, and *free* ones that may be any real number,
 * each a monotone function of one parameter, in which likelihoods are maximised.
 */
export interface Family {
  readonly name: string;
  /** Names of the parameters in order, as fit.json names them. */
  readonly parameterNames: readonly string[];
  /** Parameters at free coordinates. */
  readonly parameters: (free: Float64Array) => number[];
  /** Free coordinates of parameters. @throws RangeError outside the domain, with name and value. */
  readonly free: (parameters: readonly number[]) => Float64Array;
  /** Derivative of each parameter by its own free coordinate, for the delta method. */
  readonly slopes: (free: Float64Array) => number[];
  /** Functions of age at free coordinates. */
  readonly at: (free: Float64Array) => Distribution;
  /** Logs with first and second derivatives by the free coordinates. */
  readonly jetsAt: (free: Float64Array) => Jets;
  /** Start values: free coordinates that agree with a known cdf at two ages (one suffices for one parameter). */
  readonly start: (near: StartPoints) => Float64Array;
  /** About the standard deviation of log age: how wide the distribution is. */
  readonly spread: (free: Float64Array) => number;
  /** Location and log scale are the free coordinates, so that parameter draws have a pivotal form. */
  readonly logLocationScale: boolean;
}

/** A distribution with its parameters bound; every function keeps relative accuracy in both tails. */
export interface Distribution {
  readonly logDensity: (age: number) => number;
  readonly logSurvival: (age: number) => number;
  readonly logCdf: (age: number) => number;
  /** Age by which the log cdf (tail `lower`) or the log survival (tail `upper`) is `logProbability` ≤ 0. */
  readonly quantile: (logProbability: number, tail: 'lower' | 'upper') => number;
}

/**
 * Fills `out` with the log, its k first derivatives and its k (k + 1) / 2 second ones (11, 12, …, 22, …).
 * @param age above 0. @param logAge its natural logarithm, given because hot loops know it.
 */
export type Jet = (age: number, logAge: number, out: Float64Array) => void;

export interface Jets {
  readonly logDensity: Jet;
  readonly logSurvival: Jet;
}

/** Two ages and the share returned by each, from a fit that stands already. */
export interface StartPoints {
  readonly ages: readonly [number, number];
  readonly cdf: readonly [number, number];
}

/** Values in a jet of k coordinates. */
export function jetSize(k: number): number {
  return 1 + k + (k * (k + 1)) / 2;
}

/** Free coordinates of parameters by name. @throws RangeError when one is missing or outside the domain. */
export function freeOf(family: Family, parameters: Readonly<Record<string, number>>): Float64Array {
  return family.free(family.parameterNames.map((name) => parameters[name] ?? Number.NaN));
}

/** Throws when a parameter is not a positive finite number. */
export function requirePositive(name: string, value: number): number {
  if (value > 0 && value < Infinity) return value;
  throw new RangeError(`invalid ${name} ${value}, must be above 0 and finite`);
}

/** Throws when a parameter is not a finite number. */
export function requireFinite(name: string, value: number): number {
  if (Number.isFinite(value)) return value;
  throw new RangeError(`invalid ${name} ${value}, must be finite`);
}
