import type { Doing, EventToOpen, EventVersion } from "#lib/application/ports.ts";
import { InputError } from "#lib/core/failures/input-error.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import { addToAudit } from "./audit.ts";
import { changeEvent, nextOrdinal, requireEvent, requireUnmerged } from "./event-change.ts";
import type { Arrival, Event, Prisma } from "./generated/client.ts";
import { requireRevision } from "./stale.ts";

type Transaction = Prisma.TransactionClient;

/** Each within a transaction that the caller has opened; see `EventStore`. */
export async function openEvent(transaction: Transaction, event: EventToOpen, doing: Doing): Promise<void> {
  await requireFreeId(transaction, event.id);
  const found = await transaction.arrival.findMany({ where: { id: { in: [...event.arrivalIds] } } });
  const arrivals = event.arrivalIds.map((id, place) => found.find((row) => row.id === id) ?? unknownArrival(id, place, "an arrival that is stored"));
  const left = new Set(arrivals.map(({ eventId }) => eventId));
  await makeEvent(transaction, event, arrivals, doing);
  for (const id of left) {
    if (id !== null) await changeEvent(transaction, { id, action: "arrivals moved", detail: { to: event.id, arrivals: event.arrivalIds } }, doing);
  }
}

export async function editEvent(transaction: Transaction, edit: { id: string; startedFrom: number; title: string; note: string }, doing: Doing): Promise<number> {
  const { id, startedFrom, title, note } = edit;
  const before = await requireVersion(transaction, { id, startedFrom });
  const detail = { before: { title: before.title, note: before.note }, after: { title, note } };
  return changeEvent(transaction, { id, action: "event described", detail, data: { title, note } }, doing);
}

export async function mergeEvents(transaction: Transaction, { into, from }: { into: EventVersion; from: EventVersion }, doing: Doing): Promise<void> {
  if (into.id === from.id) throw new Refusal("conflict", `Event "${into.id}" cannot be merged into itself.`);
  await requireVersion(transaction, into);
  await requireVersion(transaction, from);
  const moving = await transaction.arrival.findMany({ where: { eventId: from.id }, orderBy: { ordinal: "asc" } });
  await moveAll(transaction, moving, { eventId: into.id, after: await nextOrdinal(transaction, into.id) });
  const detail = { into: into.id, from: from.id, arrivals: moving.map(({ id }) => id) };
  await changeEvent(transaction, { id: into.id, action: "events merged", detail }, doing);
  await changeEvent(transaction, { id: from.id, action: "events merged", detail, data: { mergedInto: into.id } }, doing);
}

export async function splitEvent(transaction: Transaction, { from, event }: { from: EventVersion; event: EventToOpen }, doing: Doing): Promise<void> {
  await requireVersion(transaction, from);
  await requireFreeId(transaction, event.id);
  const own = await transaction.arrival.findMany({ where: { eventId: from.id }, orderBy: { ordinal: "asc" } });
  const arrivals = event.arrivalIds.map((id, place) => own.find((row) => row.id === id) ?? unknownArrival(id, place, `an arrival of event "${from.id}"`));
  if (arrivals.length === own.length) {
    throw new InputError([{ code: "nothing-left", path: "arrivals", message: `arrivals: found all of event "${from.id}"; wanted some of them, so that it keeps one at least.` }]);
  }
  await makeEvent(transaction, event, arrivals, doing);
  await changeEvent(transaction, { id: from.id, action: "event split", detail: { to: event.id, arrivals: event.arrivalIds } }, doing);
}

async function makeEvent(transaction: Transaction, { id, title, note }: EventToOpen, arrivals: readonly Arrival[], doing: Doing): Promise<void> {
  await transaction.event.create({ data: { id, title, note, savedEpochSeconds: doing.savedEpochSeconds } });
  await moveAll(transaction, arrivals, { eventId: id, after: 0 });
  await addToAudit(transaction, doing, { action: "event saved", subject: `event ${id}`, detail: { arrivals: arrivals.map((arrival) => arrival.id) } });
}

async function moveAll(transaction: Transaction, arrivals: readonly Arrival[], to: { eventId: string; after: number }): Promise<void> {
  for (const [place, { id, revision }] of arrivals.entries()) {
    await transaction.arrival.update({ where: { id }, data: { eventId: to.eventId, ordinal: to.after + place, revision: revision + 1 } });
  }
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
