import { fitDispersionLine } from "../arrival/dispersion-line.ts";
import type { LineOutcome } from "../arrival/line.ts";
import type { Deployment, EventObservations, StationReading } from "../arrival/observations.ts";
import type { Reading } from "../arrival/reading.ts";
import { shelfDelaySeconds } from "../waves/shelf-delay.ts";
import type { EstimationSettings } from "./settings.ts";
import type { StationSolution } from "./solution.ts";

/** A station's line with the readings that made it, as they entered the fit. */
export interface FittedStation extends StationSolution {
  readonly deployment: Deployment;
  readonly readings: readonly Reading[];
}

/**
 * Each station's dispersion line, or the estimate that it sent in, in the order in which stations stand among the
 * deployments. Frequencies of ground motion are halved (a secondary microseism has twice the swell's frequency) and
 * the shelf's delay is taken off the arrival times before the fit.
 */
export function fitStations({ observations, settings }: { readonly observations: EventObservations; readonly settings: EstimationSettings }): FittedStation[] {
  const ids = [...new Set(observations.deployments.map((deployment) => deployment.stationId))];
  const readings = groupedBy(observations.readings);
  const estimates = groupedBy(observations.estimates);
  const deployments = groupedBy(observations.deployments);
  return ids.flatMap((id) => {
    const own = readings.get(id) ?? [];
    const sentIn = estimates.get(id) ?? [];
    if (own.length + sentIn.length === 0) return [];
    const time = sentIn[0]?.estimate.originEpochSeconds ?? middleOf(own);
    const deployment = deploymentAt(deployments.get(id) ?? [], time);
    if (!deployment) return [];
    const entered = own.map(({ reading }) => enteredReading(reading, deployment, settings));
    const outcome = outcomeOf(entered, deployment, sentIn, settings);
    return [{ id, name: deployment.name, position: deployment.position, deployment, readings: entered, outcome }];
  });
}

function groupedBy<T extends { readonly stationId: string }>(items: readonly T[]): Map<string, T[]> {
  const groups = new Map<string, T[]>();
  for (const item of items) {
    const group = groups.get(item.stationId);
    if (group) group.push(item);
    else groups.set(item.stationId, [item]);
  }
  return groups;
}

function outcomeOf(readings: readonly Reading[], deployment: Deployment, sentIn: EventObservations["estimates"], settings: EstimationSettings): LineOutcome {
  const estimate = sentIn[0]?.estimate;
  if (estimate && readings.length > 0) {
    return { kind: "refused", code: "conflicting-input", message: "The station has readings and an estimate of its own as well; bring in one of them." };
  }
  if (estimate && sentIn.length > 1) {
    return { kind: "refused", code: "conflicting-input", message: `The station has ${sentIn.length} estimates for one event; bring in one of them.` };
  }
  if (estimate) return { kind: "sent-in", estimate };
  const outcome = fitDispersionLine(readings, settings);
  if (outcome.kind !== "fitted") return outcome;
  return { kind: "fitted", line: { ...outcome.line, shelfCorrected: deployment.shelf.length > 0 } };
}

/** The reading as the deep sea would have given it. */
function enteredReading(reading: Reading, deployment: Deployment, settings: EstimationSettings): Reading {
  const divisor = deployment.sensor === "ground" ? 2 : 1;
  const frequencyHz = reading.frequencyHz / divisor;
  const delay = deployment.shelf.length > 0 ? shelfDelaySeconds({ frequencyHz, legs: deployment.shelf, gravity: settings.gravity }) : 0;
  return { ...reading, frequencyHz, frequencySigmaHz: reading.frequencySigmaHz / divisor, arrivalEpochSeconds: reading.arrivalEpochSeconds - delay };
}

/** The one that covers the time, else the nearest before it, else the first. */
function deploymentAt(deployments: readonly Deployment[], epochSeconds: number): Deployment | undefined {
  const covering = deployments.find((d) => (d.fromEpochSeconds ?? -Infinity) <= epochSeconds && epochSeconds < (d.toEpochSeconds ?? Infinity));
  if (covering) return covering;
  const byStart = [...deployments].sort((a, b) => (a.fromEpochSeconds ?? -Infinity) - (b.fromEpochSeconds ?? -Infinity));
  return byStart.filter((d) => (d.fromEpochSeconds ?? -Infinity) <= epochSeconds).at(-1) ?? byStart[0];
}

function middleOf(readings: readonly StationReading[]): number {
  return readings.reduce((sum, { reading }) => sum + reading.arrivalEpochSeconds / readings.length, 0);
}
