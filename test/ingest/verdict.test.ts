import { expect, test } from 'vitest';
import { codeWords } from '../../src/ingest/code-words.js';
import { fileFindings } from '../../src/ingest/verdict.js';
import type { FileAccount, RejectRow } from '../../src/records.js';

const account: FileAccount = {
  ...{ file: 'shipments.csv', role: 'shipments', bytes: 1, sha256: '' },
  ...{ read: 1_234_567, used: 1_233_332, rejected: 1234, setAside: 1, unusedColumns: [] },
  codes: { 'after-as-of': 1, 'missing-value': 1, 'unknown-product': 1233 },
};

function row(code: RejectRow['code'], kind: RejectRow['kind']): RejectRow {
  return { file: account.file, line: 2, kind, code, column: '', message: '', row: '' };
}

test('rows that are not used are told in words, their code beside, thousands grouped', () => {
  const rejects = [
    row('unknown-product', 'rejected'),
    row('missing-value', 'rejected'),
    row('after-as-of', 'set-aside'),
    row('unknown-product', 'rejected'),
  ];
  expect(fileFindings([account], rejects).map(({ message }) => message)).toEqual([
    '1,234 of 1,234,567 rows of shipments.csv rejected: 1 with a missing value (missing-value), ' +
      '1,233 of an unknown product (unknown-product)',
    '1 of 1,234,567 rows of shipments.csv set aside: 1 after the as-of date (after-as-of)',
  ]);
});

test('a file of one row is one row', () => {
  const one = { ...account, read: 1, rejected: 1, setAside: 0 };
  expect(fileFindings([one], [row('missing-value', 'rejected')])[0]?.message).toMatch(/^1 of 1 row of/);
});

test('no two codes have the same words', () => {
  expect(new Set(Object.values(codeWords)).size).toBe(Object.keys(codeWords).length);
});
