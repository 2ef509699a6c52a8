import { isDeepStrictEqual } from "node:util";
import type { Doing, StationToSave, StoredStation } from "#lib/application/ports.ts";
import type { StationDescription } from "#lib/core/arrival/station-description.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import { addToAudit } from "./audit.ts";
import { Prisma, type PrismaClient } from "./generated/client.ts";
import { deploymentRow } from "./observation-rows.ts";
import { requireRevision } from "./stale.ts";
import { descriptionFromRow, inChunks, loadWholeStations, WHOLE_STATION } from "./station-from-row.ts";

type Transaction = Prisma.TransactionClient;

export async function listStations(reader: PrismaClient, only?: string): Promise<StoredStation[]> {
  return reader.$transaction(async (snapshot) => {
    const rows = await loadWholeStations(snapshot, only === undefined ? null : [only]);
    const counts = await snapshot.arrival.groupBy({ by: ["stationId"], _count: true, ...(only === undefined ? {} : { where: { stationId: only } }) });
    const countOf = new Map(counts.map(({ stationId, _count }) => [stationId, _count]));
    const last = await snapshot.$queryRaw<{ stationId: string; last: number }[]>`
      SELECT a.station_id AS stationId, MAX(r.arrival_epoch_seconds) AS last
      FROM arrivals a JOIN readings r ON r.arrival_id = a.id GROUP BY a.station_id`;
    const lastOf = new Map(last.map((row) => [row.stationId, row.last]));
    return rows.map((row) => ({
      ...descriptionFromRow(row),
      revision: row.revision,
      arrivalCount: countOf.get(row.id) ?? 0,
      lastReadingEpochSeconds: lastOf.get(row.id) ?? null,
    }));
  });
}

interface Before {
  readonly description: StationDescription;
  readonly revision: number;
}

/**
 * Saves within a transaction that the caller has opened; see `StationStore.saveStations`. Rows of one table are written
 * together: statement by statement, thousands of stations would hold up everybody else's writes.
 */
export async function saveStations(transaction: Transaction, stations: readonly StationToSave[], doing: Doing): Promise<void> {
  const before = await loadBefore(transaction, stations);
  for (const { description: { id }, startedFrom } of stations) {
    const stored = before.get(id);
    if (stored === undefined && startedFrom !== 0) throw new Refusal("conflict", `Station "${id}" is not stored any more.`);
    if (stored !== undefined && startedFrom === 0) throw new Refusal("conflict", `Station "${id}" is stored already.`);
    if (stored !== undefined) requireRevision(`Station "${id}"`, stored, startedFrom);
  }
  const descriptions = stations.map(({ description }) => description);
  await makeGroups(transaction, descriptions);
  await saveOwnRows(transaction, descriptions, before);
  await saveAliases(transaction, descriptions, before);
  await saveDeployments(transaction, descriptions.filter(({ id, deployments }) => !isDeepStrictEqual(before.get(id)?.description.deployments, deployments)));
  await saveClockCorrections(transaction, descriptions, before);
  await inChunks(descriptions.map((after) => auditRow(after, before.get(after.id) ?? null, doing)), (data) => transaction.auditEntry.createMany({ data }));
}

async function loadBefore(transaction: Transaction, stations: readonly StationToSave[]): Promise<Map<string, Before>> {
  const rows = await loadWholeStations(transaction, stations.map(({ description }) => description.id));
  return new Map(rows.map((row) => [row.id, { description: descriptionFromRow(row), revision: row.revision }]));
}

async function makeGroups(transaction: Transaction, descriptions: readonly StationDescription[]): Promise<void> {
  const known = new Set((await transaction.group.findMany()).map(({ id }) => id));
  const named = new Set(descriptions.map(({ groupId }) => groupId));
  await transaction.group.createMany({ data: [...named].filter((id) => !known.has(id)).map((id) => ({ id, name: id })) });
}

