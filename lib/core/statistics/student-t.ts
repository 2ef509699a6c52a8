import quantile from "@stdlib/stats-base-dists-t-quantile";
import { requirePositive, requireWithin } from "../failures/require.ts";

/**
 * The value that Student's t of `degreesOfFreedom` (any number above zero, not only whole ones) stays below with this
 * probability.
 *
 * @throws RangeError at `probability` outside [0, 1], or at `degreesOfFreedom`.
 */
export function studentTQuantile(probability: number, degreesOfFreedom: number): number {
  requireWithin(probability, 0, 1, "probability", "Probability", "(a fraction)");
  requirePositive(degreesOfFreedom, "degreesOfFreedom", "The number of degrees of freedom", "degrees");
  return quantile(probability, degreesOfFreedom);
}
