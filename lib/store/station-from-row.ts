import { z } from "zod";
import { byStation } from "#lib/core/arrival/by-station.ts";
import { VISIBILITIES, type StationDescription } from "#lib/core/arrival/station-description.ts";
import type { Prisma } from "./generated/client.ts";
import { deploymentFromRow } from "./observations-from-rows.ts";

const byOrdinal = { orderBy: { ordinal: "asc" } } as const;

/** What has to be read along with a station's row. */
export const WHOLE_STATION = {
  aliases: byOrdinal,
  clockCorrections: byOrdinal,
  deployments: { ...byOrdinal, include: { shelf: byOrdinal } },
} as const satisfies Prisma.StationInclude;

const Seen = z.enum(VISIBILITIES);

export function descriptionFromRow(row: WholeStation): StationDescription {
  const { id, groupId, licence, attribution, contact, doi, embargoUntilEpochSeconds, note } = row;
  return {
    ...{ id, groupId, licence, attribution, contact, doi, embargoUntilEpochSeconds, note },
    visibility: Seen.parse(row.visibility),
    aliases: row.aliases.map(({ scheme, value }) => ({ scheme, value })),
    deployments: row.deployments.map(deploymentFromRow),
    clockCorrections: row.clockCorrections.map(({ stationId, fromEpochSeconds, toEpochSeconds, fastBySeconds, reason }) => ({ stationId, fromEpochSeconds, toEpochSeconds, fastBySeconds, reason })),
  };
}

export type WholeStation = Prisma.StationGetPayload<{ include: typeof WHOLE_STATION }>;

/** SQLite takes so many values in one statement, and a row has up to 20. */
const ROWS_AT_ONCE = 500;

/** Hands rows on in parts that one statement can take. */
export async function inChunks<Row>(rows: readonly Row[], work: (some: Row[]) => Promise<unknown>): Promise<void> {
  for (let start = 0; start < rows.length; start += ROWS_AT_ONCE) await work(rows.slice(start, start + ROWS_AT_ONCE));
}

/**
 * Stations (all, or those of some ids) with all that describes them, in order of their ids. Each table is read by
 * itself: rows that are asked for along with others are asked for by those rows' ids, of which a statement takes only so
 * many.
 */
export async function loadWholeStations(client: Prisma.TransactionClient, ids: readonly string[] | null): Promise<WholeStation[]> {
  if (ids === null) return wholeStations(client, null);
  const stations: WholeStation[] = [];
  await inChunks(ids, async (some) => stations.push(...(await wholeStations(client, some))));
  return stations;
}

async function wholeStations(client: Prisma.TransactionClient, ids: readonly string[] | null): Promise<WholeStation[]> {
  const own = ids === null ? {} : { stationId: { in: [...ids] } };
  const rows = await client.station.findMany({ where: ids === null ? {} : { id: { in: [...ids] } }, orderBy: { id: "asc" } });
  const aliases = byStation(await client.stationAlias.findMany({ where: own, ...byOrdinal }), ({ stationId }) => stationId);
  const corrections = byStation(await client.clockCorrection.findMany({ where: own, ...byOrdinal }), ({ stationId }) => stationId);
  const deployments = byStation(await client.deployment.findMany({ where: own, ...byOrdinal }), ({ stationId }) => stationId);
  const legs = byStation(await client.shelfLeg.findMany({ where: ids === null ? {} : { deployment: own }, ...byOrdinal }), ({ deploymentId }) => String(deploymentId));
  return rows.map((row) => ({
    ...row,
    aliases: aliases.get(row.id) ?? [],
    clockCorrections: corrections.get(row.id) ?? [],
    deployments: (deployments.get(row.id) ?? []).map((deployment) => ({ ...deployment, shelf: legs.get(String(deployment.id)) ?? [] })),
  }));
}
