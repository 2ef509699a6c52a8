import { createHash } from "node:crypto";
import type { StationDescription } from "#lib/core/arrival/station-description.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import type { Note } from "#lib/records/note.ts";
import { readStationRegister, type StationRegister } from "#lib/records/station-register-csv.ts";
import { mergedDescription } from "./merge-register.ts";
import type { Doing, StationStore, StationToSave, StoredStation } from "./ports.ts";
import { stationChanges, type StationChange } from "./station-changes.ts";

/** What taking in a file of stations would do, or has done. */
export interface StationsReport {
  readonly added: readonly string[];
  readonly changed: readonly { readonly id: string; readonly changes: readonly StationChange[] }[];
  readonly unchanged: readonly string[];
  readonly notes: readonly Note[];
  /** Stands for the file's text and for what is stored of its stations. */
  readonly token: string;
  readonly isStored: boolean;
}

export interface StationsFile {
  readonly text: string;
  readonly fileName: string;
}

type Plan = Omit<StationsReport, "isStored"> & { readonly toSave: readonly StationToSave[] };

/** @throws InputError with every problem by row and column. */
export async function previewStations(stations: StationStore, file: StationsFile): Promise<StationsReport> {
  return reportOf(await plan(stations, file), false);
}

/**
 * Stores all stations of a file, or none. Stations of which it says nothing new stay as they are, so that a file taken
 * in twice changes nothing the second time.
 *
 * @param token - of the preview that was agreed to; null to store without one
 * @throws InputError with every problem by row and column; Refusal `conflict` where the file, or what is stored of its
 *   stations, is not what was previewed.
 */
export async function takeInStations(stations: StationStore, file: StationsFile & { readonly token: string | null }, doing: Doing): Promise<StationsReport> {
  const planned = await plan(stations, file);
  if (planned.toSave.length === 0) return reportOf(planned, true);
  if (file.token !== null && file.token !== planned.token) {
    throw new Refusal("conflict", "This is not what was previewed: the file is another one, or its stations were changed meanwhile. Look at the preview again.");
  }
  await stations.saveStations(planned.toSave, doing);
  return reportOf(planned, true);
}

function reportOf({ added, changed, unchanged, notes, token }: Plan, isStored: boolean): StationsReport {
  return { added, changed, unchanged, notes, token, isStored };
}

async function plan(stations: StationStore, { text, fileName }: StationsFile): Promise<Plan> {
  const { value: register, notes } = readStationRegister(text, fileName);
  const all = await stations.listStations();
  requireFreeAliases(register, all);
  const storedOf = new Map(all.map((station) => [station.id, station]));
  const added: string[] = [];
  const unchanged: string[] = [];
  const changed: { id: string; changes: StationChange[] }[] = [];
  const toSave: StationToSave[] = [];
  for (const entry of register.stations) {
    const stored = storedOf.get(entry.id) ?? null;
    const description: StationDescription = mergedDescription(entry, stored, register.columns);
    const changes = stored === null ? [] : stationChanges(stored, description);
    if (stored === null) added.push(entry.id);
    else if (changes.length > 0) changed.push({ id: entry.id, changes });
    else unchanged.push(entry.id);
    if (stored === null || changes.length > 0) toSave.push({ description, startedFrom: stored?.revision ?? 0 });
  }
  return { added, changed, unchanged, notes, toSave, token: tokenOf(text, register, storedOf) };
}

/** Against the stations that the file does not name: among its own, the reader has seen to it. */
function requireFreeAliases({ stations, problems }: StationRegister, all: readonly StoredStation[]): void {
  const named = new Set(stations.map(({ id }) => id));
  const ownerOf = new Map(all.filter(({ id }) => !named.has(id)).flatMap(({ id, aliases }) => aliases.map(({ scheme, value }): [string, string] => [`${scheme}:${value}`, id])));
  for (const { said, aliasRow } of stations) {
    for (const { scheme, value } of said.aliases ?? []) {
      const found = `${scheme}:${value}`;
      const owner = ownerOf.get(found);
      if (owner === undefined) continue;
      problems.add({ code: "alias-taken", row: aliasRow, column: "aliases", found, wanted: `aliases that no other station has; this one is the stored station "${owner}"'s` });
    }
  }
  problems.throwIfAny();
}

function tokenOf(text: string, { stations }: StationRegister, storedOf: ReadonlyMap<string, StoredStation>): string {
  const revisions = stations.map(({ id }) => [id, storedOf.get(id)?.revision ?? 0]);
  return createHash("sha256").update(JSON.stringify([text, revisions]), "utf8").digest("hex");
}
