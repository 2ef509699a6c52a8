import { readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { keepLocalization } from "#lib/application/keep-localization.ts";
import { createLand } from "#lib/application/land.ts";
import { locateEvent } from "#lib/application/locate-event.ts";
import { readLandTopology } from "#lib/application/shipped-files.ts";
import type { LocateJson } from "#lib/contracts/locate-json.ts";
import { readSettings } from "#lib/contracts/settings.ts";
import { NO_CHOICES, type ObservationChoices } from "#lib/core/arrival/observation-choices.ts";
import type { EventObservations, StationReading } from "#lib/core/arrival/observations.ts";
import { UNDESCRIBED } from "#lib/core/arrival/station-description.ts";
import { readEventFiles } from "#lib/records/event-files.ts";
import type { Store } from "#lib/store/open-store.ts";
import { inventedEvent } from "#tests/support/invented-event.ts";
import { temporaryStore } from "#tests/support/temporary-store.ts";

const host = { program: "offing test", land: createLand({ readTopology: () => readLandTopology({ packageRoot: process.cwd() }) }) };
const settings = readSettings({});
const read = (fileName: string) => ({ fileName, text: readFileSync(`fixtures/scenarios/demo/${fileName}`, "utf8") });
/** Two stations, fen and wic, of nine readings each. */
const { value } = readEventFiles({ stations: read("stations.csv"), readings: read("tern/readings.csv"), arrivals: null });
const RIGHT: EventObservations = { ...value, deployments: value.deployments.filter(({ stationId }) => value.readings.some((item) => item.stationId === stationId)) };
const HOUR_SECONDS = 3600;
const doing = { actor: "test", savedEpochSeconds: 1_700_000_000 };

async function stored(observations = RIGHT): Promise<Store> {
  const { store } = await temporaryStore();
  await store.saveEvent({ ...inventedEvent("tern"), observations });
  return store;
}

async function kept(store: Store, chosen: Partial<ObservationChoices> = {}): Promise<LocateJson> {
  const [latest] = await store.listLocalizations("tern");
  const wanted = { eventId: "tern", choices: { ...NO_CHOICES, ...chosen }, eventRevision: null, settings, reason: "", startedFrom: latest?.number ?? 0, ...doing };
  return (await keepLocalization({ events: store, localizations: store, host }, wanted)).answer;
}

/** What the science says of these observations by themselves; notes on how they were come by stand apart. */
function located(observations: EventObservations): LocateJson | null {
  return locateEvent({ observations, settings, host }).answer;
}

const GATHERING = ["readings-unusable", "readings-suspect", "clock-corrected"];
const withoutNotes = (answer: LocateJson | null) => answer && { ...answer, warnings: answer.warnings.filter(({ code }) => !GATHERING.includes(code)) };
const notes = (answer: LocateJson): string[] => answer.warnings.filter(({ code }) => GATHERING.includes(code)).map(({ message }) => message);
const withReadings = (change: (item: StationReading, place: number) => readonly StationReading[]): EventObservations => ({ ...RIGHT, readings: RIGHT.readings.flatMap(change) });

/** The id under which the reading at a place of `RIGHT` is stored. */
async function idAt(store: Store, place: number): Promise<number> {
  const wanted = RIGHT.readings[place];
  const found = (await store.loadEvent("tern"))?.observations.readings.find((item) => item.stationId === wanted?.stationId && item.reading.row === wanted.reading.row);
  if (found === undefined) throw new Error(`No reading at ${place}.`);
  return found.id;
}

describe("an answer is worked out from the observations that were chosen, and from no others", () => {
  test("where nothing was", async () => {
    expect(await kept(await stored())).toStrictEqual(located(RIGHT));
  });

  test("where readings are flagged: bad and missing ones go, suspect ones stay where they were asked for", async () => {
    const store = await stored();
    const [bad, missing, suspect] = [await idAt(store, 0), await idAt(store, 3), await idAt(store, 12)];
    for (const [readingId, quality] of [[bad, 4], [missing, 9], [suspect, 3]] as const) {
      const arrivalId = (await store.loadEvent("tern"))?.observations.readings.find(({ id }) => id === readingId)?.arrivalId ?? 0;
      await store.flagReading({ readingId, startedFrom: (await store.loadArrival(arrivalId))?.revision ?? 0, quality }, doing);
    }
    const plain = await kept(store);
    expect(withoutNotes(plain)).toStrictEqual(located(withReadings((item, place) => ([0, 3, 12].includes(place) ? [] : [item]))));
    const asked = await kept(store, { usesSuspect: true });
    expect(withoutNotes(asked)).toStrictEqual(located(withReadings((item, place) => ([0, 3].includes(place) ? [] : [item]))));
    expect(asked.inputDigest).not.toBe(plain.inputDigest);
    expect(notes(plain).length).toBeGreaterThanOrEqual(2);
  });

  test("where readings are dropped, moved and added", async () => {
    const store = await stored();
    const [dropped, moved] = [await idAt(store, 1), await idAt(store, 5)];
    const [to, extra] = [{ arrivalEpochSeconds: (RIGHT.readings[5]?.reading.arrivalEpochSeconds ?? 0) + 1234, frequencyHz: 0.0512 }, { arrivalEpochSeconds: (RIGHT.readings[5]?.reading.arrivalEpochSeconds ?? 0) + 5000, frequencyHz: 0.0533 }];
    const stationId = RIGHT.readings[5]?.stationId ?? "";
    const measured = { arrivalSigmaSeconds: 1800, frequencySigmaHz: 0, kind: "ridge" as const };
    const answer = await kept(store, { droppedReadingIds: [dropped], movedReadings: [{ readingId: moved, ...to }], addedReadings: [{ stationId, ...extra, ...measured }] });
    const lastRow = Math.max(...RIGHT.readings.filter((item) => item.stationId === stationId).map(({ reading }) => reading.row));
    const chosen = withReadings((item, place) => (place === 1 ? [] : [place === 5 ? { ...item, reading: { ...item.reading, ...to } } : item]));
    expect(answer).toStrictEqual(located({ ...chosen, readings: [...chosen.readings, { stationId, reading: { ...extra, ...measured, row: lastRow + 1, bearing: null } }] }));
    expect(answer.source).not.toStrictEqual(located(RIGHT)?.source);
  });
});

describe("a clock's known error", () => {
  const [first] = RIGHT.deployments;
  const stationId = first?.stationId ?? "";
  /** One station's clock an hour fast. */
  const FAST = withReadings((item) => [item.stationId === stationId ? { ...item, reading: { ...item.reading, arrivalEpochSeconds: item.reading.arrivalEpochSeconds + HOUR_SECONDS } } : item]);

  async function corrected(span: { fromEpochSeconds: number | null; toEpochSeconds: number | null }): Promise<Store> {
    const store = await stored(FAST);
    const deployments = RIGHT.deployments.filter((own) => own.stationId === stationId);
    const clockCorrections = [{ stationId, ...span, fastBySeconds: HOUR_SECONDS, reason: "log kept in local time" }];
    await store.saveStations([{ description: { ...UNDESCRIBED, id: stationId, deployments, clockCorrections }, startedFrom: 1 }], doing);
    return store;
  }

  test("of an hour, taken off, gives exactly the answer of right times, and says that it was taken off", async () => {
    const answer = await kept(await corrected({ fromEpochSeconds: null, toEpochSeconds: null }));
    const right = located(RIGHT);
    expect(withoutNotes(answer)).toStrictEqual(right);
    expect(answer.inputDigest).toBe(right?.inputDigest);
    expect(notes(answer)).toStrictEqual([`${stationId}: the known error of its clock was taken off the times of 9 of 9 readings.`]);
    expect(located(FAST)?.source).not.toStrictEqual(right?.source);
  });

  test("counts for the readings of its span alone, by the clock's own time", async () => {
    const own = FAST.readings.filter((item) => item.stationId === stationId).map(({ reading }) => reading.arrivalEpochSeconds).sort((a, b) => a - b);
    const answer = await kept(await corrected({ fromEpochSeconds: own[3] ?? 0, toEpochSeconds: null }));
    const chosen = { ...FAST, readings: FAST.readings.map((item, place) => ((FAST.readings[place]?.reading.arrivalEpochSeconds ?? 0) >= (own[3] ?? 0) && item.stationId === stationId ? (RIGHT.readings[place] ?? item) : item)) };
    expect(withoutNotes(answer)).toStrictEqual(located(chosen));
    expect(notes(answer)).toStrictEqual([`${stationId}: the known error of its clock was taken off the times of 6 of 9 readings.`]);
  });

  test("does not touch a reading that the analyst moved, which stands in true time", async () => {
    const store = await corrected({ fromEpochSeconds: null, toEpochSeconds: null });
    const place = RIGHT.readings.findIndex((item) => item.stationId === stationId);
    const { arrivalEpochSeconds = 0, frequencyHz = 0 } = RIGHT.readings[place]?.reading ?? {};
    const answer = await kept(store, { movedReadings: [{ readingId: await idAt(store, place), arrivalEpochSeconds, frequencyHz }] });
    expect(withoutNotes(answer)).toStrictEqual(located(RIGHT));
  });
});
