import type { Position } from "../units/position.ts";
import type { ShelfLeg } from "../waves/shelf-delay.ts";
import type { ArrivalEstimate } from "./estimate.ts";
import type { Reading } from "./reading.ts";

export type { ShelfLeg };

/** Where a station's sensor stood over a span of time, and what it was. Several deployments may carry one station's id. */
export interface Deployment {
  readonly stationId: string;
  readonly name: string;
  readonly position: Position;
  readonly depthMetres: number | null;
  readonly sensor: "surface" | "pressure" | "ground";
  /** Bearings that the station is open to (comes from, clockwise from the first to the second); null: all. */
  readonly exposure: { readonly facesFromDegrees: number; readonly facesToDegrees: number } | null;
  readonly recordMinutes: number | null;
  readonly stamp: "start" | "middle" | "end" | null;
  readonly timeZone: string | null;
  readonly fromEpochSeconds: number | null;
  readonly toEpochSeconds: number | null;
  readonly shelf: readonly ShelfLeg[];
}

export interface StationReading {
  readonly stationId: string;
  /** Frequency as measured: for a `ground` deployment still the doubled one. */
  readonly reading: Reading;
}

export interface StationEstimate {
  readonly stationId: string;
  readonly row: number;
  readonly estimate: ArrivalEstimate;
}

/** All that was brought in for one event: the one input of fitting and of placing. */
export interface EventObservations {
  readonly deployments: readonly Deployment[];
  readonly readings: readonly StationReading[];
  readonly estimates: readonly StationEstimate[];
}
