import type * as z from 'zod';
import { alteredFile } from './altered.js';

/**
 * A document that an earlier stage left, checked against its schema.
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
  if (result.success) return result.data;
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
