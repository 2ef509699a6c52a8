import type { Deployment } from "#lib/core/arrival/observations.ts";
import type { StationAlias, Visibility } from "#lib/core/arrival/station-description.ts";
import type { Position } from "#lib/core/units/position.ts";

/** A station as the register lists it: where its latest deployment stands, under that one's name. */
export interface RegisterRow {
  readonly id: string;
  readonly name: string;
  readonly position: Position;
  readonly sensor: Deployment["sensor"];
  readonly deploymentCount: number;
  /** As `scheme:value`, with spaces between. */
  readonly aliases: string;
  readonly group: string;
  readonly visibility: Visibility;
  readonly lastReadingEpochSeconds: number | null;
  readonly arrivalCount: number;
}

interface DescribedStation {
  readonly id: string;
  readonly groupId: string;
  readonly aliases: readonly StationAlias[];
  readonly deployments: readonly Deployment[];
  readonly visibility: Visibility;
  readonly lastReadingEpochSeconds: number | null;
  readonly arrivalCount: number;
}

/** Null for a station without a deployment, which stands nowhere. */
export function registerRow(station: DescribedStation): RegisterRow | null {
  const { id, groupId, aliases, deployments, visibility, lastReadingEpochSeconds, arrivalCount } = station;
  const latest = deployments.at(-1);
  if (latest === undefined) return null;
  const { name, position, sensor } = latest;
  const others = aliases.map(({ scheme, value }) => `${scheme}:${value}`).join(" ");
  return { id, name, position, sensor, deploymentCount: deployments.length, aliases: others, group: groupId, visibility, lastReadingEpochSeconds, arrivalCount };
}

/** What the register can be sorted by. Positions run from south to north. */
export const REGISTER_COLUMNS = ["id", "name", "position", "sensor", "deployments", "aliases", "group", "visibility", "last-reading", "arrivals"] as const;
export type RegisterColumn = (typeof REGISTER_COLUMNS)[number];

export interface RegisterOrder {
  readonly column: RegisterColumn;
  readonly isDescending: boolean;
}

const KEY: Readonly<Record<RegisterColumn, (row: RegisterRow) => string | number>> = {
  id: ({ id }) => id,
  name: ({ name }) => name,
  position: ({ position }) => position.latitudeDegrees,
  sensor: ({ sensor }) => sensor,
  deployments: ({ deploymentCount }) => deploymentCount,
  aliases: ({ aliases }) => aliases,
  group: ({ group }) => group,
  visibility: ({ visibility }) => visibility,
  "last-reading": ({ lastReadingEpochSeconds }) => lastReadingEpochSeconds ?? Number.NEGATIVE_INFINITY,
  arrivals: ({ arrivalCount }) => arrivalCount,
};

const WORDS = new Intl.Collator("en", { numeric: true });

/** The rows that hold every word of the filter in their id, name, aliases or group, in order; alike ones by their ids. */
export function chosenRows(rows: readonly RegisterRow[], { filter, order }: { readonly filter: string; readonly order: RegisterOrder }): RegisterRow[] {
  // Capitals on both sides: some letters have two capitals for one small one, and would not be found the other way round.
  const words = filter.toUpperCase().split(/\s+/).filter((word) => word !== "");
  const held = rows.filter(({ id, name, aliases, group }) => {
    const text = `${id} ${name} ${aliases} ${group}`.toUpperCase();
    return words.every((word) => text.includes(word));
  });
  const key = KEY[order.column];
  const turn = order.isDescending ? -1 : 1;
  return held.sort((a, b) => turn * compare(key(a), key(b)) || WORDS.compare(a.id, b.id));
}

function compare(first: string | number, second: string | number): number {
  if (typeof first === "string" || typeof second === "string") return WORDS.compare(String(first), String(second));
  return first === second ? 0 : first - second;
}
