import type { EventObservations } from "#lib/core/arrival/observations.ts";
import { numberedStations } from "#lib/core/arrival/numbered-stations.ts";
import { buildSightTable } from "#lib/core/geodesy/build-sight-table.ts";
import type { LandMask } from "#lib/core/geodesy/land-mask.ts";
import type { SightTable } from "#lib/core/geodesy/sight-table.ts";

/** How far each station of an event sees, by its id. */
export function sightOfStations(observations: EventObservations, land: LandMask): Map<string, SightTable> {
  return new Map(
    numberedStations(observations).map(({ id, position }) => [id, buildSightTable({ station: position, land })]),
  );
}
