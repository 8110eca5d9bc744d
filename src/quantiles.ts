/**
 * Key of the quantile at probability `p`, as every document writes it: `p` rounded to six decimals without trailing
 * zeros, `"0.025"`, `"0.1"`, `"0.5"`.
 * @param p in (0, 1)
 */
export function quantileKey(p: number): string {
  return String(Number(p.toFixed(6)));
}

/** Keys of the lower and the upper end of the two-sided interval at `level`, `["0.1", "0.9"]` for 0.8. */
export function intervalKeys(level: number): readonly [lower: string, upper: string] {
  return [quantileKey((1 - level) / 2), quantileKey((1 + level) / 2)];
}
