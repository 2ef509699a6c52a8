import { z } from "zod";
import { VISIBILITIES, type StationDescription } from "#lib/core/arrival/station-description.ts";
import type { AuditTrail } from "./ports.ts";
import { stationChanges, type StationChange } from "./station-changes.ts";

export interface HistoryEntry {
  readonly savedEpochSeconds: number;
  readonly actor: string;
  /** Null for a removal. */
  readonly revision: number | null;
  readonly kind: "made" | "changed" | "removed";
  /** Null where the line does not say what was before and after in the way it is said now. */
  readonly changes: readonly StationChange[] | null;
}

const MOST_LINES = 100;
const time = z.number().nullable();
const text = z.string().nullable();
const Described: z.ZodType<StationDescription> = z.object({
  id: z.string(),
  groupId: z.string(),
  aliases: z.array(z.object({ scheme: z.string(), value: z.string() })),
  deployments: z.array(
    z.object({
      stationId: z.string(),
      name: z.string(),
      position: z.object({ latitudeDegrees: z.number(), longitudeDegrees: z.number() }),
      depthMetres: z.number().nullable(),
      sensor: z.enum(["surface", "pressure", "ground"]),
      exposure: z.object({ facesFromDegrees: z.number(), facesToDegrees: z.number() }).nullable(),
      recordMinutes: z.number().nullable(),
      stamp: z.enum(["start", "middle", "end"]).nullable(),
      timeZone: text,
      fromEpochSeconds: time,
      toEpochSeconds: time,
      shelf: z.array(z.object({ lengthMetres: z.number(), depthMetres: z.number() })),
    }),
  ),
  clockCorrections: z.array(z.object({ stationId: z.string(), fromEpochSeconds: time, toEpochSeconds: time, fastBySeconds: z.number(), reason: z.string() })),
  licence: text,
  attribution: text,
  contact: text,
  doi: text,
  visibility: z.enum(VISIBILITIES),
  embargoUntilEpochSeconds: time,
  note: z.string(),
});
const Detail = z.object({ revision: z.number().optional(), before: Described.nullable(), after: Described.optional() });
const KINDS: Readonly<Record<string, HistoryEntry["kind"]>> = { "station made": "made", "station changed": "changed", "station removed": "removed" };

/** Who changed a station when, and what, latest first: the last hundred changes. */
export async function stationHistory(audit: AuditTrail, id: string): Promise<HistoryEntry[]> {
  const lines = await audit.listAudit({ subject: `station ${id}`, limit: MOST_LINES });
  return lines.flatMap(({ savedEpochSeconds, actor, action, detail }) => {
    const kind = KINDS[action];
    if (kind === undefined) return [];
    const read = Detail.safeParse(detail).data;
    const changes = read?.after === undefined || read.before === null ? null : stationChanges(read.before, read.after);
    return [{ savedEpochSeconds, actor, kind, revision: read?.revision ?? null, changes }];
  });
}
