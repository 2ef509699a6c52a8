import type { Deployment } from "#lib/core/arrival/observations.ts";
import type { Problems } from "./problems.ts";

interface PlacedDeployment {
  readonly deployment: Deployment;
  readonly row: number;
}

/** Adds a problem for each deployment that begins before an earlier one of the same station has ended. */
export function reportOverlaps({ placed, problems }: { placed: readonly PlacedDeployment[]; problems: Problems }): void {
  const ofStation = new Map<string, PlacedDeployment[]>();
  for (const one of placed) {
    const list = ofStation.get(one.deployment.stationId);
    if (list === undefined) ofStation.set(one.deployment.stationId, [one]);
    else list.push(one);
  }
  for (const [stationId, deployments] of ofStation) {
    const inTime = deployments.toSorted((a, b) => startOf(a) - startOf(b) || a.row - b.row);
    inTime.reduce((latest, next) => {
      if (startOf(next) < endOf(latest)) problems.add(overlap(stationId, latest, next));
      return endOf(next) > endOf(latest) ? next : latest;
    });
  }
}

function overlap(stationId: string, a: PlacedDeployment, b: PlacedDeployment) {
  const [earlierRow, laterRow] = a.row < b.row ? [a.row, b.row] : [b.row, a.row];
  const wanted = `deployments of one station that do not overlap in time, told apart by from and to; this one overlaps row ${earlierRow}`;
  return { code: "overlapping-deployments", row: laterRow, column: "id", found: stationId, wanted };
}

function startOf({ deployment }: PlacedDeployment): number {
  return deployment.fromEpochSeconds ?? Number.NEGATIVE_INFINITY;
}

function endOf({ deployment }: PlacedDeployment): number {
  return deployment.toEpochSeconds ?? Number.POSITIVE_INFINITY;
}
