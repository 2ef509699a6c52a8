import type { EventObservations } from "./observations.ts";
import type { Position } from "../units/position.ts";

/** A station of an event with the number that stands for it on the chart, in its row and in every sentence. */
export interface NumberedStation {
  readonly number: number;
  readonly id: string;
  readonly name: string;
  readonly position: Position;
}

/**
 * The stations that have readings or an estimate in this event, in the order of the deployments. The numbers do not
 * change when a station is left out. Where a station has several deployments its first one gives the name and place.
 */
export function numberedStations(observations: EventObservations): NumberedStation[] {
  const heard = new Set([...observations.readings, ...observations.estimates].map(({ stationId }) => stationId));
  const first = new Map<string, Omit<NumberedStation, "number">>();
  for (const { stationId, name, position } of observations.deployments) {
    if (heard.has(stationId) && !first.has(stationId)) first.set(stationId, { id: stationId, name, position });
  }
  return [...first.values()].map((station, index) => ({ number: index + 1, ...station }));
}
