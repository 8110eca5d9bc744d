/** Small made-up records for runs of the whole program: two years, monthly cohorts, returns with origin. */

const months = Array.from(
  { length: 24 },
  (_, i) => `${2025 + Math.floor(i / 12)}-${String((i % 12) + 1).padStart(2, '0')}`,
);

/** The as-of date that belongs to them. */
export const asOf = '2026-12-31';

/** 24 cohorts of 300 units a product. */
export function shipmentsCsv(products: readonly string[] = ['Alpha', 'Beta']): string {
  const rows = products.flatMap((product) => months.map((month) => `${quoted(product)},${month},300`));
  return ['product,ship_date,quantity', ...rows, ''].join('\n');
}

/** Returns that grow with age in the first product and fade in the others; about one unit in thirty. */
export function returnsCsv(products: readonly string[] = ['Alpha', 'Beta']): string {
  const rows = products.flatMap((product, p) =>
    months.flatMap((shipped, i) =>
      months.slice(i).flatMap((returned, age) => {
        const quantity = Math.floor(
          (p === 0 ? 0.06 * age + 0.2 : 1.2 / (age + 1)) + ((7 * i + 3 * age) % 10) / 10,
        );
        return quantity === 0 ? [] : [`${quoted(product)},${shipped},${returned},${quantity}`];
      }),
    ),
  );
  return ['product,ship_date,return_date,quantity', ...rows, ''].join('\n');
}

function quoted(text: string): string {
  return `"${text.replaceAll('"', '""')}"`;
}
