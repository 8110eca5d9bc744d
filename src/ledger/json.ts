/**
 * A document as JSON: full doubles, non-finite numbers as null, keys in the order they were built, two spaces an
 * indent, a list of numbers on one line, a line feed at the end. Members that are undefined are left out.
 */
export function jsonText(document: unknown): string {
  return `${write(document, '')}\n`;
}

function write(value: unknown, indent: string): string {
  if (typeof value !== 'object' || value === null) return JSON.stringify(value) ?? 'null';
  const deeper = `${indent}  `;
  if (!Array.isArray(value)) {
    const members = Object.entries(value).filter(([, member]) => member !== undefined);
    const lines = members.map(([key, member]) => `${deeper}${JSON.stringify(key)}: ${write(member, deeper)}`);
    return lines.length === 0 ? '{}' : `{\n${lines.join(',\n')}\n${indent}}`;
  }
  if (value.every((item) => item === null || typeof item === 'number')) {
    return `[${value.map((item) => JSON.stringify(item)).join(', ')}]`;
  }
  return `[\n${value.map((item) => deeper + write(item, deeper)).join(',\n')}\n${indent}]`;
}
