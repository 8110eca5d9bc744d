/** Where a value stands in the settings: keys and list positions from the root. */
export type Path = readonly (string | number)[];

/** `products["HV 200"].costPerReturn[1].amount` */
export function pathText(path: Path): string {
  return path.reduce<string>((text, step) => {
    if (typeof step === 'number') return `${text}[${step}]`;
    if (!/^[\p{L}_*][\p{L}\p{N}_*-]*$/u.test(step)) return `${text}[${JSON.stringify(step)}]`;
    return text === '' ? step : `${text}.${step}`;
  }, '');
}

/** A value as messages show it, cut after 60 characters. */
export function valueText(value: unknown): string {
  const text = JSON.stringify(value) ?? 'undefined';
  return text.length > 60 ? `${text.slice(0, 59)}…` : text;
}
