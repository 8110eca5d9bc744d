import type { InputRole } from '../records.js';

/** What the columns of one kind of file may be, in our own names. */
export interface RoleFields {
  readonly required: readonly string[];
  readonly optional: readonly string[];
  /** Sets of fields of which at least one must be there whole, and how a message calls them. */
  readonly oneOf: { readonly sets: readonly (readonly string[])[]; readonly remedy: string } | null;
  /** Columns that would change the result and cannot be used yet. */
  readonly refused: readonly string[];
}

const origin = {
  sets: [['unit'], ['product', 'ship_date']],
  remedy:
    'returns without an origin cannot be used; give unit, or product and ship_date, or name them in columns',
};

/** Fields by role. */
export const roleFields: Readonly<Record<InputRole, RoleFields>> = {
  shipments: {
    required: ['product', 'ship_date'],
    optional: ['unit', 'quantity'],
    oneOf: { sets: [['unit'], ['quantity']], remedy: 'give unit or quantity, or name its header in columns' },
    refused: ['in_service_date', 'warranty_months'],
  },
  returns: {
    required: ['return_date'],
    optional: ['unit', 'product', 'ship_date', 'quantity'],
    oneOf: origin,
    refused: [],
  },
  withdrawals: {
    required: ['date'],
    optional: ['unit', 'product', 'ship_date', 'quantity'],
    oneOf: { ...origin, remedy: 'give unit, or product and ship_date, or name them in columns' },
    refused: [],
  },
  plan: { required: ['product', 'ship_period', 'quantity'], optional: [], oneOf: null, refused: [] },
  table: { required: ['product', 'shipped_in', 'shipped'], optional: [], oneOf: null, refused: [] },
  'table-withdrawn': {
    required: ['product', 'shipped_in', 'shipped'],
    optional: [],
    oneOf: null,
    refused: [],
  },
  ages: {
    required: ['product', 'outcome'],
    optional: ['quantity', 'age', 'age_from', 'age_to'],
    oneOf: { sets: [['age'], ['age_from', 'age_to']], remedy: 'give age, or age_from and age_to' },
    refused: [],
  },
};

/** Headers that mean a field, both as `plainHeader` writes them. */
export const synonyms: ReadonlyMap<string, string> = new Map([
  ['unitid', 'unit'],
  ['serial', 'unit'],
  ['serialnumber', 'unit'],
  ['serialno', 'unit'],
  ['qty', 'quantity'],
  ['model', 'product'],
  ['item', 'product'],
  ['shipped', 'shipdate'],
  ['shipmentdate', 'shipdate'],
  ['returned', 'returndate'],
  ['failuredate', 'returndate'],
  ['withdrawndate', 'date'],
  ['scrapdate', 'date'],
]);

/** A header without what does not count: case, spaces, `_`, `-`. */
export function plainHeader(header: string): string {
  return header.toLowerCase().replace(/[\s_-]/g, '');
}
