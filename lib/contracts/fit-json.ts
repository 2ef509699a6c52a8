import type { AnswerWarning } from "#lib/core/source/answer.ts";
import type { LineOutcome } from "#lib/core/arrival/line.ts";
import type { PublicSettings } from "./settings.ts";
import { stationJson } from "./station-json.ts";
import type { StationJson } from "./station-json.ts";

/** What both `fit` and `locate` say of where an answer came from. */
export interface Provenance {
  /** Name and version of the program. */
  readonly program: string;
  /** SHA-256 over the canonical JSON (RFC 8785) of the parsed input. */
  readonly inputDigest: string;
  readonly settings: PublicSettings;
}

export interface FitJson extends Provenance {
  readonly stations: readonly StationJson[];
  readonly warnings: readonly AnswerWarning[];
}

export function fitJson({ provenance, stations, warnings }: {
  readonly provenance: Provenance;
  readonly stations: readonly { readonly id: string; readonly outcome: LineOutcome }[];
  readonly warnings: readonly AnswerWarning[];
}): FitJson {
  return { ...provenance, stations: stations.map(stationJson), warnings };
}
