import type { EventSummary, StoredEvent } from "#lib/application/ports.ts";
import type { ClockCorrection, GatheredEstimate, GatheredReading } from "#lib/core/arrival/gathered-observations.ts";
import { arrivalSummary } from "./arrivals.ts";
import type { PrismaClient } from "./generated/client.ts";
import { placedSummary } from "./localizations.ts";
import { estimateFromRow, readingFromRow } from "./observations-from-rows.ts";
import { descriptionFromRow, WHOLE_STATION } from "./station-from-row.ts";

interface Counts {
  readonly id: string;
  readonly stations: bigint;
  readonly readings: bigint;
  readonly estimates: bigint;
  readonly first: number | null;
}

export async function listEvents(reader: PrismaClient): Promise<EventSummary[]> {
  const [events, counts, latest] = await Promise.all([
    reader.event.findMany({ where: { mergedInto: null }, orderBy: { id: "asc" } }),
    // Joined in the database: an answer of thousands of rows would be counted here otherwise.
    reader.$queryRaw<Counts[]>`
      SELECT a.event_id AS id, COUNT(DISTINCT a.station_id) AS stations, SUM(r.readings) AS readings, SUM(e.estimates) AS estimates, MIN(r.first) AS first
      FROM arrivals a
      LEFT JOIN (SELECT arrival_id, COUNT(*) AS readings, MIN(arrival_epoch_seconds) AS first FROM readings GROUP BY arrival_id) r ON r.arrival_id = a.id
      LEFT JOIN (SELECT arrival_id, COUNT(*) AS estimates FROM estimates GROUP BY arrival_id) e ON e.arrival_id = a.id
      WHERE a.event_id IS NOT NULL GROUP BY a.event_id`,
    reader.localization.findMany({
      where: { id: { in: (await reader.localization.groupBy({ by: ["eventId"], _max: { id: true } })).flatMap(({ _max }) => _max.id ?? []) } },
      select: { eventId: true, number: true, outcome: true, latitudeDegrees: true, longitudeDegrees: true, originEpochSeconds: true },
    }),
  ]);
  const countsOf = new Map(counts.map((row) => [row.id, row]));
  const latestOf = new Map(latest.map((row) => [row.eventId, placedSummary(row)]));

  const summaries = events.map(({ id, title, note, revision, savedEpochSeconds }) => ({
    ...{ id, title, note, revision },
    stationCount: Number(countsOf.get(id)?.stations ?? 0),
    readingCount: Number(countsOf.get(id)?.readings ?? 0),
    estimateCount: Number(countsOf.get(id)?.estimates ?? 0),
    firstArrivalEpochSeconds: countsOf.get(id)?.first ?? null,
    savedEpochSeconds,
    latest: latestOf.get(id) ?? null,
  }));
  return summaries.sort(
    (a, b) => (b.firstArrivalEpochSeconds ?? Number.MIN_SAFE_INTEGER) - (a.firstArrivalEpochSeconds ?? Number.MIN_SAFE_INTEGER),
  );
}

export async function loadEvent(reader: PrismaClient, id: string): Promise<StoredEvent | null> {
  const byId = { orderBy: { id: "asc" }, include: { arrival: { select: { stationId: true } } } } as const;
  // One statement after another inside one transaction: all of them see the same moment.
  return reader.$transaction(async (snapshot) => {
    const event = await snapshot.event.findUnique({ where: { id }, include: { arrivals: { orderBy: { ordinal: "asc" } } } });
    if (event === null) return null;
    const stationIds = [...new Set(event.arrivals.map(({ stationId }) => stationId))];
    const stations = (await snapshot.station.findMany({ where: { id: { in: stationIds } }, include: WHOLE_STATION })).map(descriptionFromRow);
    const inOrder = stationIds.flatMap((stationId) => stations.find((station) => station.id === stationId) ?? []);
    const ofEvent = { where: { arrival: { eventId: id } }, ...byId };
    const readings = (await snapshot.reading.findMany(ofEvent)).map(readingFromRow);
    const estimates = (await snapshot.estimate.findMany(ofEvent)).map(estimateFromRow);
    const { title, note, revision, mergedInto } = event;
    return {
      ...{ id, title, note, revision, mergedInto },
      arrivals: event.arrivals.map(arrivalSummary),
      observations: {
        deployments: inOrder.flatMap(({ deployments }) => deployments),
        ...withDistinctRows(readings, estimates),
        clockCorrections: inOrder.flatMap(({ clockCorrections }): readonly ClockCorrection[] => clockCorrections),
      },
    };
  });
}

/**
 * Messages name a station's readings by their rows. Where a station has readings of two arrivals, each numbered from its
 * own file, they are numbered through.
 */
function withDistinctRows(readings: readonly GatheredReading[], estimates: readonly GatheredEstimate[]) {
  const arrivalsOf = new Map<string, Set<number>>();
  for (const { stationId, arrivalId } of readings) arrivalsOf.set(stationId, (arrivalsOf.get(stationId) ?? new Set()).add(arrivalId));
  const lastRow = new Map<string, number>();
  const numbered = readings.map((item) => {
    if ((arrivalsOf.get(item.stationId)?.size ?? 0) < 2) return item;
    const row = (lastRow.get(item.stationId) ?? 0) + 1;
    lastRow.set(item.stationId, row);
    return { ...item, reading: { ...item.reading, row } };
  });
  return { readings: numbered, estimates };
}
