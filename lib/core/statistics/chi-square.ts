import chiSquareCdf from "@stdlib/stats-base-dists-chisquare-cdf";
import quantile from "@stdlib/stats-base-dists-chisquare-quantile";
import { requirePositive, requireWithin } from "../failures/require.ts";

/**
 * The value that a chi-square variable of `degreesOfFreedom` stays below with this probability.
 *
 * @throws RangeError at `probability` outside [0, 1], or at `degreesOfFreedom`.
 */
export function chiSquareQuantile(probability: number, degreesOfFreedom: number): number {
  requireWithin(probability, 0, 1, "probability", "Probability", "(a fraction)");
  requirePositive(degreesOfFreedom, "degreesOfFreedom", "The number of degrees of freedom", "degrees");
  return quantile(probability, degreesOfFreedom);
}

/**
 * Probability that a chi-square variable of `degreesOfFreedom` exceeds `value`: the p-value of a misfit. Taken as one
 * less the distribution function, so below about 1e-15 it is zero.
 *
 * @throws RangeError at `value` below 0 or no number, or at `degreesOfFreedom`.
 */
export function chiSquareSurvival(value: number, degreesOfFreedom: number): number {
  requireWithin(value, 0, Infinity, "value", "Chi-square", "(no unit)");
  requirePositive(degreesOfFreedom, "degreesOfFreedom", "The number of degrees of freedom", "degrees");
  return 1 - chiSquareCdf(value, degreesOfFreedom);
}
