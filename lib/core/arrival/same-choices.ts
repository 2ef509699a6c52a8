import type { ObservationChoices } from "./observation-choices.ts";

/** Whether two say the same; the order in which things were left out, dropped or moved makes no difference. */
export function sameChoices(some: ObservationChoices, others: ObservationChoices): boolean {
  return some === others || written(some) === written(others);
}

function written({ leftOutStationIds, droppedReadingIds, movedReadings, addedReadings, usesSuspect }: ObservationChoices): string {
  const moved = movedReadings.map((move) => [move.readingId, move.arrivalEpochSeconds, move.frequencyHz]).toSorted(([a = 0], [b = 0]) => a - b);
  const added = addedReadings.map((item) => [item.stationId, item.arrivalEpochSeconds, item.frequencyHz, item.arrivalSigmaSeconds, item.frequencySigmaHz, item.kind]);
  return JSON.stringify([leftOutStationIds.toSorted(), droppedReadingIds.toSorted((a, b) => a - b), moved, added, usesSuspect]);
}
