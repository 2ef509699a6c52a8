import type { ArrivalEstimate } from "./estimate.ts";
import { timedExcess, type TimedWindow } from "./timed-correction.ts";

/** When a line lets a frequency arrive, with its error (1 sigma). */
export interface LineMoment {
  readonly arrivalEpochSeconds: number;
  readonly sigmaSeconds: number;
}

/**
 * A station's line at one frequency, for drawing it over its readings.
 *   (1)  t(f) = t0 + k L f,  k = 4 pi / g
 *   (2)  var t = var t0 + 2 k f cov(L, t0) + (k f)^2 var L
 */
export function lineAtFrequency(estimate: ArrivalEstimate, frequencyHz: number, gravity: number): LineMoment {
  const secondsPerMetre = (4 * Math.PI * frequencyHz) / gravity;
  const { distanceVariance, originVariance, distanceOriginCovariance } = estimate.covariance;
  const variance = originVariance + 2 * secondsPerMetre * distanceOriginCovariance + secondsPerMetre ** 2 * distanceVariance; // (2)
  return {
    arrivalEpochSeconds: estimate.originEpochSeconds + secondsPerMetre * estimate.distanceMetres, // (1)
    sigmaSeconds: Math.sqrt(Math.max(0, variance)),
  };
}

/** By what part of its distance a line was shortened because readings of it were timed at moments: 0 to 1. */
export function shortenedBy({ distanceMetres, sharedShifts }: ArrivalEstimate, window: TimedWindow): number {
  if (sharedShifts.every(({ cause }) => cause !== "timed-readings")) return 0;
  // The largest apparent distance whose correction gives this one: L + K / L, K of timed-correction.ts.
  const rootK = (window.durationSeconds * window.gravity) / (4 * Math.PI * window.spectrumWidthHz);
  if (distanceMetres <= rootK) return 1;
  return timedExcess(distanceMetres + rootK ** 2 / distanceMetres, window).excess;
}
