import { trueEpochSeconds } from "./clock-correction.ts";
import type { GatheredObservations, GatheredReading } from "./gathered-observations.ts";
import type { LineNote } from "./line.ts";
import type { ObservationChoices } from "./observation-choices.ts";

/** What was left aside or changed between what was gathered and what is used, for flags and clocks: a note a station. */
export function gatheringNotes(gathered: GatheredObservations, choices: ObservationChoices): LineNote[] {
  const ids = [...new Set(gathered.readings.map(({ stationId }) => stationId))].filter((id) => !choices.leftOutStationIds.includes(id));
  return ids.flatMap((id) => {
    const own = gathered.readings.filter(({ stationId }) => stationId === id);
    return [...flagNotes(id, own, choices), ...clockNotes(id, own, gathered)];
  });
}

function flagNotes(id: string, own: readonly GatheredReading[], { usesSuspect }: ObservationChoices): LineNote[] {
  const unusable = own.filter(({ quality }) => quality === 4 || quality === 9).length;
  const suspect = own.filter(({ quality }) => quality === 3).length;
  return [
    ...(unusable > 0 ? [{ code: "readings-unusable", message: `${id}: ${counted(unusable)} flagged bad or missing and not used.` }] : []),
    ...(suspect > 0 && usesSuspect ? [{ code: "readings-suspect", message: `${id}: ${counted(suspect)} flagged suspect and used all the same, as was asked.` }] : []),
    ...(suspect > 0 && !usesSuspect ? [{ code: "readings-suspect", message: `${id}: ${counted(suspect)} flagged suspect and not used.` }] : []),
  ];
}

function counted(count: number): string {
  return count === 1 ? "1 reading is" : `${count} readings are`;
}

function clockNotes(id: string, own: readonly GatheredReading[], { clockCorrections }: GatheredObservations): LineNote[] {
  const shifts = own.map(({ reading: { arrivalEpochSeconds } }) => arrivalEpochSeconds - trueEpochSeconds(clockCorrections, id, arrivalEpochSeconds));
  const corrected = shifts.filter((shift) => shift !== 0).length;
  if (corrected === 0) return [];
  return [{ code: "clock-corrected", message: `${id}: the known error of its clock was taken off the times of ${corrected} of ${own.length} readings.` }];
}
