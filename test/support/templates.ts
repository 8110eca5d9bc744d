import { readdirSync, readFileSync } from 'node:fs';
import { join, relative, sep } from 'node:path';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('../../templates', import.meta.url));

/** The project's templates as the report takes them: path below templates/ → text. */
export function readTemplates(): Readonly<Record<string, string>> {
  const files = readdirSync(root, { recursive: true, withFileTypes: true }).filter((entry) => entry.isFile());
  const paths = files.map((file) => join(file.parentPath, file.name));
  return Object.fromEntries(
    paths.map((path) => [relative(root, path).replaceAll(sep, '/'), readFileSync(path, 'utf8')]),
  );
}
