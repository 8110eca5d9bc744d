import { mkdirSync, mkdtempSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join, relative } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { expandPattern, nameExpression } from '../../src/cli/glob.js';

const files = [
  'a.csv',
  'B.csv',
  'é.csv',
  '😀.csv',
  'Z.txt',
  'ship[1].csv',
  'ship1.csv',
  '.hidden.csv',
  '2024/q1/a.csv',
  '2024/b.csv',
  '2025/a.csv',
];
let base = '';

beforeAll(() => {
  base = mkdtempSync(join(tmpdir(), 'glob-'));
  for (const file of files) {
    mkdirSync(dirname(join(base, file)), { recursive: true });
    writeFileSync(join(base, file), '');
  }
  symlinkSync(base, join(base, '2024', 'round'));
});
afterAll(() => rmSync(base, { recursive: true, force: true }));

async function names(pattern: string): Promise<string[]> {
  return (await expandPattern(base, pattern)).map((path) => relative(base, path));
}

describe('expandPattern', () => {
  it('sorts by code point, not by locale and not by UTF-16 unit', async () => {
    expect(await names('?.csv')).toEqual(['B.csv', 'a.csv', 'é.csv', '😀.csv']);
  });

  it('takes a name that exists as it is written', async () => {
    expect(await names('ship[1].csv')).toEqual(['ship[1].csv']);
    expect(await names('2024/../a.csv')).toEqual(['a.csv']);
  });

  it('matches sets, ranges and their negation', async () => {
    expect(await names('[aB].csv')).toEqual(['B.csv', 'a.csv']);
    expect(await names('[!a-z]*.csv')).toEqual(['B.csv', 'é.csv', '😀.csv']);
    expect(await names('ship[0-9].csv')).toEqual(['ship1.csv']);
  });

  it('goes through folders with *, and at any depth with **, without entering links', async () => {
    expect(await names('*/a.csv')).toEqual(['2025/a.csv']);
    expect(await names('**/a.csv')).toEqual(['2024/q1/a.csv', '2025/a.csv', 'a.csv']);
    expect(await names('2024/**')).toEqual(['2024/b.csv', '2024/q1/a.csv']);
  });

  it('finds hidden files only when asked', async () => {
    expect(await names('*hidden*')).toEqual([]);
    expect(await names('.h*')).toEqual(['.hidden.csv']);
  });

  it('finds nothing where there is nothing, and no folder', async () => {
    expect(await names('*.parquet')).toEqual([]);
    expect(await names('missing/*.csv')).toEqual([]);
    expect(await names('2024')).toEqual([]);
  });
});

describe('nameExpression', () => {
  it('takes every other character for itself', () => {
    expect(nameExpression('a.b+(c)|{2}^$').test('a.b+(c)|{2}^$')).toBe(true);
    expect(nameExpression('a.b').test('axb')).toBe(false);
    expect(nameExpression('[a^b]').test('^')).toBe(true);
    expect(nameExpression('half[open').test('half[open')).toBe(true);
  });
});
