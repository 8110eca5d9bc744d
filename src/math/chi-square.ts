import jstat from 'jstat';

/**
 * Quantile of the chi-square distribution. jstat's inverse is within 1e-10 relative for probabilities between 1e-6 and
 * 1 − 1e-6 and up to about 100 degrees of freedom, which is all that is asked of it here.
 */
export function chiSquareQuantile(probability: number, degreesOfFreedom: number): number {
  return jstat.chisquare.inv(probability, degreesOfFreedom);
}

/** Quantile of the standard normal distribution, for ordinary probabilities (1e-6 to 1 − 1e-6). */
export function normalQuantile(probability: number): number {
  return jstat.normal.inv(probability, 0, 1);
}
