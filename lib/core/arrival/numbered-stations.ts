import { heardStations } from "./heard-stations.ts";
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
 * change when a station is left out. A station that was moved has the name and place at which it heard this event.
 */
export function numberedStations(observations: EventObservations): NumberedStation[] {
  return heardStations(observations).map(({ id, deployment: { name, position } }, index) => ({ number: index + 1, id, name, position }));
}
