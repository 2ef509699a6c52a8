import { NO_CHOICES } from "#lib/core/arrival/observation-choices.ts";
import type { Deployment, StationReading } from "#lib/core/arrival/observations.ts";
import { UNDESCRIBED } from "#lib/core/arrival/station-description.ts";
import type { Store } from "#lib/store/open-store.ts";

export interface RegisterSize {
  readonly stations: number;
  readonly events: number;
  /** How many answers each event has: every so manieth has that many, the others none. */
  readonly keptEvery: number;
  readonly keptCount: number;
  /** An answer and what made it, as JSON, of the size that they have. */
  readonly answerJson: string;
  readonly inputJson: string;
}

const DAY_SECONDS = 86_400;
const START_EPOCH_SECONDS = 1_000_000_000;
const doing = { actor: "fill", savedEpochSeconds: 1_700_000_000 };

/** Fills a store with invented stations and events of five or six stations with ten to twenty readings each. */
export async function fillRegister(store: Store, size: RegisterSize): Promise<void> {
  const deployments = Array.from({ length: size.stations }, (_, index) => deployment(index));
  await store.saveStations(deployments.map((own) => ({ description: { ...UNDESCRIBED, id: own.stationId, deployments: [own], aliases: [{ scheme: "wmo", value: own.stationId }] }, startedFrom: 0 })), doing);
  for (let event = 0; event < size.events; event += 1) {
    const id = `storm-${String(event).padStart(5, "0")}`;
    const heard = Array.from({ length: 5 + (event % 2) }, (_, place) => deployments[(event * 7 + place * 31) % deployments.length]).flatMap((own) => own ?? []);
    const observations = { deployments: heard, readings: heard.flatMap((own, place) => readings(own.stationId, event, 10 + ((event + place) % 11))), estimates: [] };
    await store.saveEvent({ id, title: `Invented storm ${event}`, note: "Invented.", observations, ...doing });
    for (let number = 0; event % size.keptEvery === 0 && number < size.keptCount; number += 1) await store.saveLocalization(kept(id, number, size));
  }
}

function deployment(index: number): Deployment {
  const position = { latitudeDegrees: -60 + ((index * 37) % 120), longitudeDegrees: -180 + ((index * 53) % 360) };
  const unsaid = { exposure: null, recordMinutes: 30, stamp: null, timeZone: "UTC", fromEpochSeconds: null, toEpochSeconds: null };
  return { stationId: `st-${String(index).padStart(4, "0")}`, name: `Invented ${index}`, position, depthMetres: 100 + index, sensor: "surface", shelf: [], ...unsaid };
}

function readings(stationId: string, event: number, count: number): StationReading[] {
  return Array.from({ length: count }, (_, row) => ({
    stationId,
    reading: {
      arrivalEpochSeconds: START_EPOCH_SECONDS + event * DAY_SECONDS + row * 3600,
      ...{ frequencyHz: 0.045 + 0.002 * row, arrivalSigmaSeconds: 1800, frequencySigmaHz: 0, kind: "ridge", row: row + 2, bearing: null },
    },
  }));
}

function kept(eventId: string, number: number, { answerJson, inputJson }: RegisterSize) {
  const provenance = { program: "offing", nodeVersion: "v20", inputDigest: "ab".repeat(32), settingsJson: '{"sight":true}' };
  const source = { position: { latitudeDegrees: 40, longitudeDegrees: 170 }, originEpochSeconds: START_EPOCH_SECONDS };
  return { eventId, eventRevision: 1, startedFrom: number, reason: "", choices: NO_CHOICES, outcome: "located" as const, source, answerJson, inputJson, ...provenance, ...doing };
}
