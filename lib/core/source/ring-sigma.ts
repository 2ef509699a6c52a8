import type { ArrivalEstimate } from "../arrival/estimate.ts";
import { addOwnSpread, steadyCovariance } from "./joint-covariance.ts";
import type { EstimationSettings } from "./settings.ts";

/**
 * The errors (1 sigma) of one station's distance and time where no other station bears them out: those of its readings
 * with the whole model spread, raised as the misfit raised it. Half the width of a band is the distance's. The part
 * that stations share, which drops out of a comparison between them, is in it: a storm that grows or fades shifts one
 * station's ring by as much as it shifts all.
 */
export function ringSigmas({ estimate, settings, spreadRaisedBy }: {
  readonly estimate: ArrivalEstimate;
  readonly settings: EstimationSettings;
  readonly spreadRaisedBy: number;
}): { distanceSigmaMetres: number; originSigmaSeconds: number } {
  const position = { latitudeDegrees: 0, longitudeDegrees: 0 };
  const alone = { id: "", position, estimate, readings: [], exposure: null, sight: null };
  const spreadVarianceFactor = spreadRaisedBy ** 2;
  const covariance = steadyCovariance([alone], settings, spreadVarianceFactor);
  addOwnSpread(covariance, null, { size: 1, settings, spreadVarianceFactor });
  return { distanceSigmaMetres: Math.sqrt(covariance[0] ?? NaN), originSigmaSeconds: Math.sqrt(covariance[3] ?? NaN) };
}
