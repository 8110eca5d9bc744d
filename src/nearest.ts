/**
 * The known name that is nearest to `name`, or null when none is near: at most a third of its letters differ.
 * Case, spaces, `_` and `-` count for nothing. Of equally near ones the first.
 */
export function nearest(name: string, known: readonly string[]): string | null {
  const distances = known.map((candidate) => editDistance(plain(name), plain(candidate)));
  const least = Math.min(...distances);
  const best = known[distances.indexOf(least)];
  return best !== undefined && least <= Math.max(1, Math.floor(plain(best).length / 3)) ? best : null;
}

function plain(name: string): string {
  return name
    .toLowerCase()
    .replaceAll(/[\s_-]/g, '')
    .slice(0, 100);
}

/** Optimal string alignment distance: insertions, deletions, substitutions and swaps of neighbours. */
function editDistance(a: string, b: string): number {
  let [beforeLast, last] = [[] as number[], Array.from({ length: b.length + 1 }, (_, j) => j)];
  for (let i = 1; i <= a.length; i++) {
    const row = [i];
    for (let j = 1; j <= b.length; j++) {
      const substituted = (last[j - 1] ?? 0) + (a[i - 1] === b[j - 1] ? 0 : 1);
      const swapped =
        i > 1 && j > 1 && a[i - 1] === b[j - 2] && a[i - 2] === b[j - 1]
          ? (beforeLast[j - 2] ?? 0) + 1
          : Infinity;
      row.push(Math.min(substituted, swapped, (last[j] ?? 0) + 1, (row[j - 1] ?? 0) + 1));
    }
    [beforeLast, last] = [last, row];
  }
  return last[b.length] ?? 0;
}
