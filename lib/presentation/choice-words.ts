import type { ObservationChoices } from "#lib/core/arrival/observation-choices.ts";
import { counted, listWords } from "./numbers-in-words.ts";

/** "2 readings dropped, 1 moved and 1 added": what was chosen of the readings; null where nothing was. */
export function readingChoiceWords({ droppedReadingIds, movedReadings, addedReadings, usesSuspect }: ObservationChoices): string | null {
  const counts = [
    [droppedReadingIds.length, "dropped"],
    [movedReadings.length, "moved"],
    [addedReadings.length, "added"],
  ] as const;
  const made = counts.filter(([count]) => count > 0);
  const parts = made.map(([count, what], place) => (place === 0 ? `${counted(count, "reading")} ${what}` : `${count} ${what}`));
  if (usesSuspect) parts.push("readings flagged suspect used");
  return parts.length === 0 ? null : listWords(parts);
}
