import { describe, expect, test } from 'vitest';
import { faultLines, faultsOf } from './faults.js';

/** Settings with inputs, so that only what is added can be at fault; the addition begins at line 2, column 2. */
const withInputs = (more: string) => `{ "shipments": { "files": ["s.csv"] },\n ${more} }`;

const level = 'a number between 0 and 1 with at most five decimals';
const pattern =
  'a date-fns pattern with a year and a day, week, month or quarter, such as dd.MM.yyyy (not DD.MM.YYYY), without zone (X, x, O, z), instant (T, t) or locale (P, p)';

describe('a value that a key cannot hold is named with its place and what is allowed', () => {
  test.each([
    ['"title": ""', '11: invalid title "", allowed a text that is not empty'],
    ['"asOf": "2026-02-29"', '10: invalid asOf "2026-02-29", allowed a real date written YYYY-MM-DD'],
    ['"asOf": "31.10.2026"', '10: invalid asOf "31.10.2026", allowed a real date written YYYY-MM-DD'],
    ['"period": "months"', '12: invalid period "months", allowed week, month or quarter; did you mean month'],
    ['"horizon": 0', '13: invalid horizon 0, allowed a whole number from 1 to 240'],
    ['"horizon": 2.5', '13: invalid horizon 2.5, allowed a whole number from 1 to 240'],
    ['"horizon": null', '13: invalid horizon null, allowed a whole number from 1 to 240'],
    ['"draws": 99', '11: invalid draws 99, allowed a whole number from 100 to 100000'],
    ['"seed": -1', '10: invalid seed -1, allowed a whole number from 0 to 9007199254740991'],
    ['"levels": [0.8, 1]', `18: invalid levels[1] 1, allowed ${level}`],
    ['"levels": [0.1234567]', `13: invalid levels[0] 0.1234567, allowed ${level}`],
    ['"levels": []', '12: invalid levels [], allowed a list of numbers between 0 and 1'],
    [
      '"levels": [0.8, 0.8]',
      '12: invalid levels [0.8,0.8], allowed a list of numbers between 0 and 1, each of them once',
    ],
    [
      '"candidates": ["weibul"]',
      '17: invalid candidates[0] "weibul", allowed exponential, weibull, lognormal, loglogistic, gamma; did you mean weibull',
    ],
    ['"candidates": "gamma"', '16: invalid candidates "gamma", allowed a list of families'],
    ['"maxRejectShare": 1.5', '20: invalid maxRejectShare 1.5, allowed a number from 0 to 1'],
    [
      '"returns": "r.csv"',
      '13: invalid returns "r.csv", allowed an object with files, columns, dateFormat, encoding',
    ],
    [
      '"returns": { "files": "r.csv" }',
      '24: invalid returns.files "r.csv", allowed a list of paths or patterns',
    ],
    [
      '"returns": { "dateFormat": "DD.MM.YYYY" }',
      `29: invalid returns.dateFormat "DD.MM.YYYY", allowed ${pattern}`,
    ],
    [
      '"returns": { "dateFormat": "yyyy-MM-dd\'T\'HH:mm:ssXXX" }',
      `29: invalid returns.dateFormat "yyyy-MM-dd'T'HH:mm:ssXXX", allowed ${pattern}`,
    ],
    [
      '"returns": { "dateFormat": "dd.MM.yyyy P" }',
      `29: invalid returns.dateFormat "dd.MM.yyyy P", allowed ${pattern}`,
    ],
    ['"returns": { "dateFormat": "dd.MM" }', `29: invalid returns.dateFormat "dd.MM", allowed ${pattern}`],
    ['"returns": { "dateFormat": "yyyy" }', `29: invalid returns.dateFormat "yyyy", allowed ${pattern}`],
    [
      '"returns": { "encoding": "utf-88" }',
      '27: invalid returns.encoding "utf-88", allowed an encoding by its WHATWG label, such as windows-1252',
    ],
    ['"products": []', '14: invalid products [], allowed an object with product names or * as keys'],
    [
      '"products": { "": {} }',
      '16: invalid product name "", allowed any text that is not empty except (total)',
    ],
    [
      '"products": { "(total)": {} }',
      '16: invalid product name "(total)", allowed any text that is not empty except (total)',
    ],
    [
      '"products": { "HV 200": { "warrantyMonths": 0 } }',
      '46: invalid products["HV 200"].warrantyMonths 0, allowed a whole number from 1 to 1200',
    ],
    [
      '"products": { "A": { "warrantyDays": 0 } }',
      '39: invalid products.A.warrantyDays 0, allowed a number above 0',
    ],
    [
      '"products": { "A": { "delayDays": -1 } }',
      '36: invalid products.A.delayDays -1, allowed a number of 0 or more',
    ],
    [
      '"products": { "A": { "costPerReturn": -5 } }',
      '40: invalid products.A.costPerReturn -5, allowed a number of 0 or more',
    ],
    [
      '"products": { "A": { "costPerReturn": [{ "from": "2026-01-01", "amount": -5 }] } }',
      '75: invalid products.A.costPerReturn[0].amount -5, allowed a number of 0 or more',
    ],
    [
      '"products": { "A": { "costPerReturn": [{ "amount": 5 }] } }',
      '41: missing products.A.costPerReturn[0].from, allowed a real date written YYYY-MM-DD',
    ],
    [
      '"products": { "A": { "currency": "euro" } }',
      '35: invalid products.A.currency "euro", allowed an ISO 4217 code of three capital letters',
    ],
  ])('%s', (addition, sentence) => {
    const lines = faultLines(withInputs(addition));
    expect(lines.map((line) => line.slice(line.indexOf(' ') + 1))).toEqual([`s.json:2:${sentence}`]);
  });

  test('amounts that begin on the same date', () => {
    const amounts = '[{"from":"2026-01-01","amount":1},{"from":"2026-01-01","amount":2}]';
    const [fault, ...others] = faultsOf(withInputs(`"products": { "A": { "costPerReturn": ${amounts} } }`));
    expect(fault?.message).toContain('allowed a list whose entries begin on different dates');
    expect(others).toEqual([]);
  });
});

