import type { MultiPolygon } from "geojson";
import type { AnswerWarning, SourceAnswer, SourceOutcome, StationVerdict } from "#lib/core/source/answer.ts";
import type { EventSolution, StationSolution } from "#lib/core/source/solution.ts";
import type { Position } from "#lib/core/units/position.ts";
import { SECONDS_PER_HOUR } from "#lib/core/units/time.ts";
import type { Provenance } from "./fit-json.ts";
import { isoTime } from "./iso-time.ts";
import { stationJson } from "./station-json.ts";
import type { StationJson } from "./station-json.ts";

interface PlaceJson {
  readonly latitude: number;
  readonly longitude: number;
}

/** A station of a located event; the added numbers are null where nothing could be said. */
export interface LocatedStationJson extends StationJson {
  readonly ringKm: number | null;
  /** Ring minus answer. */
  readonly residual: { readonly distanceKm: number; readonly timeHours: number } | null;
  /** Probability that the station saw this storm. */
  readonly belongs: number | null;
  readonly leaveOneOutShiftKm: number | null;
  /** Positive: the clock is fast. */
  readonly clockOffset: { readonly hours: number; readonly sigmaHours: number } | null;
}

export interface LocateJson extends Provenance {
  readonly outcome: SourceOutcome;
  readonly source: (PlaceJson & {
    readonly time: string;
    readonly timeSigmaHours: number;
    readonly onLand: boolean;
    /** The best point in water, where the best of all lies on land. */
    readonly bestInWater: PlaceJson | null;
  }) | null;
  readonly regions: readonly { readonly probability: number; readonly areaKm2: number; readonly geometry: MultiPolygon }[];
  readonly modes: readonly (PlaceJson & { readonly probability: number; readonly time: string })[];
  readonly ruledOut: readonly (PlaceJson & { readonly reason: string })[];
  readonly stations: readonly LocatedStationJson[];
  /** Points as GeoJSON writes them, longitude first. */
  readonly crossings: readonly { readonly stations: readonly [string, string]; readonly points: readonly [number, number][] }[];
  readonly fit: {
    readonly chiSquare: number;
    readonly degreesOfFreedom: number;
    readonly pValue: number;
    /** Root mean square of the rings' distance from the answer. */
    readonly ringMissKm: number;
  } | null;
  readonly drift: { readonly shiftKm: number; readonly shiftHours: number; readonly significant: boolean } | null;
  /** Factor on the spread's standard deviations; above 1 where the misfit of four or more stations raised them. */
  readonly spreadRaisedBy: number;
  readonly warnings: readonly AnswerWarning[];
}

const METRES_PER_KM = 1000;
const SQUARE_METRES_PER_KM2 = 1e6;

/** A placed event as the public contract writes it. */
export function locateJson({ provenance, solution, answer, warnings }: {
  readonly provenance: Provenance;
  readonly solution: EventSolution;
  readonly answer: SourceAnswer;
  readonly warnings: readonly AnswerWarning[];
}): LocateJson {
  const { source, fit, drift } = answer;
  return {
    ...provenance,
    outcome: answer.outcome,
    source: source && {
      ...place(source.position),
      time: isoTime(source.originEpochSeconds),
      timeSigmaHours: source.originSigmaSeconds / SECONDS_PER_HOUR,
      onLand: source.onLand,
      bestInWater: source.bestInWater && place(source.bestInWater),
    },
    regions: answer.regions.map(({ probability, areaSquareMetres, geometry }) => ({
      probability,
      areaKm2: areaSquareMetres / SQUARE_METRES_PER_KM2,
      geometry,
    })),
    modes: answer.modes.map(({ probability, position, originEpochSeconds }) => ({
      probability,
      ...place(position),
      time: isoTime(originEpochSeconds),
    })),
    ruledOut: answer.ruledOut.map(({ position, reason }) => ({ ...place(position), reason })),
    stations: solution.stations.map((station) => locatedStation(station, answer)),
    crossings: answer.crossings.map(({ stations, points }) => ({
      stations,
      points: points.map(({ latitudeDegrees, longitudeDegrees }): [number, number] => [longitudeDegrees, latitudeDegrees]),
    })),
    fit: fit && {
      chiSquare: fit.chiSquare,
      degreesOfFreedom: fit.degreesOfFreedom,
      pValue: fit.pValue,
      ringMissKm: fit.ringMissMetres / METRES_PER_KM,
    },
    drift: drift && {
      shiftKm: drift.shiftMetres / METRES_PER_KM,
      shiftHours: drift.shiftSeconds / SECONDS_PER_HOUR,
      significant: drift.significant,
    },
    spreadRaisedBy: answer.spreadRaisedBy,
    warnings,
  };
}

function locatedStation(station: StationSolution, answer: SourceAnswer): LocatedStationJson {
  const fitted = stationJson(station);
  const verdict = answer.stations.find(({ id }) => id === station.id);
  return { ...fitted, ringKm: fitted.distanceKm, ...verdictJson(verdict) };
}

function verdictJson(verdict: StationVerdict | undefined): Omit<LocatedStationJson, keyof StationJson | "ringKm"> {
  if (verdict === undefined) return { residual: null, belongs: null, leaveOneOutShiftKm: null, clockOffset: null };
  const { residual, belongs, leaveOneOutShiftMetres, clockOffset } = verdict;
  return {
    residual: residual && {
      distanceKm: residual.distanceMetres / METRES_PER_KM,
      timeHours: residual.originSeconds / SECONDS_PER_HOUR,
    },
    belongs,
    leaveOneOutShiftKm: leaveOneOutShiftMetres === null ? null : leaveOneOutShiftMetres / METRES_PER_KM,
    clockOffset: clockOffset && {
      hours: clockOffset.offsetSeconds / SECONDS_PER_HOUR,
      sigmaHours: clockOffset.sigmaSeconds / SECONDS_PER_HOUR,
    },
  };
}

function place({ latitudeDegrees, longitudeDegrees }: Position): PlaceJson {
  return { latitude: latitudeDegrees, longitude: longitudeDegrees };
}
