import type { Doing, EventToOpen, EventVersion } from "#lib/application/ports.ts";
import { InputError } from "#lib/core/failures/input-error.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import { addToAudit } from "./audit.ts";
import { changeEvent, nextOrdinal, requireEvent, requireUnmerged } from "./event-change.ts";
import { freeEventId } from "./free-event-id.ts";
import type { Arrival, Event, Prisma } from "./generated/client.ts";
import { moveTo } from "./move-arrival.ts";
import { requireRevision } from "./stale.ts";

type Transaction = Prisma.TransactionClient;

/** Each within a transaction that the caller has opened; see `EventStore`. */
export async function openEvent(transaction: Transaction, event: EventToOpen, doing: Doing): Promise<string> {
  const found = new Map((await transaction.arrival.findMany({ where: { id: { in: [...event.arrivalIds] } } })).map((row) => [row.id, row]));
  const arrivals = event.arrivalIds.map((id, place) => found.get(id) ?? unknownArrival(id, place, "an arrival that is stored"));
  // Its maker has seen no revision of another event, and so takes nothing away from one.
  for (const { id, eventId } of arrivals) {
    if (eventId !== null) throw new Refusal("conflict", `Arrival ${id} belongs to event "${eventId}". Move it from there, or split that event.`);
  }
  return makeEvent(transaction, event, arrivals, doing);
}

export async function editEvent(transaction: Transaction, edit: { id: string; startedFrom: number; title: string; note: string }, doing: Doing): Promise<number> {
  const { id, startedFrom, title, note } = edit;
  const before = await requireVersion(transaction, { id, startedFrom });
  if (before.title === title && before.note === note) return before.revision;
  const detail = { before: { title: before.title, note: before.note }, after: { title, note } };
  return changeEvent(transaction, { id, action: "event described", detail, data: { title, note } }, doing);
}

export async function mergeEvents(transaction: Transaction, { into, from }: { into: EventVersion; from: EventVersion }, doing: Doing): Promise<void> {
  if (into.id === from.id) throw new Refusal("conflict", `Event "${into.id}" cannot be merged into itself.`);
  await requireVersion(transaction, into);
  await requireVersion(transaction, from);
  const moving = await transaction.arrival.findMany({ where: { eventId: from.id }, orderBy: { ordinal: "asc" } });
  await moveAll(transaction, moving, { eventId: into.id, after: await nextOrdinal(transaction, into.id) }, doing);
  const detail = { into: into.id, from: from.id, arrivals: moving.map(({ id }) => id) };
  await changeEvent(transaction, { id: into.id, action: "events merged", detail }, doing);
  await changeEvent(transaction, { id: from.id, action: "events merged", detail, data: { mergedInto: into.id } }, doing);
}

export async function splitEvent(transaction: Transaction, { from, event }: { from: EventVersion; event: EventToOpen }, doing: Doing): Promise<string> {
  await requireVersion(transaction, from);
  const own = await transaction.arrival.findMany({ where: { eventId: from.id }, orderBy: { ordinal: "asc" } });
  const arrivals = event.arrivalIds.map((id, place) => own.find((row) => row.id === id) ?? unknownArrival(id, place, `an arrival of event "${from.id}"`));
  if (arrivals.length === own.length) {
    throw new InputError([{ code: "nothing-left", path: "arrivals", message: `arrivals: found all of event "${from.id}"; wanted some of them, so that it keeps one at least.` }]);
  }
  const made = await makeEvent(transaction, event, arrivals, doing);
  await changeEvent(transaction, { id: from.id, action: "event split", detail: { to: made, arrivals: event.arrivalIds } }, doing);
  return made;
}

async function makeEvent(transaction: Transaction, event: EventToOpen, arrivals: readonly Arrival[], doing: Doing): Promise<string> {
  const { title, note, arrivalIds } = event;
  const id = event.id ?? (await freeEventId(transaction, arrivalIds, doing.savedEpochSeconds));
  await requireFreeId(transaction, id);
  await transaction.event.create({ data: { id, title, note, savedEpochSeconds: doing.savedEpochSeconds } });
  await moveAll(transaction, arrivals, { eventId: id, after: 0 }, doing);
  await addToAudit(transaction, doing, { action: "event saved", subject: `event ${id}`, detail: { arrivals: arrivalIds } });
  return id;
}

async function moveAll(transaction: Transaction, arrivals: readonly Arrival[], { eventId, after }: { eventId: string; after: number }, doing: Doing): Promise<void> {
  for (const [place, arrival] of arrivals.entries()) await moveTo(transaction, arrival, { eventId, ordinal: after + place }, doing);
}

async function requireFreeId(transaction: Transaction, id: string): Promise<void> {
  if ((await transaction.event.findUnique({ where: { id } })) !== null) throw new Refusal("conflict", `An event "${id}" is stored already.`);
}

async function requireVersion(transaction: Transaction, { id, startedFrom }: EventVersion): Promise<Event> {
  const event = await requireEvent(transaction, id);
  requireUnmerged(event);
  requireRevision(`Event "${id}"`, event, startedFrom);
  return event;
}

function unknownArrival(id: number, place: number, wanted: string): never {
  throw new InputError([{ code: "unknown-arrival", path: `arrivals[${place}]`, message: `arrivals[${place}]: found ${id}; wanted ${wanted}.` }]);
}
