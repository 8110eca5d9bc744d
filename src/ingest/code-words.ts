import type { RejectCode, SetAsideCode } from '../records.js';

interface CodeWords {
  readonly rejected: Readonly<Record<RejectCode, string>>;
  readonly 'set-aside': Readonly<Record<SetAsideCode, string>>;
}

/** What a code says of a row, to follow a number of rows: `3 with a missing value`. */
export const codeWords: CodeWords = {
  rejected: {
    'unreadable-date': 'with an unreadable date',
    'ambiguous-date': 'with a date that can be read two ways',
    'missing-value': 'with a missing value',
    'bad-quantity': 'with an invalid quantity',
    'wrong-width': 'with too many or too few fields',
    'unknown-product': 'of an unknown product',
    'unknown-unit': 'of an unknown unit',
    'return-before-shipment': 'with a return before the shipment',
    'duplicate-unit': 'repeating a unit',
    'conflicting-unit': 'contradicting another row of the unit',
    'returns-exceed-shipped': 'with more returns than were shipped',
    'unmatched-reversal': 'reversing a return that is not there',
    'field-too-long': 'with a field that is too long',
  },
  'set-aside': {
    'after-as-of': 'after the as-of date',
    'repeat-return': 'with another return of the same unit',
    'beyond-warranty': 'beyond the warranty',
    'before-delay': 'before the delay is over',
    'before-as-of': 'planned for a period that is over',
  },
};

/** `1,221`, whatever the locale. */
export function grouped(count: number): string {
  return String(count).replace(/\B(?=(\d{3})+$)/g, ',');
}
