import { byStation } from "#lib/core/arrival/by-station.ts";
import type { Deployment } from "#lib/core/arrival/observations.ts";
import { overlappingSpans } from "#lib/core/arrival/overlapping-spans.ts";
import type { Problems } from "./problems.ts";

interface PlacedDeployment {
  readonly deployment: Deployment;
  readonly row: number;
}

/** Adds a problem for each deployment that begins before an earlier one of the same station has ended. */
export function reportOverlaps({ placed, problems }: { placed: readonly PlacedDeployment[]; problems: Problems }): void {
  for (const [stationId, own] of byStation(placed, ({ deployment }) => deployment.stationId)) {
    for (const { earlier, later } of overlappingSpans(own.map(({ deployment }) => deployment))) {
      const [firstRow = 0, secondRow = 0] = [own[earlier]?.row ?? 0, own[later]?.row ?? 0].sort((a, b) => a - b);
      const wanted = `deployments of one station that do not overlap in time, told apart by from and to; this one overlaps row ${firstRow}`;
      problems.add({ code: "overlapping-deployments", row: secondRow, column: "id", found: stationId, wanted });
    }
  }
}
