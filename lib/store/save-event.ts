import { isDeepStrictEqual } from "node:util";
import type { EventToSave } from "#lib/application/ports.ts";
import type { Deployment } from "#lib/core/arrival/observations.ts";
import { InputError } from "#lib/core/failures/input-error.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import type { Prisma } from "./generated/client.ts";
import { deploymentRow, estimateRow, readingRow } from "./observation-rows.ts";
import { deploymentFromRow } from "./observations-from-rows.ts";

/** Writes an event within a transaction that the caller has opened; see `EventStore.saveEvent`. */
export async function saveEvent(transaction: Prisma.TransactionClient, event: EventToSave): Promise<void> {
  const { deployments, readings, estimates } = event.observations;
  const deploymentsOf = byStation(deployments);
  requireKnownStations(event, deploymentsOf);

  if ((await transaction.event.findUnique({ where: { id: event.id } })) !== null) {
    throw new Refusal("conflict", `An event "${event.id}" is stored already.`);
  }
  for (const [stationId, own] of deploymentsOf) await keepStation(transaction, stationId, own);

  await transaction.event.create({
    data: { id: event.id, title: event.title, note: event.note, savedEpochSeconds: event.savedEpochSeconds },
  });
  const parts = [...deploymentsOf.keys()].map((stationId, ordinal) => ({ eventId: event.id, stationId, ordinal }));
  await transaction.eventStation.createMany({ data: parts });
  await transaction.reading.createMany({ data: readings.map((item, ordinal) => readingRow(event.id, item, ordinal)) });
  await transaction.estimate.createMany({ data: estimates.map((item, ordinal) => estimateRow(event.id, item, ordinal)) });
  await transaction.auditEntry.create({
    data: {
      atEpochSeconds: event.savedEpochSeconds,
      actor: event.actor,
      action: "event saved",
      subject: `event ${event.id}`,
      detail: JSON.stringify({ stations: parts.length, readings: readings.length, estimates: estimates.length }),
    },
  });
}

function byStation(deployments: readonly Deployment[]): Map<string, Deployment[]> {
  const groups = new Map<string, Deployment[]>();
  for (const deployment of deployments) {
    const group = groups.get(deployment.stationId);
    if (group === undefined) groups.set(deployment.stationId, [deployment]);
    else group.push(deployment);
  }
  return groups;
}

function requireKnownStations(event: EventToSave, known: ReadonlyMap<string, unknown>): void {
  const { readings, estimates } = event.observations;
  const named = [
    ...readings.map((item, place) => ({ stationId: item.stationId, path: `observations.readings[${place}].stationId` })),
    ...estimates.map((item, place) => ({ stationId: item.stationId, path: `observations.estimates[${place}].stationId` })),
  ];
  const issues = named
    .filter((item) => !known.has(item.stationId))
    .map(({ stationId, path }) => ({
      code: "unknown-station",
      path,
      message: `Station "${stationId}" has no deployment, so nobody knows where it stood.`,
    }));
  if (issues.length > 0) throw new InputError(issues);
}

/** A station is described once. Another event may bring it again, word for word. */
async function keepStation(transaction: Prisma.TransactionClient, stationId: string, own: readonly Deployment[]): Promise<void> {
  const byOrdinal = { orderBy: { ordinal: "asc" as const } };
  const stored = await transaction.deployment.findMany({ where: { stationId }, ...byOrdinal, include: { shelf: byOrdinal } });
  if (stored.length > 0) {
    if (isDeepStrictEqual(stored.map(deploymentFromRow), own)) return;
    throw new Refusal("conflict", `Station "${stationId}" is known already, with other deployments than these.`);
  }
  await transaction.station.create({ data: { id: stationId } });
  for (const [ordinal, deployment] of own.entries()) {
    await transaction.deployment.create({ data: deploymentRow(deployment, ordinal) });
  }
}
