import type { Jets } from '../families/family.js';

/**
 * Units that can still come back, in groups of like units, with their chances. Column j is a period; where `limited`, one
 * more column holds what comes after the horizon and within warranty.
 */
export interface Exposed {
  readonly groups: readonly ExposedGroup[];
  /** Number of periods. */
  readonly periods: number;
  /** True when every group has a warranty limit, so that there is an end to wait for. */
  readonly limited: boolean;
  /**
   * Chances of a unit of each group to be returned in each column, given that it has not been returned by the cut-off:
   * group g, column j at g · columns + j. The buffer is overwritten by the next call.
   */
  readonly chances: (jets: Jets) => Float64Array;
  /** Columns a group has in `chances`: the periods, and one for later. */
  readonly columns: number;
}

export interface ExposedGroup {
  readonly units: number;
  /** Shipped after the as-of date, as planned. */
  readonly planned: boolean;
}

/** Expected returns by period, the planned part of them, and until warranty ends for what is shipped. */
export interface Expectation {
  readonly periods: Float64Array;
  readonly planned: Float64Array;
  readonly untilWarrantyEnds: number;
}

/** Expected returns for given chances: Σ units · P / S. */
export function expectation(exposed: Exposed, chances: Float64Array): Expectation {
  const periods = new Float64Array(exposed.periods);
  const planned = new Float64Array(exposed.periods);
  let until = 0;
  exposed.groups.forEach((group, g) => {
    for (let j = 0; j < exposed.columns; j++) {
      const expected = group.units * (chances[g * exposed.columns + j] as number);
      if (j < exposed.periods) periods[j] = (periods[j] as number) + expected;
      if (!group.planned) until += expected;
      else if (j < exposed.periods) planned[j] = (planned[j] as number) + expected;
    }
  });
  return { periods, planned, untilWarrantyEnds: until };
}
