import { SECONDS_PER_HOUR } from "#lib/core/units/time.ts";
import { areaWords, distanceWords, type DistanceUnit } from "./distances.ts";
import { figure } from "./figures.ts";
import { counted, listWords } from "./numbers-in-words.ts";
import { hoursFigure } from "./times.ts";

const METRES_PER_KM = 1000;
const SQUARE_METRES_PER_KM2 = 1e6;

/** The difference of two kept answers, as the programming interface gives it. */
export interface KeptDifference {
  readonly outcome: { readonly before: string; readonly after: string };
  readonly shift: { readonly km: number; readonly hours: number } | null;
  readonly region95Km2: { readonly before: number | null; readonly after: number | null };
  readonly stationsIn: readonly string[];
  readonly stationsOut: readonly string[];
  readonly readings: readonly { readonly station: string; readonly changed: number; readonly in: number; readonly out: number }[];
  readonly settings: readonly { readonly name: string; readonly before: number | boolean | null; readonly after: number | boolean | null }[];
  readonly program: { readonly before: string; readonly after: string };
}

/** A sentence for each thing that is different; `nameOf` names a station by its id. */
export function changeWords(difference: KeptDifference, { nameOf, unit }: { nameOf: (id: string) => string; unit: DistanceUnit }): string[] {
  const { stationsIn, stationsOut, settings, program } = difference;
  const named = (ids: readonly string[]): string => listWords(ids.map(nameOf));
  const sentences = [
    ...placeWords(difference, unit),
    ...(stationsOut.length > 0 ? [`Without ${named(stationsOut)}.`] : []),
    ...(stationsIn.length > 0 ? [`With ${named(stationsIn)}.`] : []),
    ...difference.readings.map((of) => `${nameOf(of.station)}: ${readingWords(of)}.`),
    ...settings.map(({ name, before, after }) => `Setting ${name}: ${String(after)}, before ${String(before)}.`),
    ...(program.before === program.after ? [] : [`Worked out by ${program.after}, before by ${program.before}.`]),
  ];
  return sentences.length === 0 ? ["Nothing is different."] : sentences;
}

function placeWords({ outcome, shift, region95Km2 }: KeptDifference, unit: DistanceUnit): string[] {
  const { before, after } = region95Km2;
  return [
    ...(outcome.before === outcome.after ? [] : [`${OUTCOMES[outcome.after] ?? outcome.after}, before: ${(OUTCOMES[outcome.before] ?? outcome.before).toLowerCase()}.`]),
    ...(shift === null || (shift.km === 0 && shift.hours === 0) ? [] : [`The most probable source moved ${distanceWords(shift.km * METRES_PER_KM, unit)} and is ${laterWords(shift.hours)}.`]),
    ...(before === null || after === null || before === after ? [] : [`The 95\u202f% region covers ${areaWords(after * SQUARE_METRES_PER_KM2, unit)}, before ${areaWords(before * SQUARE_METRES_PER_KM2, unit)}.`]),
  ];
}

const OUTCOMES: Readonly<Record<string, string>> = {
  located: "Located",
  several: "Not surely one place",
  "ring-only": "Distance only",
  "too-few": "Distance only",
  "no-agreement": "No common source",
};

function laterWords(hours: number): string {
  if (Math.abs(hours) < 0.05) return "at the same time";
  return `${hoursFigure(Math.abs(hours) * SECONDS_PER_HOUR)}\u00a0h ${hours > 0 ? "later" : "earlier"}`;
}

function readingWords({ changed, in: cameIn, out }: KeptDifference["readings"][number]): string {
  const parts = [
    ...(out > 0 ? [`${counted(out, "reading")} out`] : []),
    ...(cameIn > 0 ? [`${counted(cameIn, "reading")} in`] : []),
    ...(changed > 0 ? [`${figure(changed)} changed`] : []),
  ];
  return listWords(parts);
}
