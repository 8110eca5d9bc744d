/** The gamma function's relatives, all in logs so that neither tail is lost. */

const lanczos = [
  0.9999999999998099, 676.5203681218851, -1259.1392167224028, 771.3234287776531, -176.6150291621406,
  12.507343278686905, -0.13857109526572012, 9.984369578019572e-6, 1.5056327351493116e-7,
];
const halfLogTwoPi = 0.9189385332046728;

/** log Γ(x), x > 0. Lanczos, g = 7, n = 9 (Godfrey's coefficients), error below 1e-14; Stirling's series from 12 on. */
export function logGamma(x: number): number {
  if (x >= 12) return (x - 0.5) * Math.log(x) - x + halfLogTwoPi + stirlingRemainder(x);
  if (x < 0.5) return Math.log(Math.PI / Math.sin(Math.PI * x)) - logGamma(1 - x);
  let sum = lanczos[0] as number;
  for (let i = 1; i < lanczos.length; i++) sum += (lanczos[i] as number) / (x - 1 + i);
  const t = x + 6.5;
  return halfLogTwoPi + (x - 0.5) * Math.log(t) - t + Math.log(sum);
}

/** ψ(x), the derivative of log Γ, x > 0; recurrence up to 10, then Abramowitz & Stegun 6.3.18; error below 1e-14. */
export function digamma(x: number): number {
  let shift = 0;
  let y = x;
  for (; y < 10; y++) shift += 1 / y;
  const r = 1 / (y * y);
  const series =
    r * (1 / 12 - r * (1 / 120 - r * (1 / 252 - r * (1 / 240 - r * (1 / 132 - (r * 691) / 32760)))));
  return Math.log(y) - 0.5 / y - series - shift;
}

/** ψ'(x), x > 0; recurrence up to 10, then Abramowitz & Stegun 6.4.12. */
export function trigamma(x: number): number {
  let shift = 0;
  let y = x;
  for (; y < 10; y++) shift += 1 / (y * y);
  const r = 1 / (y * y);
  const series = r * (1 / 6 - r * (1 / 30 - r * (1 / 42 - r * (1 / 30 - (r * 5) / 66))));
  return 1 / y + 0.5 * r + series / y + shift;
}

/** log of the regularised incomplete gamma functions P(a, x) and Q(a, x), a > 0, x ≥ 0. */
export interface LogIncompleteGamma {
  readonly lower: number;
  readonly upper: number;
}

/**
 * log P(a, x) and log Q(a, x) by the series below a + 1 and Lentz's continued fraction above (Abramowitz & Stegun
 * 6.5.29, 6.5.31); relative error of either below 2e-11 up to a = 1e6 in both tails.
 */
export function logIncompleteGamma(a: number, x: number): LogIncompleteGamma {
  if (x <= 0) return { lower: -Infinity, upper: 0 };
  if (x === Infinity) return { lower: 0, upper: -Infinity };
  const prefactor = logPrefactor(a, x);
  if (x < a + 1) {
    const lower = Math.min(0, prefactor + Math.log(lowerSeries(a, x)));
    return { lower, upper: logComplement(lower) };
  }
  const upper = Math.min(0, prefactor + Math.log(upperFraction(a, x)));
  return { lower: logComplement(upper), upper };
}

/** log(1 − exp(l)) for l ≤ 0, by the split of Mächler (2012), "Accurately computing log(1 − exp(−|a|))". */
export function logComplement(l: number): number {
  return l > -Math.LN2 ? Math.log(-Math.expm1(l)) : Math.log1p(-Math.exp(l));
}

/** a log x − x − log Γ(a), for large a without the cancellation of its terms. */
function logPrefactor(a: number, x: number): number {
  if (a < 12) return a * Math.log(x) - x - logGamma(a);
  return a * logMinus(x, a) + 0.5 * Math.log(a) - halfLogTwoPi - stirlingRemainder(a);
}

/** log(x / a) − (x − a) / a. */
function logMinus(x: number, a: number): number {
  const r = (x - a) / a;
  if (Math.abs(r) > 0.1) return Math.log(x / a) - r;
  let sum = 0;
  let power = r;
  for (let n = 2; n < 40; n++) {
    power *= -r;
    sum += power / n;
    if (Math.abs(power) < 1e-18 * Math.abs(sum)) break;
  }
  return sum;
}

/** log Γ(x) − [(x − ½) log x − x + ½ log 2π] for x ≥ 12 (Abramowitz & Stegun 6.1.41). */
function stirlingRemainder(x: number): number {
  const r = 1 / (x * x);
  return (1 / 12 - r * (1 / 360 - r * (1 / 1260 - r * (1 / 1680 - r / 1188)))) / x;
}

function lowerSeries(a: number, x: number): number {
  let term = 1 / a;
  let sum = term;
  for (let n = 1; n < 100000; n++) {
    term *= x / (a + n);
    sum += term;
    if (term < sum * 1e-17) break;
  }
  return sum;
}

function upperFraction(a: number, x: number): number {
  const tiny = 1e-300;
  let b = x + 1 - a;
  let c = 1 / tiny;
  let d = 1 / b;
  let h = d;
  for (let i = 1; i < 100000; i++) {
    const an = -i * (i - a);
    b += 2;
    d = an * d + b;
    if (Math.abs(d) < tiny) d = tiny;
    c = b + an / c;
    if (Math.abs(c) < tiny) c = tiny;
    d = 1 / d;
    const delta = d * c;
    h *= delta;
    if (Math.abs(delta - 1) < 1e-16) break;
  }
  return h;
}
