import type { Visibility } from "#lib/core/arrival/station-description.ts";

export const VISIBILITY_WORDS: Readonly<Record<Visibility, string>> = {
  group: "own group",
  pool: "groups that pool theirs",
  public: "everybody",
};

/** What the columns of a stations file are called in a sentence. */
const FIELD_WORDS: Readonly<Record<string, string>> = {
  depth_m: "depth, m",
  faces_from_deg: "faces from, °",
  faces_to_deg: "faces to, °",
  record_minutes: "record, minutes",
  time_zone: "time zone",
  embargo_until: "embargo until",
  clock_corrections: "clock corrections",
  doi: "DOI",
};

/** "licence", or "depth, m, of deployment 2". */
export function changedFieldWords({ field, deployment }: { readonly field: string; readonly deployment: number | null }): string {
  if (field === "deployment") return `deployment ${String(deployment)}`;
  const words = FIELD_WORDS[field] ?? field;
  return deployment === null ? words : `${words}, of deployment ${deployment}`;
}
