import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

/** The report's templates: path below the package's templates folder, `/` as separator → text. */
export function readTemplates(): Readonly<Record<string, string>> {
  return Object.fromEntries(filesBelow(new URL('../../templates/', import.meta.url), ''));
}

function filesBelow(root: URL, folder: string): [string, string][] {
  const entries = readdirSync(fileURLToPath(new URL(folder, root)), { withFileTypes: true });
  return entries.flatMap((entry): [string, string][] => {
    const path = `${folder}${entry.name}`;
    if (entry.isDirectory()) return filesBelow(root, `${path}/`);
    return [[path, readFileSync(fileURLToPath(new URL(path, root)), 'utf8')]];
  });
}
