/** How near a number has to come, by the kind of quantity; the tolerances that the project promises. */
export const tolerances = {
  parameter: { relative: 1e-6 },
  logLikelihood: { absolute: 1e-7 },
  standardError: { relative: 1e-4 },
  interval: { relative: 1e-4 },
  tail: { relative: 1e-10 },
  cellProbability: { relative: 1e-9 },
  expectedReturns: { relative: 1e-6 },
} as const satisfies Record<string, Tolerance>;

export type Tolerance = { readonly relative: number } | { readonly absolute: number };
export type Quantity = keyof typeof tolerances;

/**
 * Passes when `actual` is within the tolerance of its kind; a relative one is a share of `expected`, so nothing but 0
 * is near 0. NaN and undefined are near nothing, an infinity only to itself.
 * @param what names the number in the message, for numbers in a loop
 * @throws Error with both numbers and how far they are apart
 */
export function near(
  actual: number | null | undefined,
  expected: number,
  quantity: Quantity,
  what = '',
): void {
  const tolerance: Tolerance = tolerances[quantity];
  const [kind, allowed] =
    'relative' in tolerance
      ? (['relative', tolerance.relative] as const)
      : (['absolute', tolerance.absolute] as const);
  const difference = distance(actual ?? Number.NaN, expected, kind);
  if (difference <= allowed) return;
  const name = what === '' ? quantity : `${quantity} of ${what}`;
  throw new Error(
    `${name}: actual ${actual}, expected ${expected}, ${kind} difference ${difference.toExponential(2)}, allowed ${allowed}`,
  );
}

function distance(actual: number, expected: number, kind: 'relative' | 'absolute'): number {
  if (actual === expected) return 0;
  const apart = Math.abs(actual - expected);
  return kind === 'absolute' ? apart : apart / Math.abs(expected);
}
