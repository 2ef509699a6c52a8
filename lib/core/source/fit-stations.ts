import { fitDispersionLine } from "../arrival/dispersion-line.ts";
import { heardStations } from "../arrival/heard-stations.ts";
import type { LineOutcome } from "../arrival/line.ts";
import type { Deployment, EventObservations } from "../arrival/observations.ts";
import type { Reading } from "../arrival/reading.ts";
import { shelfDelaySeconds } from "../waves/shelf-delay.ts";
import type { EstimationSettings } from "./settings.ts";
import type { StationSolution } from "./solution.ts";

/** A station's line with the readings that made it, as they entered the fit. */
export interface FittedStation extends StationSolution {
  readonly deployment: Deployment;
  readonly readings: readonly Reading[];
}

/**
 * Each station's dispersion line, or the estimate that it sent in, in the order in which stations stand among the
 * deployments. Frequencies of ground motion are halved (a secondary microseism has twice the swell's frequency) and
 * the shelf's delay is taken off the arrival times before the fit.
 */
export function fitStations({ observations, settings }: { readonly observations: EventObservations; readonly settings: EstimationSettings }): FittedStation[] {
  return heardStations(observations).map(({ id, deployment, readings, estimates }) => {
    const entered = readings.map(({ reading }) => enteredReading(reading, deployment, settings));
    const outcome = outcomeOf(entered, deployment, estimates, settings);
    return { id, name: deployment.name, position: deployment.position, deployment, readings: entered, outcome };
  });
}

function outcomeOf(readings: readonly Reading[], deployment: Deployment, sentIn: EventObservations["estimates"], settings: EstimationSettings): LineOutcome {
  const estimate = sentIn[0]?.estimate;
  if (estimate && readings.length > 0) {
    return { kind: "refused", code: "conflicting-input", message: "The station has readings and an estimate of its own as well; bring in one of them." };
  }
  if (estimate && sentIn.length > 1) {
    return { kind: "refused", code: "conflicting-input", message: `The station has ${sentIn.length} estimates for one event; bring in one of them.` };
  }
  if (estimate) return { kind: "sent-in", estimate };
  const outcome = fitDispersionLine(readings, settings);
  if (outcome.kind !== "fitted") return outcome;
  return { kind: "fitted", line: { ...outcome.line, shelfCorrected: deployment.shelf.length > 0 } };
}

/** The reading as the deep sea would have given it. */
function enteredReading(reading: Reading, deployment: Deployment, settings: EstimationSettings): Reading {
  const divisor = deployment.sensor === "ground" ? 2 : 1;
  const frequencyHz = reading.frequencyHz / divisor;
  const delay = deployment.shelf.length > 0 ? shelfDelaySeconds({ frequencyHz, legs: deployment.shelf, gravity: settings.gravity }) : 0;
  return { ...reading, frequencyHz, frequencySigmaHz: reading.frequencySigmaHz / divisor, arrivalEpochSeconds: reading.arrivalEpochSeconds - delay };
}
