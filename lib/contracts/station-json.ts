import type { EstimateCovariance } from "#lib/core/arrival/estimate.ts";
import type { LineOutcome } from "#lib/core/arrival/line.ts";
import { SECONDS_PER_HOUR } from "#lib/core/units/time.ts";
import { isoTime } from "./iso-time.ts";

/** One station of the answer, in public units. The numbers are null where the station could not be fitted. */
export interface StationJson {
  readonly id: string;
  readonly readingsUsed: number;
  /** Rows of the readings file. */
  readonly readingsDownweighted: readonly number[];
  readonly distanceKm: number | null;
  readonly distanceSigmaKm: number | null;
  readonly originTime: string | null;
  readonly originTimeSigmaHours: number | null;
  readonly correlation: number | null;
  readonly reducedChiSquare: number | null;
  readonly pValue: number | null;
  /** Whether the shelf's delay was taken off the readings' times; null where nothing was fitted here. */
  readonly shelfCorrected: boolean | null;
  /** Why the station could not be fitted. */
  readonly error?: string;
  readonly errorCode?: string;
}

const METRES_PER_KM = 1000;

export function stationJson({ id, outcome }: { readonly id: string; readonly outcome: LineOutcome }): StationJson {
  if (outcome.kind === "refused") return { ...unfitted(id), error: outcome.message, errorCode: outcome.code };
  const estimate = outcome.kind === "fitted" ? outcome.line : outcome.estimate;
  return {
    ...unfitted(id),
    ...(outcome.kind === "fitted" && {
      readingsUsed: outcome.line.readingsUsed,
      readingsDownweighted: outcome.line.downweightedRows,
      reducedChiSquare: outcome.line.reducedChiSquare,
      pValue: outcome.line.pValue,
      shelfCorrected: outcome.line.shelfCorrected,
    }),
    distanceKm: estimate.distanceMetres / METRES_PER_KM,
    originTime: isoTime(estimate.originEpochSeconds),
    ...sigmas(estimate.covariance),
  };
}

function unfitted(id: string): StationJson {
  const fit = { distanceKm: null, distanceSigmaKm: null, originTime: null, originTimeSigmaHours: null, correlation: null };
  return { id, readingsUsed: 0, readingsDownweighted: [], ...fit, reducedChiSquare: null, pValue: null, shelfCorrected: null };
}

function sigmas({ distanceVariance, originVariance, distanceOriginCovariance }: EstimateCovariance) {
  const distanceSigma = Math.sqrt(distanceVariance);
  const originSigma = Math.sqrt(originVariance);
  return {
    distanceSigmaKm: distanceSigma / METRES_PER_KM,
    originTimeSigmaHours: originSigma / SECONDS_PER_HOUR,
    correlation: distanceOriginCovariance / (distanceSigma * originSigma),
  };
}
