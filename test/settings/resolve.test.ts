import { describe, expect, test } from 'vitest';
import { rulesOf } from '../../src/config.js';
import { familyNames } from '../../src/families/index.js';
import { roleFields } from '../../src/ingest/fields.js';
import { recordFields } from '../../src/settings/known.js';
import { type Flags, readSettings, resolveConfig } from '../../src/settings.js';
import { faultLines } from './faults.js';

const resolve = (text: string, flags: Flags = {}) => resolveConfig(readSettings(text, 's.json'), flags);
const input = { files: [], columns: {}, dateFormat: null, encoding: null };
const noRules = {
  warrantyMonths: null,
  warrantyDays: null,
  delayDays: 0,
  delayReason: null,
  costPerReturn: [],
  currency: null,
};

describe('resolveConfig', () => {
  test('fills in every default', () => {
    expect(resolveConfig(null, { shipments: ['s.csv'] })).toEqual({
      title: 'Warranty return forecast',
      asOf: null,
      period: 'month',
      horizon: 12,
      levels: [0.8, 0.95],
      draws: 4000,
      seed: 1,
      candidates: familyNames,
      maxRejectShare: 0.01,
      ageUnit: 'day',
      ageStep: null,
      shipments: { ...input, files: ['s.csv'] },
      returns: input,
      withdrawals: input,
      plan: input,
      table: input,
      tableWithdrawn: input,
      ages: input,
      everyProduct: noRules,
      namedProducts: [],
    });
  });

  test('reads every key', () => {
    const config = resolve(`{
      "title": "Fans", "horizon": 6, "levels": [0.955, 0.5], "draws": 200, "seed": 0,
      "candidates": ["gamma", "weibull"], "maxRejectShare": 0,
      "ages": { "files": ["a.csv"], "columns": { "age": "hours" }, "encoding": "latin1" },
      "ageUnit": "h", "ageStep": 0.5 }`);
    expect(config).toMatchObject({
      title: 'Fans',
      horizon: 6,
      levels: [0.5, 0.955],
      draws: 200,
    });
    expect(config).toMatchObject({ seed: 0, candidates: ['gamma', 'weibull'], maxRejectShare: 0 });
    expect(config).toMatchObject({ ageUnit: 'h', ageStep: 0.5 });
    expect(config.ages).toEqual({
      files: ['a.csv'],
      columns: { age: 'hours' },
      dateFormat: null,
      encoding: 'latin1',
    });
  });

  test.each([
    'dd.MM.yyyy',
    'd/M/yy',
    'yyyyMMdd',
    'MMM yyyy',
    'yyyy-QQQ',
    "RRRR-'W'II",
    "dd.MM.yyyy 'um' HH:mm",
  ])('takes the date pattern %s', (pattern) => {
    const shipments = { files: ['s.csv'], dateFormat: pattern };
    expect(resolve(JSON.stringify({ shipments })).shipments.dateFormat).toBe(pattern);
  });

  test('merges * under a product key by key', () => {
    const config = resolve(`{ "shipments": { "files": ["s.csv"] }, "products": {
      "B": { "warrantyMonths": null, "costPerReturn": [{ "from": "2026-07-01", "amount": 9 }, { "from": "2026-01-01", "amount": 8 }] },
      "*": { "warrantyMonths": 24, "costPerReturn": 38.5, "currency": "EUR" },
      "A": { "delayDays": 27, "delayReason": "customs" } } }`);
    const cost = [{ from: null, amount: 38.5 }];
    expect(config.everyProduct).toEqual({
      ...noRules,
      warrantyMonths: 24,
      costPerReturn: cost,
      currency: 'EUR',
    });
    expect(config.namedProducts.map(({ product }) => product)).toEqual(['A', 'B']);
    expect(rulesOf(config, 'A')).toEqual({ ...config.everyProduct, delayDays: 27, delayReason: 'customs' });
    expect(rulesOf(config, 'B')).toEqual({
      ...noRules,
      costPerReturn: [
        { from: '2026-01-01', amount: 8 },
        { from: '2026-07-01', amount: 9 },
      ],
      currency: 'EUR',
    });
    expect(rulesOf(config, 'C')).toEqual(config.everyProduct);
  });

  test('takes any text for a product name', () => {
    const names = ['__proto__', 'constructor', 'toString', '=1+1', 'a\nb', '"', '.', '😀', '＊'];
    const rules = names.map((name, i) => `${JSON.stringify(name)}: { "warrantyMonths": ${i + 1} }`);
    const config = resolve(`{ "shipments": { "files": ["s"] }, "products": { ${rules.join()} } }`);
    expect(names.map((name) => rulesOf(config, name).warrantyMonths)).toEqual(names.map((_, i) => i + 1));
    expect(rulesOf(config, 'valueOf').warrantyMonths).toBeNull();
  });

  test('drops a currency where no cost is set', () => {
    const text = '{ "shipments": { "files": ["s"] }, "products": { "*": { "currency": "EUR" } } }';
    expect(resolve(text).everyProduct.currency).toBeNull();
  });
});

