import fc from 'fast-check';
import { expect, test } from 'vitest';
import { jsonText } from '../../src/ledger/json.js';

test('a document has its keys as built, lists of numbers on one line, and null for what is not finite', () => {
  const document = {
    b: 1.5,
    a: [1, Number.NaN, -Infinity, 0.1],
    none: undefined,
    list: [{ x: [] }, 'é\n'],
    o: {},
  };
  expect(jsonText(document)).toBe(
    '{\n  "b": 1.5,\n  "a": [1, null, null, 0.1],\n  "list": [\n    {\n      "x": []\n    },\n    "é\\n"\n  ],\n  "o": {}\n}\n',
  );
});

test('any JSON value reads back as the same value', () => {
  fc.assert(
    fc.property(fc.jsonValue(), (value) => {
      expect(JSON.parse(jsonText(value))).toEqual(JSON.parse(JSON.stringify(value)));
    }),
  );
});

test('doubles are written in full', () => {
  fc.assert(
    fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (x) => {
      expect(JSON.parse(jsonText([x]))[0]).toBe(x === 0 ? 0 : x);
    }),
  );
});
