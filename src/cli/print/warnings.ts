import type { Finding, MonthEnd } from '../../records.js';
import { nameOf } from './names.js';
import { printable } from './text.js';

/**
 * The warnings of a run, one a line: about the records, and with `products` also those of every product, which the printed
 * fit and forecast carry themselves.
 */
export function warningsText({ table, fit, forecast }: MonthEnd, products: boolean): string {
  const ofRecords = table.findings.filter(isWarning).map(({ message }) => message);
  const judged = products ? [...(fit?.products ?? []), ...(forecast?.products ?? [])] : [];
  const ofProducts = judged.flatMap((product) =>
    product.findings.filter(isWarning).map(({ message }) => `${nameOf(product)}: ${message}`),
  );
  return [...ofRecords, ...ofProducts].map((text) => `warning: ${printable(text)}\n`).join('');
}

function isWarning({ severity }: Finding): boolean {
  return severity === 'warning';
}
