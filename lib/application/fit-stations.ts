import { fitDispersionLine } from "#lib/core/arrival/dispersion-line.ts";
import type { LineOutcome } from "#lib/core/arrival/line.ts";
import { noShelfNotes } from "#lib/core/arrival/no-shelf.ts";
import type { EventObservations } from "#lib/core/arrival/observations.ts";
import type { Reading } from "#lib/core/arrival/reading.ts";
import type { AnswerWarning } from "#lib/core/source/answer.ts";
import { fitStations } from "#lib/core/source/fit-stations.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";
import { toEstimationSettings } from "#lib/contracts/estimation-settings.ts";
import { fitJson } from "#lib/contracts/fit-json.ts";
import type { FitJson } from "#lib/contracts/fit-json.ts";
import type { PublicSettings } from "#lib/contracts/settings.ts";
import type { Host } from "./host.ts";
import { inputDigest } from "./input-digest.ts";
import { distinctWarnings } from "./warnings.ts";

export interface StationsToFit {
  /** Without deployments every station is taken as deep-water and at the surface, and a warning says so. */
  readonly observations: EventObservations;
  readonly settings: PublicSettings;
  readonly notes?: readonly AnswerWarning[];
  readonly host: Pick<Host, "program">;
}

interface FittedAlone {
  readonly id: string;
  readonly outcome: LineOutcome;
  readonly onGround: boolean;
}

/** Says of each station alone how far away and when the storm was. */
export function fitEachStation({ observations, settings, notes = [], host }: StationsToFit): FitJson {
  const core = toEstimationSettings(settings);
  const placeless = observations.deployments.length === 0;
  const stations = placeless ? fitWithoutDeployments(observations, core) : fitDeployed(observations, core);
  const warnings = distinctWarnings([...notes, ...(placeless ? [NO_STATIONS] : []), ...stations.flatMap(stationWarnings), ...(placeless ? [] : noShelfNotes(stations))]);
  const provenance = { program: host.program, inputDigest: inputDigest(observations), settings };
  return fitJson({ provenance, stations, warnings });
}

const NO_STATIONS = {
  code: "stations-unknown",
  message: "No stations were given, so every sensor is taken to be at the surface (none on the ground) and no shelf is corrected for.",
};

function fitDeployed(observations: EventObservations, settings: EstimationSettings): FittedAlone[] {
  return fitStations({ observations, settings }).map(({ id, outcome, deployment }) => ({ id, outcome, onGround: deployment.sensor === "ground" }));
}

function fitWithoutDeployments({ readings }: EventObservations, settings: EstimationSettings): FittedAlone[] {
  const ofStation = new Map<string, Reading[]>();
  for (const { stationId, reading } of readings) {
    const own = ofStation.get(stationId);
    if (own === undefined) ofStation.set(stationId, [reading]);
    else own.push(reading);
  }
  return [...ofStation].map(([id, own]) => ({ id, outcome: fitDispersionLine(own, settings), onGround: false }));
}

function stationWarnings({ id, outcome, onGround }: FittedAlone): AnswerWarning[] {
  if (outcome.kind === "refused") return [{ code: outcome.code, message: `${id}: ${outcome.message}` }];
  const lineNotes = outcome.kind === "fitted" ? outcome.line.notes : [];
  return [...(onGround ? [{ code: "ground-halved", message: `${id}: its frequencies were halved, for ground motion has twice the swell's frequency.` }] : []),
    ...lineNotes.map(({ code, message }) => ({ code, message: `${id}: ${message}` }))];
}
