import type { Jet } from './family.js';

/** Chosen so that the truncation (step⁴) and the rounding (1e-14 / step²) of second derivatives are both below 1e-8. */
const step = 2e-3;

/**
 * A jet by five-point central differences, for a log function without derivatives in closed form (Abramowitz & Stegun
 * 25.3.6, 25.3.24, 25.3.27). The value itself is exact.
 */
export function differenceJet(free: Float64Array, log: (shifted: Float64Array, age: number) => number): Jet {
  const k = free.length;
  const at = Float64Array.from(free);
  const shifted = (age: number, i: number, di: number, j: number, dj: number): number => {
    at.set(free);
    at[i] = (at[i] as number) + di * step;
    at[j] = (at[j] as number) + dj * step;
    return log(at, age);
  };
  return (age, _logAge, out) => {
    const value = log(free, age);
    out[0] = value;
    let next = 1 + k;
    for (let i = 0; i < k; i++) {
      const [m2, m1, p1, p2] = [-2, -1, 1, 2].map((d) => shifted(age, i, d, i, 0)) as [
        number,
        number,
        number,
        number,
      ];
      out[1 + i] = (m2 - 8 * m1 + 8 * p1 - p2) / (12 * step);
      out[next++] = (-m2 + 16 * m1 - 30 * value + 16 * p1 - p2) / (12 * step * step);
      for (let j = i + 1; j < k; j++) out[next++] = crossed((a, b) => shifted(age, i, a, j, b));
    }
  };
}

/** ∂²/∂i∂j from the four corners at one and at two steps, extrapolated. */
function crossed(value: (di: number, dj: number) => number): number {
  const corners = (d: number) =>
    (value(d, d) - value(d, -d) - value(-d, d) + value(-d, -d)) / (4 * d * d * step * step);
  return (4 * corners(1) - corners(2)) / 3;
}
