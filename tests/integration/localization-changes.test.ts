import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { keepLocalization } from "#lib/application/keep-localization.ts";
import { createLand } from "#lib/application/land.ts";
import { localizationChanges } from "#lib/application/localization-changes.ts";
import { readLandTopology } from "#lib/application/shipped-files.ts";
import type { LocalizationChanges } from "#lib/contracts/api/localizations.ts";
import { readSettings } from "#lib/contracts/settings.ts";
import { NO_CHOICES, type ObservationChoices } from "#lib/core/arrival/observation-choices.ts";
import { readEventFiles } from "#lib/records/event-files.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { temporaryStore } from "#tests/support/temporary-store.ts";

const host = { program: "offing test", land: createLand({ readTopology: () => readLandTopology({ packageRoot: process.cwd() }) }) };
const read = (fileName: string) => ({ fileName, text: readFileSync(`fixtures/scenarios/demo/${fileName}`, "utf8") });
const DOING = { actor: "test", savedEpochSeconds: 1_700_000_000 };

/** The demo's event of two stations, nine readings each, with a way to keep answers of it and to compare them. */
async function keptEvent() {
  const { store } = await temporaryStore();
  const { value } = readEventFiles({ stations: read("stations.csv"), readings: read("tern/readings.csv"), arrivals: null });
  const heard = new Set(value.readings.map(({ stationId }) => stationId));
  const observations = { ...value, deployments: value.deployments.filter(({ stationId }) => heard.has(stationId)) };
  await store.saveEvent({ id: "tern", title: "Tern", note: "", observations, ...DOING });
  const kept = { number: 0 };
  const keep = async (choices: Partial<ObservationChoices>, settings: unknown = {}): Promise<number> => {
    const wanted = { eventId: "tern", choices: { ...NO_CHOICES, ...choices }, settings: readSettings(settings), reason: "", startedFrom: kept.number, eventRevision: null, ...DOING };
    kept.number = (await keepLocalization({ events: store, localizations: store, host }, wanted)).number;
    return kept.number;
  };
  const compare = async (from: number, to: number): Promise<LocalizationChanges> => {
    const [before, after] = [await store.loadLocalization("tern", from), await store.loadLocalization("tern", to)];
    if (before === null || after === null) throw new Error("Both were kept.");
    return localizationChanges(before, after);
  };
  const readings = (await store.loadEvent("tern"))?.observations.readings ?? [];
  return { store, keep, compare, readings };
}

describe("what changed between two kept answers", () => {
  test("is nothing where nothing was chosen otherwise, and each thing where it was", async () => {
    const { keep, compare, readings } = await keptEvent();
    const [first, second, third] = readings;
    if (first === undefined || second === undefined || third === undefined) throw new Error("The event has readings.");
    const station = first.stationId;
    const moved = { readingId: third.id, arrivalEpochSeconds: third.reading.arrivalEpochSeconds + 3600, frequencyHz: third.reading.frequencyHz };
    await keep({});
    await keep({});
    await keep({ droppedReadingIds: [first.id], movedReadings: [moved] });
    await keep({ droppedReadingIds: [second.id] }, { spread: { timeHours: 9 } });

    expect(await compare(1, 2)).toMatchObject({ shift: { km: 0, hours: 0 }, stationsIn: [], stationsOut: [], readings: [], settings: [] });
    expect((await compare(1, 3)).readings).toStrictEqual([{ station, changed: 1, in: 0, out: 1 }]);
    const last = await compare(3, 4);
    expect(last.readings).toStrictEqual([{ station, changed: 1, in: 1, out: 1 }]);
    expect(last.settings).toStrictEqual([{ name: "spread.timeHours", before: 6, after: 9 }]);
    // There and back is the same way.
    const [there, back] = [await compare(1, 4), await compare(4, 1)];
    expectWithin(back.shift?.km ?? NaN, there.shift?.km ?? NaN, { absolute: 1e-9, unit: "km", because: "a geodesic is as long both ways" });
    expectWithin(back.shift?.hours ?? NaN, -(there.shift?.hours ?? NaN), { absolute: 0, unit: "h", because: "a difference of the same two times" });
  });

  test("names stations that are in or out", async () => {
    const { keep, compare } = await keptEvent();
    await keep({});
    await keep({ leftOutStationIds: ["fen"] });
    expect(await compare(1, 2)).toMatchObject({ stationsOut: ["fen"], stationsIn: [], readings: [], outcome: { after: "ring-only" }, shift: null });
    expect(await compare(2, 1)).toMatchObject({ stationsOut: [], stationsIn: ["fen"] });
  });

  test("counts readings by what they say where a station's second arrival joined, and nothing once they are dropped again", async () => {
    const { store, keep, compare, readings } = await keptEvent();
    await keep({});
    const [first] = readings;
    if (first === undefined) throw new Error("The event has readings.");
    const later = [1, 2, 3].map((place) => ({ reading: { ...first.reading, row: place, arrivalEpochSeconds: first.reading.arrivalEpochSeconds + place * 600 }, quality: 2 as const }));
    const arrival = await store.saveArrival({ stationId: first.stationId, eventId: "tern", note: "", readings: later, estimate: null }, DOING);
    await keep({});
    expect((await compare(1, 2)).readings).toStrictEqual([{ station: first.stationId, changed: 0, in: 3, out: 0 }]);
    const joined = (await store.loadArrival(arrival))?.readings.map(({ id }) => id) ?? [];
    await keep({ droppedReadingIds: joined });
    expect(await compare(1, 3)).toMatchObject({ readings: [], shift: { km: 0, hours: 0 } });
    expect((await store.loadLocalization("tern", 3))?.inputDigest).toBe((await store.loadLocalization("tern", 1))?.inputDigest);
  });
});
