import type { ArrivalFilter, ArrivalSummary, ArrivalToSave, Doing, ReadingFilter, StoredArrival } from "#lib/application/ports.ts";
import type { GatheredReading } from "#lib/core/arrival/gathered-observations.ts";
import type { QualityFlag } from "#lib/core/arrival/quality.ts";
import { InputError } from "#lib/core/failures/input-error.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import { addToAudit } from "./audit.ts";
import { changeEvent, nextOrdinal } from "./event-change.ts";
import type { Prisma, PrismaClient } from "./generated/client.ts";
import { estimateRow, readingRow } from "./observation-rows.ts";
import { estimateFromRow, readingFromRow } from "./observations-from-rows.ts";
import { moveTo } from "./move-arrival.ts";
import { requireRevision } from "./stale.ts";

type Transaction = Prisma.TransactionClient;

const WITH_OBSERVATIONS = { readings: { orderBy: { id: "asc" } }, estimates: { orderBy: { id: "asc" } } } as const satisfies Prisma.ArrivalInclude;

export async function listArrivals(reader: PrismaClient, filter: ArrivalFilter): Promise<StoredArrival[]> {
  const { stationId, eventId, afterId, limit } = filter;
  const where = { ...(stationId === undefined ? {} : { stationId }), ...(eventId === undefined ? {} : { eventId }), ...(afterId === undefined ? {} : { id: { gt: afterId } }) };
  const rows = await reader.arrival.findMany({ where, orderBy: { id: "asc" }, take: limit, include: WITH_OBSERVATIONS });
  return rows.map(arrivalFromRow);
}

export async function loadArrival(reader: PrismaClient, id: number): Promise<StoredArrival | null> {
  const row = await reader.arrival.findUnique({ where: { id }, include: WITH_OBSERVATIONS });
  return row && arrivalFromRow(row);
}

function arrivalFromRow(row: Prisma.ArrivalGetPayload<{ include: typeof WITH_OBSERVATIONS }>): StoredArrival {
  const [estimate] = row.estimates;
  return {
    ...arrivalSummary(row),
    readings: row.readings.map((reading) => readingFromRow({ ...reading, arrival: row })),
    estimate: estimate === undefined ? null : estimateFromRow({ ...estimate, arrival: row }).estimate,
  };
}

export function arrivalSummary(row: Prisma.ArrivalGetPayload<object>): ArrivalSummary {
  const { id, stationId, eventId, note, revision, actor, savedEpochSeconds } = row;
  return { id, stationId, eventId, note, revision, actor, savedEpochSeconds };
}

export async function listReadings(reader: PrismaClient, filter: ReadingFilter): Promise<GatheredReading[]> {
  const { stationId, afterId, fromEpochSeconds, toEpochSeconds, limit } = filter;
  const rows = await reader.reading.findMany({
    where: {
      ...(stationId === undefined ? {} : { arrival: { stationId } }),
      ...(afterId === undefined ? {} : { id: { gt: afterId } }),
      arrivalEpochSeconds: { ...(fromEpochSeconds === undefined ? {} : { gte: fromEpochSeconds }), ...(toEpochSeconds === undefined ? {} : { lt: toEpochSeconds }) },
    },
    orderBy: { id: "asc" },
    take: limit,
    include: { arrival: { select: { stationId: true } } },
  });
  return rows.map(readingFromRow);
}

/** Saves within a transaction that the caller has opened; see `ArrivalStore.saveArrival`. */
export async function saveArrival(transaction: Transaction, arrival: ArrivalToSave, doing: Doing): Promise<number> {
  const { stationId, eventId, note, readings, estimate } = arrival;
  if ((await transaction.station.findUnique({ where: { id: stationId } })) === null) {
    throw new InputError([{ code: "unknown-station", path: "station", message: `station: found "${stationId}"; wanted the id of a station that is stored.` }]);
  }
  const ordinal = eventId === null ? null : await nextOrdinal(transaction, eventId);
  const { id } = await transaction.arrival.create({ data: { stationId, eventId, ordinal, note, ...doing } });
  await transaction.reading.createMany({ data: readings.map((reading) => readingRow(id, reading)) });
  if (estimate !== null) await transaction.estimate.create({ data: { ...estimateRow(id, { estimate, row: 1 }) } });
  const detail = { arrival: id, station: stationId, readings: readings.length, estimates: estimate === null ? 0 : 1 };
  await addToAudit(transaction, doing, { action: "arrival brought in", subject: `arrival ${id}`, detail: { ...detail, event: eventId } });
  if (eventId !== null) await changeEvent(transaction, { id: eventId, action: "arrival brought in", detail }, doing);
  return id;
}

export async function moveArrival(transaction: Transaction, move: { id: number; startedFrom: number; eventId: string | null }, doing: Doing): Promise<number> {
  const { id, startedFrom, eventId } = move;
  const row = await requireArrival(transaction, id, startedFrom);
  if (row.eventId === eventId) return row.revision;
  const ordinal = eventId === null ? null : await nextOrdinal(transaction, eventId);
  const revision = await moveTo(transaction, row, { eventId, ordinal }, doing);
  const detail = { arrival: id, station: row.stationId, from: row.eventId, to: eventId };
  for (const event of [row.eventId, eventId]) {
    if (event !== null) await changeEvent(transaction, { id: event, action: "arrival moved", detail }, doing);
  }
  return revision;
}

export async function flagReading(transaction: Transaction, flag: { readingId: number; startedFrom: number; quality: QualityFlag }, doing: Doing): Promise<number> {
  const { readingId, startedFrom, quality } = flag;
  const reading = await transaction.reading.findUnique({ where: { id: readingId } });
  if (reading === null) throw new Refusal("not-found", `No reading ${readingId} is stored.`);
  const { id, eventId, stationId, revision } = await requireArrival(transaction, reading.arrivalId, startedFrom);
  if (reading.quality === quality) return revision;
  await transaction.reading.update({ where: { id: readingId }, data: { quality } });
  await transaction.arrival.update({ where: { id }, data: { revision: revision + 1 } });
  const detail = { reading: readingId, arrival: id, station: stationId, before: reading.quality, after: quality };
  await addToAudit(transaction, doing, { action: "reading flagged", subject: `arrival ${id}`, detail: { ...detail, revision: revision + 1 } });
  if (eventId !== null) await changeEvent(transaction, { id: eventId, action: "reading flagged", detail }, doing);
  return revision + 1;
}

async function requireArrival(transaction: Transaction, id: number, startedFrom: number) {
  const row = await transaction.arrival.findUnique({ where: { id } });
  if (row === null) throw new Refusal("not-found", `No arrival ${id} is stored.`);
  requireRevision(`Arrival ${id}`, row, startedFrom);
  return row;
}
