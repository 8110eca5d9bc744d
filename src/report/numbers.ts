/** Numbers as people read them: a fixed English format, never the machine's locale. */
import { formatLocale } from 'd3-format';

const locale = formatLocale({ decimal: '.', thousands: ',', grouping: [3], currency: ['', ''], minus: '−' });
const whole = locale.format(',.0f');
const oneDecimal = locale.format(',.1f');
const twoDecimals = locale.format(',.2f');
const fourDigits = locale.format(',.4~r');
const threeDigits = locale.format(',.3~r');

/** What stands where there is no number. */
export const noNumber = '–';

/** An observed count: `1,204`. */
export function countText(count: number | null): string {
  return count === null ? noNumber : whole(count);
}

/** An expected count: one decimal below 10, else whole. */
export function expectedText(expected: number | null): string {
  if (expected === null) return noNumber;
  const short = oneDecimal(expected);
  return Math.abs(Number(expected.toFixed(1))) < 10 ? short : whole(expected);
}

/** `24 to 39`, both whole as quantiles of a count are. */
export function rangeText(lower: number | null, upper: number | null): string {
  return lower === null || upper === null ? noNumber : `${whole(lower)} to ${whole(upper)}`;
}

/** A share of 1: `80 %`, `2.35 %`, `0.041 %`; three digits at most. The space does not break. */
export function percentText(share: number | null): string {
  return share === null ? noNumber : `${threeDigits(share * 100)}\u00a0%`;
}

/** A weight among candidates: `28.4 %`, `below 0.1 %`. */
export function weightText(weight: number): string {
  return weight < 0.001 ? `below ${percentText(0.001)}` : percentText(Number(weight.toFixed(3)));
}

/** A parameter or an age, four significant digits, thousands grouped: `4,211`, `1.31`. */
export function measureText(value: number | null): string {
  if (value === null) return noNumber;
  return Math.abs(value) >= 1000 ? whole(value) : fourDigits(value);
}

/** A log likelihood or an information criterion, two decimals. */
export function criterionText(value: number | null): string {
  return value === null ? noNumber : twoDecimals(value);
}

/** `EUR 1,204`; below 100 with two decimals. */
export function moneyText(amount: number | null, currency: string | null): string {
  if (amount === null || currency === null) return noNumber;
  return `${currency}\u00a0${Math.abs(amount) < 100 ? twoDecimals(amount) : whole(amount)}`;
}

/** A tick of an axis: as many digits as it needs, three at most. */
export function tickText(value: number): string {
  return threeDigits(value);
}
