import { describe, expect, test } from "vitest";
import type { ArrivalToSave } from "#lib/application/ports.ts";
import type { Reading } from "#lib/core/arrival/reading.ts";
import type { Store } from "#lib/store/open-store.ts";
import { inventedEvent } from "#tests/support/invented-event.ts";
import { temporaryStore } from "#tests/support/temporary-store.ts";

const doing = { actor: "editor", savedEpochSeconds: 1_700_000_500 };

function reading(row: number, arrivalEpochSeconds = 821_000_000 + 3600 * row): Reading {
  return { arrivalEpochSeconds, frequencyHz: 0.05 + 0.001 * row, arrivalSigmaSeconds: 1800, frequencySigmaHz: 0, kind: "ridge", row, bearing: null };
}

const toSave = (eventId: string | null, rows: readonly number[] = [1, 2], stationId = "north-mole"): ArrivalToSave => ({
  ...{ stationId, eventId, note: "From the log", estimate: null },
  readings: rows.map((row) => ({ reading: reading(row), quality: 1 })),
});

/** A store with the events gale and lull, each of the stations north-mole and far-rock. */
async function twoEvents(): Promise<Store> {
  const { store } = await temporaryStore();
  await store.saveEvent(inventedEvent("gale"));
  await store.saveEvent(inventedEvent("lull"));
  return store;
}

async function event(store: Store, id: string) {
  const loaded = await store.loadEvent(id);
  if (loaded === null) throw new Error(`No event ${id}.`);
  return loaded;
}

const ids = async (store: Store, id: string): Promise<number[]> => (await event(store, id)).arrivals.map((arrival) => arrival.id);

/** What was done to something, the latest first. */
const trail = async (store: Store, subject: string) => (await store.listAudit({ subject, limit: 100 })).map(({ action, detail }) => ({ action, ...(detail as object) }));

describe("an arrival", () => {
  test("that is brought in stands last in its event, which is told of it", async () => {
    const store = await twoEvents();
    const id = await store.saveArrival(toSave("gale"), doing);
    expect(await ids(store, "gale")).toStrictEqual([1, 2, id]);
    expect(await event(store, "gale")).toMatchObject({ revision: 2 });
    expect(await store.loadArrival(id)).toMatchObject({ id, stationId: "north-mole", eventId: "gale", note: "From the log", revision: 1, actor: "editor", savedEpochSeconds: 1_700_000_500, estimate: null, readings: [{ quality: 1, reading: reading(1) }, { quality: 1, reading: reading(2) }] });
    const told = { action: "arrival brought in", arrival: id, station: "north-mole", readings: 2, estimates: 0 };
    expect(await trail(store, `arrival ${id}`)).toStrictEqual([{ ...told, event: "gale" }]);
    expect((await trail(store, "event gale"))[0]).toStrictEqual({ ...told, revision: 2 });
  });

  test("that waits is no event's, and none is told of it", async () => {
    const store = await twoEvents();
    const id = await store.saveArrival(toSave(null), doing);
    expect((await store.listArrivals({ eventId: null, limit: 10 })).map((arrival) => arrival.id)).toStrictEqual([id]);
    expect(await trail(store, `arrival ${id}`)).toMatchObject([{ event: null }]);
    for (const name of ["gale", "lull"]) expect(await event(store, name)).toMatchObject({ revision: 1 });
  });

  test("moves to another event and out of it, and both events are told", async () => {
    const store = await twoEvents();
    expect(await store.moveArrival({ id: 1, startedFrom: 1, eventId: "lull" }, doing)).toBe(2);
    expect(await ids(store, "gale")).toStrictEqual([2]);
    expect(await ids(store, "lull")).toStrictEqual([3, 4, 1]);
    const moved = { action: "arrival moved", arrival: 1, station: "north-mole", from: "gale", to: "lull", revision: 2 };
    for (const subject of ["arrival 1", "event gale", "event lull"]) expect((await trail(store, subject))[0], subject).toStrictEqual(moved);
    expect(await store.moveArrival({ id: 1, startedFrom: 2, eventId: null }, doing)).toBe(3);
    expect(await ids(store, "lull")).toStrictEqual([3, 4]);
    expect([await event(store, "gale"), await event(store, "lull")]).toMatchObject([{ revision: 2 }, { revision: 3 }]);
  });

  test("that is moved to where it is stays as it is", async () => {
    const store = await twoEvents();
    expect(await store.moveArrival({ id: 1, startedFrom: 1, eventId: "gale" }, doing)).toBe(1);
    expect(await event(store, "gale")).toMatchObject({ revision: 1 });
    expect(await trail(store, "arrival 1")).toStrictEqual([]);
  });

  test("counts up when a reading of it is flagged, and so does its event", async () => {
    const store = await twoEvents();
    const [first] = (await event(store, "gale")).observations.readings;
    expect(await store.flagReading({ readingId: first?.id ?? 0, startedFrom: 1, quality: 4 }, doing)).toBe(2);
    expect((await event(store, "gale")).observations.readings.map(({ quality }) => quality)).toStrictEqual([4, 2]);
    expect((await event(store, "lull")).observations.readings.map(({ quality }) => quality)).toStrictEqual([2, 2]);
    const told = { action: "reading flagged", reading: first?.id, arrival: 1, station: "north-mole", before: 2, after: 4, revision: 2 };
    expect(await trail(store, "arrival 1")).toStrictEqual([told]);
    expect((await trail(store, "event gale"))[0]).toStrictEqual(told);
  });
});

