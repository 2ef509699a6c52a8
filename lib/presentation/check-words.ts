import type { NumberedStation } from "#lib/core/arrival/numbered-stations.ts";
import { outcomeEstimate } from "#lib/core/arrival/outcome-estimate.ts";
import type { SourceAnswer, StationVerdict } from "#lib/core/source/answer.ts";
import { ringSigmas } from "#lib/core/source/ring-sigma.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";
import type { EventSolution } from "#lib/core/source/solution.ts";
import { distanceWords, type DistanceUnit } from "./distances.ts";
import { hoursFigure, plusMinusHours } from "./times.ts";

/** What the checks found, in words that say what to do. */
export interface CheckWords {
  readonly leavingOneOut: string;
  readonly drift: string;
  readonly clocks: readonly string[];
}

interface Said {
  readonly answer: SourceAnswer;
  /** What the answer stands in. */
  readonly solution: EventSolution;
  readonly stations: readonly NumberedStation[];
  readonly settings: EstimationSettings;
  readonly unit: DistanceUnit;
}

export function checkWords(said: Said): CheckWords {
  return { leavingOneOut: leavingOneOut(said), drift: drift(said), clocks: clocks(said) };
}

function leavingOneOut(said: Said): string {
  let most: { id: string; shiftMetres: number } | null = null;
  for (const { id, leaveOneOutShiftMetres: shiftMetres } of said.answer.stations) {
    if (shiftMetres !== null && (most === null || shiftMetres > most.shiftMetres)) most = { id, shiftMetres };
  }
  if (most === null) return said.answer.stations.length < 3 ? "needs three stations" : "leaves no place to compare";
  return `moves it at most ${distanceWords(most.shiftMetres, said.unit)} (without ${numberOf(most.id, said.stations)})`;
}

function drift({ answer, unit }: Said): string {
  const { drift: found } = answer;
  if (found === null) {
    return answer.stations.length < 2 ? "needs two stations" : "not checked: too few stations with readings enough in each half";
  }
  const apart = `${distanceWords(found.shiftMetres, unit)} and ${hoursFigure(Math.abs(found.shiftSeconds))}\u00a0h apart`;
  return found.significant
    ? `${apart}, more than the error: a moving or long-lived storm`
    : `${apart}, within the error: no drift seen`;
}

function clocks(said: Said): string[] {
  const suspect = said.answer.stations.flatMap((verdict) => clockOf(verdict, said) ?? []);
  return suspect.length === 0 ? ["none suspect"] : suspect;
}

function clockOf(verdict: StationVerdict, said: Said): string | null {
  const number = numberOf(verdict.id, said.stations);
  if (verdict.clockOffset !== null) {
    const { offsetSeconds, sigmaSeconds } = verdict.clockOffset;
    const size = `${hoursFigure(Math.abs(offsetSeconds))} ${plusMinusHours(sigmaSeconds)}`;
    return `${number} looks ${size} ${offsetSeconds > 0 ? "fast" : "slow"}: check its clock and dates`;
  }
  if (verdict.residual === null || !isStrayByTimeAlone(verdict, said)) return null;
  const { originSeconds } = verdict.residual;
  const way = originSeconds < 0 ? "early" : "late";
  return `${number} fits in distance and is ${hoursFigure(Math.abs(originSeconds))}\u00a0h ${way}: look at its dates`;
}

/** Does the station not belong although its distance lies within two sigmas of its ring? Then its time is what is off. */
function isStrayByTimeAlone({ id, belongs, residual }: StationVerdict, { answer, solution, settings }: Said): boolean {
  const outcome = solution.stations.find((station) => station.id === id)?.outcome;
  const estimate = outcome === undefined ? null : outcomeEstimate(outcome);
  if (belongs === null || belongs >= 0.5 || residual === null || estimate === null) return false;
  const { distanceSigmaMetres } = ringSigmas({ estimate, settings, spreadRaisedBy: answer.spreadRaisedBy });
  return Math.abs(residual.distanceMetres) <= 2 * distanceSigmaMetres;
}

function numberOf(id: string, stations: readonly NumberedStation[]): string {
  return String(stations.find((station) => station.id === id)?.number ?? id);
}
