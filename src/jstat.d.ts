/** The part of jstat that is used; the package brings no types. */
declare module 'jstat' {
  interface Quantiles {
    chisquare: { inv(probability: number, degreesOfFreedom: number): number };
    normal: { inv(probability: number, mean: number, deviation: number): number };
  }
  const jstat: Quantiles;
  export default jstat;
}
