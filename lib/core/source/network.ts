import { frameAt, type Frame } from "../geodesy/quick-inverse.ts";
import type { StationArrival } from "./answer.ts";
import { firmnessOf, type Firmness } from "./firmness.ts";
import { steadyCovariance } from "./joint-covariance.ts";
import type { EstimationSettings } from "./settings.ts";
import type { StationTerms } from "./site.ts";

/** How far apart in origin time two arrivals may be and still have been brought in for one event. */
export const PLAUSIBLE_ORIGIN_SECONDS = 10 * 86_400;
/** Distances that an arrival may tell of when it is not of this storm: 500 to 20,000 km. */
const PLAUSIBLE_DISTANCE_METRES = 19_500_000;
/** Standard deviation given to the time of a station whose clock is set aside: three years. */
const CLOCK_SET_ASIDE_SECONDS = 1e8;

/**
 * The stations of one event as columns, the form in which the search works. Every state vector has 2n entries: the n
 * distances first, then the n origin times.
 */
export interface Network {
  readonly size: number;
  readonly arrivals: readonly StationArrival[];
  readonly settings: EstimationSettings;
  /** Factor on the variance of the model spread; 1 unless the misfit raised it. */
  readonly spreadVarianceFactor: number;
  readonly frames: readonly Frame[];
  readonly distances: Float64Array;
  /** Origin times in seconds from `zeroEpochSeconds`. */
  readonly origins: Float64Array;
  readonly zeroEpochSeconds: number;
  /** 2n x 2n: what does not depend on where the storm was. */
  readonly steady: Float64Array;
  /** Log density (per metre and second) of an arrival that is of anything but this storm. */
  readonly logStrayDensity: Float64Array;
  readonly firmness: Firmness;
  /** What measured directions say anywhere, where no station has one: nothing. Null where one has. */
  readonly noBearings: StationTerms | null;
}

export interface NetworkOptions {
  readonly settings: EstimationSettings;
  readonly spreadVarianceFactor?: number;
  /** Ids of stations of which only the distance counts. */
  readonly clocksSetAside?: ReadonlySet<string>;
}

export function networkOf(arrivals: readonly StationArrival[], options: NetworkOptions): Network {
  const { settings, spreadVarianceFactor = 1, clocksSetAside } = options;
  const size = arrivals.length;
  const zeroEpochSeconds = Math.round(arrivals.reduce((sum, arrival) => sum + arrival.estimate.originEpochSeconds / size, 0));
  const aside = arrivals.map((arrival) => (clocksSetAside?.has(arrival.id) ? CLOCK_SET_ASIDE_SECONDS : 0));
  const steady = steadyCovariance(arrivals, settings, spreadVarianceFactor);
  aside.forEach((sigma, i) => {
    const diagonal = (size + i) * (2 * size + 1);
    steady[diagonal] = (steady[diagonal] ?? NaN) + sigma ** 2;
  });
  return {
    size,
    arrivals,
    settings,
    spreadVarianceFactor,
    frames: arrivals.map((arrival) => frameAt(arrival.position)),
    distances: Float64Array.from(arrivals, (arrival) => arrival.estimate.distanceMetres),
    origins: Float64Array.from(arrivals, (arrival) => arrival.estimate.originEpochSeconds - zeroEpochSeconds),
    zeroEpochSeconds,
    steady,
    logStrayDensity: Float64Array.from(
      aside,
      (sigma) => -Math.log(PLAUSIBLE_DISTANCE_METRES) - Math.log(sigma > 0 ? sigma * Math.sqrt(2 * Math.PI) : PLAUSIBLE_ORIGIN_SECONDS),
    ),
    firmness: firmnessOf(arrivals.map((arrival) => arrival.estimate), settings, spreadVarianceFactor),
    noBearings: arrivals.some((arrival) => arrival.estimate.bearing) ? null : { byStation: new Float64Array(size), sum: 0, none: true },
  };
}
