import { describe, expect, test } from 'vitest';
import { readSettings } from '../../src/settings.js';
import { faultLines } from './faults.js';

const mend = 'mend the syntax; comments and trailing commas are allowed';

describe('readSettings', () => {
  test('reads comments, trailing commas and a byte-order mark', () => {
    const text = '\uFEFF{ // a comment\n  /* another */ "seed": 7, "levels": [0.5, 0.9,],\n}\n';
    expect(readSettings(text, 's.json').value).toEqual({ seed: 7, levels: [0.5, 0.9] });
  });

  test('knows the place of values and keys, whatever the line ends', () => {
    const { place } = readSettings('{\r\n  "products": {\n\n "A": { "delayDays":\n 5 } } }', 's.json');
    expect(place(['products', 'A', 'delayDays'])).toEqual({ file: 's.json', line: 5, column: 2 });
    expect(place(['products', 'A', 'delayDays'], 'key')).toEqual({ file: 's.json', line: 4, column: 9 });
    expect(place(['products', 'A', 'currency'])).toEqual({ file: 's.json', line: 4, column: 7 });
  });

  test('keeps hostile keys as their own properties', () => {
    const { value } = readSettings('{ "products": { "__proto__": { "x": 1 }, "constructor": 2 } }', 's.json');
    const products = value.products as object;
    expect(Object.keys(products)).toEqual(['__proto__', 'constructor']);
    expect(Object.getPrototypeOf(products)).toBe(Object.prototype);
    expect(({} as Record<string, unknown>).x).toBeUndefined();
  });

  test('names every fault of syntax at once', () => {
    expect(faultLines('{ "seed": 7,\n  "draws" 500,\n  "title": "a\\q",\n  "levels": [0.8 0.9] }')).toEqual([
      `invalid-json s.json:2:11: invalid JSON: a colon is missing after the key; ${mend}`,
      `invalid-json s.json:3:12: invalid JSON: an escape that JSON does not have; ${mend}`,
      `invalid-json s.json:4:18: invalid JSON: a comma is missing before this; ${mend}`,
    ]);
  });

  test.each([
    ['', '1:1: invalid JSON: a value is missing'],
    ['{ "seed": 1', '1:12: invalid JSON: a closing } is missing'],
    ['{ "seed": 1 } x', '1:15: invalid JSON: a word or sign that is no JSON value'],
    ['{ "seed": 1 }\n{ }', '2:1: invalid JSON: something follows the end of the object'],
    ['{ "seed": 1 } /* open', '1:15: invalid JSON: a comment that begins here is not closed'],
  ])('refuses %j', (text, sentence) => {
    expect(faultLines(text)[0]).toBe(`invalid-json s.json:${sentence}; ${mend}`);
  });

  test('refuses anything but an object', () => {
    expect(faultLines('\n [1]')).toEqual([
      'invalid-json s.json:2:2: invalid settings, allowed one object in braces; write { "asOf": "2026-10-31" }, for example',
    ]);
  });

  test('refuses a key that stands twice, at any depth', () => {
    expect(faultLines('{ "seed": 1, "products": { "A": {},\n "A": {} }, "seed": 2 }')).toEqual([
      'double-key s.json:2:2: invalid products.A, the key stands twice; keep one of the two',
      'double-key s.json:2:13: invalid seed, the key stands twice; keep one of the two',
    ]);
  });
});
