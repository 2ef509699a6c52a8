import { trueEpochSeconds } from "./clock-correction.ts";
import type { GatheredObservations, GatheredReading } from "./gathered-observations.ts";
import type { LineNote } from "./line.ts";
import type { ObservationChoices } from "./observation-choices.ts";
import { isUsable } from "./quality.ts";
import type { Reading } from "./reading.ts";

/**
 * What flags and clocks changed between what was gathered and what is used, in notes for each station. Readings that
 * the analyst dropped are no matter for a note, and those that were moved stand in true time already.
 */
export function gatheringNotes(gathered: GatheredObservations, choices: ObservationChoices): LineNote[] {
  const ids = [...new Set(gathered.readings.map(({ stationId }) => stationId))].filter((id) => !choices.leftOutStationIds.includes(id));
  const dropped = new Set(choices.droppedReadingIds);
  const moved = new Set(choices.movedReadings.map(({ readingId }) => readingId));
  return ids.flatMap((id) => {
    const own = gathered.readings.filter((item) => item.stationId === id && !dropped.has(item.id));
    const used = own.filter(({ quality }) => isUsable(quality, choices));
    return [...flagNotes(id, own, choices), ...clockNotes(id, used, moved, gathered)];
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

function clockNotes(id: string, used: readonly GatheredReading[], moved: ReadonlySet<number>, { clockCorrections }: GatheredObservations): LineNote[] {
  const isCorrected = ({ arrivalEpochSeconds }: Reading): boolean => trueEpochSeconds(clockCorrections, id, arrivalEpochSeconds) !== arrivalEpochSeconds;
  const corrected = used.filter((item) => !moved.has(item.id) && isCorrected(item.reading)).length;
  if (corrected === 0) return [];
  return [{ code: "clock-corrected", message: `${id}: the known error of its clock was taken off the times of ${corrected} of ${used.length} readings.` }];
}
