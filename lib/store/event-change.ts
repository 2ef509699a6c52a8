import type { Doing } from "#lib/application/ports.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import { addToAudit } from "./audit.ts";
import type { Event, Prisma } from "./generated/client.ts";

type Transaction = Prisma.TransactionClient;

/** @throws Refusal `not-found` */
export async function requireEvent(transaction: Transaction, id: string): Promise<Event> {
  const event = await transaction.event.findUnique({ where: { id } });
  if (event === null) throw new Refusal("not-found", `No event "${id}" is stored.`);
  return event;
}

/** The place behind an event's last arrival. @throws Refusal `not-found`; `conflict` where it was merged into another. */
export async function nextOrdinal(transaction: Transaction, eventId: string): Promise<number> {
  requireUnmerged(await requireEvent(transaction, eventId));
  const last = await transaction.arrival.findFirst({ where: { eventId }, orderBy: { ordinal: "desc" } });
  return (last?.ordinal ?? -1) + 1;
}

export function requireUnmerged({ id, mergedInto }: Event): void {
  if (mergedInto !== null) throw new Refusal("conflict", `Event "${id}" was merged into "${mergedInto}" and takes no more changes.`);
}

/** Counts the event's revision up and writes what was done into its audit trail. Gives the new revision. */
export async function changeEvent(transaction: Transaction, change: { id: string; action: string; detail: object; data?: Prisma.EventUncheckedUpdateInput }, doing: Doing): Promise<number> {
  const { id, action, detail, data = {} } = change;
  const { revision } = await transaction.event.update({ where: { id }, data: { ...data, revision: { increment: 1 } } });
  await addToAudit(transaction, doing, { action, subject: `event ${id}`, detail: { ...detail, revision } });
  return revision;
}
