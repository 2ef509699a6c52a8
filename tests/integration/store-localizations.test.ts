import { readFileSync } from "node:fs";
import { join } from "node:path";
import Database from "better-sqlite3";
import { describe, expect, onTestFinished, test } from "vitest";
import { keepLocalization } from "#lib/application/keep-localization.ts";
import { createLand } from "#lib/application/land.ts";
import { locateEvent } from "#lib/application/locate-event.ts";
import { NO_CHOICES, type ObservationChoices } from "#lib/core/arrival/observation-choices.ts";
import type { LocalizationToSave } from "#lib/application/ports.ts";
import { readLandTopology } from "#lib/application/shipped-files.ts";
import { readSettings } from "#lib/contracts/settings.ts";
import type { EventObservations } from "#lib/core/arrival/observations.ts";
import { readEventFiles } from "#lib/records/event-files.ts";
import { DATABASE_FILE } from "#lib/store/open-store.ts";
import { inventedEvent } from "#tests/support/invented-event.ts";
import { temporaryStore } from "#tests/support/temporary-store.ts";

const host = { program: "offing test", land: createLand({ readTopology: () => readLandTopology({ packageRoot: process.cwd() }) }) };

const INVENTED_CHOICES: ObservationChoices = {
  leftOutStationIds: ["far-rock"],
  droppedReadingIds: [2],
  movedReadings: [{ readingId: 1, arrivalEpochSeconds: 821_000_123.5, frequencyHz: 0.07 / 3 }],
  addedReadings: [{ stationId: "north-mole", arrivalEpochSeconds: 821_020_000, frequencyHz: 0.05, arrivalSigmaSeconds: 600, frequencySigmaHz: 0.001, kind: "timed" }],
  usesSuspect: true,
};

function invented(number: number): LocalizationToSave {
  return {
    ...{ eventId: "gale", startedFrom: number - 1, savedEpochSeconds: 1_700_000_000 + number, actor: "test", reason: `the ${number}th` },
    ...{ program: "offing test", nodeVersion: "v20", inputDigest: "ab".repeat(32), settingsJson: '{"sight":true}', inputJson: "{}" },
    ...{ eventRevision: 1, choices: INVENTED_CHOICES, answerJson: `{"number":${number}}`, outcome: "located" },
    source: { position: { latitudeDegrees: -47.5, longitudeDegrees: 180 }, originEpochSeconds: 1_699_000_000.5 },
  };
}

const without = (...leftOutStationIds: string[]): ObservationChoices => ({ ...NO_CHOICES, leftOutStationIds });

describe("localizations in the store", () => {
  test("are numbered as they come, listed latest first, and come back as they were saved", async () => {
    const { store } = await temporaryStore();
    await store.saveEvent(inventedEvent("gale"));
    expect(await store.saveLocalization(invented(1))).toBe(1);
    expect(await store.saveLocalization({ ...invented(2), outcome: "no-agreement", source: null })).toBe(2);

    const { startedFrom, ...first } = invented(1);
    expect(startedFrom).toBe(0);
    expect(await store.loadLocalization("gale", 1)).toStrictEqual({ ...first, number: 1, source: { ...first.source, position: { latitudeDegrees: -47.5, longitudeDegrees: -180 } } });
    const list = await store.listLocalizations("gale");
    expect(list.map(({ number, outcome, source }) => [number, outcome, source === null])).toStrictEqual([[2, "no-agreement", true], [1, "located", false]]);
    expect(list[0]).not.toHaveProperty("answerJson");
    expect(await store.loadLocalization("gale", 3)).toBeNull();
    expect(await store.listLocalizations("calm")).toStrictEqual([]);
  });

  test("are refused for an event that nobody knows, and where another was saved meanwhile", async () => {
    const { store } = await temporaryStore();
    await expect(store.saveLocalization(invented(1))).rejects.toMatchObject({ name: "Refusal", reason: "not-found" });
    await store.saveEvent(inventedEvent("gale"));
    await expect(store.saveLocalization(invented(2))).rejects.toMatchObject({ reason: "conflict", message: expect.stringContaining("has 0 localizations") as string });
    const racing = await Promise.allSettled(Array.from({ length: 8 }, () => store.saveLocalization(invented(1))));
    expect(racing.filter(({ status }) => status === "fulfilled")).toHaveLength(1);
    await expect(store.saveLocalization(invented(1))).rejects.toMatchObject({ reason: "conflict", message: expect.stringMatching(/^Number 1 of event "gale" was kept by test at 2023-11-14T22:13Z; this one started from number 0\.$/) as string });
    expect(await store.listLocalizations("gale")).toHaveLength(1);
  });

  test("are kept for good, each with its line in the audit trail", async () => {
    const { store, dataDirectory } = await temporaryStore();
    await store.saveEvent(inventedEvent("gale"));
    await store.saveLocalization(invented(1));
    const database = new Database(join(dataDirectory, DATABASE_FILE));
    onTestFinished(() => {
      database.close();
    });
    for (const sql of ["UPDATE localizations SET reason = 'better'", "DELETE FROM localizations"]) {
      expect(() => database.exec(sql)).toThrow("A localization is kept as it was saved.");
    }
    const trail = await store.write((transaction) => transaction.auditEntry.findMany({ where: { action: "localization saved" } }));
    expect(trail.map(({ actor, subject, detail }) => [actor, subject, JSON.parse(detail) as unknown])).toStrictEqual([
      ["test", "event gale", { number: 1, outcome: "located", inputDigest: "ab".repeat(32), choices: INVENTED_CHOICES }],
    ]);
  });
});

