import * as z from "zod/mini";
import type { Deployment } from "#lib/core/arrival/observations.ts";
import { VISIBILITIES, type StationDescription } from "#lib/core/arrival/station-description.ts";
import { isoTime } from "../iso-time.ts";
import { timeField } from "./fields.ts";
import { kilometresOf } from "./kilometres.ts";

const timeOrNull = z.nullable(timeField);
const textAnswer = z.nullable(z.string());

/** A stored station. Whatever it holds can be sent back as it is, but for `id`, `arrivals` and `lastReading`. */
export const stationShape = z.object({
  id: z.string(),
  revision: z.int(),
  group: z.string(),
  aliases: z.array(z.object({ scheme: z.string(), value: z.string() })),
  deployments: z.array(
    z.object({
      name: z.string(),
      latitudeDegrees: z.number(),
      longitudeDegrees: z.number(),
      depthMetres: z.nullable(z.number()),
      sensor: z.enum(["surface", "pressure", "ground"]),
      facesFromDegrees: z.nullable(z.number()),
      facesToDegrees: z.nullable(z.number()),
      recordMinutes: z.nullable(z.number()),
      stamp: z.nullable(z.enum(["start", "middle", "end"])),
      timeZone: textAnswer,
      from: timeOrNull,
      to: timeOrNull,
      shelf: z.array(z.object({ lengthKm: z.number(), depthMetres: z.number() })),
    }),
  ),
  clockCorrections: z.array(z.object({ from: timeOrNull, to: timeOrNull, fastBySeconds: z.number(), reason: z.string() })),
  licence: textAnswer,
  attribution: textAnswer,
  contact: textAnswer,
  doi: textAnswer,
  visibility: z.enum(VISIBILITIES),
  embargoUntil: timeOrNull,
  note: z.string(),
  arrivals: z.int(),
  lastReading: timeOrNull,
});

export type StationJson = z.infer<typeof stationShape>;

export interface DescribedStation extends StationDescription {
  readonly revision: number;
  readonly arrivalCount: number;
  readonly lastReadingEpochSeconds: number | null;
}

export function stationJson(station: DescribedStation): StationJson {
  const { id, revision, groupId, aliases, clockCorrections, licence, attribution, contact, doi, visibility, note } = station;
  return {
    ...{ id, revision, group: groupId, aliases: aliases.map(({ scheme, value }) => ({ scheme, value })) },
    deployments: station.deployments.map(deploymentJson),
    clockCorrections: clockCorrections.map(({ fastBySeconds, reason, ...span }) => ({ ...spanJson(span), fastBySeconds, reason })),
    ...{ licence, attribution, contact, doi, visibility, embargoUntil: timeJson(station.embargoUntilEpochSeconds), note },
    arrivals: station.arrivalCount,
    lastReading: timeJson(station.lastReadingEpochSeconds),
  };
}

function deploymentJson(deployment: Deployment): StationJson["deployments"][number] {
  const { name, position, depthMetres, sensor, exposure, recordMinutes, stamp, timeZone, shelf } = deployment;
  return {
    ...{ name, ...position, depthMetres, sensor },
    facesFromDegrees: exposure?.facesFromDegrees ?? null,
    facesToDegrees: exposure?.facesToDegrees ?? null,
    ...{ recordMinutes, stamp, timeZone, ...spanJson(deployment) },
    shelf: shelf.map((leg) => ({ lengthKm: kilometresOf(leg.lengthMetres), depthMetres: leg.depthMetres })),
  };
}

function spanJson({ fromEpochSeconds, toEpochSeconds }: { fromEpochSeconds: number | null; toEpochSeconds: number | null }) {
  return { from: timeJson(fromEpochSeconds), to: timeJson(toEpochSeconds) };
}

function timeJson(epochSeconds: number | null): string | null {
  return epochSeconds === null ? null : isoTime(epochSeconds);
}

const changeShape = z.object({ field: z.string(), deployment: z.nullable(z.int()), before: z.string(), after: z.string() });

/** What taking in a file of stations would do, or has done. `changes` speak in the file's columns. */
export const stationsReportShape = z.object({
  stored: z.boolean(),
  added: z.array(z.string()),
  changed: z.array(z.object({ id: z.string(), changes: z.array(changeShape) })),
  unchanged: z.array(z.string()),
  notes: z.array(z.object({ code: z.string(), message: z.string() })),
  token: z.string(),
});

export type StationsReportJson = z.infer<typeof stationsReportShape>;

export function stationsReportJson({ isStored, added, changed, unchanged, notes, token }: TakenIn): StationsReportJson {
  return { stored: isStored, ...{ added: [...added], unchanged: [...unchanged], notes: [...notes], token }, changed: changed.map(({ id, changes }) => ({ id, changes: [...changes] })) };
}

interface TakenIn {
  readonly isStored: boolean;
  readonly added: readonly string[];
  readonly changed: readonly { readonly id: string; readonly changes: readonly z.infer<typeof changeShape>[] }[];
  readonly unchanged: readonly string[];
  readonly notes: readonly { readonly code: string; readonly message: string }[];
  readonly token: string;
}
