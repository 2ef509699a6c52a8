import type { Doing } from "#lib/application/ports.ts";
import { addToAudit } from "./audit.ts";
import type { Arrival, Prisma } from "./generated/client.ts";

/** Gives an arrival its new place, its next revision, and the line in its own audit trail. The events' lines are the caller's. */
export async function moveTo(transaction: Prisma.TransactionClient, arrival: Arrival, to: { eventId: string | null; ordinal: number | null }, doing: Doing): Promise<number> {
  const { id, stationId: station, eventId: from } = arrival;
  const { revision } = await transaction.arrival.update({ where: { id }, data: { ...to, revision: arrival.revision + 1 } });
  await addToAudit(transaction, doing, { action: "arrival moved", subject: `arrival ${id}`, detail: { arrival: id, station, from, to: to.eventId, revision } });
  return revision;
}
