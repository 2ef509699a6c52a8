import { isDeepStrictEqual } from "node:util";
import type { Doing, StationToSave, StoredStation } from "#lib/application/ports.ts";
import type { StationDescription } from "#lib/core/arrival/station-description.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import { addToAudit } from "./audit.ts";
import type { Prisma, PrismaClient } from "./generated/client.ts";
import { deploymentRow } from "./observation-rows.ts";
import { requireRevision } from "./stale.ts";
import { descriptionFromRow, WHOLE_STATION } from "./station-from-row.ts";

type Transaction = Prisma.TransactionClient;

export async function listStations(reader: PrismaClient, only?: string): Promise<StoredStation[]> {
  return reader.$transaction(async (snapshot) => {
    const where = only === undefined ? {} : { id: only };
    const rows = await snapshot.station.findMany({ where, orderBy: { id: "asc" }, include: { ...WHOLE_STATION, _count: { select: { arrivals: true } } } });
    const last = await snapshot.$queryRaw<{ stationId: string; last: number }[]>`
      SELECT a.station_id AS stationId, MAX(r.arrival_epoch_seconds) AS last
      FROM arrivals a JOIN readings r ON r.arrival_id = a.id GROUP BY a.station_id`;
    const lastOf = new Map(last.map((row) => [row.stationId, row.last]));
    return rows.map((row) => ({
      ...descriptionFromRow(row),
      revision: row.revision,
      arrivalCount: row._count.arrivals,
      lastReadingEpochSeconds: lastOf.get(row.id) ?? null,
    }));
  });
}

/** Saves within a transaction that the caller has opened; see `StationStore.saveStations`. */
export async function saveStations(transaction: Transaction, stations: readonly StationToSave[], doing: Doing): Promise<void> {
  const before = new Map<string, { description: StationDescription; revision: number }>();
  for (const { description, startedFrom } of stations) {
    const row = await transaction.station.findUnique({ where: { id: description.id }, include: WHOLE_STATION });
    if (row === null && startedFrom !== 0) throw new Refusal("conflict", `Station "${description.id}" is not stored any more.`);
    if (row !== null && startedFrom === 0) throw new Refusal("conflict", `Station "${description.id}" is stored already.`);
    if (row === null) continue;
    requireRevision(`Station "${description.id}"`, row, startedFrom);
    before.set(description.id, { description: descriptionFromRow(row), revision: row.revision });
  }
  await makeGroups(transaction, stations);
  // All of them first, so that an alias may pass from one of these stations to another.
  await transaction.stationAlias.deleteMany({ where: { stationId: { in: [...before.keys()] } } });
  for (const { description } of stations) await saveStation(transaction, description, before.get(description.id) ?? null, doing);
}

async function makeGroups(transaction: Transaction, stations: readonly StationToSave[]): Promise<void> {
  const known = new Set((await transaction.group.findMany()).map(({ id }) => id));
  const named = new Set(stations.map(({ description }) => description.groupId));
  await transaction.group.createMany({ data: [...named].filter((id) => !known.has(id)).map((id) => ({ id, name: id })) });
}

async function saveStation(transaction: Transaction, description: StationDescription, before: { description: StationDescription; revision: number } | null, doing: Doing): Promise<void> {
  const { id, aliases, deployments, clockCorrections, ...plain } = description;
  const revision = (before?.revision ?? 0) + 1;
  if (before === null) await transaction.station.create({ data: { id, ...plain } });
  else await transaction.station.update({ where: { id }, data: { ...plain, revision } });

  await requireFreeAliases(transaction, description);
  await transaction.stationAlias.createMany({ data: aliases.map((alias, ordinal) => ({ stationId: id, ordinal, ...alias })) });
  if (!isDeepStrictEqual(before?.description.deployments, deployments)) {
    await transaction.deployment.deleteMany({ where: { stationId: id } });
    await createDeployments(transaction, deployments);
  }
  await transaction.clockCorrection.deleteMany({ where: { stationId: id } });
  await transaction.clockCorrection.createMany({ data: clockCorrections.map((correction, ordinal) => ({ ...correction, stationId: id, ordinal })) });
  const action = before === null ? "station made" : "station changed";
  await addToAudit(transaction, doing, { action, subject: `station ${id}`, detail: { revision, before: before?.description ?? null, after: description } });
}

export async function createDeployments(transaction: Transaction, deployments: StationDescription["deployments"]): Promise<void> {
  for (const [ordinal, deployment] of deployments.entries()) {
    const { shelf, ...row } = deploymentRow(deployment, ordinal);
    // Legs apart, and only where there are any: a create that nests them costs four statements.
    const { id } = await transaction.deployment.create({ data: row });
    if (shelf.length > 0) await transaction.shelfLeg.createMany({ data: shelf.map((leg, place) => ({ deploymentId: id, ordinal: place, ...leg })) });
  }
}

async function requireFreeAliases(transaction: Transaction, { id, aliases }: StationDescription): Promise<void> {
  if (aliases.length === 0) return;
  const taken = await transaction.stationAlias.findFirst({ where: { OR: aliases.map(({ scheme, value }) => ({ scheme, value })), NOT: { stationId: id } } });
  if (taken === null) return;
  throw new Refusal("conflict", `The alias ${taken.scheme}:${taken.value} is station "${taken.stationId}"'s, and so cannot be "${id}"'s.`);
}

export async function removeStation(transaction: Transaction, id: string, startedFrom: number, doing: Doing): Promise<void> {
  const row = await transaction.station.findUnique({ where: { id }, include: { ...WHOLE_STATION, _count: { select: { arrivals: true } } } });
  if (row === null) throw new Refusal("not-found", `No station "${id}" is stored.`);
  requireRevision(`Station "${id}"`, row, startedFrom);
  const count = row._count.arrivals;
  if (count > 0) throw new Refusal("conflict", `Station "${id}" has ${count === 1 ? "an arrival" : `${count} arrivals`}, and stays with them. End its last deployment instead.`);
  await transaction.deployment.deleteMany({ where: { stationId: id } });
  await transaction.station.delete({ where: { id } });
  await addToAudit(transaction, doing, { action: "station removed", subject: `station ${id}`, detail: { before: descriptionFromRow(row) } });
}
