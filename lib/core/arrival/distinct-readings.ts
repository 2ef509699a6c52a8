import type { LineNote } from "./line.ts";
import type { Reading } from "./reading.ts";

const GROUPS_NAMED = 20;

/**
 * Readings in order of frequency, those of one time, frequency and kind taken as one. Where such readings state other
 * errors the largest counts, whichever stood first, and a note names their rows.
 */
export function distinctReadings(readings: readonly Reading[]): { readings: readonly Reading[]; notes: readonly LineNote[] } {
  const groups = new Map<string, Reading[]>();
  for (const reading of readings) {
    const key = `${reading.arrivalEpochSeconds} ${reading.frequencyHz} ${reading.kind}`;
    const alike = groups.get(key);
    if (alike === undefined) groups.set(key, [reading]);
    else alike.push(reading);
  }
  const ordered = [...groups.values()].map(asOne).sort((a, b) => byPlace(a.reading, b.reading));
  const repeated = ordered.map(({ rows }) => rows).filter((rows) => rows.length > 1);
  return { readings: ordered.map(({ reading }) => reading), notes: repeated.length === 0 ? [] : [countedOnce(repeated)] };
}

function asOne(alike: readonly Reading[]): { reading: Reading; rows: readonly number[] } {
  const rows = [...new Set(alike.map(({ row }) => row))].sort((a, b) => a - b);
  const [widest] = [...alike].sort(widestFirst);
  if (widest === undefined) throw new Error("A group of readings holds at least the one that it was made for.");
  const frequencySigmaHz = alike.reduce((largest, reading) => Math.max(largest, reading.frequencySigmaHz), 0);
  return { reading: { ...widest, frequencySigmaHz, row: rows[0] ?? widest.row }, rows };
}

/** By what the readings say and never by where they stood. */
function widestFirst(a: Reading, b: Reading): number {
  return (
    b.arrivalSigmaSeconds - a.arrivalSigmaSeconds ||
    (b.bearing?.sigmaDegrees ?? 0) - (a.bearing?.sigmaDegrees ?? 0) ||
    (a.bearing?.comesFromDegrees ?? 0) - (b.bearing?.comesFromDegrees ?? 0)
  );
}

function byPlace(a: Reading, b: Reading): number {
  return a.frequencyHz - b.frequencyHz || a.arrivalEpochSeconds - b.arrivalEpochSeconds || a.kind.localeCompare(b.kind);
}

function countedOnce(repeated: readonly (readonly number[])[]): LineNote {
  const named = repeated.slice(0, GROUPS_NAMED).map((rows) => `rows ${rows.slice(0, -1).join(", ")} and ${rows.at(-1)}`).join("; ");
  const more = repeated.length > GROUPS_NAMED ? `; and ${repeated.length - GROUPS_NAMED} more such groups` : "";
  return {
    code: "readings-alike",
    message: `Readings of one time and one frequency count once, with the largest of their errors: ${named}${more}.`,
  };
}
