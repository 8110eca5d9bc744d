/** What the charts share: their size, and ticks along periods. */
import { type PeriodParts, periodParts } from './dates.js';

/** A label on an axis; `at` in percent of the width, or in pixels down. */
export interface Tick {
  readonly at: number;
  readonly label: string;
  /** Left out where the page is narrow. */
  readonly wideOnly: boolean;
}

/**
 * Pixels down. Charts stretch with the page: heights are pixels, places across are percent of the width, and paths are
 * drawn on a width of 1000 that is stretched without their strokes.
 */
export const frame = {
  height: 300,
  top: 28,
  bottom: 268,
  pathWidth: 1000,
  /** Curves that leave the axis are cut here. */
  clipTop: 20,
  clipHeight: 248,
} as const;

/** Class of a drawing that leaves room on the left for the longest label of the vertical axis: `room-1` to `room-4`. */
export function roomFor(ticks: readonly Tick[]): string {
  const longest = Math.max(0, ...ticks.map(({ label }) => label.length));
  return `room-${Math.min(4, Math.max(1, Math.ceil((longest - 1) / 3)))}`;
}

/** Rounded to two decimals, as every number in an SVG is. */
export function svgNumber(value: number): number {
  return Math.round(value * 100) / 100;
}

/** Ticks for a row of equal slots, one a period: at most ten where the page is wide, four where it is narrow. */
export function periodTicks(labels: readonly string[]): readonly Tick[] {
  const parts = labels.map(periodParts);
  const steps = stepsOf(parts[0]?.places ?? 1);
  const wide = fittingStep(steps, labels.length, 10);
  const narrow = fittingStep(steps, labels.length, 4);
  return parts.flatMap((part, i) => {
    if (!falls(part, wide) || labels[i - 1] === labels[i]) return [];
    const at = svgNumber(((i + 0.5) / labels.length) * 100);
    return [{ at, label: tickLabel(part, wide), wideOnly: !falls(part, narrow) }];
  });
}

/** Steps that divide a year of so many places evenly, then whole years. */
function stepsOf(places: number): readonly number[] {
  const within = [1, 2, 3, 4, 5, 6, 13, 26].filter((step) => step < places && places % step === 0);
  return [...within, ...[1, 2, 5, 10, 20, 50].map((years) => years * places)];
}

function fittingStep(steps: readonly number[], slots: number, most: number): number {
  return steps.find((step) => slots / step <= most) ?? Math.ceil(slots / most);
}

/** A 53rd week falls on no step. */
function falls(part: PeriodParts, step: number): boolean {
  return part.place < part.places && (Number(part.year ?? 0) * part.places + part.place) % step === 0;
}

function tickLabel(part: PeriodParts, step: number): string {
  if (part.year === null) return part.short;
  return step % part.places === 0 ? part.year : `${part.short} ${part.year}`;
}
