/** Quadrature rules on (0, 1). */
export interface Rule {
  readonly nodes: Float64Array;
  readonly weights: Float64Array;
}

const rules = new Map<number, Rule>();

/**
 * Gauss-Legendre rule with n nodes on (0, 1), exact for polynomials of degree 2n − 1. Nodes by Newton's iteration on
 * the Legendre polynomial (Abramowitz & Stegun 25.4.29).
 */
export function gaussLegendre(n: number): Rule {
  const known = rules.get(n);
  if (known !== undefined) return known;
  const rule = { nodes: new Float64Array(n), weights: new Float64Array(n) };
  for (let i = 0; i < n; i++) {
    let x = Math.cos((Math.PI * (i + 0.75)) / (n + 0.5));
    let slope = 1;
    for (let step = 0; step < 50; step++) {
      const [value, derivative] = legendre(n, x);
      slope = derivative;
      const change = value / derivative;
      x -= change;
      if (Math.abs(change) < 1e-16) break;
    }
    rule.nodes[i] = 0.5 * (1 - x);
    rule.weights[i] = 1 / ((1 - x * x) * slope * slope);
  }
  rules.set(n, rule);
  return rule;
}

/**
 * Double-exponential rule on (0, 1) for integrands with any algebraic or logarithmic end at 0 (Takahasi & Mori 1974);
 * the nodes near 0 keep full relative accuracy.
 * Powers of age above -0.95 are integrated to their end.
 * @param step of the trapezoid rule; 1/8 reaches about 1e-12, 1/4 about 1e-7.
 */
export function doubleExponential(step: number): Rule {
  const nodes: number[] = [];
  const weights: number[] = [];
  // To the left until nodes near the smallest double, to the right until they meet 1.
  for (let i = -Math.ceil(6.1 / step); i <= Math.ceil(4.4 / step); i++) {
    const s = i * step;
    const y = Math.PI * Math.sinh(s);
    const x = 1 / (1 + Math.exp(-y));
    const weight = step * Math.PI * Math.cosh(s) * x * (1 / (1 + Math.exp(y)));
    if (weight < 1e-300 || x >= 1) continue;
    nodes.push(x);
    weights.push(weight);
  }
  return { nodes: Float64Array.from(nodes), weights: Float64Array.from(weights) };
}

/** The Legendre polynomial of degree n at x, and its derivative. */
function legendre(n: number, x: number): [number, number] {
  let previous = 1;
  let value = x;
  for (let k = 2; k <= n; k++) {
    const next = ((2 * k - 1) * x * value - (k - 1) * previous) / k;
    previous = value;
    value = next;
  }
  return [value, (n * (x * value - previous)) / (x * x - 1)];
}
