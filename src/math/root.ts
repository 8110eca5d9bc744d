/**
 * A root of f between a and b, where f has opposite signs, by the method of Brent (1973, Algorithms for Minimization
 * without Derivatives, chapter 4).
 * @param tolerance absolute, in x. @throws RangeError when the signs do not differ.
 */
export function findRoot(f: (x: number) => number, a: number, b: number, tolerance: number): number {
  let [x0, x1] = [a, b];
  let [f0, f1] = [f(x0), f(x1)];
  if (f0 === 0) return x0;
  if (f1 === 0) return x1;
  if (f0 > 0 === f1 > 0) throw new RangeError(`invalid bracket [${a}, ${b}], the signs of f must differ`);
  let [x2, f2] = [x0, f0];
  let last = x1 - x0;
  let before = last;
  for (let i = 0; i < 200; i++) {
    if (Math.abs(f2) < Math.abs(f1)) [x0, x1, x2, f0, f1, f2] = [x1, x2, x1, f1, f2, f1];
    const near = 2 * Number.EPSILON * Math.abs(x1) + 0.5 * tolerance;
    const middle = 0.5 * (x2 - x1);
    if (Math.abs(middle) <= near || f1 === 0) return x1;
    const [p, q] = interpolate(x0, x1, x2, f0, f1, f2);
    const usable =
      Math.abs(before) >= near && 2 * p < Math.min(3 * middle * q - Math.abs(near * q), Math.abs(before * q));
    before = usable ? last : middle;
    last = usable ? p / q : middle;
    [x0, f0] = [x1, f1];
    x1 += Math.abs(last) > near ? last : Math.sign(middle) * near;
    f1 = f(x1);
    if (f1 > 0 === f2 > 0) {
      [x2, f2] = [x0, f0];
      last = x1 - x0;
      before = last;
    }
  }
  return x1;
}

/** Numerator (≥ 0) and denominator of the step by secant or inverse quadratic interpolation. */
function interpolate(
  x0: number,
  x1: number,
  x2: number,
  f0: number,
  f1: number,
  f2: number,
): [number, number] {
  const s = f1 / f0;
  const middle = 0.5 * (x2 - x1);
  let p = 2 * middle * s;
  let q = 1 - s;
  if (x0 !== x2) {
    const u = f0 / f2;
    const r = f1 / f2;
    p = s * (2 * middle * u * (u - r) - (x1 - x0) * (r - 1));
    q = (u - 1) * (r - 1) * (s - 1);
  }
  return p > 0 ? [p, -q] : [-p, q];
}
