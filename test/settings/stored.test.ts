import { describe, expect, test } from 'vitest';
import type { Config } from '../../src/config.js';
import { UserError } from '../../src/errors.js';
import { overrideStored, readSettings, readStoredConfig, resolveConfig } from '../../src/settings.js';

const config: Config = resolveConfig(
  readSettings(
    `{ "asOf": "2026-10-31", "levels": [0.9], "shipments": { "files": ["s.csv"], "columns": { "product": "type" } },
       "products": { "__proto__": { "costPerReturn": 5, "currency": "EUR", "delayDays": 3, "delayReason": "so" } } }`,
    's.json',
  ),
  {},
);

describe('a stored configuration', () => {
  test('reads back as it was', () => {
    expect(readStoredConfig(JSON.parse(JSON.stringify(config)), 'run.json')).toEqual(config);
  });

  test.each([
    [{ ...config, horizon: 0 }, 'settings.horizon'],
    [{ ...config, extra: 1 }, 'settings'],
    [
      { ...config, everyProduct: { ...config.everyProduct, delayDays: '3' } },
      'settings.everyProduct.delayDays',
    ],
    [null, 'settings'],
  ])('is refused when it was altered (%#)', (altered, path) => {
    const read = () => readStoredConfig(altered, 'run.json');
    expect(read).toThrow(`run.json: invalid ${path}, not settings that this version wrote`);
    expect(read).toThrow(expect.objectContaining({ exitCode: 3 }));
  });

  test('takes what later stages obey from the flags', () => {
    const flags = { horizon: '3', levels: '0.8,0.5', draws: '500', seed: '4', candidates: 'gamma' };
    const later = { horizon: 3, levels: [0.5, 0.8], draws: 500, seed: 4, candidates: ['gamma'] };
    expect(overrideStored(config, flags)).toEqual({ ...config, ...later });
    expect(overrideStored(config, {})).toEqual(config);
  });

  test('refuses flags that earlier stages would have had to obey, and faulty ones, all at once', () => {
    const flags = { horizon: 'x', asOf: '2026-11-30', shipments: ['s.csv'], delayDays: '3' };
    const codes = () => {
      try {
        overrideStored(config, flags);
      } catch (error) {
        return error instanceof UserError
          ? error.faults.map(({ code, column }) => `${code} ${column}`)
          : error;
      }
    };
    expect(codes()).toEqual([
      'invalid-value --horizon',
      'conflicting-input --as-of',
      'conflicting-input --shipments',
      'conflicting-input --delay-days',
    ]);
  });
});
