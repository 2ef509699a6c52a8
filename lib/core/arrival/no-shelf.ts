import type { LineNote, LineOutcome } from "./line.ts";

const STATIONS_NAMED = 20;

/** One note that names the stations whose readings came over a shelf, or none, that nobody described. */
export function noShelfNotes(stations: readonly { readonly id: string; readonly outcome: LineOutcome }[]): LineNote[] {
  const ids = stations.filter(({ outcome }) => outcome.kind === "fitted" && !outcome.line.shelfCorrected).map(({ id }) => id);
  if (ids.length === 0) return [];
  const named = ids.slice(0, STATIONS_NAMED).join(", ") + (ids.length > STATIONS_NAMED ? ` and ${ids.length - STATIONS_NAMED} more` : "");
  return [{ code: "no-shelf", message: `No shelf profile is known, and so no delay over the shelf was taken off: ${named}.` }];
}
