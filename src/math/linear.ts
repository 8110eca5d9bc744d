/** Small symmetric systems, row-major in plain arrays of k × k. */

/**
 * The lower Cholesky factor of a symmetric matrix, or null when it is not positive definite.
 * @param matrix row-major, k × k. Source: Golub & Van Loan, Matrix Computations, algorithm 4.2.1.
 */
export function cholesky(matrix: Float64Array, k: number): Float64Array | null {
  const factor = new Float64Array(k * k);
  for (let i = 0; i < k; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = matrix[i * k + j] as number;
      for (let m = 0; m < j; m++) sum -= (factor[i * k + m] as number) * (factor[j * k + m] as number);
      if (i !== j) factor[i * k + j] = sum / (factor[j * k + j] as number);
      else if (sum > 0) factor[i * k + i] = Math.sqrt(sum);
      else return null;
    }
  }
  return factor;
}

/** Solves (L Lᵀ) x = b for the factor L of `cholesky`. */
export function solveCholesky(factor: Float64Array, b: Float64Array, k: number): Float64Array {
  const x = Float64Array.from(b);
  for (let i = 0; i < k; i++) {
    for (let m = 0; m < i; m++) x[i] = (x[i] as number) - (factor[i * k + m] as number) * (x[m] as number);
    x[i] = (x[i] as number) / (factor[i * k + i] as number);
  }
  for (let i = k - 1; i >= 0; i--) {
    for (let m = i + 1; m < k; m++)
      x[i] = (x[i] as number) - (factor[m * k + i] as number) * (x[m] as number);
    x[i] = (x[i] as number) / (factor[i * k + i] as number);
  }
  return x;
}

/** The inverse of a symmetric positive definite matrix, or null when it is not one. */
export function invertPositive(matrix: Float64Array, k: number): Float64Array | null {
  const factor = cholesky(matrix, k);
  if (factor === null) return null;
  const inverse = new Float64Array(k * k);
  for (let j = 0; j < k; j++) {
    const unit = new Float64Array(k);
    unit[j] = 1;
    inverse.set(solveCholesky(factor, unit, k), j * k);
  }
  return inverse;
}
