import type { Config } from '../config.js';
import { nearest } from '../nearest.js';
import type { Finding, ProductRecords } from '../records.js';

/**
 * Warnings of products that the settings name and the records do not have, whose rules hold for nothing: one for each that may
 * be a slip for a product without rules of its own, and one for all the others.
 */
export function unknownInSettings(config: Config, products: readonly ProductRecords[]): Finding[] {
  const known = new Set(products.map(({ product }) => product));
  const named = new Set(config.namedProducts.map(({ product }) => product));
  const without = [...known].filter((product) => !named.has(product));
  const unknown = [...named].filter((product) => !known.has(product));
  const slips = unknown.flatMap((product) => {
    const meant = nearest(product, without);
    return meant === null ? [] : [{ product, meant }];
  });
  const others = unknown.filter((name) => !slips.some(({ product }) => product === name));
  const lacking = config.asOf === null ? 'do not have' : `do not have by the as-of date ${config.asOf}`;
  return [
    ...slips.map(({ product, meant }) =>
      warning(
        `the settings name the product ${product}, which the records ${lacking}; did you mean ${meant}?`,
      ),
    ),
    ...(others.length === 0
      ? []
      : [warning(`the settings name ${listed(others)}, which the records ${lacking}`)]),
  ];
}

/** Names shown of a longer list. */
const mostShown = 10;

function listed(names: readonly string[]): string {
  const shown = names.slice(0, mostShown).join(', ');
  const more = names.length > mostShown ? ` and ${names.length - mostShown} more` : '';
  return `${names.length === 1 ? 'the product' : 'the products'} ${shown}${more}`;
}

function warning(message: string): Finding {
  return { code: 'unknown-product-settings', severity: 'warning', message };
}
