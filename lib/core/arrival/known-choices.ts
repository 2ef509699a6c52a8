import type { GatheredObservations } from "./gathered-observations.ts";
import type { ObservationChoices } from "./observation-choices.ts";

/** Choices without what names stations and readings that the event does not have, or does not have any more. */
export function knownChoices(choices: ObservationChoices, { deployments, readings }: GatheredObservations): ObservationChoices {
  const stations = new Set(deployments.map(({ stationId }) => stationId));
  const known = new Set(readings.map(({ id }) => id));
  return {
    leftOutStationIds: choices.leftOutStationIds.filter((id) => stations.has(id)),
    droppedReadingIds: choices.droppedReadingIds.filter((id) => known.has(id)),
    movedReadings: choices.movedReadings.filter(({ readingId }) => known.has(readingId)),
    addedReadings: choices.addedReadings.filter(({ stationId }) => stations.has(stationId)),
    usesSuspect: choices.usesSuspect,
  };
}
