import { readdir, stat } from 'node:fs/promises';
import { join, parse, resolve, sep } from 'node:path';
import { compareText } from '../csv.js';

/**
 * The files that a path or pattern names, as absolute paths sorted by code point. `*` and `?` match within a name,
 * `[a-c]` and `[!a-c]` one character, `**` any number of folders; names that begin with a dot only match a pattern that
 * begins with one. A name that exists as it is written is taken as it is written.
 * @param base the folder that relative patterns start from.
 * @returns an empty list when nothing matches; folders never match.
 */
export async function expandPattern(base: string, pattern: string): Promise<string[]> {
  const path = resolve(base, pattern);
  if (await isFile(path)) return [path];
  if (!isPattern(pattern)) return [];
  const { root } = parse(path);
  const found = await walk(root, path.slice(root.length).split(sep));
  return [...new Set(found)].sort(compareText);
}

/** True when `text` holds a character that makes it more than a path. */
export function isPattern(text: string): boolean {
  return /[*?[]/.test(text);
}

/** The expression that a name must match in full; source: POSIX.1-2017, Shell & Utilities, 2.13. */
export function nameExpression(pattern: string): RegExp {
  let source = pattern.startsWith('.') ? '' : '(?!\\.)';
  for (let at = 0; at < pattern.length; ) {
    const set = /^\[(!?)(\]?[^\]]*)\]/u.exec(pattern.slice(at));
    const text = set?.[0] ?? String.fromCodePoint(pattern.codePointAt(at) ?? 0);
    if (set) source += `[${set[1] === '!' ? '^' : ''}${escapeSet(set[2] ?? '')}]`;
    else source += text === '*' ? '.*' : text === '?' ? '.' : text.replace(/[\\^$.*+?()[\]{}|/]/g, '\\$&');
    at += text.length;
  }
  return new RegExp(`^${source}$`, 'su');
}

async function walk(folder: string, segments: readonly string[]): Promise<string[]> {
  const [segment = '', ...rest] = segments;
  if (segment === '**') return walkDeep(folder, rest);
  const names = isPattern(segment) ? await matching(folder, segment) : [segment];
  const found: string[] = [];
  for (const name of names) {
    const path = join(folder, name);
    if (rest.length > 0) found.push(...(await walk(path, rest)));
    else if (await isFile(path)) found.push(path);
  }
  return found;
}

/** `**`: what the rest of the pattern finds here and in every folder below; linked folders are not entered. */
async function walkDeep(folder: string, rest: readonly string[]): Promise<string[]> {
  const found = await walk(folder, rest.length === 0 ? ['*'] : rest);
  for (const entry of await entriesOf(folder)) {
    if (entry.isDirectory() && !entry.name.startsWith('.')) {
      found.push(...(await walkDeep(join(folder, entry.name), rest)));
    }
  }
  return found;
}

async function matching(folder: string, segment: string): Promise<string[]> {
  const names = (await entriesOf(folder)).map((entry) => entry.name);
  if (names.includes(segment)) return [segment];
  const expression = nameExpression(segment);
  return names.filter((name) => expression.test(name));
}

async function entriesOf(folder: string) {
  return readdir(folder, { withFileTypes: true }).catch(() => []);
}

async function isFile(path: string): Promise<boolean> {
  return stat(path).then(
    (found) => found.isFile(),
    () => false,
  );
}

function escapeSet(text: string): string {
  return text.replace(/[\\^[\]&~|]/g, '\\$&');
}
