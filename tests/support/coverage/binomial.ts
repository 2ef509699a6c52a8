/** How far a count may lie from the law's before chance is no excuse: three standard deviations of a binomial count. */
export function threeSigma(trials: number, probability: number): number {
  return 3 * Math.sqrt(trials * probability * (1 - probability));
}
