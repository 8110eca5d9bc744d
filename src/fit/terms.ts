import { type Config, cutOffOf, rulesOf, warrantyLimit } from '../config.js';
import { survivorsByCohort } from '../counts.js';
import { type AgeGrid, ageGrid, type Precision } from '../exposure/grid.js';
import {
  type LaidWindows,
  layWindows,
  returnedBeforeExit,
  returnedBy,
  returnedWithin,
  type Window,
} from '../exposure/window.js';
import type { AgeGroup, ProductRecords } from '../records.js';

/**
 * What a product's records contribute to the log likelihood, with equal contributions put together: units whose return
 * fell into a window, units not returned within a window, and units of known age. Counts are in the order `returned`,
 * `kept`, `aged`, and a refit to weighted data replaces the counts only.
 */
export interface Terms {
  /** Days (or ageUnit) before which nothing is returned. */
  readonly delay: number;
  /** Units returned within a window each. */
  readonly returned: readonly Window[];
  /** Units not returned within a window each: survivors and withdrawn units. */
  readonly kept: readonly Window[];
  /** Ages less the delay. */
  readonly aged: readonly AgeGroup[];
  /** Units behind each term: returned, then kept, then aged. */
  readonly counts: Float64Array;
  /** Number of returned units, the sample size of the choice. */
  readonly returns: number;
}

/** The terms of a product; terms that say nothing (a survivor younger than the delay) are left out. */
export function termsOf(config: Config, records: ProductRecords): Terms {
  const rules = rulesOf(config, records.product);
  const returned = new Map<string, [Window, number]>();
  const kept = new Map<string, [Window, number]>();
  for (const cell of records.returned) {
    const cohort = records.cohorts[cell.cohort] as (typeof records.cohorts)[number];
    count(returned, returnedWithin(cohort, cell, warrantyLimit(rules, cohort.from)), cell.quantity);
  }
  for (const cell of records.withdrawn) {
    const cohort = records.cohorts[cell.cohort] as (typeof records.cohorts)[number];
    count(kept, returnedBeforeExit(cohort, cell, warrantyLimit(rules, cohort.from)), cell.quantity);
  }
  const left = survivorsByCohort(records);
  records.cohorts.forEach((cohort, i) => {
    const survivors = left[i] as number;
    if (survivors === 0) return;
    count(kept, returnedBy(cohort, cutOffOf(config), warrantyLimit(rules, cohort.from)), survivors);
  });
  const informative = [...kept.values()].filter(([window]) => window.end > rules.delayDays);
  const aged = informativeAges(records.ages, rules.delayDays, rules.warrantyDays ?? Infinity);
  const quantities = [...returned.values(), ...informative].map(([, quantity]) => quantity);
  const fromAges = records.ages.filter((group) => group.outcome === 'returned');
  return {
    delay: rules.delayDays,
    returned: [...returned.values()].map(([window]) => window),
    kept: informative.map(([window]) => window),
    aged,
    counts: Float64Array.from([...quantities, ...aged.map((group) => group.quantity)]),
    returns: [...records.returned, ...fromAges].reduce((sum, cell) => sum + cell.quantity, 0),
  };
}

/** Windows laid on a grid of their own. */
export interface LaidTerms {
  readonly grid: AgeGrid;
  readonly returned: LaidWindows;
  readonly kept: LaidWindows;
}

/** Lays the windows of the terms on a grid of the wanted precision. */
export function layTerms(terms: Terms, precision: Precision): LaidTerms {
  const knots = [...terms.returned, ...terms.kept].flatMap((window) => window.knots);
  const grid = ageGrid(knots, terms.delay, precision);
  return { grid, returned: layWindows(terms.returned, grid), kept: layWindows(terms.kept, grid) };
}

function count(into: Map<string, [Window, number]>, window: Window, quantity: number): void {
  const known = into.get(window.key);
  if (known === undefined) into.set(window.key, [window, quantity]);
  else known[1] += quantity;
}

/** Ages cut at the warranty limit: beyond it nothing is counted, so an interval across it ends there. */
export function cappedAges(ages: readonly AgeGroup[], limit: number): AgeGroup[] {
  return ages.map((group) =>
    group.exact && group.outcome === 'returned'
      ? group
      : { ...group, from: Math.min(group.from, limit), to: Math.min(group.to, limit) },
  );
}

/** Ages less the delay; survivors younger than the delay say nothing. */
function informativeAges(ages: readonly AgeGroup[], delay: number, limit: number): AgeGroup[] {
  return cappedAges(ages, limit)
    .map((group) => ({ ...group, from: Math.max(0, group.from - delay), to: group.to - delay }))
    .filter((group) => group.outcome === 'returned' || group.to > 0);
}
