import type { ArrivalEstimate } from "#lib/core/arrival/estimate.ts";
import { addOwnSpread, steadyCovariance } from "#lib/core/source/joint-covariance.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";

/**
 * The errors (1 sigma) of a distance and a time that no other station bears out: those of the readings with the whole
 * model spread. The part that stations share, which drops out of a comparison between them, is in it: a storm that
 * grows or fades shifts one station's distance and time by as much as it shifts all.
 */
export function loneRingSigmas(ring: { estimate: ArrivalEstimate; settings: EstimationSettings }): {
  distanceSigmaMetres: number;
  originSigmaSeconds: number;
} {
  const { estimate, settings } = ring;
  const position = { latitudeDegrees: 0, longitudeDegrees: 0 };
  const alone = { id: "", position, estimate, readings: [], exposure: null, sight: null };
  const covariance = steadyCovariance([alone], settings, 1);
  addOwnSpread(covariance, null, { size: 1, settings, spreadVarianceFactor: 1 });
  return { distanceSigmaMetres: Math.sqrt(covariance[0] ?? NaN), originSigmaSeconds: Math.sqrt(covariance[3] ?? NaN) };
}
