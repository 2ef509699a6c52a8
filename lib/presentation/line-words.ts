import type { DispersionLine } from "#lib/core/arrival/line.ts";
import { shortenedBy } from "#lib/core/arrival/line-at-frequency.ts";
import { ringSigmas } from "#lib/core/source/ring-sigma.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";
import { distanceWords, uncertainDistanceWords, type DistanceUnit } from "./distances.ts";
import { figure, percentWords, pValueWords, twoLeadingDigits } from "./figures.ts";
import { counted, listWords } from "./numbers-in-words.ts";
import { hoursFigure, plusMinusHours, uncertainMomentWords } from "./times.ts";

/** One station's line in words: how far, when, how the two hang together, and how well the readings follow it. */
export interface LineWords {
  /** What the band on the map holds beyond the readings' own error. */
  readonly band: string;
  readonly distance: string;
  readonly time: string;
  /** Neither error means much alone. */
  readonly together: string;
  readonly scatter: string;
  readonly remarks: readonly string[];
}

/** A correction smaller than this drowns in the readings' own errors. */
const WORTH_SAYING = 0.05;
/** The usual odds of statistics; nothing hangs on them but a sentence. */
const UNLIKELY = 0.05;

export function lineWords(line: DispersionLine, { unit, settings }: { readonly unit: DistanceUnit; readonly settings: EstimationSettings }): LineWords {
  const { distanceSigmaMetres } = ringSigmas({ estimate: line, settings, spreadRaisedBy: 1 });
  const { distanceVariance, originVariance } = line.covariance;
  const originSigma = Math.sqrt(originVariance);
  return {
    distance: uncertainDistanceWords(line.distanceMetres, Math.sqrt(distanceVariance), unit),
    time: `${uncertainMomentWords(line.originEpochSeconds, originSigma)} ${plusMinusHours(originSigma)}`,
    band: `Errors are 1 sigma of the readings; the band on the map, ±\u00a0${distanceWords(twoLeadingDigits(distanceSigmaMetres), unit)}, has the storm’s size and life in it.`,
    together: togetherWords(line, unit),
    scatter: scatterWords(line),
    remarks: remarks(line, settings),
  };
}

function togetherWords({ covariance }: DispersionLine, unit: DistanceUnit): string {
  const distanceSigma = Math.sqrt(covariance.distanceVariance);
  const shiftSeconds = covariance.distanceOriginCovariance / distanceSigma;
  const correlation = shiftSeconds / Math.sqrt(covariance.originVariance);
  const sense = shiftSeconds < 0 ? "earlier" : "later";
  // Two digits that read as certain would claim too much.
  const said = Math.abs(correlation) >= 0.995 ? `beyond ${figure(0.99 * Math.sign(correlation), 2)}` : figure(correlation, 2);
  return `Distance and time go together (correlation ${said}): ${distanceWords(twoLeadingDigits(distanceSigma), unit)} farther goes with ${hoursFigure(Math.abs(shiftSeconds))}\u00a0h ${sense}.`;
}

function scatterWords({ pValue }: DispersionLine): string {
  if (pValue === null) return "Two readings fit any line: a third would show whether they scatter as stated.";
  const said = pValueWords(pValue);
  if (pValue < UNLIKELY) return `The readings scatter more than their errors say (${said}); the errors of the result were widened by it.`;
  if (pValue > 1 - UNLIKELY) return `The readings scatter less than their errors say (${said}).`;
  return `The readings scatter as their errors say (${said}).`;
}

function remarks(line: DispersionLine, { gravity, timed }: EstimationSettings): string[] {
  const shortened = shortenedBy(line, { gravity, ...timed });
  const rows = line.downweightedRows.map(String);
  return [
    // Where the distance is weak by it, the line's own note says so at more length.
    ...(shortened >= WORTH_SAYING && line.notes.every(({ code }) => code !== "timed-distance-weak")
      ? [`Periods timed at a moment make a storm look too far; the line as read (dashed) gave ${percentWords(shortened)} more.`]
      : []),
    ...(rows.length > 0 ? [`${rows.length === 1 ? "Reading" : "Readings"} ${listWords(rows)} lie${rows.length === 1 ? "s" : ""} off the line and count${rows.length === 1 ? "s" : ""} less.`] : []),
    ...line.notes.map(({ message }) => message),
  ];
}

/** "5 of 6 readings" where one is not used. */
export function usedWords(used: number, typed: number): string {
  return used === typed ? counted(used, "reading") : `${used} of ${counted(typed, "reading")}`;
}

/** A period with its error, for the reading that was typed: "16.2 ± 0.4 s". */
export function periodWords(periodSeconds: number, sigmaSeconds: number | null): string {
  return sigmaSeconds === null ? `${figure(periodSeconds, 1)}\u00a0s` : `${figure(periodSeconds, 1)} ±\u00a0${figure(sigmaSeconds, 1)}\u00a0s`;
}