describe("an event", () => {
  test("numbers the rows of a station's later arrivals on from those of the first, which keeps its own", async () => {
    const store = await twoEvents();
    const rows = async () => (await event(store, "gale")).observations.readings.map((item) => [item.stationId, item.reading.row]);
    expect(await rows()).toStrictEqual([["north-mole", 2], ["north-mole", 3]]);
    await store.saveArrival(toSave("gale", [1, 2, 3]), doing);
    await store.saveArrival(toSave("gale", [7], "far-rock"), doing);
    expect(await rows()).toStrictEqual([["north-mole", 2], ["north-mole", 3], ["north-mole", 4], ["north-mole", 5], ["north-mole", 6], ["far-rock", 7]]);
  });

  test("is opened of arrivals in the order asked for, under the first free name of their day", async () => {
    const store = await twoEvents();
    const [one, other] = [await store.saveArrival(toSave(null, [30]), doing), await store.saveArrival(toSave(null, [5]), doing)];
    const made = await store.openEvent({ id: null, title: "Opened", note: "", arrivalIds: [other, one] }, doing);
    expect(made).toBe("1996-01-07"); // 821,000,000 s and five hours
    expect(await ids(store, made)).toStrictEqual([other, one]);
    expect(await trail(store, `event ${made}`)).toStrictEqual([{ action: "event saved", arrivals: [other, one] }]);
    expect(await trail(store, `arrival ${one}`)).toMatchObject([{ action: "arrival moved", from: null, to: made, revision: 2 }, { action: "arrival brought in" }]);
    const next = async () => store.openEvent({ id: null, title: "Empty", note: "", arrivalIds: [] }, doing);
    expect([await next(), await next(), await next()]).toStrictEqual(["2023-11-14", "2023-11-14-2", "2023-11-14-3"]); // the day of 1,700,000,500 s
  });

  test("is described anew, with what was said before in the trail", async () => {
    const store = await twoEvents();
    expect(await store.editEvent({ id: "gale", startedFrom: 1, title: "Great gale", note: "" }, doing)).toBe(2);
    expect(await event(store, "gale")).toMatchObject({ title: "Great gale", note: "", revision: 2 });
    expect((await trail(store, "event gale"))[0]).toStrictEqual({ action: "event described", before: { title: "Storm gale", note: "Made up for a test." }, after: { title: "Great gale", note: "" }, revision: 2 });
  });

  test("takes another's arrivals behind its own, and the other stays, empty, pointing to it", async () => {
    const store = await twoEvents();
    await store.mergeEvents({ into: { id: "gale", startedFrom: 1 }, from: { id: "lull", startedFrom: 1 } }, doing);
    expect(await ids(store, "gale")).toStrictEqual([1, 2, 3, 4]);
    expect(await event(store, "lull")).toMatchObject({ revision: 2, mergedInto: "gale", arrivals: [], observations: { deployments: [], readings: [], estimates: [] } });
    expect((await store.listEvents()).map(({ id, stationCount, readingCount, estimateCount }) => [id, stationCount, readingCount, estimateCount])).toStrictEqual([["gale", 2, 4, 2]]);
    for (const subject of ["event gale", "event lull"]) expect((await trail(store, subject))[0], subject).toStrictEqual({ action: "events merged", into: "gale", from: "lull", arrivals: [3, 4], revision: 2 });
    expect((await trail(store, "arrival 3"))[0]).toMatchObject({ action: "arrival moved", from: "lull", to: "gale", revision: 2 });
    const [third] = (await event(store, "gale")).observations.readings.filter(({ arrivalId }) => arrivalId === 3);
    await store.flagReading({ readingId: third?.id ?? 0, startedFrom: 2, quality: 3 }, doing);
    expect([await event(store, "gale"), await event(store, "lull")]).toMatchObject([{ revision: 3 }, { revision: 2 }]);
  });

  test("is split in two, each with its own line", async () => {
    const store = await twoEvents();
    const made = await store.splitEvent({ from: { id: "gale", startedFrom: 1 }, event: { id: "gale-b", title: "B", note: "", arrivalIds: [2] } }, doing);
    expect([made, await ids(store, "gale"), await ids(store, "gale-b")]).toStrictEqual(["gale-b", [1], [2]]);
    expect([await event(store, "gale"), await event(store, "gale-b")]).toMatchObject([{ revision: 2 }, { revision: 1 }]);
    expect((await trail(store, "event gale"))[0]).toStrictEqual({ action: "event split", to: "gale-b", arrivals: [2], revision: 2 });
    expect((await event(store, "gale")).observations.deployments.map(({ stationId }) => stationId)).toStrictEqual(["north-mole", "north-mole"]);
  });
});

