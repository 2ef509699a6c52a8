import { noShelfNotes } from "../arrival/no-shelf.ts";
import type { EventObservations } from "../arrival/observations.ts";
import type { LandMask } from "../geodesy/land-mask.ts";
import type { SightTable } from "../geodesy/sight-table.ts";
import type { AnswerWarning, StationArrival } from "./answer.ts";
import { fitStations, type FittedStation } from "./fit-stations.ts";
import { locateSource } from "./locate-source.ts";
import type { EstimationSettings } from "./settings.ts";
import type { EventSolution } from "./solution.ts";
import { widenedForScatter } from "./widened.ts";

export interface EventProblem {
  readonly observations: EventObservations;
  readonly settings: EstimationSettings;
  /** Null: the whole Earth is taken as ocean. */
  readonly land: LandMask | null;
  /** By station id; a station without one sees past all land. Not consulted where `settings.sight` is false. */
  readonly sightTables: ReadonlyMap<string, SightTable>;
  /** False leaves out leave-one-out and drift. */
  readonly checks?: boolean;
}

/** An event from its observations to its answer: each station's line, then the source. The one way that hosts call. */
export function solveEvent(problem: EventProblem): EventSolution {
  const { observations, settings, land, checks = true } = problem;
  const fitted = fitStations({ observations, settings });
  const arrivals = fitted.flatMap((station) => arrivalOf(station, problem) ?? []);
  return {
    stations: fitted.map(({ id, name, position, outcome }) => ({ id, name, position, outcome })),
    answer: arrivals.length > 0 ? locateSource(arrivals, { settings, land, checks }) : null,
    warnings: [...fitted.flatMap(stationWarnings), ...noShelfNotes(fitted)],
  };
}

function arrivalOf({ id, position, deployment, readings, outcome }: FittedStation, { settings, sightTables }: EventProblem): StationArrival | null {
  if (outcome.kind === "refused") return null;
  const estimate = outcome.kind === "fitted" ? widenedForScatter(outcome.line) : outcome.estimate;
  const sight = settings.sight ? (sightTables.get(id) ?? null) : null;
  return { id, position, estimate, readings, exposure: deployment.exposure, sight };
}

function stationWarnings({ id, deployment, outcome }: FittedStation): AnswerWarning[] {
  if (outcome.kind === "refused") return [{ code: outcome.code, message: `${id}: ${outcome.message}` }];
  if (outcome.kind === "sent-in") return [];
  return [
    ...(deployment.sensor === "ground" ? [{ code: "ground-halved", message: `${id} measures ground motion, which has twice the swell's frequency: its frequencies were halved.` }] : []),
    ...outcome.line.notes.map(({ code, message }) => ({ code, message: `${id}: ${message}` })),
  ];
}
