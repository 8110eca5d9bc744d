import type { AgeGroup } from '../records.js';
import { badQuantity, isWellFormed, missingValue, type Row, refOf, textAt, wholeNumber } from './cells.js';
import { type FileTally, rejectRow } from './tally.js';

/** The ages in a row: exact in `age`, or from `age_from` to `age_to`; null when the row is rejected. */
export function readAge(tally: FileTally, row: Row): AgeGroup | null {
  if (!isWellFormed(tally, row)) return null;
  const at = (field: string) => textAt(row, tally.columns?.at(field) ?? -1);
  const outcome = at('outcome').toLowerCase();
  if (outcome === '') return missingValue(tally, row, 'outcome');
  if (outcome !== 'returned' && outcome !== 'surviving') return noOutcome(tally, row, outcome);
  const quantity = quantityOf(tally, row, at('quantity'));
  if (quantity === null) return null;
  const [age, from, to] = [at('age'), at('age_from'), at('age_to')];
  if (age !== '' && (from !== '' || to !== '')) {
    return badQuantity(tally, row, 'age', age, 'it must be empty where age_from or age_to is given');
  }
  if (outcome === 'surviving') return surviving(tally, row, age, from, to, quantity);
  return age !== '' ? exact(tally, row, age, quantity) : interval(tally, row, from, to, quantity);
}

/** An outcome that says neither is as good as none. */
function noOutcome(tally: FileTally, row: Row, text: string): null {
  const message = `missing outcome, ${text} is none: it must be returned or surviving`;
  rejectRow(refOf(tally, row), 'missing-value', 'outcome', message);
  return null;
}

/** A survivor's age is exact, or it has an age_from and no end. */
function surviving(
  tally: FileTally,
  row: Row,
  exactText: string,
  fromText: string,
  to: string,
  quantity: number,
): AgeGroup | null {
  const [field, text] = exactText !== '' ? ['age', exactText] : ['age_from', fromText];
  if (text === '') return missingValue(tally, row, 'age');
  if (to !== '') return badQuantity(tally, row, 'age_to', to, 'it must be empty where a unit survives');
  const age = ageIn(text);
  if (age === null) return badQuantity(tally, row, field, text, 'it must be a number, 0 or above');
  return { outcome: 'surviving', from: age, to: age, exact: true, quantity };
}

function exact(tally: FileTally, row: Row, text: string, quantity: number): AgeGroup | null {
  const age = ageIn(text);
  if (age === null || age === 0) return badQuantity(tally, row, 'age', text, 'it must be a number above 0');
  return { outcome: 'returned', from: age, to: age, exact: true, quantity };
}

function interval(
  tally: FileTally,
  row: Row,
  fromText: string,
  toText: string,
  quantity: number,
): AgeGroup | null {
  if (fromText === '') return missingValue(tally, row, toText === '' ? 'age' : 'age_from');
  if (toText === '') return missingValue(tally, row, 'age_to');
  const [from, to] = [ageIn(fromText), ageIn(toText)];
  if (from === null) return badQuantity(tally, row, 'age_from', fromText, 'it must be a number, 0 or above');
  if (to === null || to <= from)
    return badQuantity(tally, row, 'age_to', toText, 'it must be above age_from');
  return { outcome: 'returned', from, to, exact: false, quantity };
}

function quantityOf(tally: FileTally, row: Row, text: string): number | null {
  if (text === '') return 1;
  const quantity = wholeNumber(text);
  if (quantity !== null && quantity > 0) return quantity;
  return badQuantity(tally, row, 'quantity', text, 'it must be a whole number above 0');
}

function ageIn(text: string): number | null {
  return /^\+?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d{1,2})?$/.test(text) ? Number(text) : null;
}
