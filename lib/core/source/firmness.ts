import type { ArrivalEstimate } from "../arrival/estimate.ts";
import type { EstimationSettings } from "./settings.ts";

/** How firm the joint covariance stands whatever the azimuths: what a bound over a whole cell may lean on. */
export interface Firmness {
  /** At least this (m, 1 sigma) is each distance uncertain by itself, its time and everything shared given. */
  readonly distanceMetres: number;
  /** The spread's shared correlation as it counts in the whole of a station's covariance: m times the settings'. */
  readonly correlation: number;
}

/** A spread of nothing is taken for a metre and a second. */
const LEAST_SPREAD = 1;

/**
 * With C a station's own covariance, V = diag(distance^2, time^2) the own spread and rho its shared correlation,
 *   (1)  m = max over stations of the largest eigenvalue of (C + V)^-1 V = 1 / smallest of V^-1/2 (C + V) V^-1/2
 *   (2)  distance^2 = min over stations of the first entry of C + (1 - rho) V less what its time tells
 */
export function firmnessOf(estimates: readonly ArrivalEstimate[], { spread }: EstimationSettings, spreadVarianceFactor: number): Firmness {
  const distance = Math.max(LEAST_SPREAD, spread.distanceMetres ** 2 * spreadVarianceFactor);
  const time = Math.max(LEAST_SPREAD, spread.originSeconds ** 2 * spreadVarianceFactor);
  const apart = 1 - spread.sharedCorrelation;
  let share = 0;
  let least = Infinity;
  for (const { covariance } of estimates) {
    const a = covariance.distanceVariance / distance;
    const b = covariance.originVariance / time;
    const cross = covariance.distanceOriginCovariance ** 2 / (distance * time);
    const largest = 1 + (a + b) / 2 + Math.sqrt(((a - b) / 2) ** 2 + cross);
    share = Math.max(share, largest / (1 + a + b + Math.max(0, a * b - cross))); // (1)
    least = Math.min(least, (a + apart - cross / (b + apart || 1)) * distance); // (2)
  }
  return { distanceMetres: Math.sqrt(Math.max(LEAST_SPREAD, least)), correlation: spread.sharedCorrelation * Math.min(1, share) };
}
