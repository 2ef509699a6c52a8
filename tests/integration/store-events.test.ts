import { join } from "node:path";
import Database from "better-sqlite3";
import { describe, expect, onTestFinished, test } from "vitest";
import { DATABASE_FILE, openStore } from "#lib/store/open-store.ts";
import { broughtIn } from "#tests/support/brought-in.ts";
import { inventedEvent, INVENTED_DEPLOYMENT } from "#tests/support/invented-event.ts";
import { temporaryDirectory } from "#tests/support/temporary-directory.ts";
import { MIGRATIONS_DIRECTORY } from "#tests/support/migrations-directory.ts";
import { temporaryStore } from "#tests/support/temporary-store.ts";

describe("events in the store", () => {
  test("come back as they went in, from the file and not from memory", async () => {
    const dataDirectory = temporaryDirectory();
    const first = await openStore({ dataDirectory, migrationsDirectory: MIGRATIONS_DIRECTORY });
    const event = inventedEvent("gale");
    await first.saveEvent(event);
    await first.close();

    const { store } = await temporaryStore(dataDirectory);
    const { id, title, note, observations } = event;
    expect(broughtIn(await store.loadEvent("gale"))).toStrictEqual({ id, title, note, observations });
    expect(await store.loadEvent("nothing")).toBeNull();
  });

  test("are listed with their counts, latest swell first and estimates alone last", async () => {
    const { store } = await temporaryStore();
    const early = inventedEvent("early");
    const late = inventedEvent("late");
    const lateReadings = late.observations.readings.map((item) => ({
      ...item,
      reading: { ...item.reading, arrivalEpochSeconds: item.reading.arrivalEpochSeconds + 1e6 },
    }));
    await store.saveEvent({ ...inventedEvent("sent-in"), observations: { ...early.observations, readings: [] } });
    await store.saveEvent(early);
    await store.saveEvent({ ...late, observations: { ...late.observations, readings: lateReadings } });

    const list = await store.listEvents();
    expect(list.map((event) => event.id)).toStrictEqual(["late", "early", "sent-in"]);
    expect(list[1]).toStrictEqual({
      id: "early",
      title: "Storm early",
      note: "Made up for a test.",
      revision: 1,
      stationCount: 2,
      readingCount: 2,
      estimateCount: 1,
      firstArrivalEpochSeconds: 821_000_000.5,
      savedEpochSeconds: 1_700_000_000.25,
      latest: null,
    });
    expect(list[2]?.firstArrivalEpochSeconds).toBeNull();
  });

  test("are not overwritten", async () => {
    const { store } = await temporaryStore();
    await store.saveEvent(inventedEvent("gale"));
    const again = store.saveEvent({ ...inventedEvent("gale"), title: "Another" });
    await expect(again).rejects.toMatchObject({ name: "Refusal", reason: "conflict" });
    expect((await store.loadEvent("gale"))?.title).toBe("Storm gale");
  });

  test("refuse a station that is known at another place, and leave nothing half done", async () => {
    const { store } = await temporaryStore();
    await store.saveEvent(inventedEvent("gale"));
    const moved = { ...INVENTED_DEPLOYMENT, position: { latitudeDegrees: 1, longitudeDegrees: 2 } };
    const fresh = { ...INVENTED_DEPLOYMENT, stationId: "new-pier" };
    const event = inventedEvent("other");
    const saving = store.saveEvent({ ...event, observations: { deployments: [fresh, moved], readings: [], estimates: [] } });
    await expect(saving).rejects.toMatchObject({ name: "Refusal", reason: "conflict" });
    expect(await store.write((transaction) => transaction.station.findUnique({ where: { id: "new-pier" } }))).toBeNull();
  });

  test("refuse a reading whose station nobody describes", async () => {
    const { store } = await temporaryStore();
    const event = inventedEvent("gale");
    const saving = store.saveEvent({ ...event, observations: { ...event.observations, deployments: [INVENTED_DEPLOYMENT] } });
    await expect(saving).rejects.toMatchObject({
      name: "InputError",
      issues: [{ code: "unknown-station", path: "observations.estimates[0].stationId" }],
    });
  });

  test("leave a line in the audit trail, which nobody can change or remove", async () => {
    const { store, dataDirectory } = await temporaryStore();
    await store.saveEvent(inventedEvent("gale"));
    const entries = await store.write((transaction) => transaction.auditEntry.findMany());
    expect(entries).toMatchObject([
      { actor: "test", action: "station made", subject: "station north-mole" },
      { actor: "test", action: "station made", subject: "station far-rock" },
      { actor: "test", action: "event saved", subject: "event gale" },
    ]);

    const database = new Database(join(dataDirectory, DATABASE_FILE));
    onTestFinished(() => {
      database.close();
    });
    expect(() => database.exec("UPDATE audit_entries SET actor = 'someone'")).toThrow("The audit trail is only added to.");
    expect(() => database.exec("DELETE FROM audit_entries")).toThrow("The audit trail is only added to.");
  });
});
