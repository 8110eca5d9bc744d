import { describe, expect, test } from 'vitest';
import { faultLines } from './faults.js';

const withInputs = (more: string) => `{ "shipments": { "files": ["s.csv"] },\n ${more} }`;

describe('faults that no single key shows', () => {
  test('a delay without a reason, where it is said', () => {
    expect(
      faultLines(withInputs('"products": { "*": { "delayDays": 20 }, "A": { "warrantyMonths": 24 } }')),
    ).toEqual([
      'missing-value s.json:2:36: missing products.*.delayReason, needed by delayDays; say why units cannot come back earlier',
    ]);
  });

  test('a delay of a product with the reason under *', () => {
    const products = '{ "*": { "delayReason": "transport" }, "A": { "delayDays": 20 } }';
    expect(faultLines(withInputs(`"products": ${products}`))).toEqual([]);
  });

  test('a reason taken back by null', () => {
    const products = '{ "*": { "delayDays": 20, "delayReason": "transport" }, "A": { "delayReason": null } }';
    expect(faultLines(withInputs(`"products": ${products}`))).toEqual([
      'missing-value s.json:2:92: missing products.A.delayReason, needed by delayDays; say why units cannot come back earlier',
    ]);
  });

  test('a delay beyond the warranty', () => {
    const rules = '{ "warrantyDays": 20, "delayDays": 30, "delayReason": "transport" }';
    expect(faultLines(withInputs(`"products": { "A": ${rules} }`))).toEqual([
      'invalid-value s.json:2:56: invalid products.A.delayDays 30, allowed less than the warranty lasts',
    ]);
  });

  test('a cost without a currency', () => {
    expect(faultLines(withInputs('"products": { "A": { "costPerReturn": 5 } }'))).toEqual([
      'missing-value s.json:2:40: missing products.A.currency, needed by costPerReturn; add the code of the currency, such as EUR',
    ]);
  });

  test('a faulty value hides no other and is not complained about twice', () => {
    const products = '{ "A": { "delayDays": 5, "delayReason": 3 }, "B": { "costPerReturn": 5 } }';
    expect(
      faultLines(withInputs(`"seed": "x", "products": ${products}`)).map((l) => l.split(',')[0]),
    ).toEqual([
      'invalid-value s.json:2:10: invalid seed "x"',
      'invalid-value s.json:2:67: invalid products.A.delayReason 3',
      'missing-value s.json:2:96: missing products.B.currency',
    ]);
  });
});

describe('inputs that do not go together', () => {
  test.each([
    [
      '{ "table": "t.csv", "shipments": { "files": ["s.csv"] } }',
      '21: invalid shipments, not allowed beside table',
    ],
    [
      '{ "table": "t.csv", "returns": { "files": ["s.csv"] } }',
      '21: invalid returns, not allowed beside table',
    ],
    ['{ "ages": "a.csv", "table": "t.csv" }', '20: invalid table, not allowed beside ages'],
    ['{ "ages": "a.csv", "plan": { "files": ["p.csv"] } }', '20: invalid plan, not allowed beside ages'],
    ['{ "ages": "a.csv", "asOf": "2026-10-31" }', '20: invalid asOf, not allowed beside ages'],
  ])('%s', (text, sentence) => {
    expect(faultLines(text)).toEqual([`conflicting-input s.json:1:${sentence}; remove one of the two`]);
  });

  test.each([
    [
      '{ "tableWithdrawn": "t.csv", "shipments": { "files": ["s.csv"] } }',
      '3: missing table, needed by tableWithdrawn; add table or remove tableWithdrawn',
    ],
    [
      '{ "shipments": { "files": ["s.csv"] }, "ageStep": 5 }',
      '40: missing ages, needed by ageStep; add ages or remove ageStep',
    ],
    [
      '{ "shipments": { "files": ["s.csv"] }, "ageUnit": "km" }',
      '40: missing ages, needed by ageUnit; add ages or remove ageUnit',
    ],
    [
      '{ "returns": { "files": ["r.csv"] } }',
      '3: missing shipments, needed by returns; add shipments or remove returns',
    ],
    [
      '{ "seed": 1 }',
      '1: missing shipments, table or ages; name the files in the settings or by --shipments, --table or --ages',
    ],
  ])('%s', (text, sentence) => {
    expect(faultLines(text)[0]).toBe(`missing-records s.json:1:${sentence}`);
  });

  test('a second table', () => {
    expect(faultLines('{ "table": { "files": ["a", "b"] } }')).toEqual([
      'invalid-value s.json:1:29: invalid table.files[1], allowed one file and not 2; put the tables into one file',
    ]);
  });

  test('standard input twice', () => {
    expect(faultLines('{ "shipments": { "files": ["-"] }, "returns": { "files": ["r", "-"] } }')).toEqual([
      'double-stdin s.json:1:64: invalid returns.files[1] "-", standard input can be read once only; name a file',
    ]);
  });
});

test('what only a calendar knows is refused beside ages', () => {
  const text = '{ "ages": "a.csv", "period": "week",\n "products": { "A": { "warrantyMonths": 12 } } }';
  expect(faultLines(text)).toEqual([
    'conflicting-input s.json:1:20: invalid period, not allowed beside ages; remove one of the two',
    'conflicting-input s.json:2:23: invalid products.A.warrantyMonths, not allowed beside ages; use warrantyDays, which is in the unit of the ages',
  ]);
});
