import type { MultiPolygon } from "geojson";
import type { ArrivalEstimate } from "../arrival/estimate.ts";
import type { Reading } from "../arrival/reading.ts";
import type { SightTable } from "../geodesy/sight-table.ts";
import type { Position } from "../units/position.ts";

/** Bearings (comes from, clockwise from true north) that a station is open to, from the first clockwise to the second. */
export interface Exposure {
  readonly facesFromDegrees: number;
  readonly facesToDegrees: number;
}

/** One station's part in an event. `readings` are those that made `estimate`; empty for an estimate that was sent in. */
export interface StationArrival {
  readonly id: string;
  readonly position: Position;
  readonly estimate: ArrivalEstimate;
  readonly readings: readonly Reading[];
  readonly exposure: Exposure | null;
  readonly sight: SightTable | null;
}

export type SourceOutcome = "located" | "several" | "ring-only" | "too-few" | "no-agreement";

/** A separate possible source: one mode of the posterior, with the share of the probability that lies about it. */
export interface PossibleSource {
  readonly probability: number;
  readonly position: Position;
  readonly originEpochSeconds: number;
}

export interface ConfidenceRegion {
  readonly probability: number;
  readonly areaSquareMetres: number;
  /** RFC 7946: split at the antimeridian, closed over a pole. */
  readonly geometry: MultiPolygon;
}

/** What the answer says of one station. Residuals are ring minus answer. A positive clock offset is a fast clock. */
export interface StationVerdict {
  readonly id: string;
  readonly residual: { readonly distanceMetres: number; readonly originSeconds: number } | null;
  /** Probability that the station saw this storm; null where no storm was placed. */
  readonly belongs: number | null;
  readonly leaveOneOutShiftMetres: number | null;
  readonly clockOffset: { readonly offsetSeconds: number; readonly sigmaSeconds: number } | null;
}

export interface AnswerWarning {
  readonly code: string;
  readonly message: string;
}

export interface SourceAnswer {
  readonly outcome: SourceOutcome;
  readonly source: {
    readonly position: Position;
    readonly originEpochSeconds: number;
    readonly originSigmaSeconds: number;
    /** False where land, sight or exposure keeps the best point from where rings and directions would put it. */
    readonly atPeak: boolean;
    readonly onLand: boolean;
    /** The best point in water, where the best point of all lies on land. */
    readonly bestInWater: Position | null;
  } | null;
  readonly regions: readonly ConfidenceRegion[];
  readonly modes: readonly PossibleSource[];
  readonly ruledOut: readonly { readonly position: Position; readonly reason: string }[];
  /** In the order of the arrivals handed in. */
  readonly stations: readonly StationVerdict[];
  readonly crossings: readonly { readonly stations: readonly [string, string]; readonly points: readonly Position[] }[];
  /** Null where there was nothing to fit together. `ringMissMetres`: root mean square of the rings' distance from the answer. */
  readonly fit: {
    readonly chiSquare: number;
    readonly degreesOfFreedom: number;
    readonly pValue: number;
    readonly ringMissMetres: number;
  } | null;
  readonly drift: { readonly shiftMetres: number; readonly shiftSeconds: number; readonly significant: boolean } | null;
  /** Factor (1 or more) by which the misfit of four or more stations raised the spread's standard deviations. */
  readonly spreadRaisedBy: number;
  readonly warnings: readonly AnswerWarning[];
}
