import { z } from "zod";
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

export function descriptionFromRow(row: Prisma.StationGetPayload<{ include: typeof WHOLE_STATION }>): StationDescription {
  const { id, groupId, licence, attribution, contact, doi, embargoUntilEpochSeconds, note } = row;
  return {
    ...{ id, groupId, licence, attribution, contact, doi, embargoUntilEpochSeconds, note },
    visibility: Seen.parse(row.visibility),
    aliases: row.aliases.map(({ scheme, value }) => ({ scheme, value })),
    deployments: row.deployments.map(deploymentFromRow),
    clockCorrections: row.clockCorrections.map(({ stationId, fromEpochSeconds, toEpochSeconds, fastBySeconds, reason }) => ({ stationId, fromEpochSeconds, toEpochSeconds, fastBySeconds, reason })),
  };
}
