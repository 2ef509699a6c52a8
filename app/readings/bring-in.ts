import type { NewReading } from "#lib/contracts/api/readings.ts";
import type { Deployment } from "#lib/core/arrival/observations.ts";
import { askServer, type Asked, type Issue } from "../_components/ask-server.ts";

export interface Bringing {
  readonly stationId: string;
  /** Of a station that is placed here and not stored yet. */
  readonly placed: Deployment | null;
  readonly readings: readonly NewReading[];
  readonly note: string;
  readonly keep: { readonly way: "new" | "event" | "waiting"; readonly title: string; readonly event: string };
}

/** How far an earlier try of the same readings came, so that the next one goes on from there and saves nothing twice. */
export interface Progress {
  readonly isStationStored: boolean;
  readonly arrivalId: number | null;
  /** Whether a try ended without an answer: then the server is asked what it has. */
  readonly isUnsure: boolean;
}

export const NO_PROGRESS: Progress = { isStationStored: false, arrivalId: null, isUnsure: false };

export type BroughtIn =
  | { readonly kind: "in"; readonly arrivalId: number; readonly event: { readonly id: string; readonly title: string } | null }
  | { readonly kind: "refused"; readonly issues: readonly Issue[]; readonly progress: Progress };

const UNHEARD = "The server did not answer, so whether this was brought in is not known. Nothing that you typed is lost. Try again: what is in already is not brought in twice.";

/** Stores the station where it is new, brings its readings in and makes their event where one is wanted: in this order, for each needs what came before. */
export async function bringIn(bringing: Bringing, before: Progress): Promise<BroughtIn> {
  let progress = before;
  const refused = (issues: readonly Issue[]): BroughtIn => ({ kind: "refused", issues, progress: { ...progress, isUnsure: progress.isUnsure || issues.some(({ message }) => message === UNHEARD) } });

  if (bringing.placed !== null && !progress.isStationStored) {
    const issues = await storeStation(bringing.placed, progress);
    if (issues !== null) return refused(issues);
    progress = { ...progress, isStationStored: true };
  }
  if (progress.arrivalId === null) {
    const arrival = await bringArrival(bringing, progress);
    if (Array.isArray(arrival)) return refused(arrival as readonly Issue[]);
    progress = { ...progress, arrivalId: arrival as number };
  }
  const arrivalId = progress.arrivalId ?? 0;
  if (bringing.keep.way === "waiting") return { kind: "in", arrivalId, event: null };
  if (bringing.keep.way === "event") return { kind: "in", arrivalId, event: { id: bringing.keep.event, title: "" } };
  const made = await makeEvent(bringing.keep.title.trim(), arrivalId, progress);
  return made.kind === "done" ? { kind: "in", arrivalId, event: made.reply } : refused([...made.issues, { path: "", message: `The readings are in, as arrival ${arrivalId}, and wait for an event.` }]);
}

async function storeStation({ stationId, name, position, timeZone }: Deployment, { isUnsure }: Progress): Promise<readonly Issue[] | null> {
  const path = `/api/v1/stations/${encodeURIComponent(stationId)}`;
  const body = { revision: 0, deployments: [{ name, ...position, sensor: "surface", timeZone }] };
  const asked = await askServer<unknown>(path, { method: "PUT", body, unheard: UNHEARD });
  if (asked.kind === "done") return null;
  if (asked.kind === "failed") return asked.issues;
  const found = isUnsure ? await askServer<{ deployments: readonly { latitudeDegrees: number; longitudeDegrees: number }[] }>(path, { unheard: UNHEARD }) : null;
  const [there] = found?.kind === "done" ? found.reply.deployments : [];
  // The try that was not answered had stored it.
  if (there?.latitudeDegrees === position.latitudeDegrees && there.longitudeDegrees === position.longitudeDegrees) return null;
  return [{ path: "id", message: `A station “${stationId}” is stored already. Choose it among the stored ones, or give this one another id.` }];
}

/** The id of the arrival, or what stands against it. */
async function bringArrival({ stationId, readings, note, keep }: Bringing, { isUnsure }: Progress): Promise<number | readonly Issue[]> {
  const same = await sameReadings(stationId, readings);
  if (same.kind !== "done") return same.issues;
  if (same.reply !== null) {
    return isUnsure ? same.reply : [{ path: "", message: `The same readings of this station are in already, as arrival ${same.reply}. They were not brought in again.` }];
  }
  const body = { station: stationId, event: keep.way === "event" ? keep.event : null, note: note.trim(), readings };
  const asked = await askServer<{ id: number }>("/api/v1/arrivals", { method: "POST", body, unheard: UNHEARD });
  return asked.kind === "done" ? asked.reply.id : asked.issues;
}

interface ReadingThere {
  readonly arrival: number;
  readonly time: string;
  readonly frequencyHz: number;
}

/** The arrival of the station that holds just these readings, if one does. */
async function sameReadings(stationId: string, readings: readonly NewReading[]): Promise<Asked<number | null>> {
  const times = readings.map(({ time }) => Date.parse(time));
  const query = new URLSearchParams({ station: stationId, from: new Date(Math.min(...times)).toISOString(), to: new Date(Math.max(...times) + 1000).toISOString(), limit: "99999" });
  const asked = await askServer<{ readings: readonly ReadingThere[] }>(`/api/v1/readings?${query.toString()}`, { unheard: UNHEARD });
  if (asked.kind !== "done") return asked;
  const wanted = readings.map(({ time, frequencyHz, periodSeconds }) => signature(Date.parse(time), frequencyHz ?? 1 / (periodSeconds ?? NaN)));
  const there = new Map<number, string[]>();
  for (const { arrival, time, frequencyHz } of asked.reply.readings) there.set(arrival, [...(there.get(arrival) ?? []), signature(Date.parse(time), frequencyHz)]);
  const alike = [...there].find(([, own]) => own.sort().join() === wanted.sort().join());
  return { kind: "done", reply: alike?.[0] ?? null };
}

function signature(epochMilliseconds: number, frequencyHz: number): string {
  return `${epochMilliseconds} ${frequencyHz.toPrecision(9)}`;
}

async function makeEvent(title: string, arrivalId: number, { isUnsure }: Progress): Promise<Asked<{ id: string; title: string }>> {
  if (isUnsure) {
    const found = await askServer<{ event: string | null }>(`/api/v1/arrivals/${arrivalId}`, { unheard: UNHEARD });
    if (found.kind !== "done") return found;
    if (found.reply.event !== null) return { kind: "done", reply: { id: found.reply.event, title } };
  }
  return askServer<{ id: string; title: string }>("/api/v1/events", { method: "POST", body: { title, arrivals: [arrivalId] }, unheard: UNHEARD });
}
