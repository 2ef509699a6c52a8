import type { ArrivalEstimate } from "../arrival/estimate.ts";
import type { SpreadSettings } from "./settings.ts";

/**
 * Half the width of a station's band (m, 1 sigma): its own error of distance, and how far the storm's size and life
 * let one station's ring lie from the storm's middle,
 *   (1)  sigma^2 = var(L) + a^2 (d^2 + (k L)^2)
 * with d the spread of distance, k the spread of scale and a the factor by which the misfit raised them.
 */
export function ringSigmaMetres(ring: {
  estimate: ArrivalEstimate;
  spread: SpreadSettings;
  spreadRaisedBy: number;
}): number {
  const { estimate, spread, spreadRaisedBy } = ring;
  const model = Math.hypot(spread.distanceMetres, spread.scaleFraction * estimate.distanceMetres) * spreadRaisedBy;
  return Math.hypot(Math.sqrt(estimate.covariance.distanceVariance), model); // (1)
}