describe("a change is all or nothing, whichever of its writes fails", () => {
  const keeping = {
    ...{ eventId: "gale", startedFrom: 0, reason: "", program: "offing", nodeVersion: "v20", inputDigest: "ab".repeat(32), settingsJson: "{}", inputJson: "{}", answerJson: "{}", eventRevision: 1 },
    ...{ choices: { leftOutStationIds: [], droppedReadingIds: [], movedReadings: [], addedReadings: [], usesSuspect: false }, outcome: "too-few" as const, source: null, ...doing },
  };
  /** Each with how many rows it writes at least, so that none can pass for want of a write that fails. */
  const changes: [string, number, (store: Store) => Promise<unknown>][] = [
    ["saveEvent", 4, (store) => store.saveEvent(inventedEvent("third"))],
    ["saveArrival", 4, (store) => store.saveArrival(toSave("gale"), doing)],
    ["moveArrival", 5, (store) => store.moveArrival({ id: 1, startedFrom: 1, eventId: "lull" }, doing)],
    ["flagReading", 4, (store) => store.flagReading({ readingId: 1, startedFrom: 1, quality: 4 }, doing)],
    ["openEvent", 4, (store) => store.openEvent({ id: "new", title: "New", note: "", arrivalIds: [5] }, doing)],
    ["editEvent", 2, (store) => store.editEvent({ id: "gale", startedFrom: 1, title: "x", note: "" }, doing)],
    ["mergeEvents", 8, (store) => store.mergeEvents({ into: { id: "gale", startedFrom: 1 }, from: { id: "lull", startedFrom: 1 } }, doing)],
    ["splitEvent", 6, (store) => store.splitEvent({ from: { id: "gale", startedFrom: 1 }, event: { id: "new", title: "B", note: "", arrivalIds: [2] } }, doing)],
    ["saveLocalization", 2, (store) => store.saveLocalization(keeping)],
  ];

  test.each(changes)("%s", async (_, leastWrites, change) => {
    const store = await twoEvents();
    await store.saveArrival(toSave(null), doing);
    const before = await wholeDatabase(store);
    let writes = 0;
    for (; writes < 40; writes += 1) {
      await failWriteAfter(store, writes);
      const outcome = await change(store).then(() => "done", (error: unknown) => String(error));
      await failWriteAfter(store, null);
      if (outcome === "done") break;
      expect(outcome).toMatch(/constraint/i); // what the driver makes of a trigger that refuses
      expect(await wholeDatabase(store), `after ${writes} writes`).toStrictEqual(before);
    }
    expect(writes).toBeGreaterThanOrEqual(leastWrites);
    expect(await wholeDatabase(store)).not.toStrictEqual(before);
  });
});

const TABLES = ["stations", "groups", "station_aliases", "deployments", "shelf_legs", "clock_corrections", "events", "arrivals", "readings", "estimates", "localizations", "audit_entries"];

async function wholeDatabase(store: Store): Promise<unknown> {
  return store.write(async (transaction) => {
    const tables: [string, unknown][] = [];
    for (const table of TABLES) tables.push([table, await transaction.$queryRawUnsafe(`SELECT * FROM ${table} ORDER BY rowid`)]);
    return tables;
  });
}

/**
 * Lets so many rows be written, on the store's own connection, and the next one fail; null lets all pass. The rows are
 * counted in a table of that connection alone, within the transaction that writes them.
 */
async function failWriteAfter(store: Store, writes: number | null): Promise<void> {
  await store.write(async (transaction) => {
    await transaction.$executeRawUnsafe("CREATE TEMP TABLE IF NOT EXISTS allowed (writes INTEGER NOT NULL)");
    await transaction.$executeRawUnsafe("DELETE FROM allowed");
    for (const table of TABLES) {
      for (const kind of ["INSERT", "UPDATE", "DELETE"]) {
        const name = `fail_${kind}_${table}`;
        await transaction.$executeRawUnsafe(`DROP TRIGGER IF EXISTS ${name}`);
        if (writes === null) continue;
        await transaction.$executeRawUnsafe(`CREATE TEMP TRIGGER ${name} BEFORE ${kind} ON main.${table} BEGIN
          UPDATE allowed SET writes = writes - 1;
          SELECT CASE WHEN (SELECT writes FROM allowed) < 0 THEN RAISE(ABORT, 'fails on purpose') END;
        END`);
      }
    }
    if (writes !== null) await transaction.$executeRawUnsafe(`INSERT INTO allowed VALUES (${writes})`);
  });
}
