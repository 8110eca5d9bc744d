import { parsePeriod } from '../../src/calendar.js';
import type { Config, ProductRules } from '../../src/config.js';
import { familyNames } from '../../src/families/index.js';
import type { AgeGroup, Cell, Cohort, ProductRecords } from '../../src/records.js';
import type { GroupedTable } from '../reference/load.js';

const noFiles = { files: [], columns: {}, dateFormat: null, encoding: null };

export const plainRules: ProductRules = {
  warrantyMonths: null,
  warrantyDays: null,
  delayDays: 0,
  delayReason: null,
  costPerReturn: [],
  currency: null,
};

/** A complete configuration for tests of stages; the settings' own defaults are tested with the settings. */
export function configWith(changes: Partial<Config> = {}): Config {
  return {
    title: 'Test',
    asOf: null,
    period: 'month',
    horizon: 12,
    levels: [0.8, 0.95],
    draws: 1000,
    seed: 1,
    candidates: familyNames,
    maxRejectShare: 0.01,
    ageUnit: 'day',
    ageStep: null,
    shipments: noFiles,
    returns: noFiles,
    withdrawals: noFiles,
    plan: noFiles,
    table: noFiles,
    tableWithdrawn: noFiles,
    ages: noFiles,
    everyProduct: plainRules,
    namedProducts: [],
    ...changes,
  };
}

const nothing = {
  segment: null,
  cohorts: [],
  returned: [],
  withdrawn: [],
  planned: [],
  ages: [],
  rejectedReturns: 0,
  unusable: null,
};

/** A product known by ages alone. */
export function agedProduct(product: string, ages: readonly AgeGroup[]): ProductRecords {
  return { ...nothing, product, resolution: 'age', ages };
}

/** A product of cohorts and cells. */
export function datedProduct(
  product: string,
  cohorts: readonly Cohort[],
  returned: readonly Cell[],
  changes: Partial<ProductRecords> = {},
): ProductRecords {
  return { ...nothing, product, resolution: 'period', cohorts, returned, ...changes };
}

/** The published table of grouped.json as records. */
export function groupedProduct(table: GroupedTable): ProductRecords {
  const months = table.shipMonths.map((label) => parsePeriod(label) ?? { from: 0, to: 0 });
  const cohorts = months.map((month, i) => ({ ...month, shipped: table.shipped[i] ?? 0 }));
  const returned = table.returned.flatMap((row, i) =>
    row.map((quantity, j) => ({ cohort: i, ...(months[i + j] as { from: number; to: number }), quantity })),
  );
  return datedProduct(
    'v1',
    cohorts,
    returned.filter((cell) => cell.quantity > 0),
  );
}
