import { expect, test } from 'vitest';
import { findDuplicates } from '../../src/ingest/duplicates.js';
import { fingerprint, newFingerprints } from '../../src/ingest/fingerprints.js';
import { newTally } from '../../src/ingest/tally.js';
import { configWith } from '../support/data.js';
import { ingestText, memorySource } from '../support/memory.js';

const header = 'unit,product,ship_date,note\n';
const serial = (i: number) => `SN-${String(i).padStart(7, '0')}`;
const line = (i: number, note: string) => `${serial(i)},P${i % 7},2026-0${1 + (i % 9)}-1${i % 10},${note}`;

test('doubled and contradicting units are found among 100,000, and no others', async () => {
  const rows = Array.from({ length: 100_000 }, (_, i) => line(i, 'first'));
  const doubled = [17, 40_000, 99_999];
  const conflicting = [3, 50_021];
  const more = [
    ...doubled.map((i) => line(i, 'again')),
    ...conflicting.map((i) => line(i, 'other').replace(/P\d/, 'P9')),
  ];
  const { files, rejects, products } = await ingestText({
    shipments: `${header}${[...rows, ...more].join('\n')}\n`,
    returns: `unit,return_date\n${serial(17)},2026-10-01\n${serial(5)},2026-10-02\n`,
  });
  // of equal rows the one that sorts first is used: "again" before "first"
  const expected = [
    ...doubled.map((i) => `${i + 2} duplicate-unit`),
    ...conflicting.flatMap((i, n) => [`${i + 2} conflicting-unit`, `${100_005 + n} conflicting-unit`]),
  ];
  expect(rejects.map((row) => `${row.line} ${row.code}`)).toEqual(
    expected.sort((a, b) => Number.parseInt(a, 10) - Number.parseInt(b, 10)),
  );
  expect(files[0]).toMatchObject({ read: 100_005, used: 99_998, rejected: 7 });
  const units = products.flatMap(({ cohorts }) => cohorts).reduce((sum, { shipped }) => sum + shipped, 0);
  expect(units).toBe(99_998);
  expect(products.map(({ product }) => product)).not.toContain('P9');
});

test('fingerprints of a million serials in a row are all different whole numbers', () => {
  const store = newFingerprints();
  for (let i = 0; i < 1_000_000; i++) store.add(fingerprint(serial(i)));
  expect(store.takeRepeated().size).toBe(0);
  for (let i = 0; i < 1000; i++) {
    expect(Number.isSafeInteger(fingerprint(serial(i)))).toBe(true);
    expect(fingerprint(serial(i))).toBeGreaterThanOrEqual(0);
  }
});

test('what comes twice is found in every bucket and size, once', () => {
  const store = newFingerprints();
  for (let print = 0; print < 600_000; print++) store.add(print);
  for (let print = 0; print < 600_000; print += 1009) store.add(print);
  store.add(1009);
  expect(store.takeRepeated().size).toBe(Math.ceil(600_000 / 1009));
  expect(store.takeRepeated().size).toBe(0);
});

test('a suspect whose serial comes once is left alone', async () => {
  const tally = newTally(
    memorySource(
      's.csv',
      `${header}u1,A,2026-01-05,\nu2,A,2026-01-05,\nu3,A,2026-01-05,\nu3,A,2026-01-05,\n`,
    ),
    'shipments',
  );
  const suspects = new Set(['u1', 'u2', 'u3'].map(fingerprint));
  const { removed, conflicting } = await findDuplicates(configWith(), [tally], Infinity, suspects);
  expect(removed.map(({ unit }) => unit)).toEqual(['u3']);
  expect(conflicting).toEqual([]);
});
