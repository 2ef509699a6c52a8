import type { ClockCorrection } from "./gathered-observations.ts";
import type { Deployment } from "./observations.ts";

/** Another name of a station: `wmo` and its number, or another scheme's. */
export interface StationAlias {
  readonly scheme: string;
  readonly value: string;
}

/** Who sees a station's raw data: its own group, all groups that pool theirs, or everybody. */
export const VISIBILITIES = ["group", "pool", "public"] as const;
export type Visibility = (typeof VISIBILITIES)[number];

/** A station as its keepers describe it. The words about its data follow the data into every export. */
export interface StationDescription {
  readonly id: string;
  readonly groupId: string;
  readonly aliases: readonly StationAlias[];
  /** One at least, in order of time; no two overlap. */
  readonly deployments: readonly Deployment[];
  /** In order of time; no two overlap. */
  readonly clockCorrections: readonly ClockCorrection[];
  readonly licence: string | null;
  readonly attribution: string | null;
  readonly contact: string | null;
  readonly doi: string | null;
  readonly visibility: Visibility;
  /** Until then only the station's own group sees its raw data. */
  readonly embargoUntilEpochSeconds: number | null;
  readonly note: string;
}

/** What is taken of a station that nobody has described further. */
export const UNDESCRIBED: Omit<StationDescription, "id" | "deployments"> = {
  groupId: "local",
  aliases: [],
  clockCorrections: [],
  licence: null,
  attribution: null,
  contact: null,
  doi: null,
  visibility: "group",
  embargoUntilEpochSeconds: null,
  note: "",
};
