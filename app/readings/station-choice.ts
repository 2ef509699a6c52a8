import type { StationAtHand } from "./fit-readings.ts";

/** A stored station, as the form needs it. */
export interface StationChoice extends StationAtHand {
  readonly name: string;
  /** Its other names, as `scheme:value`. */
  readonly aliases: readonly string[];
}

const MOST_SHOWN = 50;

export function stationLabel({ id, name }: StationChoice): string {
  return name === id ? id : `${name} (${id})`;
}

/** Stations whose name, id or other name holds the text; those that begin with it first. */
export function stationsLike(stations: readonly StationChoice[], text: string): { readonly found: readonly StationChoice[]; readonly more: number } {
  const wanted = text.trim().toUpperCase();
  const names = ({ id, name, aliases }: StationChoice): string[] => [id, name, ...aliases, ...aliases.map((alias) => alias.slice(alias.indexOf(":") + 1))].map((one) => one.toUpperCase());
  const like = stations.filter((station) => names(station).some((name) => name.includes(wanted)));
  const [first, rest] = [like.filter((station) => names(station).some((name) => name.startsWith(wanted))), like.filter((station) => !names(station).some((name) => name.startsWith(wanted)))];
  return { found: [...first, ...rest].slice(0, MOST_SHOWN), more: Math.max(0, like.length - MOST_SHOWN) };
}
