import { isDeepStrictEqual } from "node:util";
import type { Doing, EventToSave } from "#lib/application/ports.ts";
import type { Deployment } from "#lib/core/arrival/observations.ts";
import { NOT_EVALUATED } from "#lib/core/arrival/quality.ts";
import { UNDESCRIBED } from "#lib/core/arrival/station-description.ts";
import { InputError } from "#lib/core/failures/input-error.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import { addToAudit } from "./audit.ts";
import type { Prisma } from "./generated/client.ts";
import { estimateRow, readingRow } from "./observation-rows.ts";
import { deploymentFromRow } from "./observations-from-rows.ts";
import { saveStations } from "./stations.ts";

/** Writes an event within a transaction that the caller has opened; see `EventStore.saveEvent`. */
export async function saveEvent(transaction: Prisma.TransactionClient, event: EventToSave): Promise<void> {
  const { deployments, readings, estimates } = event.observations;
  const deploymentsOf = byStation(deployments);
  requireKnownStations(event, deploymentsOf);

  if ((await transaction.event.findUnique({ where: { id: event.id } })) !== null) {
    throw new Refusal("conflict", `An event "${event.id}" is stored already.`);
  }
  for (const own of deploymentsOf.values()) await keepStation(transaction, own, event);

  await transaction.event.create({
    data: { id: event.id, title: event.title, note: event.note, savedEpochSeconds: event.savedEpochSeconds },
  });
  const arrivalOf = new Map<string, number>();
  for (const [ordinal, stationId] of [...deploymentsOf.keys()].entries()) {
    const { actor, savedEpochSeconds } = event;
    const { id } = await transaction.arrival.create({ data: { stationId, eventId: event.id, ordinal, note: "", actor, savedEpochSeconds } });
    arrivalOf.set(stationId, id);
  }
  await transaction.reading.createMany({ data: readings.map(({ stationId, reading }) => readingRow(arrivalOf.get(stationId) ?? 0, { reading, quality: NOT_EVALUATED })) });
  await transaction.estimate.createMany({ data: estimates.map(({ stationId, estimate, row }) => estimateRow(arrivalOf.get(stationId) ?? 0, { estimate, row })) });
  const detail = { stations: arrivalOf.size, readings: readings.length, estimates: estimates.length };
  await addToAudit(transaction, event, { action: "event saved", subject: `event ${event.id}`, detail });
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
async function keepStation(transaction: Prisma.TransactionClient, own: readonly Deployment[], doing: Doing): Promise<void> {
  const stationId = own[0]?.stationId ?? "";
  const byOrdinal = { orderBy: { ordinal: "asc" as const } };
  const stored = await transaction.deployment.findMany({ where: { stationId }, ...byOrdinal, include: { shelf: byOrdinal } });
  if (stored.length > 0) {
    if (isDeepStrictEqual(stored.map(deploymentFromRow), own)) return;
    throw new Refusal("conflict", `Station "${stationId}" is known already, with other deployments than these.`);
  }
  const description = { ...UNDESCRIBED, id: stationId, deployments: own };
  await saveStations(transaction, [{ description, startedFrom: 0 }], doing);
}