describe("an answer that is kept", () => {
  const read = (fileName: string) => ({ fileName, text: readFileSync(`fixtures/scenarios/demo/${fileName}`, "utf8") });
  const { value: observations } = readEventFiles({ stations: read("stations.csv"), readings: read("tern/readings.csv"), arrivals: null });
  const wanted = { eventId: "tern", choices: NO_CHOICES, eventRevision: null, settings: readSettings({}), reason: "", actor: "test", savedEpochSeconds: 1_700_000_000, startedFrom: 0 };

  test("is worked out from what is stored, and can be made again from its own copies to the last bit", async () => {
    const { store } = await temporaryStore();
    await store.saveEvent({ ...inventedEvent("tern"), observations });
    const { number, answer } = await keepLocalization({ events: store, localizations: store, host }, { ...wanted, settings: readSettings({ spread: { timeHours: 9 } }) });
    const kept = await store.loadLocalization("tern", number);
    expect(kept?.outcome).toBe("several");
    const again = locateEvent({ observations: JSON.parse(kept?.inputJson ?? "") as EventObservations, settings: readSettings(JSON.parse(kept?.settingsJson ?? "")), host });
    expect(JSON.stringify(again.answer)).toBe(kept?.answerJson);
    expect(JSON.stringify(answer)).toBe(kept?.answerJson);
    expect(kept?.inputDigest).toBe(answer.inputDigest);
  });

  test("leaves out the stations it is told to, and none that the event does not have", async () => {
    const { store } = await temporaryStore();
    await store.saveEvent({ ...inventedEvent("tern"), observations });
    const keeping = { events: store, localizations: store, host };
    const [station = ""] = observations.readings.map(({ stationId }) => stationId);
    const { answer } = await keepLocalization(keeping, { ...wanted, choices: without(station) });
    expect(answer.outcome).toBe("ring-only");
    expect(answer.stations.map(({ id }) => id)).not.toContain(station);
    await expect(keepLocalization(keeping, { ...wanted, choices: without("nowhere") })).rejects.toMatchObject({ issues: [{ code: "unknown-station", path: "leftOut[0]" }] });
    const all = [...new Set(observations.readings.map(({ stationId }) => stationId))];
    await expect(keepLocalization(keeping, { ...wanted, startedFrom: 1, choices: without(...all) })).rejects.toMatchObject({ issues: [{ code: "not-fitted" }] });
    await expect(keepLocalization(keeping, { ...wanted, eventId: "calm" })).rejects.toMatchObject({ reason: "not-found" });
    expect(await store.listLocalizations("tern")).toHaveLength(1);
  });
});
