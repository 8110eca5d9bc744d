import { readdirSync } from 'node:fs';
import { describe, expect, it } from 'vitest';

const listed = [
  'DEVELOPERS.md',
  'LICENSE',
  'README.md',
  'package-lock.json',
  'package.json',
  'sample-data',
  'src',
  'templates',
  'test',
  'tsconfig.json',
];

/** What .gitignore keeps out of the repository: made by the tools, not by us. */
const made = /^(node_modules|dist|coverage|returnfall-out.*|.*\.tgz)$/;

describe('the top level', () => {
  const unlisted = (names: readonly string[]) =>
    names.filter((name) => !name.startsWith('.') && !made.test(name) && !listed.includes(name));

  it('holds what DEVELOPERS.md maps and dotfiles, nothing else', () => {
    const names = readdirSync(new URL('..', import.meta.url));
    const advice = 'configuration lives in dotfiles and in the folders it is for';
    expect(unlisted(names), advice).toEqual([]);
  });

  it('would notice a stray file', () => {
    expect(unlisted(['src', 'biome.json', 'scripts', '.npmrc', 'dist', 'a.tgz'])).toEqual([
      'biome.json',
      'scripts',
    ]);
  });
});
