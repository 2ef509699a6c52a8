import type { EventObservations, StationReading } from "#lib/core/arrival/observations.ts";
import { geodesicInverse } from "#lib/core/geodesy/geodesic.ts";
import type { LocateJson } from "#lib/contracts/locate-json.ts";
import type { LocalizationChanges } from "#lib/contracts/api/localizations.ts";
import type { StoredLocalization } from "./ports.ts";

const METRES_PER_KM = 1000;
const MS_PER_HOUR = 3_600_000;

/** What is different between two answers that were kept of one event, from the copies that each holds of what made it. */
export function localizationChanges(before: StoredLocalization, after: StoredLocalization): LocalizationChanges {
  const [was, is] = [before, after].map(({ answerJson }) => JSON.parse(answerJson) as LocateJson);
  const [had, has] = [before, after].map(({ inputJson }) => JSON.parse(inputJson) as EventObservations);
  if (was === undefined || is === undefined || had === undefined || has === undefined) throw new Error("Two answers are compared.");
  const [stationsBefore, stationsAfter] = [heard(had), heard(has)];
  return {
    ...{ from: before.number, to: after.number },
    outcome: { before: was.outcome, after: is.outcome },
    shift: was.source && is.source && shiftOf(was.source, is.source),
    region95Km2: { before: area95(was), after: area95(is) },
    stationsIn: stationsAfter.filter((id) => !stationsBefore.includes(id)),
    stationsOut: stationsBefore.filter((id) => !stationsAfter.includes(id)),
    readings: stationsAfter.filter((id) => stationsBefore.includes(id)).flatMap((id) => readingChanges(id, had, has)),
    settings: differences(was.settings, is.settings),
    program: { before: before.program, after: after.program },
  };
}

type Source = NonNullable<LocateJson["source"]>;

function shiftOf(a: Source, b: Source): NonNullable<LocalizationChanges["shift"]> {
  const [from, to] = [a, b].map(({ latitude, longitude }) => ({ latitudeDegrees: latitude, longitudeDegrees: longitude }));
  if (from === undefined || to === undefined) throw new Error("A shift has two ends.");
  return { km: geodesicInverse({ from, to }).distanceMetres / METRES_PER_KM, hours: (Date.parse(b.time) - Date.parse(a.time)) / MS_PER_HOUR };
}

function area95({ regions }: LocateJson): number | null {
  return regions.find(({ probability }) => probability === 0.95)?.areaKm2 ?? null;
}

/** In the order of the deployments. */
function heard({ deployments, readings, estimates }: EventObservations): string[] {
  const ids = new Set([...readings, ...estimates].map(({ stationId }) => stationId));
  return [...new Set(deployments.map(({ stationId }) => stationId))].filter((id) => ids.has(id));
}

/** A reading that was moved, or whose time was corrected, is one that went out and one that came in: it counts as changed. */
function readingChanges(station: string, had: EventObservations, has: EventObservations): LocalizationChanges["readings"] {
  const [before, after] = [had, has].map(({ readings }) => readings.filter(({ stationId }) => stationId === station).map(keyOf));
  const wentOut = (before ?? []).filter((key) => after?.includes(key) !== true).length;
  const cameIn = (after ?? []).filter((key) => before?.includes(key) !== true).length;
  const changed = Math.min(wentOut, cameIn);
  return wentOut + cameIn === 0 ? [] : [{ station, changed, in: cameIn - changed, out: wentOut - changed }];
}

function keyOf({ reading }: StationReading): string {
  const { arrivalEpochSeconds, frequencyHz, kind, arrivalSigmaSeconds, frequencySigmaHz } = reading;
  return JSON.stringify([arrivalEpochSeconds, frequencyHz, kind, arrivalSigmaSeconds, frequencySigmaHz]);
}

/** Settings whose values differ, by their address. */
function differences(before: object, after: object): LocalizationChanges["settings"] {
  const [was, is] = [leaves(before), leaves(after)];
  return [...new Set([...was.keys(), ...is.keys()])].filter((name) => was.get(name) !== is.get(name)).map((name) => ({ name, before: was.get(name) ?? null, after: is.get(name) ?? null }));
}

function leaves(settings: object, before = ""): Map<string, number | boolean> {
  const entries = Object.entries(settings) as [string, unknown][];
  return new Map(
    entries.flatMap(([name, value]): [string, number | boolean][] => {
      if (typeof value === "number" || typeof value === "boolean") return [[before + name, value]];
      return typeof value === "object" && value !== null ? [...leaves(value, `${before}${name}.`)] : [];
    }),
  );
}