describe('an unknown key', () => {
  test.each([
    ['"horizn": 3', '2: unknown key horizn; did you mean horizon'],
    ['"as_of": "2026-10-31"', '2: unknown key as_of; did you mean asOf'],
    ['"prodcuts": {}', '2: unknown key prodcuts; did you mean products'],
    ['"returns": { "file": [] }', '15: unknown key returns.file; did you mean files'],
    [
      '"returns": { "columns": { "shipdate": "x" } }',
      '28: unknown key returns.columns.shipdate; did you mean ship_date',
    ],
    [
      '"products": { "A": { "warranty": 3 } }',
      '23: unknown key products.A.warranty; did you mean warrantyDays',
    ],
    [
      '"returns": { "__proto__": 1 }',
      '15: unknown key returns.__proto__; known keys are files, columns, dateFormat, encoding',
    ],
    [
      '"ages": { "constructor": 1 }',
      '12: unknown key ages.constructor; known keys are files, columns, dateFormat, encoding',
    ],
  ])('%s names the nearest known one', (addition, sentence) => {
    expect(faultLines(withInputs(addition))).toEqual([`unknown-key s.json:2:${sentence}`]);
  });

  test('at the root lists the known ones when none is near', () => {
    expect(faultLines(withInputs('"toString": 1'))[0]).toMatch(
      /^unknown-key s.json:2:2: unknown key toString; known keys are title, asOf/,
    );
  });
});

describe('what this version does not have is refused, not ignored', () => {
  const roots = [
    'segmentBy',
    'backtest',
    'season',
    'driftMonths',
    'discountTiming',
    'query',
    'registerSince',
  ];
  test.each(roots)('%s', (key) => {
    expect(faultLines(withInputs(`"${key}": 1`))).toEqual([
      `not-built s.json:2:2: invalid ${key}, this version does not have it; remove it`,
    ]);
  });

  const rules = ['serviceLag', 'recordingLag', 'afterWarranty', 'warrantyFrom', 'afterReturn', 'lentShape'];
  test.each(rules)('products.A.%s', (key) => {
    expect(faultLines(withInputs(`"products": { "A": { "${key}": 1 } }`))).toEqual([
      `not-built s.json:2:23: invalid products.A.${key}, this version does not have it; remove it`,
    ]);
  });

  test.each(['dateIs', 'unknownUnit', 'reversals', 'query'])('returns.%s', (key) => {
    expect(faultLines(withInputs(`"returns": { "${key}": 1 }`))[0]).toMatch(/^not-built s.json:2:15: /);
  });

  test('a family', () => {
    expect(faultLines(withInputs('"candidates": ["gamma", "gompertz"]'))).toEqual([
      'not-built s.json:2:26: invalid candidates[1] gompertz, this version does not have it; remove it',
    ]);
  });
});
