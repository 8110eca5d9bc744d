import { exitCodes, type Fault, UserError } from '../errors.js';
import type { MonthEnd, NotForecast, Segment } from '../records.js';
import { nameOf } from './print/names.js';

/** A product that the asked-for stage could not deal with. */
export interface Missing {
  readonly name: string;
  readonly reason: NotForecast;
}

/**
 * The products without a fit or forecast, of the latest stage that ran; none after the table alone.
 * @throws UserError exit 3, with the intake, when no product is left.
 */
export function missingProducts(result: MonthEnd): readonly Missing[] {
  const products: readonly Judged[] = result.forecast?.products ?? result.fit?.products ?? [];
  const missing = products.flatMap((product) =>
    product.notForecast === null ? [] : [{ name: nameOf(product), reason: product.notForecast }],
  );
  if (products.length > 0 && missing.length === products.length) throw nothingForecast(missing, result);
  return missing;
}

/** `not forecast: HV-200: …`, one line a product. */
export function missingText(missing: readonly Missing[]): string {
  return missing.map(({ name, reason }) => `not forecast: ${name}: ${reason.message}\n`).join('');
}

interface Judged {
  readonly product: string;
  readonly segment: Segment | null;
  readonly notForecast: NotForecast | null;
}

function nothingForecast(missing: readonly Missing[], result: MonthEnd): UserError {
  const first: Fault = { code: 'nothing-forecast', message: 'no product could be forecast' };
  const reasons = missing.map(({ name, reason }) => ({
    code: reason.code,
    message: `${name}: ${reason.message}`,
  }));
  return new UserError([first, ...reasons], exitCodes.unusableInput, result.intake);
}
