import type { Bearing } from "./reading.ts";

/**
 * Covariance of a station's distance L and origin time t0 (SI: m2, m s, s2). They are strongly and negatively
 * correlated, so neither standard deviation means much without the other two numbers.
 */
export interface EstimateCovariance {
  readonly distanceVariance: number;
  readonly originVariance: number;
  readonly distanceOriginCovariance: number;
}

/**
 * An uncertainty that stations share because it comes from the storm and not from the station: one standard deviation
 * of it moves the station's distance and origin time by these amounts. It is part of `covariance` already; `cause`
 * says which stations move together.
 */
export interface SharedShift {
  readonly cause: "timed-readings" | "bin-width";
  readonly distanceMetres: number;
  readonly originSeconds: number;
}

/** What one station says of a storm: how far away and when, from its own readings or as sent in by its group. */
export interface ArrivalEstimate {
  readonly distanceMetres: number;
  readonly originEpochSeconds: number;
  readonly covariance: EstimateCovariance;
  readonly sharedShifts: readonly SharedShift[];
  readonly bearing: Bearing | null;
}
