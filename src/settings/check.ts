import type * as z from 'zod';
import type { Fault } from '../errors.js';
import { nearest } from '../nearest.js';
import type { Keys, Stated } from './keys.js';
import { notBuilt } from './known.js';
import { type Path, pathText, valueText } from './path.js';

/** A fault whose place is still a path. */
export interface Complaint extends Pick<Fault, 'code' | 'message' | 'remedy'> {
  readonly path: Path;
  /** What of the path is at fault. */
  readonly at: 'value' | 'key';
}

/** What is sound in an object, and what is not. */
export interface Checked<K extends Keys> {
  readonly stated: Stated<K>;
  readonly complaints: readonly Complaint[];
}

/**
 * Holds an object against the keys it may have, key by key, so that one fault hides no other.
 * @param path of the object, for messages.
 * @param others keys that the caller handles itself.
 */
export function checkKeys<K extends Keys>(
  keys: K,
  value: unknown,
  path: Path,
  others: readonly string[] = [],
): Checked<K> {
  const known = [...Object.keys(keys), ...others];
  if (!isObject(value))
    return { stated: {}, complaints: [invalid(path, value, `an object with ${known.join(', ')}`)] };
  const stated: Record<string, unknown> = {};
  const complaints: Complaint[] = [];
  for (const [name, inner] of Object.entries(value)) {
    if (others.includes(name)) continue;
    const schema = Object.hasOwn(keys, name) ? keys[name] : undefined;
    const result = schema?.safeParse(inner);
    if (result === undefined) complaints.push(unknownKey([...path, name], known));
    else if (result.success) stated[name] = result.data;
    else
      complaints.push(...result.error.issues.flatMap((issue) => complaintsOf(issue, inner, [...path, name])));
  }
  return { stated: stated as Stated<K>, complaints: onePerPlace(complaints) };
}

/** `invalid NAME VALUE, allowed …` */
export function invalid(path: Path, value: unknown, allowed: string, remedy?: string): Complaint {
  const message = `invalid ${path.length === 0 ? 'settings' : pathText(path)} ${valueText(value)}, allowed ${allowed}`;
  return { code: 'invalid-value', message, path, at: 'value', ...(remedy === undefined ? {} : { remedy }) };
}

export function isObject(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

/** @param issue its message is what is allowed there. @param value the value it was found in, at `base`. */
function complaintsOf(issue: z.core.$ZodIssue, value: unknown, base: Path): Complaint[] {
  const inner = issue.path.map((step) => (typeof step === 'number' ? step : String(step)));
  if (issue.code === 'unrecognized_keys') {
    return issue.keys.map((key) => unknownKey([...base, ...inner, key], issue.message.split(', ')));
  }
  const found = deepest(value, inner);
  const path = [...base, ...inner.slice(0, found.depth)];
  if (found.depth === inner.length - 1 && isObject(found.value))
    return [missing([...base, ...inner], issue.message)];
  if (issue.code !== 'invalid_value') return [invalid(path, found.value, issue.message)];
  return [unknownName(path, found.value, issue)];
}

function unknownKey(path: Path, known: readonly string[]): Complaint {
  const name = String(path.at(-1));
  if (notBuilt.has(name)) return notBuiltYet(path, pathText(path), 'key');
  const near = nearest(name, known);
  const remedy = near === null ? `known keys are ${known.join(', ')}` : `did you mean ${near}`;
  return { code: 'unknown-key', message: `unknown key ${pathText(path)}`, remedy, path, at: 'key' };
}

function unknownName(path: Path, value: unknown, issue: z.core.$ZodIssueInvalidValue): Complaint {
  if (typeof value === 'string' && notBuilt.has(value))
    return notBuiltYet(path, `${pathText(path)} ${value}`, 'value');
  const near = typeof value === 'string' ? nearest(value, issue.values.map(String)) : null;
  return invalid(path, value, issue.message, near === null ? undefined : `did you mean ${near}`);
}

function notBuiltYet(path: Path, what: string, at: Complaint['at']): Complaint {
  const message = `invalid ${what}, this version does not have it`;
  return { code: 'not-built', message, remedy: 'remove it', path, at };
}

function missing(path: Path, allowed: string): Complaint {
  const message = `missing ${pathText(path)}, allowed ${allowed}`;
  return { code: 'missing-value', message, path, at: 'value' };
}

/** How far `path` leads into `value`, and what stands there. */
function deepest(value: unknown, path: Path): { depth: number; value: unknown } {
  let [depth, here] = [0, value];
  for (const step of path) {
    if (typeof here !== 'object' || here === null || !Object.hasOwn(here, step)) break;
    here = (here as Record<string | number, unknown>)[step];
    depth++;
  }
  return { depth, value: here };
}

function onePerPlace(complaints: readonly Complaint[]): Complaint[] {
  const key = ({ path, message }: Complaint) => JSON.stringify([path, message]);
  return complaints.filter((c, i) => complaints.findIndex((other) => key(other) === key(c)) === i);
}
