import type * as z from 'zod';
import { alteredFile } from './altered.js';

/**
 * A document that an earlier stage left, checked against its schema.
 * Its keys keep their order, so that it writes the same text again.
 * @param name of the schema, `returnfall/fit/1`.
 * @throws UserError exit 3 when it is not JSON, of another schema, or lacks something.
 */
export function readDocument<T>(file: string, text: string, name: string, schema: z.ZodType<T>): T {
  const value = parse(file, text);
  const found = typeof value === 'object' && value !== null && 'schema' in value ? value.schema : null;
  if (found !== name) {
    throw alteredFile(file, `invalid schema ${JSON.stringify(found)}, allowed ${JSON.stringify(name)}`);
  }
  const result = schema.safeParse(value);
  if (result.success) return asWritten(result.data, value) as T;
  const [issue] = result.error.issues;
  throw alteredFile(file, `invalid ${issue?.path.join('.') ?? 'document'}, not as ${name} has it`);
}

function parse(file: string, text: string): unknown {
  try {
    return JSON.parse(text);
  } catch (error) {
    if (error instanceof SyntaxError) throw alteredFile(file, 'invalid JSON, the file is damaged');
    throw error;
  }
}

/** `read` with the keys of its objects in the order of `written`. */
function asWritten(read: unknown, written: unknown): unknown {
  if (typeof read !== 'object' || read === null || typeof written !== 'object' || written === null)
    return read;
  const member = (key: string | number) => asWritten(Reflect.get(read, key), Reflect.get(written, key));
  if (Array.isArray(written)) return written.map((_, i) => member(i));
  return Object.fromEntries(Object.keys(written).map((key) => [key, member(key)]));
}
