/** A cell of a printed table; numbers come as text, ready to be read. */
export type Align = 'left' | 'right';

/** `text` on one line and without control characters, so that a name from a file cannot steer a terminal. */
export function printable(text: string): string {
  return text.replace(/[\p{Cc}\p{Cf}\p{Zl}\p{Zp}\p{Cs}]/gu, (c) => {
    const code = c.codePointAt(0) ?? 0;
    return c === '\n' ? '\\n' : c === '\t' ? '\\t' : `\\u{${code.toString(16)}}`;
  });
}

/** Lines of a table: columns padded to their widest cell, two spaces apart, nothing after the last character. */
export function alignColumns(rows: readonly (readonly string[])[], aligns: readonly Align[]): string[] {
  const widths = aligns.map((_, at) => Math.max(0, ...rows.map((row) => lengthOf(row[at] ?? ''))));
  return rows.map((row) =>
    aligns
      .map((align, at) => {
        const cell = row[at] ?? '';
        const gap = ' '.repeat((widths[at] ?? 0) - lengthOf(cell));
        return align === 'left' ? cell + gap : gap + cell;
      })
      .join('  ')
      .trimEnd(),
  );
}

/** At most `width` characters, the end replaced by an ellipsis where something is missing. */
export function shorten(text: string, width: number): string {
  const characters = [...text];
  return characters.length <= width ? text : `${characters.slice(0, width - 1).join('')}…`;
}

/** `12,345`; `decimals` digits after the point. Never the machine's locale. */
export function numberText(value: number, decimals = 0): string {
  if (!Number.isFinite(value)) return '-';
  const [whole = '', fraction] = Math.abs(value).toFixed(decimals).split('.');
  const grouped = whole.replace(/\B(?=(\d{3})+$)/g, ',');
  const text = fraction === undefined ? grouped : `${grouped}.${fraction}`;
  return value < 0 && Number(value.toFixed(decimals)) !== 0 ? `-${text}` : text;
}

/** An expected count for people: one decimal below ten, whole from there on. */
export function countText(value: number): string {
  return numberText(value, Math.abs(value) < 9.95 ? 1 : 0);
}

/** A parameter: four significant digits at least, never fewer than the whole ones. */
export function measureText(value: number): string {
  const magnitude = Math.abs(value);
  if (magnitude !== 0 && (magnitude < 1e-4 || magnitude >= 1e9)) return value.toExponential(3);
  return numberText(value, magnitude === 0 ? 0 : Math.max(0, 3 - Math.floor(Math.log10(magnitude))));
}

/** An age or a percentage: six significant digits at most, without idle zeros. */
export function plainNumber(value: number): string {
  return Number.isFinite(value) ? String(Number(value.toPrecision(6))) : '-';
}

function lengthOf(text: string): number {
  return [...text].length;
}
