import { describe, expect, test } from "vitest";
import { UNDESCRIBED, type StationDescription } from "#lib/core/arrival/station-description.ts";
import type { StoredStation } from "#lib/application/ports.ts";
import { chosenObservations } from "#lib/core/arrival/chosen-observations.ts";
import { NO_CHOICES } from "#lib/core/arrival/observation-choices.ts";
import { inventedEvent } from "#tests/support/invented-event.ts";
import { temporaryStore } from "#tests/support/temporary-store.ts";

const DOING = { actor: "test", savedEpochSeconds: 1_700_000_100 };

function descriptionOf(station: StoredStation): StationDescription {
  const { id, groupId, aliases, deployments, clockCorrections, licence, attribution, contact, doi, visibility, embargoUntilEpochSeconds, note } = station;
  return { id, groupId, aliases, deployments, clockCorrections, licence, attribution, contact, doi, visibility, embargoUntilEpochSeconds, note };
}

test("a station that is removed and made anew goes on from its old revisions, so that they stay stale", async () => {
  const { store } = await temporaryStore();
  const { deployments } = inventedEvent("gale").observations;
  const description = { ...UNDESCRIBED, id: "far-rock", deployments: deployments.filter(({ stationId }) => stationId === "far-rock") };
  await store.saveStations([{ description, startedFrom: 0 }], DOING);
  await store.removeStation("far-rock", 1, DOING);
  expect(await store.loadStation("far-rock")).toBeNull();
  await store.saveStations([{ description: { ...description, note: "anew" }, startedFrom: 0 }], DOING);
  expect((await store.loadStation("far-rock"))?.revision).toBe(2);
  await expect(store.saveStations([{ description, startedFrom: 1 }], DOING)).rejects.toMatchObject({ reason: "conflict" });
  expect((await store.loadStation("far-rock"))?.note).toBe("anew");
});

describe("a station that is described anew", () => {
  test("in place, time or clock makes a new revision of the events that it has a part in, and of no others", async () => {
    const { store } = await temporaryStore();
    await store.saveEvent(inventedEvent("gale"));
    const { deployments } = inventedEvent("calm").observations;
    await store.saveEvent({ ...inventedEvent("calm"), observations: { deployments: deployments.filter(({ stationId }) => stationId === "far-rock"), readings: [], estimates: inventedEvent("calm").observations.estimates } });
    const [, mole] = await store.listStations();
    if (mole === undefined) throw new Error("The event brought two stations.");
    const description = descriptionOf(mole);

    await store.saveStations([{ description: { ...description, contact: "somebody@example.org" }, startedFrom: 1 }], DOING);
    expect((await store.loadEvent("gale"))?.revision).toBe(1);

    const clock = { stationId: "north-mole", fromEpochSeconds: null, toEpochSeconds: null, fastBySeconds: 3600, reason: "Kept in local time" };
    await store.saveStations([{ description: { ...description, clockCorrections: [clock] }, startedFrom: 2 }], DOING);
    expect((await store.loadEvent("gale"))?.revision).toBe(2);
    expect((await store.loadEvent("calm"))?.revision).toBe(1);
    const [line] = await store.listAudit({ subject: "event gale", limit: 1 });
    expect(line).toMatchObject({ action: "stations described anew", actor: "test", detail: { stations: ["north-mole"], revision: 2 } });
  });

  test("with a clock that was fast has that taken off its readings' times, and no others", async () => {
    const { store } = await temporaryStore();
    await store.saveEvent(inventedEvent("gale"));
    const [, mole] = await store.listStations();
    if (mole === undefined) throw new Error("The event brought two stations.");
    const [first] = inventedEvent("gale").observations.readings;
    const at = first?.reading.arrivalEpochSeconds ?? 0;
    const clock = { stationId: "north-mole", fromEpochSeconds: at, toEpochSeconds: at + 1, fastBySeconds: 3600, reason: "Kept in local time" };
    await store.saveStations([{ description: { ...descriptionOf(mole), clockCorrections: [clock] }, startedFrom: 1 }], DOING);
    const event = await store.loadEvent("gale");
    const times = event === null ? [] : chosenObservations(event.observations, NO_CHOICES).readings.map(({ reading }) => reading.arrivalEpochSeconds);
    const asBroughtIn = inventedEvent("gale").observations.readings.map(({ reading }) => reading.arrivalEpochSeconds);
    expect(times).toStrictEqual([at - 3600, ...asBroughtIn.slice(1)]);
  });

  test("is not changed from an older revision, and not made twice", async () => {
    const { store } = await temporaryStore();
    await store.saveEvent(inventedEvent("gale"));
    const [rock] = await store.listStations();
    if (rock === undefined) throw new Error("The event brought two stations.");
    const change = { description: { ...descriptionOf(rock), note: "moored" }, startedFrom: 1 };
    await store.saveStations([change], DOING);
    await expect(store.saveStations([change], DOING)).rejects.toMatchObject({ reason: "conflict" });
    await expect(store.saveStations([{ ...change, startedFrom: 0 }], DOING)).rejects.toMatchObject({ reason: "conflict" });
    await expect(store.saveStations([{ description: { ...UNDESCRIBED, id: "gone", deployments: [] }, startedFrom: 3 }], DOING)).rejects.toMatchObject({ reason: "conflict" });
    expect((await store.loadStation("far-rock"))?.note).toBe("moored");
    await store.saveStations([{ ...change, startedFrom: 2 }], DOING);
    expect((await store.loadStation("far-rock"))?.revision).toBe(2); // it says nothing new
    await expect(store.removeStation("far-rock", 2, DOING)).rejects.toMatchObject({ reason: "conflict", message: expect.stringContaining("has an arrival") as string });
  });
});
