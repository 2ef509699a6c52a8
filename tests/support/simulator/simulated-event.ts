import type { Deployment, EventObservations, StationReading } from "#lib/core/arrival/observations.ts";
import type { Position } from "#lib/core/units/position.ts";

/** What the estimator is given of a storm, and beside it the truth that it is not given. */
export interface SimulatedEvent {
  readonly observations: EventObservations;
  readonly truth: { readonly position: Position; readonly originEpochSeconds: number };
  /** The station whose arrival is not of this storm, or whose clock is wrong. */
  readonly wrongStationId: string | null;
  readonly clockOffsetSeconds: number | null;
}

export interface NetworkStation {
  readonly id: string;
  readonly position: Position;
}

export function deploymentOf(station: NetworkStation): Deployment {
  return {
    stationId: station.id,
    name: station.id,
    position: station.position,
    depthMetres: null,
    sensor: "surface",
    exposure: null,
    recordMinutes: null,
    stamp: null,
    timeZone: null,
    fromEpochSeconds: null,
    toEpochSeconds: null,
    shelf: [],
  };
}

export function observationsOf(stations: readonly NetworkStation[], readings: readonly StationReading[]): EventObservations {
  return { deployments: stations.map(deploymentOf), readings: readings.map(numbered), estimates: [] };
}

/** A clock that is fast by the offset writes every time too late by it. */
export function withClockOffset(readings: readonly StationReading[], stationId: string, offsetSeconds: number): StationReading[] {
  return readings.map((entry) =>
    entry.stationId === stationId
      ? { ...entry, reading: { ...entry.reading, arrivalEpochSeconds: entry.reading.arrivalEpochSeconds + offsetSeconds } }
      : entry,
  );
}

function numbered(entry: StationReading, index: number): StationReading {
  return { ...entry, reading: { ...entry.reading, row: index + 2 } };
}
