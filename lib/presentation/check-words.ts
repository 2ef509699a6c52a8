import type { NumberedStation } from "#lib/core/arrival/numbered-stations.ts";
import type { SourceAnswer } from "#lib/core/source/answer.ts";
import { distanceWords, type DistanceUnit } from "./distances.ts";
import { hoursFigure, plusMinusHours } from "./times.ts";

/** What the checks found, in words that say what to do. */
export interface CheckWords {
  readonly leavingOneOut: string;
  readonly drift: string;
  readonly clocks: readonly string[];
}

export function checkWords(said: {
  answer: SourceAnswer;
  stations: readonly NumberedStation[];
  unit: DistanceUnit;
}): CheckWords {
  return { leavingOneOut: leavingOneOut(said), drift: drift(said), clocks: clocks(said) };
}

function leavingOneOut(said: { answer: SourceAnswer; stations: readonly NumberedStation[]; unit: DistanceUnit }): string {
  let most: { id: string; shiftMetres: number } | null = null;
  for (const { id, leaveOneOutShiftMetres: shiftMetres } of said.answer.stations) {
    if (shiftMetres !== null && (most === null || shiftMetres > most.shiftMetres)) most = { id, shiftMetres };
  }
  if (most === null) return said.answer.stations.length < 3 ? "needs three stations" : "leaves no place to compare";
  return `moves it at most ${distanceWords(most.shiftMetres, said.unit)} (without ${numberOf(most.id, said.stations)})`;
}

function drift(said: { answer: SourceAnswer; unit: DistanceUnit }): string {
  const { drift: found } = said.answer;
  if (found === null) return "not checked: too few readings in each half";
  const apart = `${distanceWords(found.shiftMetres, said.unit)} and ${hoursFigure(Math.abs(found.shiftSeconds))}\u00a0h apart`;
  return found.significant
    ? `${apart}, more than the error: a moving or long-lived storm`
    : `${apart}, within the error: no drift seen`;
}

function clocks(said: { answer: SourceAnswer; stations: readonly NumberedStation[] }): string[] {
  const suspect = said.answer.stations.flatMap(({ id, clockOffset }) => {
    if (clockOffset === null) return [];
    const { offsetSeconds, sigmaSeconds } = clockOffset;
    const way = offsetSeconds > 0 ? "fast" : "slow";
    const size = `${hoursFigure(Math.abs(offsetSeconds))} ${plusMinusHours(sigmaSeconds)}`;
    return [`${numberOf(id, said.stations)} looks ${size} ${way}: check its clock and dates`];
  });
  return suspect.length === 0 ? ["none suspect"] : suspect;
}

function numberOf(id: string, stations: readonly NumberedStation[]): string {
  return String(stations.find((station) => station.id === id)?.number ?? id);
}
