/** The exact distribution of Σ Bin(nᵢ, pᵢ) by convolution, and its quantiles: an oracle for small cases. */
export function sumOfBinomials(parts: readonly (readonly [n: number, p: number])[]): number[] {
  return parts.reduce<number[]>((sum, [n, p]) => convolve(sum, binomial(n, p)), [1]);
}

/** The smallest y with P(Y ≤ y) ≥ probability. */
export function quantileOf(distribution: readonly number[], probability: number): number {
  let reached = 0;
  return distribution.findIndex((p) => {
    reached += p;
    return reached >= probability;
  });
}

function binomial(n: number, p: number): number[] {
  const terms = [(1 - p) ** n];
  for (let k = 1; k <= n; k++) {
    terms.push(((terms[k - 1] as number) * (n - k + 1) * p) / (k * (1 - p)));
    if ((terms[k] as number) < 1e-40 && k > n * p) break;
  }
  return terms;
}

function convolve(a: readonly number[], b: readonly number[]): number[] {
  const sum = new Array<number>(a.length + b.length - 1).fill(0);
  a.forEach((x, i) => {
    b.forEach((y, j) => {
      sum[i + j] = (sum[i + j] as number) + x * y;
    });
  });
  return sum;
}
