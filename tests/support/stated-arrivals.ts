import type { EventObservations } from "#lib/core/arrival/observations.ts";
import type { Bearing } from "#lib/core/arrival/reading.ts";
import type { Position } from "#lib/core/units/position.ts";
import { legBetween } from "./simulator/ellipsoid.ts";
import { deploymentOf, type NetworkStation } from "./simulator/simulated-event.ts";

/** A station's distance and origin time as its group might send them in. */
export interface StatedArrival {
  readonly id: string;
  readonly position: Position;
  readonly distanceMetres: number;
  readonly originEpochSeconds: number;
  readonly distanceSigmaMetres: number;
  readonly originSigmaSeconds: number;
  readonly correlation: number;
  readonly bearing?: Bearing;
}

export const STORM_EPOCH_SECONDS = 1_077_580_800;

/** What each station would say of a storm without any error, with the errors it states: 4 % and 5 h where not given. */
export function exactArrivals(event: {
  readonly stations: readonly NetworkStation[];
  readonly storm: Position;
  readonly distanceFraction?: number;
  readonly originSigmaSeconds?: number;
}): StatedArrival[] {
  const { stations, storm, distanceFraction = 0.04, originSigmaSeconds = 18_000 } = event;
  return stations.map(({ id, position }) => {
    const { distanceMetres } = legBetween(storm, position);
    const errors = { distanceSigmaMetres: distanceFraction * distanceMetres, originSigmaSeconds, correlation: -0.9 };
    return { id, position, distanceMetres, originEpochSeconds: STORM_EPOCH_SECONDS, ...errors };
  });
}

export function statedObservations(arrivals: readonly StatedArrival[]): EventObservations {
  return {
    deployments: arrivals.map(deploymentOf),
    readings: [],
    estimates: arrivals.map((arrival, index) => ({
      stationId: arrival.id,
      row: index + 2,
      estimate: {
        distanceMetres: arrival.distanceMetres,
        originEpochSeconds: arrival.originEpochSeconds,
        covariance: {
          distanceVariance: arrival.distanceSigmaMetres ** 2,
          originVariance: arrival.originSigmaSeconds ** 2,
          distanceOriginCovariance: arrival.correlation * arrival.distanceSigmaMetres * arrival.originSigmaSeconds,
        },
        sharedShifts: [],
        bearing: arrival.bearing ?? null,
      },
    })),
  };
}
