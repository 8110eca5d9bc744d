/** How a file separates its cells and its lines. */
export interface HeaderLine {
  readonly separator: ',' | ';' | '\t';
  readonly lineEnd: '\n' | '\r\n' | '\r';
  /** True when the file ends and holds nothing but white space. */
  readonly blank: boolean;
}

const [tab, lineFeed, carriageReturn, space, quote, comma, semicolon] = [9, 10, 13, 32, 34, 44, 59];

/**
 * What the first line that is not blank says: the separator that it holds most of outside quotes (comma before semicolon
 * before tab where they tie) and its line end. Null when no line ends in `head`.
 * @param whole true when nothing follows `head`, so that its end is the end of a line.
 */
export function headerLine(head: Uint8Array, whole = false): HeaderLine | null {
  const counts = { comma: 0, semicolon: 0, tab: 0 };
  let quoted = false;
  let blank = true;
  for (let i = 0; i < head.length; i++) {
    const byte = head[i];
    if (byte === quote) quoted = !quoted;
    if (quoted) continue;
    if (byte === lineFeed && !blank) return line(counts, '\n', false);
    if (byte === carriageReturn && !blank) {
      if (i + 1 < head.length) return line(counts, head[i + 1] === lineFeed ? '\r\n' : '\r', false);
      if (!whole) return null;
    }
    if (byte === comma) counts.comma++;
    else if (byte === semicolon) counts.semicolon++;
    else if (byte === tab) counts.tab++;
    if (byte !== space && byte !== tab && byte !== lineFeed && byte !== carriageReturn) blank = false;
  }
  return whole ? line(counts, '\n', blank) : null;
}

function line(
  counts: { comma: number; semicolon: number; tab: number },
  lineEnd: HeaderLine['lineEnd'],
  blank: boolean,
): HeaderLine {
  const most = Math.max(counts.comma, counts.semicolon, counts.tab);
  const separator = counts.comma === most ? ',' : counts.semicolon === most ? ';' : '\t';
  return { separator, lineEnd, blank };
}
