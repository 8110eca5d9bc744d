import type { Config } from '../config.js';
import { compareText } from '../csv.js';
import type { Cohort, ProductRecords } from '../records.js';
import type { ProductClaims } from './claims.js';
import type { Fleet, ShippedProduct } from './fleet.js';
import { productRecords } from './product.js';
import type { FileTally } from './tally.js';

/** What all files together say. */
export interface Parts {
  readonly fleet: Fleet;
  readonly claims: ReadonlyMap<string, ProductClaims>;
  readonly plans: ReadonlyMap<string, readonly Cohort[]>;
  /** Files whose rejected rows may name returned units; those of other roles are passed over. */
  readonly returnsFiles: readonly FileTally[];
}

/** Puts the products together, sorted by name. */
export function assemble(config: Config, parts: Parts, cutOff: number): ProductRecords[] {
  const { fleet, plans, claims } = parts;
  const built = [...fleet.products.keys()].sort(compareText).map((product) =>
    productRecords(
      config,
      {
        product,
        shipped: fleet.products.get(product) as ShippedProduct,
        claims: claims.get(product) ?? { units: [], counted: [] },
        planned: plans.get(product) ?? [],
      },
      cutOff,
    ),
  );
  return built.map((records) => ({
    ...records,
    rejectedReturns: rejectedReturns(parts.returnsFiles, records.product),
  }));
}

/** Units in rejected rows of returns that name the product. */
function rejectedReturns(tallies: readonly FileTally[], product: string): number {
  return tallies
    .filter(({ role }) => role === 'returns' || role === 'table')
    .reduce((sum, tally) => sum + (tally.rejectedUnits.get(product) ?? 0), 0);
}
