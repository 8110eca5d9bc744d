/**
 * Writing CSV (RFC 4180) that a spreadsheet opens safely. A text cell that begins like a formula gets one leading
 * apostrophe, and so does text that begins with an apostrophe, so that reading removes exactly one.
 */

/** The text that was written into a cell of `csvLine`. */
export function unprotectText(cell: string): string {
  return cell.startsWith("'") ? cell.slice(1) : cell;
}

/** One line with its line feed: text is protected and quoted where needed, numbers are as they are, null is empty. */
export function csvLine(cells: readonly (string | number | null)[]): string {
  return `${cells.map(cellText).join(',')}\n`;
}

/** Fields as a CSV row without the line end and without protection, for showing a row as it was read. */
export function rowText(fields: readonly string[]): string {
  return fields.map((f) => (/[",\r\n]/.test(f) ? `"${f.replaceAll('"', '""')}"` : f)).join(',');
}

/** Orders text by code point, as every list of Returnfall is ordered. */
export function compareText(a: string, b: string): number {
  if (a === b) return 0;
  const [x, y] = [[...a], [...b]];
  for (let i = 0; i < Math.min(x.length, y.length); i++) {
    const difference = (x[i]?.codePointAt(0) ?? 0) - (y[i]?.codePointAt(0) ?? 0);
    if (difference !== 0) return difference;
  }
  return x.length - y.length;
}

function cellText(cell: string | number | null): string {
  if (cell === null) return '';
  if (typeof cell === 'number') return String(cell);
  const text = protectText(cell);
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

function protectText(text: string): string {
  return /^[=+\-@\t\r']/.test(text) ? `'${text}` : text;
}
