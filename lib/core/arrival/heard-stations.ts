import { deepWaterTravelSeconds } from "../waves/travel-time.ts";
import { STANDARD_GRAVITY } from "../units/gravity.ts";
import type { Deployment, EventObservations, StationEstimate, StationReading } from "./observations.ts";

/** Of the swell that carries an estimate's storm to its station; periods of 12 to 20 s come within days of it. */
const SWELL_FREQUENCY_HZ = 1 / 14;

/** A station that has readings or an estimate in an event, with the deployment that heard it. */
export interface HeardStation {
  readonly id: string;
  readonly deployment: Deployment;
  readonly readings: readonly StationReading[];
  readonly estimates: readonly StationEstimate[];
}

/**
 * The stations that were heard, in the order in which they stand among the deployments. A station that was moved stands
 * where it did when the swell came in: at the middle of its readings, or, for an estimate, when swell of 14 s that left
 * at the origin time had come its distance. The deployment that covers that time counts, else the nearest before it,
 * else the first.
 */
export function heardStations(observations: EventObservations): HeardStation[] {
  const readings = groupedBy(observations.readings);
  const estimates = groupedBy(observations.estimates);
  return [...groupedBy(observations.deployments)].flatMap(([id, deployments]) => {
    const own = readings.get(id) ?? [];
    const sentIn = estimates.get(id) ?? [];
    const time = sentIn[0] ? arrivalOf(sentIn[0]) : middleOf(own);
    const deployment = time === null ? undefined : deploymentAt(deployments, time);
    return deployment ? [{ id, deployment, readings: own, estimates: sentIn }] : [];
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

function deploymentAt(deployments: readonly Deployment[], epochSeconds: number): Deployment | undefined {
  const covering = deployments.find((d) => (d.fromEpochSeconds ?? -Infinity) <= epochSeconds && epochSeconds < (d.toEpochSeconds ?? Infinity));
  if (covering) return covering;
  const byStart = [...deployments].sort((a, b) => (a.fromEpochSeconds ?? -Infinity) - (b.fromEpochSeconds ?? -Infinity));
  return byStart.filter((d) => (d.fromEpochSeconds ?? -Infinity) <= epochSeconds).at(-1) ?? byStart[0];
}

function arrivalOf({ estimate: { distanceMetres, originEpochSeconds } }: StationEstimate): number {
  return originEpochSeconds + deepWaterTravelSeconds({ frequencyHz: SWELL_FREQUENCY_HZ, distanceMetres, gravity: STANDARD_GRAVITY });
}

function middleOf(readings: readonly StationReading[]): number | null {
  if (readings.length === 0) return null;
  return readings.reduce((sum, { reading }) => sum + reading.arrivalEpochSeconds / readings.length, 0);
}
