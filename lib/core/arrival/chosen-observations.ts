import { trueEpochSeconds } from "./clock-correction.ts";
import type { GatheredObservations, GatheredReading } from "./gathered-observations.ts";
import type { AddedReading, ObservationChoices } from "./observation-choices.ts";
import type { EventObservations, StationReading } from "./observations.ts";
import { isUsable } from "./quality.ts";

/**
 * The observations that an answer is worked out from: what was gathered, on a true clock, without what its flags or the
 * analyst ruled out, with what the analyst moved and added. Added readings are numbered on from the station's own rows.
 */
export function chosenObservations(gathered: GatheredObservations, choices: ObservationChoices): EventObservations {
  const leftOut = new Set(choices.leftOutStationIds);
  const dropped = new Set(choices.droppedReadingIds);
  const stays = ({ stationId }: { readonly stationId: string }): boolean => !leftOut.has(stationId);
  const isUsed = (item: GatheredReading): boolean => stays(item) && isUsable(item.quality, choices) && !dropped.has(item.id);
  const moved = new Map(choices.movedReadings.map((move) => [move.readingId, move]));
  const placed = ({ id, stationId, reading }: GatheredReading): StationReading => {
    const move = moved.get(id);
    const arrivalEpochSeconds = move?.arrivalEpochSeconds ?? trueEpochSeconds(gathered.clockCorrections, stationId, reading.arrivalEpochSeconds);
    return { stationId, reading: { ...reading, arrivalEpochSeconds, frequencyHz: move?.frequencyHz ?? reading.frequencyHz } };
  };
  return {
    deployments: gathered.deployments,
    readings: [...gathered.readings.filter(isUsed).map(placed), ...addedReadings(gathered, choices.addedReadings.filter(stays))],
    estimates: gathered.estimates.filter(stays).map(({ stationId, row, estimate }) => ({ stationId, row, estimate })),
  };
}

function addedReadings({ readings }: GatheredObservations, added: readonly AddedReading[]): StationReading[] {
  const lastRow = new Map<string, number>();
  for (const { stationId, reading } of readings) lastRow.set(stationId, Math.max(lastRow.get(stationId) ?? 0, reading.row));
  return added.map(({ stationId, ...measured }) => {
    const row = (lastRow.get(stationId) ?? 0) + 1;
    lastRow.set(stationId, row);
    return { stationId, reading: { ...measured, row, bearing: null } };
  });
}
