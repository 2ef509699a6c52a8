import type { Deployment } from "#lib/core/arrival/observations.ts";
import { UNDESCRIBED, type StationDescription } from "#lib/core/arrival/station-description.ts";
import type { RegisterStation } from "#lib/records/station-register-csv.ts";

/** The parts of a deployment that a file may have no column for; a span, and an exposure, are one thing with two columns. */
const OPTIONAL_PARTS: readonly { readonly columns: readonly string[]; readonly of: (stored: Deployment) => Partial<Deployment> }[] = [
  { columns: ["depth_m"], of: ({ depthMetres }) => ({ depthMetres }) },
  { columns: ["sensor"], of: ({ sensor }) => ({ sensor }) },
  { columns: ["faces_from_deg", "faces_to_deg"], of: ({ exposure }) => ({ exposure }) },
  { columns: ["record_minutes"], of: ({ recordMinutes }) => ({ recordMinutes }) },
  { columns: ["stamp"], of: ({ stamp }) => ({ stamp }) },
  { columns: ["time_zone"], of: ({ timeZone }) => ({ timeZone }) },
  { columns: ["from", "to"], of: ({ fromEpochSeconds, toEpochSeconds }) => ({ fromEpochSeconds, toEpochSeconds }) },
  { columns: ["shelf"], of: ({ shelf }) => ({ shelf }) },
];

/**
 * A station as a file and what is stored of it make it together. What the file has no column for stays: of the station
 * as a whole, and of each deployment that the file names again (one that began at the same moment, or the only one where
 * the file has no spans). Deployments that the file does not name go: it names all of a station's.
 */
export function mergedDescription(entry: RegisterStation, stored: StationDescription | null, columns: ReadonlySet<string>): StationDescription {
  const { id, said } = entry;
  if (stored === null) return { ...UNDESCRIBED, ...said, id, deployments: entry.deployments };
  const absent = OPTIONAL_PARTS.filter((part) => !part.columns.some((column) => columns.has(column)));
  const hasSpans = columns.has("from") || columns.has("to");
  const deployments = entry.deployments.map((deployment): Deployment => {
    const only = entry.deployments.length === 1 && stored.deployments.length === 1 ? stored.deployments[0] : undefined;
    const again = hasSpans ? stored.deployments.find(({ fromEpochSeconds }) => fromEpochSeconds === deployment.fromEpochSeconds) : only;
    return again === undefined ? deployment : Object.assign({ ...deployment }, ...absent.map((part) => part.of(again))) as Deployment;
  });
  const { groupId, aliases, clockCorrections, licence, attribution, contact, doi, visibility, embargoUntilEpochSeconds, note } = stored;
  return { ...{ groupId, aliases, clockCorrections, licence, attribution, contact, doi, visibility, embargoUntilEpochSeconds, note }, ...said, id, deployments };
}
