import type { ProductCounts, ProductRecords } from './records.js';

/** Units of each cohort that have neither been returned nor withdrawn. */
export function survivorsByCohort(
  records: Pick<ProductRecords, 'cohorts' | 'returned' | 'withdrawn'>,
): number[] {
  const left = records.cohorts.map((cohort) => cohort.shipped);
  for (const cell of [...records.returned, ...records.withdrawn]) {
    left[cell.cohort] = (left[cell.cohort] as number) - cell.quantity;
  }
  return left;
}

/** What became of the units of a product, with or without a calendar. */
export function productCounts(records: ProductRecords): ProductCounts {
  const { product, segment, resolution, ages } = records;
  const aged = (outcome: string) => sum(ages.filter((group) => group.outcome === outcome));
  const returns = sum(records.returned) + aged('returned');
  const withdrawn = sum(records.withdrawn);
  const units = records.cohorts.reduce((n, cohort) => n + cohort.shipped, 0) + sum(ages);
  return { product, segment, resolution, units, returns, withdrawn, survivors: units - returns - withdrawn };
}

function sum(items: readonly { readonly quantity: number }[]): number {
  return items.reduce((total, item) => total + item.quantity, 0);
}