describe('flags', () => {
  const settings = `{ "asOf": "2026-09-30", "horizon": 3, "levels": [0.5],
    "shipments": { "files": ["s.csv"], "columns": { "product": "type" }, "dateFormat": "dd.MM.yyyy" },
    "products": { "*": { "delayDays": 5, "delayReason": "transport" }, "A": { "warrantyMonths": 12, "delayDays": 9 } } }`;

  test('override the settings', () => {
    const config = resolve(settings, {
      asOf: '2026-10-31',
      period: 'quarter',
      horizon: '24',
      levels: '0.9, 0.8',
      draws: '1000',
      seed: '9',
      candidates: 'weibull, gamma',
      returns: ['a.csv', 'b.csv'],
    });
    expect(config).toMatchObject({ asOf: '2026-10-31', period: 'quarter', horizon: 24, levels: [0.8, 0.9] });
    expect(config).toMatchObject({ draws: 1000, seed: 9, candidates: ['weibull', 'gamma'] });
    expect(config.returns.files).toEqual(['a.csv', 'b.csv']);
  });

  test('that name files leave how they are read', () => {
    expect(resolve(settings, { shipments: ['new.csv'] }).shipments).toEqual({
      files: ['new.csv'],
      columns: { product: 'type' },
      dateFormat: 'dd.MM.yyyy',
      encoding: null,
    });
  });

  test("of warranty in one unit take back the settings' other unit", () => {
    const months = `{ "shipments": { "files": ["s.csv"] }, "products": { "*": { "warrantyMonths": 24 }, "B": { "warrantyDays": 500 } } }`;
    expect(resolve(months).everyProduct).toMatchObject({ warrantyMonths: 24, warrantyDays: null });
    expect(rulesOf(resolve(months), 'B')).toMatchObject({ warrantyMonths: 24, warrantyDays: 500 });
    const config = resolve(months, { warrantyDays: '1500' });
    expect(config.everyProduct).toMatchObject({ warrantyMonths: null, warrantyDays: 1500 });
    expect(rulesOf(config, 'B')).toMatchObject({ warrantyMonths: null, warrantyDays: 1500 });
  });

  test('of warranty and delay hold for every product, with a reason that says so', () => {
    const config = resolve(settings, { warrantyMonths: '36', delayDays: '9' });
    const given = 'given on the command line, by --delay-days';
    expect(rulesOf(config, 'B')).toMatchObject({ warrantyMonths: 36, delayDays: 9, delayReason: given });
    expect(rulesOf(config, 'A')).toMatchObject({
      warrantyMonths: 36,
      delayDays: 9,
      delayReason: 'transport',
    });
  });

  test('with faults are named by the flag, all at once and after those of the settings', () => {
    const flags = { asOf: 'today', horizon: '1e2', candidates: 'weibul', warrantyDays: '-3', delayDays: '' };
    expect(faultLines('{ "seed": 0.5 }', flags).map((line) => line.split(', allowed')[0])).toEqual([
      'invalid-value s.json:1:11: invalid seed 0.5',
      'invalid-value --as-of: invalid asOf "today"',
      'invalid-value --horizon: invalid horizon "1e2"',
      'invalid-value --candidates: invalid candidates[0] "weibul"',
      'invalid-value --warranty-days: invalid warrantyDays -3',
      'invalid-value --delay-days: invalid delayDays ""',
    ]);
  });

  test('that do not go with the settings are named by the flag', () => {
    const text = '{ "ages": "a.csv", "products": { "A": { "warrantyDays": 10 } } }';
    const lines = faultLines(text, { asOf: '2026-10-31', delayDays: '10' });
    expect(lines.map((line) => line.split(', ')[0])).toEqual([
      'conflicting-input --as-of: invalid asOf',
      'invalid-value --delay-days: invalid products.A.delayDays 10',
    ]);
  });
});

test('columns may map every field that the files may have, and no other', () => {
  const fields = Object.fromEntries(
    Object.entries(roleFields)
      .filter(([role]) => role !== 'table-withdrawn')
      .map(([role, { required, optional }]) => [role, [...required, ...optional].sort()]),
  );
  expect(
    Object.fromEntries(Object.entries(recordFields).map(([role, list]) => [role, [...list].sort()])),
  ).toEqual(fields);
});
