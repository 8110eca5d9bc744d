import { expect, test } from 'vitest';
import { codeWords } from '../../src/ingest/code-words.js';
import { fileFindings } from '../../src/ingest/verdict.js';
import type { FileAccount } from '../../src/records.js';

const account: FileAccount = {
  ...{ file: 'shipments.csv', role: 'shipments', bytes: 1, sha256: '' },
  ...{ read: 1_234_567, used: 1_233_332, rejected: 1234, setAside: 1, unusedColumns: [] },
  codes: { 'after-as-of': 1, 'missing-value': 1, 'unknown-product': 1233 },
};

test('rows that are not used are told in words, their code beside, thousands grouped', () => {
  expect(fileFindings([account]).map(({ message }) => message)).toEqual([
    '1,234 of 1,234,567 rows of shipments.csv rejected: 1 with a missing value (missing-value), ' +
      '1,233 of an unknown product (unknown-product)',
    '1 of 1,234,567 rows of shipments.csv set aside: 1 after the as-of date (after-as-of)',
  ]);
});

test('a file of one row is one row', () => {
  const one = { ...account, read: 1, rejected: 1, setAside: 0 };
  expect(fileFindings([one])[0]?.message).toMatch(/^1 of 1 row of/);
});

test('no two codes have the same words', () => {
  const words = [...Object.values(codeWords.rejected), ...Object.values(codeWords['set-aside'])];
  expect(new Set(words).size).toBe(words.length);
});
