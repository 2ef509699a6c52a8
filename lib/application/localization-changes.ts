import type { EventObservations } from "#lib/core/arrival/observations.ts";
import type { Reading } from "#lib/core/arrival/reading.ts";
import { geodesicInverse } from "#lib/core/geodesy/geodesic.ts";
import type { LocateJson } from "#lib/contracts/locate-json.ts";
import type { LocalizationChanges } from "#lib/contracts/api/localizations.ts";
import { settingDifferences } from "#lib/contracts/setting-differences.ts";
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
    settings: settingDifferences(was.settings, is.settings),
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

/**
 * Readings that say the same are the same, whatever their rows. Of the rest those of one row are one reading that was
 * changed: moved by hand, or its time corrected.
 */
function readingChanges(station: string, had: EventObservations, has: EventObservations): LocalizationChanges["readings"] {
  const [before, after] = [had, has].map(({ readings }) => readings.filter(({ stationId }) => stationId === station).map(({ reading }) => reading));
  const wentOut = withoutAlike(before ?? [], after ?? []);
  const cameIn = withoutAlike(after ?? [], before ?? []);
  const rows = new Set(wentOut.map(({ row }) => row));
  const changed = cameIn.filter(({ row }) => rows.has(row)).length;
  return wentOut.length + cameIn.length === 0 ? [] : [{ station, changed, in: cameIn.length - changed, out: wentOut.length - changed }];
}

/** Those of `some` for which `others` has no counterpart, each counterpart counted once. */
function withoutAlike(some: readonly Reading[], others: readonly Reading[]): Reading[] {
  const left = new Map<string, number>();
  for (const reading of others) left.set(contentOf(reading), (left.get(contentOf(reading)) ?? 0) + 1);
  return some.filter((reading) => {
    const count = left.get(contentOf(reading)) ?? 0;
    left.set(contentOf(reading), count - 1);
    return count <= 0;
  });
}

function contentOf({ arrivalEpochSeconds, frequencyHz, arrivalSigmaSeconds, frequencySigmaHz, kind, bearing }: Reading): string {
  return JSON.stringify([arrivalEpochSeconds, frequencyHz, arrivalSigmaSeconds, frequencySigmaHz, kind, bearing]);
}
