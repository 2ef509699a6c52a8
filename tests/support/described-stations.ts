import fc from "fast-check";
import type { ClockCorrection } from "#lib/core/arrival/gathered-observations.ts";
import type { Deployment } from "#lib/core/arrival/observations.ts";
import { VISIBILITIES, type StationDescription } from "#lib/core/arrival/station-description.ts";
import { DOI, isLine, isNote, isReason, isStationId, tidy } from "#lib/core/arrival/station-limits.ts";

/** What spreadsheets, CSV and Unicode are known to trip over. */
const AWKWARD = ["=1+1", "+44 20", "-x", "@sum", "'=x", "''-", "'quoted'", "\"", "a,b", "a;b", "日本 語", "e\u0301", "🌊", "\u00a0x", "#", "|", "null"];
const words = fc.oneof(fc.string({ unit: "grapheme", maxLength: 20 }), fc.constantFrom(...AWKWARD), fc.tuple(fc.constantFrom(...AWKWARD), fc.string({ maxLength: 8 })).map(([first, rest]) => first + rest));
const line = words.map(tidy).filter((text) => isLine(text, 80));
/** Plain objects only, as everything else makes them. */
function record<Value>(model: { [Key in keyof Value]: fc.Arbitrary<Value[Key]> }): fc.Arbitrary<Value> {
  return fc.record<Value>(model, { noNullPrototype: true });
}
const orNull = <Value>(value: fc.Arbitrary<Value>): fc.Arbitrary<Value | null> => fc.option(value, { nil: null });
const note = fc.array(words, { maxLength: 4 }).map((lines) => tidy(lines.join("\n"))).filter(isNote);
const double = (min: number, max: number): fc.Arbitrary<number> => fc.double({ min, max, noNaN: true }).map((value) => value + 0);
/** Between 1901 and 2100: whole seconds and thousandths, put together as a reader of files does it. */
const moment = fc.tuple(fc.integer({ min: -2_177_452_800, max: 4_102_444_800 }), fc.oneof(fc.constant(0), fc.integer({ min: 0, max: 999 }))).map(([seconds, thousandths]) => seconds + thousandths / 1000);

const legs = fc.array(record({ lengthMetres: double(1e-7, 2e7), depthMetres: double(1e-7, 12_000) }), { maxLength: 4 });

/** Spans one after another, of which the first may have no start and the last no end. */
function spans(least: number) {
  return fc.tuple(fc.uniqueArray(moment, { minLength: 2 * Math.max(1, least), maxLength: 8 }), fc.boolean(), fc.boolean()).map(([moments, opensFirst, opensLast]) => {
    const inOrder = moments.toSorted((a, b) => a - b);
    const pairs = Array.from({ length: Math.floor(inOrder.length / 2) }, (_, place) => ({ fromEpochSeconds: inOrder[2 * place] ?? null, toEpochSeconds: inOrder[2 * place + 1] ?? null }));
    return pairs.map((span, place) => ({
      fromEpochSeconds: opensFirst && place === 0 ? null : span.fromEpochSeconds,
      toEpochSeconds: opensLast && place === pairs.length - 1 ? null : span.toEpochSeconds,
    }));
  });
}

function deployment(stationId: string): fc.Arbitrary<Omit<Deployment, "fromEpochSeconds" | "toEpochSeconds">> {
  return record({
    stationId: fc.constant(stationId),
    name: line,
    position: record({ latitudeDegrees: double(-90, 90), longitudeDegrees: double(-180, 180) }),
    depthMetres: orNull(double(1e-9, 12_000)),
    sensor: fc.constantFrom("surface" as const, "pressure" as const, "ground" as const),
    exposure: orNull(record({ facesFromDegrees: double(0, 360), facesToDegrees: double(0, 360) })),
    recordMinutes: orNull(double(1e-3, 1e6)),
    stamp: fc.constantFrom("start" as const, "middle" as const, "end" as const, null),
    timeZone: fc.constantFrom("Pacific/Honolulu", "Europe/Lisbon", "UTC", null),
    shelf: legs,
  });
}

function corrections(stationId: string): fc.Arbitrary<ClockCorrection[]> {
  const rest = record({
    fastBySeconds: fc.oneof(fc.integer({ min: -86_400, max: 86_400 }), double(-1e9, 1e9)).filter((seconds) => seconds !== 0),
    reason: line.filter((text) => isReason(text)),
  });
  return spans(0).chain((own) => fc.array(rest, { minLength: own.length, maxLength: own.length }).map((rests) => own.map((span, place) => ({ stationId, ...span, ...(rests[place] ?? { fastBySeconds: 1, reason: "x" }) }))));
}

function station(id: string, place: number): fc.Arbitrary<StationDescription> {
  const own = spans(1).chain((given) => fc.tuple(...given.map((span) => deployment(id).map((one): Deployment => ({ ...one, ...span })))));
  return record({
    id: fc.constant(id),
    groupId: line,
    aliases: fc.uniqueArray(fc.integer({ min: 0, max: 99 }), { maxLength: 3 }).map((numbers) => numbers.map((number) => ({ scheme: number % 2 === 0 ? "wmo" : "port-2", value: `${place}:=${number}é` }))),
    deployments: own,
    clockCorrections: fc.oneof(fc.constant([]), corrections(id)),
    licence: orNull(line),
    attribution: orNull(line),
    contact: orNull(line),
    doi: orNull(fc.constantFrom("10.1234/a", "10.99999/é(b)<c>;\"d\",").filter((doi) => DOI.test(doi))),
    visibility: fc.constantFrom(...VISIBILITIES),
    embargoUntilEpochSeconds: orNull(moment),
    note,
  });
}

/** Stations as a register may hold them, each with an id and aliases of its own. */
export const describedStations: fc.Arbitrary<StationDescription[]> = fc
  .uniqueArray(line.filter(isStationId), { minLength: 1, maxLength: 5 })
  .chain((ids) => fc.tuple(...ids.map(station)));
