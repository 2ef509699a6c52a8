import { existsSync, readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { z } from "zod";
import type { EventStore } from "#lib/application/ports.ts";
import type { EventObservations } from "#lib/core/arrival/observations.ts";
import { readEventFiles } from "#lib/records/event-files.ts";
import type { TextFile } from "#lib/records/event-files.ts";

const EventFile = z.strictObject({ title: z.string().min(1), note: z.string() });

/** A scenario's folder: `stations.csv`, and a folder for each event with `event.json` and its readings and arrivals. */
export interface Scenario {
  readonly directory: string;
  readonly savedEpochSeconds: number;
}

/** Saves all events of a scenario, in the order of their names, and gives their ids. */
export async function seedEvents(store: EventStore, scenario: Scenario): Promise<string[]> {
  const ids = readdirSync(scenario.directory, { withFileTypes: true })
    .filter((entry) => entry.isDirectory() && existsSync(join(scenario.directory, entry.name, "event.json")))
    .map((entry) => entry.name)
    .sort();
  for (const id of ids) {
    const folder = join(scenario.directory, id);
    const { title, note } = EventFile.parse(JSON.parse(readFileSync(join(folder, "event.json"), "utf8")));
    const { value } = readEventFiles({
      stations: textFile(scenario.directory, "stations.csv"),
      readings: textFile(folder, "readings.csv"),
      arrivals: textFile(folder, "arrivals.csv"),
    });
    const { savedEpochSeconds } = scenario;
    await store.saveEvent({ id, title, note, actor: "demo", savedEpochSeconds, observations: withoutIdle(value) });
  }
  return ids;
}

/** Stations that have nothing to say of an event take no part in it. */
function withoutIdle(observations: EventObservations): EventObservations {
  const heard = new Set([...observations.readings, ...observations.estimates].map((item) => item.stationId));
  return { ...observations, deployments: observations.deployments.filter(({ stationId }) => heard.has(stationId)) };
}

function textFile(folder: string, fileName: string): TextFile | null {
  const path = join(folder, fileName);
  return existsSync(path) ? { text: readFileSync(path, "utf8"), fileName } : null;
}
