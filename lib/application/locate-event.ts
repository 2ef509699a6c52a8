import { heardStations } from "#lib/core/arrival/heard-stations.ts";
import type { EventObservations } from "#lib/core/arrival/observations.ts";
import type { SightTable } from "#lib/core/geodesy/sight-table.ts";
import type { AnswerWarning } from "#lib/core/source/answer.ts";
import { solveEvent } from "#lib/core/source/solve-event.ts";
import type { EventSolution } from "#lib/core/source/solution.ts";
import { toEstimationSettings } from "#lib/contracts/estimation-settings.ts";
import { locateJson } from "#lib/contracts/locate-json.ts";
import type { LocateJson } from "#lib/contracts/locate-json.ts";
import type { PublicSettings } from "#lib/contracts/settings.ts";
import type { Host } from "./host.ts";
import { inputDigest } from "./input-digest.ts";
import type { Land } from "./land.ts";
import { distinctWarnings } from "./warnings.ts";

export interface EventToLocate {
  readonly observations: EventObservations;
  readonly settings: PublicSettings;
  /** What the readers of the files had to say; it stands first among the warnings. */
  readonly notes?: readonly AnswerWarning[];
  readonly host: Host;
}

export interface LocatedEvent {
  readonly solution: EventSolution;
  /** The public answer; null where no station could be fitted. */
  readonly answer: LocateJson | null;
}

/** Says where and when the storm was that made one event's swell, and how sure that is. */
export function locateEvent({ observations, settings, notes = [], host }: EventToLocate): LocatedEvent {
  const solution = solveEvent({
    observations,
    settings: toEstimationSettings(settings),
    land: host.land.mask(),
    sightTables: settings.sight ? sightTables(observations, host.land) : new Map(),
  });
  if (solution.answer === null) return { solution, answer: null };
  const provenance = { program: host.program, inputDigest: inputDigest(observations), settings };
  const warnings = distinctWarnings([...notes, ...solution.warnings, ...solution.answer.warnings]);
  return { solution, answer: locateJson({ provenance, solution, answer: solution.answer, warnings }) };
}

/** By station, from where it stood when it heard this event; only for those that heard something. */
function sightTables(observations: EventObservations, land: Land): Map<string, SightTable> {
  return new Map(heardStations(observations).map(({ id, deployment }) => [id, land.sightFrom(deployment.position)]));
}
