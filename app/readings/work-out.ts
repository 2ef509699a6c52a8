import { isBlank, readRow, type ReadRow } from "#lib/contracts/hand-readings/hand-row.ts";
import type { Draft } from "#lib/contracts/hand-readings/draft.ts";
import { readPlaced, shoreDeployment, type ReadPlaced } from "#lib/contracts/hand-readings/placed-station.ts";
import type { ChartWindow } from "#lib/chart/chart-window.ts";
import type { Deployment } from "#lib/core/arrival/observations.ts";
import { outcomeEstimate } from "#lib/core/arrival/outcome-estimate.ts";
import { ringSigmas } from "#lib/core/source/ring-sigma.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";
import type { Position } from "#lib/core/units/position.ts";
import { fitReadings, type Findings, type NumberedReading, type StationAtHand } from "./fit-readings.ts";
import type { StationChoice } from "./station-choice.ts";

/** All that follows from what stands in the form at this moment. */
export interface WorkedOut {
  readonly chosen: StationChoice | null;
  readonly placed: ReadPlaced;
  /** Of the station, at the readings' time. */
  readonly deployment: Deployment | null;
  /** That clock times are read in, */
  readonly zone: string;
  /** and the one that could be chosen. */
  readonly stationZone: string | null;
  readonly reads: readonly ReadRow[];
  /** Rows that are not blank. */
  readonly typed: number;
  readonly readings: readonly NumberedReading[];
  readonly findings: Findings;
  readonly mark: { readonly name: string; readonly position: Position } | null;
  readonly window: ChartWindow;
  readonly ring: { readonly centre: Position; readonly radiusMetres: number; readonly sigmaMetres: number } | null;
}

/** Readings say how far before anybody has said where. */
const NOWHERE = shoreDeployment({ id: "", name: "", position: { latitudeDegrees: 0, longitudeDegrees: 0 }, timeZone: null });

export function workOut(draft: Draft, stations: readonly StationChoice[], settings: EstimationSettings): WorkedOut {
  const isNew = draft.station.way === "new";
  const chosen = isNew ? null : (stations.find(({ id }) => id === draft.station.id) ?? null);
  const placed = readPlaced(draft.station.placed);
  const stationZone = isNew ? placed.timeZone : (chosen?.deployments.at(-1)?.timeZone ?? null);
  const zone = draft.clock === "station" && stationZone !== null ? stationZone : "UTC";
  const reads = draft.rows.map((row) => readRow(row, zone));
  const readings = reads.flatMap(({ reading }, i) => (reading === null ? [] : [{ number: i + 1, reading }]));

  const atHand = chosen ?? stationPlaced(draft, placed);
  const findings = fitReadings(atHand, readings, settings);
  const isSomewhere = chosen !== null || placed.position !== null;
  const deployment = isSomewhere ? (findings.fitted?.deployment ?? atHand.deployments.at(-1) ?? null) : null;
  return {
    ...{ chosen, placed, deployment, zone, stationZone, reads, readings, findings },
    typed: draft.rows.filter((row) => !isBlank(row)).length,
    mark: deployment && { name: deployment.name, position: deployment.position },
    window: windowFor(deployment),
    ring: deployment && ringOf(findings, deployment, settings),
  };
}

function stationPlaced({ station }: Draft, { position, timeZone }: ReadPlaced): StationAtHand {
  const { id } = station.placed;
  const there = station.way === "new" && position !== null ? shoreDeployment({ id, name: id, position, timeZone }) : { ...NOWHERE, stationId: id };
  return { id, deployments: [there], clockCorrections: [] };
}

const WINDOW_STEP_DEGREES = 30;

/** In steps, so that a station that is being placed does not have the whole map drawn anew each time. */
function windowFor(deployment: Deployment | null): ChartWindow {
  const longitude = deployment?.position.longitudeDegrees ?? 0;
  return { centreLongitudeDegrees: Math.round(longitude / WINDOW_STEP_DEGREES) * WINDOW_STEP_DEGREES };
}

function ringOf({ fitted }: Findings, { position }: Deployment, settings: EstimationSettings): WorkedOut["ring"] {
  const estimate = fitted === null ? null : outcomeEstimate(fitted.outcome);
  if (estimate === null) return null;
  const { distanceSigmaMetres } = ringSigmas({ estimate, settings, spreadRaisedBy: 1 });
  return { centre: position, radiusMetres: estimate.distanceMetres, sigmaMetres: distanceSigmaMetres };
}