/** New rows and changed ones in one statement: the client's own way to change rows takes a statement for each. */
async function saveOwnRows(transaction: Transaction, descriptions: readonly StationDescription[], before: ReadonlyMap<string, Before>): Promise<void> {
  await inChunks(descriptions, (some) => {
    const rows = some.map(({ id, groupId, licence, attribution, contact, doi, visibility, embargoUntilEpochSeconds, note }) => {
      const revision = (before.get(id)?.revision ?? 0) + 1;
      return Prisma.sql`(${id}, ${revision}, ${groupId}, ${licence}, ${attribution}, ${contact}, ${doi}, ${visibility}, ${embargoUntilEpochSeconds}, ${note})`;
    });
    return transaction.$executeRaw`
      INSERT INTO stations (id, revision, group_id, licence, attribution, contact, doi, visibility, embargo_until_epoch_seconds, note)
      VALUES ${Prisma.join(rows)}
      ON CONFLICT (id) DO UPDATE SET revision = excluded.revision, group_id = excluded.group_id, licence = excluded.licence,
        attribution = excluded.attribution, contact = excluded.contact, doi = excluded.doi, visibility = excluded.visibility,
        embargo_until_epoch_seconds = excluded.embargo_until_epoch_seconds, note = excluded.note`;
  });
}

/** Those of all these stations go first, so that an alias may pass from one of them to another. */
async function saveAliases(transaction: Transaction, descriptions: readonly StationDescription[], before: ReadonlyMap<string, Before>): Promise<void> {
  await inChunks([...before.keys()], (ids) => transaction.stationAlias.deleteMany({ where: { stationId: { in: ids } } }));
  const rows = descriptions.flatMap(({ id, aliases }) => aliases.map((alias, ordinal) => ({ stationId: id, ordinal, ...alias })));
  const ownerOf = new Map<string, string>();
  const nameOf = ({ scheme, value }: { scheme: string; value: string }): string => `${scheme}:${value}`;
  await inChunks([...new Set(rows.map(({ value }) => value))], async (values) => {
    for (const taken of await transaction.stationAlias.findMany({ where: { value: { in: values } } })) ownerOf.set(nameOf(taken), taken.stationId);
  });
  for (const row of rows) {
    const owner = ownerOf.get(nameOf(row));
    if (owner !== undefined) throw new Refusal("conflict", `The alias ${nameOf(row)} is station "${owner}"'s, and so cannot be "${row.stationId}"'s.`);
    ownerOf.set(nameOf(row), row.stationId);
  }
  await inChunks(rows, (data) => transaction.stationAlias.createMany({ data }));
}

async function saveDeployments(transaction: Transaction, descriptions: readonly StationDescription[]): Promise<void> {
  await inChunks(descriptions.map(({ id }) => id), (ids) => transaction.deployment.deleteMany({ where: { stationId: { in: ids } } }));
  const parts = descriptions.flatMap(({ deployments }) => deployments.map(deploymentRow)).map(({ shelf, ...row }) => ({ shelf, row }));
  await inChunks(parts.map(({ row }) => row), (data) => transaction.deployment.createMany({ data }));
  const keyOf = ({ stationId, ordinal }: { stationId: string; ordinal: number }): string => JSON.stringify([stationId, ordinal]);
  const withShelf = parts.filter(({ shelf }) => shelf.length > 0);
  const idOf = new Map<string, number>();
  await inChunks([...new Set(withShelf.map(({ row }) => row.stationId))], async (ids) => {
    const stored = await transaction.deployment.findMany({ where: { stationId: { in: ids } }, select: { id: true, stationId: true, ordinal: true } });
    for (const row of stored) idOf.set(keyOf(row), row.id);
  });
  const legs = withShelf.flatMap(({ row, shelf }) => shelf.map((leg, ordinal) => ({ deploymentId: idOf.get(keyOf(row)) ?? 0, ordinal, ...leg })));
  await inChunks(legs, (data) => transaction.shelfLeg.createMany({ data }));
}

async function saveClockCorrections(transaction: Transaction, descriptions: readonly StationDescription[], before: ReadonlyMap<string, Before>): Promise<void> {
  await inChunks([...before.keys()], (ids) => transaction.clockCorrection.deleteMany({ where: { stationId: { in: ids } } }));
  const rows = descriptions.flatMap(({ id, clockCorrections }) => clockCorrections.map((correction, ordinal) => ({ ...correction, stationId: id, ordinal })));
  await inChunks(rows, (data) => transaction.clockCorrection.createMany({ data }));
}

function auditRow(after: StationDescription, before: Before | null, { actor, savedEpochSeconds }: Doing) {
  const detail = { revision: (before?.revision ?? 0) + 1, before: before?.description ?? null, after };
  const action = before === null ? "station made" : "station changed";
  return { atEpochSeconds: savedEpochSeconds, actor, action, subject: `station ${after.id}`, detail: JSON.stringify(detail) };
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
