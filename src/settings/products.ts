import { compareText } from '../csv.js';
import { type Complaint, checkKeys, invalid, isObject } from './check.js';
import { ruleKeys, type Stated } from './keys.js';

/** What is said of one product. */
export type Rules = Stated<typeof ruleKeys>;

/** What is said of `*` and of the products by name, sorted by name. */
export interface StatedProducts {
  readonly every: Rules;
  readonly named: readonly { readonly product: string; readonly rules: Rules }[];
  readonly complaints: readonly Complaint[];
}

/** Reads `products`: its keys are product names, any text but the empty one and `(total)`. */
export function readProducts(value: unknown): StatedProducts {
  if (value === undefined) return { every: {}, named: [], complaints: [] };
  if (!isObject(value)) {
    const complaint = invalid(['products'], value, 'an object with product names or * as keys');
    return { every: {}, named: [], complaints: [complaint] };
  }
  const read = Object.entries(value).map(([product, rules]) => ({
    product,
    name: nameComplaints(product),
    ...checkKeys(ruleKeys, rules, ['products', product]),
  }));
  return {
    every: read.find(({ product }) => product === '*')?.stated ?? {},
    named: read
      .filter(({ product }) => product !== '*')
      .map(({ product, stated }) => ({ product, rules: stated }))
      .sort((a, b) => compareText(a.product, b.product)),
    complaints: read.flatMap(({ complaints, name }) => [...name, ...complaints]),
  };
}

function nameComplaints(product: string): Complaint[] {
  if (product !== '' && product !== '(total)') return [];
  const message = `invalid product name ${JSON.stringify(product)}, allowed any text that is not empty except (total)`;
  return [{ code: 'invalid-product', message, path: ['products', product], at: 'key' }];
}
