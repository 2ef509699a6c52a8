import { setTimeout as pause } from "node:timers/promises";
import { expect, test } from "vitest";
import { inventedEvent } from "#tests/support/invented-event.ts";
import { temporaryStore } from "#tests/support/temporary-store.ts";

test("a write made while another transaction is failing survives", async () => {
  const { store } = await temporaryStore();
  const failing = store.write(async (transaction) => {
    await transaction.station.create({ data: { id: "half-done" } });
    await pause(50);
    throw new Error("fails on purpose");
  });
  const saved = store.saveEvent(inventedEvent("gale"));

  await expect(failing).rejects.toThrow("fails on purpose");
  await saved;
  const stations = await store.write((transaction) => transaction.station.findMany({ orderBy: { id: "asc" } }));
  expect(stations.map((station) => station.id)).toStrictEqual(["far-rock", "north-mole"]);
  expect(await store.loadEvent("gale")).not.toBeNull();
});

test("reading goes on while a transaction is open, and sees nothing of it before its end", async () => {
  const { store } = await temporaryStore();
  await store.saveEvent(inventedEvent("gale"));
  await store.write(async (transaction) => {
    await transaction.event.update({ where: { id: "gale" }, data: { title: "Not yet" } });
    expect((await store.loadEvent("gale"))?.title).toBe("Storm gale");
  });
  expect((await store.loadEvent("gale"))?.title).toBe("Not yet");
});

test("events saved at the same time all arrive", async () => {
  const { store } = await temporaryStore();
  const ids = Array.from({ length: 12 }, (_, number) => `storm-${String(number).padStart(2, "0")}`);
  await Promise.all(ids.map((id) => store.saveEvent(inventedEvent(id))));
  expect((await store.listEvents()).map((event) => event.id)).toStrictEqual(ids);
});

test("what is acknowledged has reached the disk, and keys are held to", async () => {
  const { store } = await temporaryStore();
  const pragma = (name: string) => store.write((transaction) => transaction.$queryRawUnsafe<Record<string, unknown>[]>(`PRAGMA ${name}`));
  expect(await pragma("journal_mode")).toMatchObject([{ journal_mode: "wal" }]);
  const [synchronous] = await pragma("synchronous");
  expect(Number(synchronous?.synchronous)).toBe(2); // 2 is FULL: https://www.sqlite.org/pragma.html#pragma_synchronous
  const [timeout] = await pragma("busy_timeout");
  expect(Number(timeout?.timeout)).toBeGreaterThanOrEqual(5000);
  const orphan = store.write((transaction) => transaction.arrival.create({ data: { eventId: "no", stationId: "no", ordinal: 0, note: "", actor: "test", savedEpochSeconds: 0 } }));
  await expect(orphan).rejects.toThrow(/foreign key/i);
});
