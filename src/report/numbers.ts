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

/** The format of a column of expected counts: one decimal in all of them where any is below 10, else whole. */
export function expectedColumn(values: readonly (number | null)[]): (expected: number | null) => string {
  const fine = values.some((value) => value !== null && Number(Math.abs(value).toFixed(1)) < 10);
  const format = fine ? oneDecimal : whole;
  return (expected) => (expected === null ? noNumber : format(expected));
}

/** `24 to 39`, both whole as quantiles of a count are. */
export function rangeText(lower: number | null, upper: number | null): string {
  return lower === null || upper === null ? noNumber : `${whole(lower)} to ${whole(upper)}`;
}

/** A share of 1: `80 %`, `2.35 %`, `0.041 %`; three digits at most. The space does not break. */
export function percentText(share: number | null): string {
  return share === null ? noNumber : `${threeDigits(share * 100)}\u00a0%`;
}

/** The format of a column of shares: the decimals that show three digits of the largest, one at least. */
export function percentColumn(shares: readonly (number | null)[]): (share: number | null) => string {
  const largest = 100 * Math.max(0, ...shares.map((share) => share ?? 0));
  const decimals = largest > 0 ? Math.min(6, Math.max(1, 2 - Math.floor(Math.log10(largest)))) : 1;
  const format = locale.format(`,.${decimals}f`);
  return (share) => (share === null ? noNumber : `${format(share * 100)}\u00a0%`);
}

/** A weight among candidates: `28.4 %`, `below 0.1 %`. */
export function weightText(weight: number): string {
  return weight < 0.001 ? `below ${percentText(0.001)}` : `${oneDecimal(weight * 100)}\u00a0%`;
}

/** A parameter or an age, four significant digits, thousands grouped: `4,211`, `1.31`. */
export function measureText(value: number | null): string {
  if (value === null) return noNumber;
  return Math.abs(value) >= 1000 ? whole(value) : fourDigits(value);
}

/** The format of a column of ages: whole where all are, or where the oldest is 1,000 or more, else one decimal. */
export function ageColumn(ages: readonly number[]): (age: number) => string {
  return ages.every(Number.isInteger) || Math.max(...ages) >= 1000 ? whole : oneDecimal;
}

/** A log likelihood or an information criterion, two decimals. */
export function criterionText(value: number | null): string {
  return value === null ? noNumber : twoDecimals(value);
}

/** `EUR 1,204`; below 100 with two decimals. */
export function moneyText(amount: number | null, currency: string | null): string {
  return moneyColumn([amount])(amount, currency);
}

/** The format of a column of amounts: two decimals in all of them where any but 0 is below 100, else whole. */
export function moneyColumn(
  amounts: readonly (number | null)[],
): (amount: number | null, currency: string | null) => string {
  const fine = amounts.some((amount) => amount !== null && amount !== 0 && Math.abs(amount) < 100);
  const format = fine ? twoDecimals : whole;
  return (amount, currency) =>
    amount === null || currency === null ? noNumber : `${currency}\u00a0${format(amount)}`;
}

/** An amount that was set, never rounded: `EUR 1,138.50`, `EUR 185`, `USD 0.125`. */
export function rateText(amount: number, currency: string | null): string {
  const decimals = (/\.(\d+)$/.exec(String(amount))?.[1] ?? '').length;
  const format = decimals === 0 ? whole : locale.format(`,.${Math.max(2, decimals)}f`);
  return `${currency ?? ''}\u00a0${format(amount)}`.trim();
}

/** A tick of an axis: as many digits as it needs, three at most. */
export function tickText(value: number): string {
  return threeDigits(value);
}
