import { hat, returnedUntilAge, type Window } from '../exposure/window.js';
import type { Terms } from './terms.js';

/** Spacing of the ages that narrow windows are moved to, as a share of age. */
const spacing = 0.02;

/**
 * Terms for refits to randomly weighted data, which need the likelihood's shape but not its last digits. A window that is
 * narrower than 2 % of its age is divided between the two neighbours of its centre on a grid of ages, in proportion, so that
 * mass and mean age stay; dated records of three years come down from thousands of terms to hundreds. Wide windows stay as
 * they are. A refit is always compared with the maximum of the same coarse terms, so that the small error cancels.
 */
export function coarseTerms(terms: Terms): Terms {
  const returned = collect(terms.returned, terms.counts, 0, terms.delay, hat);
  const kept = collect(terms.kept, terms.counts, terms.returned.length, terms.delay, (_before, age) =>
    returnedUntilAge(age),
  );
  const aged = terms.counts.subarray(terms.returned.length + terms.kept.length);
  return {
    ...terms,
    returned: returned.map(([window]) => window),
    kept: kept.map(([window]) => window),
    counts: Float64Array.from([...returned.map(([, n]) => n), ...kept.map(([, n]) => n), ...aged]),
  };
}

function collect(
  windows: readonly Window[],
  counts: Float64Array,
  first: number,
  delay: number,
  place: (before: number, age: number, after: number) => Window,
): [Window, number][] {
  const collected = new Map<string, [Window, number]>();
  const add = (window: Window, units: number) => {
    const known = collected.get(window.key);
    if (known === undefined) collected.set(window.key, [window, units]);
    else known[1] += units;
  };
  windows.forEach((window, w) => {
    const units = counts[first + w] as number;
    const from = Math.max(delay, window.rampFrom);
    const centre = 0.5 * (from + window.end) - delay;
    const step = Math.log1p(spacing);
    if (!(window.end - from < spacing * centre)) {
      add(window, units);
      return;
    }
    const low = Math.floor(Math.log(centre) / step);
    const age = (i: number) => delay + Math.exp(i * step);
    const high = (centre + delay - age(low)) / (age(low + 1) - age(low));
    add(place(age(low - 1), age(low), age(low + 1)), units * (1 - high));
    add(place(age(low), age(low + 1), age(low + 2)), units * high);
  });
  return [...collected.values()].filter(([, units]) => units > 0);
}
