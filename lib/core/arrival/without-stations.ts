import type { EventObservations } from "./observations.ts";

/** The same observations as if these stations had sent nothing: their deployments stay, their arrivals go. */
export function withoutStations(observations: EventObservations, stationIds: readonly string[]): EventObservations {
  const stays = (part: { readonly stationId: string }): boolean => !stationIds.includes(part.stationId);
  return {
    deployments: observations.deployments,
    readings: observations.readings.filter(stays),
    estimates: observations.estimates.filter(stays),
  };
}
