import { isDeepStrictEqual } from "node:util";
import { z } from "zod";
import type { Doing, StationToSave, StoredStation } from "#lib/application/ports.ts";
import type { StationDescription } from "#lib/core/arrival/station-description.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import { addToAudit } from "./audit.ts";
import { changeEvent } from "./event-change.ts";
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
      FROM arrivals a JOIN readings r ON r.arrival_id = a.id ${only === undefined ? Prisma.empty : Prisma.sql`WHERE a.station_id = ${only}`} GROUP BY a.station_id`;
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
  const stored = await loadBefore(transaction, stations);
  for (const { description: { id }, startedFrom } of stations) {
    const one = stored.get(id);
    if (one === undefined && startedFrom !== 0) throw new Refusal("conflict", `Station "${id}" is not stored any more.`);
    if (one !== undefined && startedFrom === 0) throw new Refusal("conflict", `Station "${id}" is stored already.`);
    if (one !== undefined) requireRevision(`Station "${id}"`, one, startedFrom);
  }
  // What says nothing new is no change, and makes nobody's work stale.
  const descriptions = stations.map(({ description }) => description).filter((after) => !isDeepStrictEqual(stored.get(after.id)?.description, after));
  const changed = new Set(descriptions.map(({ id }) => id));
  const before = new Map([...stored].filter(([id]) => changed.has(id)));
  const revisions = await nextRevisions(transaction, descriptions, before);
  await makeGroups(transaction, descriptions);
  await saveOwnRows(transaction, descriptions, revisions);
  await saveAliases(transaction, descriptions, before);
  await saveDeployments(transaction, descriptions.filter(({ id, deployments }) => !isDeepStrictEqual(before.get(id)?.description.deployments, deployments)));
  await saveClockCorrections(transaction, descriptions, before);
  await tellEvents(transaction, descriptions.filter((after) => changesAnswers(before.get(after.id), after)), doing);
  const lines = descriptions.map((after) => auditRow(after, { before: before.get(after.id) ?? null, revision: revisions.get(after.id) ?? 1 }, doing));
  await insertRows(transaction, "audit_entries (at_epoch_seconds, actor, action, subject, detail_json)", lines.map((line) => [line.atEpochSeconds, line.actor, line.action, line.subject, line.detail]));
}

async function loadBefore(transaction: Transaction, stations: readonly StationToSave[]): Promise<Map<string, Before>> {
  const rows = await loadWholeStations(transaction, stations.map(({ description }) => description.id));
  return new Map(rows.map((row) => [row.id, { description: descriptionFromRow(row), revision: row.revision }]));
}

/** A station that was removed and is made anew goes on from where it was: its old revisions are stale for good. */
async function nextRevisions(transaction: Transaction, descriptions: readonly StationDescription[], before: ReadonlyMap<string, Before>): Promise<Map<string, number>> {
  const next = new Map([...before].map(([id, { revision }]) => [id, revision + 1]));
  await inChunks(descriptions.map(({ id }) => `station ${id}`), async (subjects) => {
    const removed = await transaction.auditEntry.findMany({ where: { subject: { in: subjects }, action: REMOVED }, select: { subject: true, detail: true } });
    for (const { subject, detail } of removed) {
      const id = subject.slice("station ".length);
      const { revision } = Removal.parse(JSON.parse(detail));
      next.set(id, Math.max(next.get(id) ?? 1, revision + 1));
    }
  });
  return next;
}

const REMOVED = "station removed";
const Removal = z.object({ revision: z.number() });

async function makeGroups(transaction: Transaction, descriptions: readonly StationDescription[]): Promise<void> {
  const known = new Set((await transaction.group.findMany()).map(({ id }) => id));
  const named = new Set(descriptions.map(({ groupId }) => groupId));
  await transaction.group.createMany({ data: [...named].filter((id) => !known.has(id)).map((id) => ({ id, name: id })) });
}

/**
 * Rows of one table, many in a statement. The client's own way takes three times as long, for it makes a plan of each
 * row. Names of tables and columns are this file's own and never anybody's input.
 */
async function insertRows(transaction: Transaction, into: string, rows: readonly (readonly (string | number | null)[])[], then = ""): Promise<void> {
  await inChunks(rows, (some) => {
    const values = some.map((row) => Prisma.sql`(${Prisma.join([...row])})`);
    return transaction.$executeRaw`INSERT INTO ${Prisma.raw(into)} VALUES ${Prisma.join(values)} ${Prisma.raw(then)}`;
  });
}

/** New rows and changed ones alike. */
async function saveOwnRows(transaction: Transaction, descriptions: readonly StationDescription[], revisions: ReadonlyMap<string, number>): Promise<void> {
  const columns = ["revision", "group_id", "licence", "attribution", "contact", "doi", "visibility", "embargo_until_epoch_seconds", "note"];
  const rows = descriptions.map(({ id, groupId, licence, attribution, contact, doi, visibility, embargoUntilEpochSeconds, note }) => {
    return [id, revisions.get(id) ?? 1, groupId, licence, attribution, contact, doi, visibility, embargoUntilEpochSeconds, note];
  });
  const set = columns.map((column) => `${column} = excluded.${column}`).join(", ");
  await insertRows(transaction, `stations (id, ${columns.join(", ")})`, rows, `ON CONFLICT (id) DO UPDATE SET ${set}`);
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
  await insertRows(transaction, "station_aliases (station_id, ordinal, scheme, value)", rows.map(({ stationId, ordinal, scheme, value }) => [stationId, ordinal, scheme, value]));
}

async function saveDeployments(transaction: Transaction, descriptions: readonly StationDescription[]): Promise<void> {
  await inChunks(descriptions.map(({ id }) => id), (ids) => transaction.deployment.deleteMany({ where: { stationId: { in: ids } } }));
  const parts = descriptions.flatMap(({ deployments }) => deployments.map(deploymentRow)).map(({ shelf, ...row }) => ({ shelf, row }));
  await insertRows(transaction, `deployments (${DEPLOYMENT_COLUMNS})`, parts.map(({ row }) => deploymentValues(row)));
  const keyOf = ({ stationId, ordinal }: { stationId: string; ordinal: number }): string => JSON.stringify([stationId, ordinal]);
  const withShelf = parts.filter(({ shelf }) => shelf.length > 0);
  const idOf = new Map<string, number>();
  await inChunks([...new Set(withShelf.map(({ row }) => row.stationId))], async (ids) => {
    const stored = await transaction.deployment.findMany({ where: { stationId: { in: ids } }, select: { id: true, stationId: true, ordinal: true } });
    for (const row of stored) idOf.set(keyOf(row), row.id);
  });
  const legs = withShelf.flatMap(({ row, shelf }) => shelf.map((leg, ordinal) => ({ deploymentId: idOf.get(keyOf(row)) ?? 0, ordinal, ...leg })));
  await insertRows(transaction, "shelf_legs (deployment_id, ordinal, length_metres, depth_metres)", legs.map((leg) => [leg.deploymentId, leg.ordinal, leg.lengthMetres, leg.depthMetres]));
}

const DEPLOYMENT_COLUMNS =
  "station_id, ordinal, name, latitude_degrees, longitude_degrees, depth_metres, sensor, faces_from_degrees, faces_to_degrees, record_minutes, stamp, time_zone, from_epoch_seconds, to_epoch_seconds";

/** In the order of `DEPLOYMENT_COLUMNS`. */
function deploymentValues(row: Omit<ReturnType<typeof deploymentRow>, "shelf">): (string | number | null)[] {
  const { facesFromDegrees, facesToDegrees, recordMinutes, stamp, timeZone, fromEpochSeconds, toEpochSeconds } = row;
  const place = [row.stationId, row.ordinal, row.name, row.latitudeDegrees, row.longitudeDegrees, row.depthMetres, row.sensor];
  return [...place, facesFromDegrees, facesToDegrees, recordMinutes, stamp, timeZone, fromEpochSeconds, toEpochSeconds];
}

async function saveClockCorrections(transaction: Transaction, descriptions: readonly StationDescription[], before: ReadonlyMap<string, Before>): Promise<void> {
  await inChunks([...before.keys()], (ids) => transaction.clockCorrection.deleteMany({ where: { stationId: { in: ids } } }));
  const rows = descriptions.flatMap(({ id, clockCorrections }) => clockCorrections.map((correction, ordinal) => ({ ...correction, stationId: id, ordinal })));
  await inChunks(rows, (data) => transaction.clockCorrection.createMany({ data }));
}

/** Whether answers that this station has a part in come out otherwise than before. */
function changesAnswers(before: Before | undefined, after: StationDescription): boolean {
  if (before === undefined) return false;
  const { deployments, clockCorrections } = before.description;
  return !isDeepStrictEqual([deployments, clockCorrections], [after.deployments, after.clockCorrections]);
}

/** Counts the revision of every event that these stations have a part in up, so that whoever works on one is told. */
async function tellEvents(transaction: Transaction, descriptions: readonly StationDescription[], doing: Doing): Promise<void> {
  const stationsOf = new Map<string, string[]>();
  await inChunks(descriptions.map(({ id }) => id), async (ids) => {
    const parts = await transaction.arrival.findMany({ where: { stationId: { in: ids }, eventId: { not: null } }, distinct: ["eventId", "stationId"], select: { eventId: true, stationId: true } });
    for (const { eventId, stationId } of parts) if (eventId !== null) stationsOf.set(eventId, [...(stationsOf.get(eventId) ?? []), stationId]);
  });
  for (const [id, stations] of stationsOf) await changeEvent(transaction, { id, action: "stations described anew", detail: { stations } }, doing);
}

function auditRow(after: StationDescription, { before, revision }: { before: Before | null; revision: number }, { actor, savedEpochSeconds }: Doing) {
  const detail = { revision, before: before?.description ?? null, after };
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
  await addToAudit(transaction, doing, { action: REMOVED, subject: `station ${id}`, detail: { revision: row.revision, before: descriptionFromRow(row) } });
}
