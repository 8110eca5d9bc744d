/** Digits after the point in a currency, 2 for EUR, 0 for JPY. Source: ISO 4217, by the ICU data of the runtime. */
export function minorDigits(currency: string): number {
  const format = new Intl.NumberFormat('en', { style: 'currency', currency });
  return format.resolvedOptions().maximumFractionDigits ?? 2;
}

/** `value` as the nearest whole number of units of its last of `digits` decimals, halves up. */
export function toUnits(value: number, digits: number): number {
  return Math.round(value * 10 ** digits);
}

/** Units of the last decimal, written with `digits` decimals; null stays null. */
export function unitsText(units: number | null, digits: number): string | null {
  return units === null ? null : (units / 10 ** digits).toFixed(digits);
}

/** Sum of whole units; null when a term is null or there is none. */
export function sumUnits(units: readonly (number | null)[]): number | null {
  return units.reduce<number | null>(
    (sum, term) => (sum === null || term === null ? null : sum + term),
    units.length === 0 ? null : 0,
  );
}
