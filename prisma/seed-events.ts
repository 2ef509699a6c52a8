import { existsSync, readdirSync, readFileSync } from "node:fs";
import { basename, join } from "node:path";
import { z } from "zod";
import type { EventStore, EventBroughtIn } from "#lib/application/ports.ts";
import type { EventObservations } from "#lib/core/arrival/observations.ts";
import { InputError } from "#lib/core/failures/input-error.ts";
import type { InputIssue } from "#lib/core/failures/input-error.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import { readEventFiles } from "#lib/records/event-files.ts";
import type { TextFile } from "#lib/records/event-files.ts";
import type { Note, ReadResult } from "#lib/records/note.ts";
import { decodeText } from "#lib/records/text.ts";

const EventFile = z.strictObject({ title: z.string().min(1), note: z.string().default("") });

export interface Intake {
  readonly saved: readonly string[];
  /** Why others were not, in a sentence each. */
  readonly refused: readonly string[];
}

/**
 * The events of a folder, in the order of their names: `stations.csv`, and a folder for each event, named by its id,
 * with `event.json` (`{"title": ..., "note": ...}`, the note as you like) and `readings.csv`, `arrivals.csv` or both.
 * Errors that the readers took for want of any stand in the event's note as well, for whoever opens it later.
 *
 * @throws InputError with the problems of all their files.
 */
export function readEventFolder(directory: string): ReadResult<EventBroughtIn[]> {
  const issues: InputIssue[] = [];
  const stations = textFile(directory, "stations.csv");
  if (stations === null) throw problem(directory, "found no stations.csv; wanted one, and a folder for each event beside it");
  const ids = readdirSync(directory, { withFileTypes: true })
    .filter((entry) => entry.isDirectory() && existsSync(join(directory, entry.name, "event.json")))
    .map((entry) => entry.name)
    .sort();
  const events = ids.flatMap((id) => {
    try {
      return [readEvent(id, join(directory, id), stations)];
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      issues.push(...error.issues);
      return [];
    }
  });
  if (issues.length > 0) throw new InputError(issues);
  if (events.length === 0) throw problem(directory, "found no event; wanted a folder for each, with an event.json in it");
  const notes = events.flatMap((event) => event.notes);
  return { value: events.map(({ value }) => value), notes: notes.filter(({ message }, i) => notes.findIndex((note) => note.message === message) === i) };
}

/** Saves events one by one. One that is known already, or clashes with what is, does not keep the others out. */
export async function saveEvents(store: EventStore, events: readonly EventBroughtIn[], by: { actor: string; savedEpochSeconds: number }): Promise<Intake> {
  const saved: string[] = [];
  const refused: string[] = [];
  for (const event of events) {
    try {
      await store.saveEvent({ ...event, ...by });
      saved.push(event.id);
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      refused.push(`${event.id}: ${error.message}`);
    }
  }
  return { saved, refused };
}

function readEvent(id: string, folder: string, stations: TextFile): ReadResult<EventBroughtIn> {
  const { title, note } = readEventFile(join(folder, "event.json"), id);
  const { value, notes } = readEventFiles({ stations, readings: textFile(folder, "readings.csv"), arrivals: textFile(folder, "arrivals.csv") });
  if (value.readings.length + value.estimates.length === 0) {
    throw problem(folder, "found neither readings.csv nor arrivals.csv; wanted one of them at least");
  }
  return { value: { id, title, note: noteWith(note, notes), observations: withoutIdle(value) }, notes };
}

/** The errors that were taken change the answer, and nothing else that is stored tells them from given ones. */
function noteWith(note: string, notes: readonly Note[]): string {
  const assumed = notes.filter(({ code }) => code === "default-error").map(({ message }) => `Assumed at intake: ${message}`);
  return [note, ...assumed].filter((part) => part !== "").join(" ");
}

function readEventFile(path: string, id: string): z.infer<typeof EventFile> {
  try {
    return EventFile.parse(JSON.parse(readFileSync(path, "utf8")));
  } catch {
    throw problem(join(id, "event.json"), 'found something else; wanted {"title": "...", "note": "..."}, the title not empty; the note may be left out');
  }
}

/** Stations that have nothing to say of an event take no part in it. */
function withoutIdle(observations: EventObservations): EventObservations {
  const heard = new Set([...observations.readings, ...observations.estimates].map((item) => item.stationId));
  return { ...observations, deployments: observations.deployments.filter(({ stationId }) => heard.has(stationId)) };
}

/** Named by its folder as well where it is an event's, for there are many of one name. */
function textFile(folder: string, name: string): TextFile | null {
  const path = join(folder, name);
  if (!existsSync(path)) return null;
  const fileName = name === "stations.csv" ? name : join(basename(folder), name);
  return { text: decodeText(readFileSync(path), fileName), fileName };
}

function problem(place: string, found: string): InputError {
  return new InputError([{ code: "event-folder", path: place, message: `${place}: ${found}.` }]);
}
