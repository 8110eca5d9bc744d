import type { DayRange } from '../calendar.js';

/** How long a stretch of days a date names. */
export type Grain = 'day' | 'week' | 'month' | 'quarter';

/** The days that a date cell names. */
export interface Dated extends DayRange {
  readonly grain: Grain;
  /** Equal for equal days and grain, and for no others. */
  readonly key: number;
}

/** From fine to coarse. */
export const grains: readonly Grain[] = ['day', 'week', 'month', 'quarter'];

/** A stretch of days as a date cell would name it. */
export function dated(range: DayRange, grain: Grain): Dated {
  return { from: range.from, to: range.to, grain, key: range.from * 4 + grains.indexOf(grain) };
}
