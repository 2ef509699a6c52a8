import type { EventSummary, StoredEvent } from "#lib/application/ports.ts";
import type { PrismaClient } from "./generated/client.ts";
import { deploymentFromRow, estimateFromRow, readingFromRow } from "./observations-from-rows.ts";

export async function listEvents(reader: PrismaClient): Promise<EventSummary[]> {
  const [events, readings, estimates] = await Promise.all([
    reader.event.findMany({ orderBy: { id: "asc" }, include: { _count: { select: { stations: true } } } }),
    reader.reading.groupBy({ by: ["eventId"], _count: true, _min: { arrivalEpochSeconds: true } }),
    reader.estimate.groupBy({ by: ["eventId"], _count: true }),
  ]);
  const readingsOf = new Map(readings.map((group) => [group.eventId, group]));
  const estimatesOf = new Map(estimates.map((group) => [group.eventId, group._count]));

  const summaries = events.map((event) => ({
    id: event.id,
    title: event.title,
    note: event.note,
    stationCount: event._count.stations,
    readingCount: readingsOf.get(event.id)?._count ?? 0,
    estimateCount: estimatesOf.get(event.id) ?? 0,
    firstArrivalEpochSeconds: readingsOf.get(event.id)?._min.arrivalEpochSeconds ?? null,
    savedEpochSeconds: event.savedEpochSeconds,
  }));
  return summaries.sort(
    (a, b) => (b.firstArrivalEpochSeconds ?? Number.MIN_SAFE_INTEGER) - (a.firstArrivalEpochSeconds ?? Number.MIN_SAFE_INTEGER),
  );
}

export async function loadEvent(reader: PrismaClient, id: string): Promise<StoredEvent | null> {
  const byOrdinal = { orderBy: { ordinal: "asc" as const } };
  // One statement after another inside one transaction: all of them see the same moment.
  return reader.$transaction(async (snapshot) => {
    const event = await snapshot.event.findUnique({
      where: { id },
      include: {
        stations: {
          ...byOrdinal,
          include: { station: { include: { deployments: { ...byOrdinal, include: { shelf: byOrdinal } } } } },
        },
      },
    });
    if (event === null) return null;
    const readings = await snapshot.reading.findMany({ where: { eventId: id }, ...byOrdinal });
    const estimates = await snapshot.estimate.findMany({ where: { eventId: id }, ...byOrdinal });
    return {
      id: event.id,
      title: event.title,
      note: event.note,
      observations: {
        deployments: event.stations.flatMap((part) => part.station.deployments.map(deploymentFromRow)),
        readings: readings.map(readingFromRow),
        estimates: estimates.map(estimateFromRow),
      },
    };
  });
}
