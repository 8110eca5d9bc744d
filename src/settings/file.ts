import { type Node, type ParseError, parseTree, printParseErrorCode } from 'jsonc-parser';
import { exitCodes, type Fault, UserError } from '../errors.js';
import { type Path, pathText } from './path.js';

/** A settings file that is sound JSON, with the place of each value in it. */
export interface SettingsFile {
  /** As messages name it. */
  readonly file: string;
  /** The root object; every key in it is its own property, `__proto__` too. */
  readonly value: Readonly<Record<string, unknown>>;
  /** Place of the value at `path`, or of the deepest value on the way to it; `at` asks for the key instead. */
  readonly place: (path: Path, at?: 'value' | 'key') => Required<Pick<Fault, 'file' | 'line' | 'column'>>;
}

/**
 * Parses JSON with comments and trailing commas.
 * @param file the name that messages give it.
 * @throws UserError exit 2 with every fault of syntax and every key that stands twice, with line and column.
 */
export function readSettings(text: string, file: string): SettingsFile {
  const body = text.startsWith('\uFEFF') ? text.slice(1) : text;
  const errors: ParseError[] = [];
  const root = parseTree(body, errors, { allowTrailingComma: true });
  const placeAt = (offset: number) => ({ file, ...lineAndColumn(body, offset) });
  const faults = syntaxFaults(errors, placeAt);
  if (root?.type !== 'object' && faults.length === 0) faults.push(notAnObject(placeAt(root?.offset ?? 0)));
  if (root !== undefined) faults.push(...doubleKeys(root, [], placeAt));
  if (root === undefined || faults.length > 0) throw new UserError(faults, exitCodes.unusableSettings);
  return {
    file,
    value: dataOf(root) as Record<string, unknown>,
    place: (path, at = 'value') => placeAt(offsetOf(root, path, at)),
  };
}

type PlaceAt = (offset: number) => { file: string; line: number; column: number };

/** One fault a place: what the parser reports after the first at the same character only repeats it. */
function syntaxFaults(errors: readonly ParseError[], placeAt: PlaceAt): Fault[] {
  const first = errors.filter((e, i) => errors.findIndex((other) => other.offset === e.offset) === i);
  return first.map((error) => ({
    code: 'invalid-json',
    message: `invalid JSON: ${sentences[printParseErrorCode(error.error)] ?? 'a character that does not belong here'}`,
    ...placeAt(error.offset),
    remedy: 'mend the syntax; comments and trailing commas are allowed',
  }));
}

const sentences: Readonly<Record<string, string>> = {
  InvalidSymbol: 'a word or sign that is no JSON value',
  InvalidNumberFormat: 'a number that is not written as JSON numbers are',
  PropertyNameExpected: 'a key in double quotes is missing',
  ValueExpected: 'a value is missing',
  ColonExpected: 'a colon is missing after the key',
  CommaExpected: 'a comma is missing before this',
  CloseBraceExpected: 'a closing } is missing',
  CloseBracketExpected: 'a closing ] is missing',
  EndOfFileExpected: 'something follows the end of the object',
  UnexpectedEndOfComment: 'a comment that begins here is not closed',
  UnexpectedEndOfString: 'a text that begins here is not closed',
  UnexpectedEndOfNumber: 'a number that begins here is not complete',
  InvalidUnicode: 'a \\u escape without four hexadecimal digits',
  InvalidEscapeCharacter: 'an escape that JSON does not have',
  InvalidCharacter: 'a control character inside a text',
};

function notAnObject(place: ReturnType<PlaceAt>): Fault {
  const message = 'invalid settings, allowed one object in braces';
  return { code: 'invalid-json', message, ...place, remedy: 'write { "asOf": "2026-10-31" }, for example' };
}

function doubleKeys(node: Node, path: Path, placeAt: PlaceAt): Fault[] {
  const seen = new Set<string>();
  return (node.children ?? []).flatMap((child, i) => {
    if (node.type !== 'object') return doubleKeys(child, [...path, i], placeAt);
    const [key, value] = child.children ?? [];
    if (key === undefined) return [];
    const inner = [...path, String(key.value)];
    const twice: Fault = {
      code: 'double-key',
      message: `invalid ${pathText(inner)}, the key stands twice`,
      ...placeAt(key.offset),
      remedy: 'keep one of the two',
    };
    const faults = seen.has(key.value) ? [twice] : [];
    seen.add(key.value);
    return value === undefined ? faults : [...faults, ...doubleKeys(value, inner, placeAt)];
  });
}

/** Plain data; `Object.fromEntries` makes own properties of any name, so that no key can reach a prototype. */
function dataOf(node: Node): unknown {
  const children = node.children ?? [];
  if (node.type === 'array') return children.map(dataOf);
  if (node.type !== 'object') return node.value;
  return Object.fromEntries(
    children.flatMap(({ children: pair }) =>
      pair?.[0] && pair[1] ? [[pair[0].value, dataOf(pair[1])] as const] : [],
    ),
  );
}

function offsetOf(root: Node, path: Path, at: 'value' | 'key'): number {
  let node = root;
  let offset = root.offset;
  for (const step of path) {
    const property = node.children?.find((child, i) =>
      node.type === 'object' ? child.children?.[0]?.value === step : i === step,
    );
    const [key, value] = node.type === 'object' ? (property?.children ?? []) : [property, property];
    if (key === undefined || value === undefined) return offset;
    offset = at === 'key' ? key.offset : value.offset;
    node = value;
  }
  return offset;
}

function lineAndColumn(text: string, offset: number): { line: number; column: number } {
  const before = text.slice(0, offset).split(/\r\n|\r|\n/);
  return { line: before.length, column: (before.at(-1) ?? '').length + 1 };
}
