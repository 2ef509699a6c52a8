import type { EventSummary, StoredEvent } from "#lib/application/ports.ts";
import type { ClockCorrection, GatheredReading } from "#lib/core/arrival/gathered-observations.ts";
import { arrivalSummary } from "./arrivals.ts";
import type { PrismaClient } from "./generated/client.ts";
import { placedSummary } from "./localizations.ts";
import { estimateFromRow, readingFromRow } from "./observations-from-rows.ts";
import { descriptionFromRow, WHOLE_STATION } from "./station-from-row.ts";

interface SummaryRow {
  readonly id: string;
  readonly title: string;
  readonly note: string;
  readonly revision: bigint;
  readonly savedEpochSeconds: number;
  readonly stationCount: bigint | null;
  readonly readingCount: bigint | null;
  readonly estimateCount: bigint | null;
  readonly firstArrivalEpochSeconds: number | null;
  readonly number: bigint | null;
  readonly outcome: string | null;
  readonly latitudeDegrees: number | null;
  readonly longitudeDegrees: number | null;
  readonly originEpochSeconds: number | null;
}

export async function listEvents(reader: PrismaClient): Promise<EventSummary[]> {
  // One statement, counted and joined in the database: all of it is of one moment, and no reading leaves it to be counted.
  const rows = await reader.$queryRaw<SummaryRow[]>`
    SELECT e.id, e.title, e.note, e.revision, e.saved_epoch_seconds AS savedEpochSeconds,
      c.stationCount, c.readingCount, c.estimateCount, c.firstArrivalEpochSeconds,
      l.number, l.outcome, l.latitude_degrees AS latitudeDegrees, l.longitude_degrees AS longitudeDegrees, l.origin_epoch_seconds AS originEpochSeconds
    FROM events e
    LEFT JOIN (
      SELECT a.event_id, COUNT(DISTINCT a.station_id) AS stationCount,
        SUM((SELECT COUNT(*) FROM readings r WHERE r.arrival_id = a.id)) AS readingCount,
        SUM((SELECT COUNT(*) FROM estimates s WHERE s.arrival_id = a.id)) AS estimateCount,
        MIN((SELECT MIN(r.arrival_epoch_seconds) FROM readings r WHERE r.arrival_id = a.id)) AS firstArrivalEpochSeconds
      FROM arrivals a WHERE a.event_id IS NOT NULL GROUP BY a.event_id
    ) c ON c.event_id = e.id
    LEFT JOIN localizations l ON l.event_id = e.id AND l.number = (SELECT MAX(k.number) FROM localizations k WHERE k.event_id = e.id)
    WHERE e.merged_into IS NULL
    ORDER BY firstArrivalEpochSeconds DESC NULLS LAST, e.id`;
  return rows.map(summaryFromRow);
}

function summaryFromRow(row: SummaryRow): EventSummary {
  const { number, outcome, latitudeDegrees, longitudeDegrees, originEpochSeconds } = row;
  return {
    id: row.id,
    title: row.title,
    note: row.note,
    revision: Number(row.revision),
    stationCount: Number(row.stationCount ?? 0),
    readingCount: Number(row.readingCount ?? 0),
    estimateCount: Number(row.estimateCount ?? 0),
    firstArrivalEpochSeconds: row.firstArrivalEpochSeconds,
    savedEpochSeconds: row.savedEpochSeconds,
    latest: number === null || outcome === null ? null : placedSummary({ number: Number(number), outcome, latitudeDegrees, longitudeDegrees, originEpochSeconds }),
  };
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
        readings: withDistinctRows(readings, event.arrivals),
        estimates,
        clockCorrections: inOrder.flatMap(({ clockCorrections }): readonly ClockCorrection[] => clockCorrections),
      },
    };
  });
}

/**
 * Messages name a station's readings by their rows. Where a station has readings of two arrivals, each numbered from its
 * own file, those of the arrival that joined the event later are numbered on from the last row of the earlier one, which
 * keeps its own: rows say which reading is which in the answers that were kept before.
 */
function withDistinctRows(readings: readonly GatheredReading[], arrivals: readonly { readonly id: number; readonly stationId: string }[]): GatheredReading[] {
  const lastOfArrival = new Map<number, number>();
  for (const { arrivalId, reading } of readings) lastOfArrival.set(arrivalId, Math.max(lastOfArrival.get(arrivalId) ?? 0, reading.row));
  const lastOfStation = new Map<string, number>();
  const before = new Map<number, number>();
  for (const { id, stationId } of arrivals) {
    const rows = lastOfStation.get(stationId) ?? 0;
    before.set(id, rows);
    lastOfStation.set(stationId, rows + (lastOfArrival.get(id) ?? 0));
  }
  return readings.map((item) => {
    const rows = before.get(item.arrivalId) ?? 0;
    return rows === 0 ? item : { ...item, reading: { ...item.reading, row: item.reading.row + rows } };
  });
}
