import { HALF_GIRTH_METRES } from "../geodesy/earth.ts";
import { distinctReadings } from "./distinct-readings.ts";
import type { EstimateCovariance } from "./estimate.ts";
import { scatterOf } from "./line-scatter.ts";
import type { DispersionLine, LineNote, LineOutcome, LineRefusal } from "./line.ts";
import { meanBearing } from "./mean-bearing.ts";
import type { Reading } from "./reading.ts";
import { correctedLine, type CorrectedLine } from "./timed-line.ts";

export interface LineSettings {
  readonly gravity: number;
  readonly timed: { readonly durationSeconds: number; readonly spectrumWidthHz: number };
}

const NO_CONVERGENCE = "No line could be fitted: the search for it did not converge.";

/**
 * How far away and when a storm was, from one station's readings.
 *
 * A point disturbance at distance L and time t0 arrives as a straight line in the frequency-time plane:
 *   (1)  t = t0 + s f,   L = g s / (4 pi)
 * fitted with errors in both coordinates (they are zero in frequency for readings from spectra) and robustly.
 * The covariance of (t0, s) is multiplied by n / n_eff for the correlation of neighbouring readings, then by the
 * reduced chi-square where that exceeds one. Two readings give the exact solution with the stated errors alone.
 * Readings `timed` at a moment are corrected first (timed-line.ts); what that leaves open enters the covariance as a
 * shared shift.
 * Deep water all the way: the caller takes the shelf's delay off the times first.
 *
 * Refused, as a value: fewer than two distinct readings, no line that the search settles on, periods that rise with time, a slope within two of its
 * standard deviations of zero, a distance beyond half the Earth's girth.
 * [source: munk-1963, york-2004]
 */
export function fitDispersionLine(readings: readonly Reading[], settings: LineSettings): LineOutcome {
  const { readings: ordered, notes } = distinctReadings(readings);
  const unfit = unfitReadings(ordered);
  if (unfit) return unfit;

  const zeroEpochSeconds = ordered[0]?.arrivalEpochSeconds ?? NaN;
  const corrected = correctedLine(ordered, zeroEpochSeconds, { gravity: settings.gravity, ...settings.timed });
  if (corrected === null) return refuse("slope-undetermined", NO_CONVERGENCE);
  const { line, shift, excess } = corrected;
  const scatter = scatterOf(line);
  const metresPerSlope = settings.gravity / (4 * Math.PI); // (1)
  const distanceMetres = line.york.slope * metresPerSlope;
  const refusal = refusalOf(line.york.slope, Math.sqrt(line.york.slopeVariance * scatter.inflation), distanceMetres);
  if (refusal) return refusal;

  const { bearing, notes: bearingNotes } = meanBearing(ordered);
  return {
    kind: "fitted",
    line: {
      distanceMetres,
      originEpochSeconds: zeroEpochSeconds + line.york.intercept,
      covariance: covarianceOf(corrected, scatter.inflation, metresPerSlope),
      sharedShifts: shift ? [shift] : [],
      bearing,
      readingsUsed: ordered.length,
      downweightedRows: ordered.filter((_, i) => (line.weights[i] ?? 1) < 1).map((reading) => reading.row).sort((a, b) => a - b),
      reducedChiSquare: scatter.reducedChiSquare,
      pValue: scatter.pValue,
      effectiveReadings: scatter.effective,
      degreesOfFreedom: Math.max(1, scatter.effective - 2),
      meanFrequencyHz: ordered.reduce((sum, reading) => sum + reading.frequencyHz, 0) / ordered.length,
      shelfCorrected: false,
      notes: [...notes, ...bearingNotes, ...(excess > 0.5 ? [weakTimed(excess)] : [])],
    } satisfies DispersionLine,
  };
}

function covarianceOf({ line: { york }, shift }: CorrectedLine, inflation: number, metresPerSlope: number): EstimateCovariance {
  const { distanceMetres, originSeconds } = shift ?? { distanceMetres: 0, originSeconds: 0 };
  return {
    distanceVariance: york.slopeVariance * inflation * metresPerSlope ** 2 + distanceMetres ** 2,
    originVariance: york.interceptVariance * inflation + originSeconds ** 2,
    distanceOriginCovariance: york.interceptSlopeCovariance * inflation * metresPerSlope + distanceMetres * originSeconds,
  };
}

function unfitReadings(ordered: readonly Reading[]): LineOutcome | null {
  if (ordered.length < 2) return refuse("too-few-readings", `At least two distinct readings are needed; there is ${ordered.length === 1 ? "one" : "none"}.`);
  if (new Set(ordered.map((reading) => reading.frequencyHz)).size < 2) {
    return refuse("slope-undetermined", "All readings have one frequency, so nothing says how fast the period falls.");
  }
  return null;
}

function refusalOf(slope: number, slopeSigma: number, distanceMetres: number): LineOutcome | null {
  if (!Number.isFinite(slope) || !Number.isFinite(slopeSigma)) {
    return refuse("slope-undetermined", NO_CONVERGENCE);
  }
  if (slope < -2 * slopeSigma) {
    return refuse("period-rises", "The period rises with time, so this is not one dispersive arrival: swell from one storm arrives long waves first.");
  }
  if (slope < 2 * slopeSigma) {
    return refuse("slope-undetermined", "The readings lie so close together, or scatter so much, that the slope of their line is not determined to better than half its size.");
  }
  if (distanceMetres > HALF_GIRTH_METRES) {
    const km = Math.round(distanceMetres / 1000);
    return refuse("beyond-half-girth", `The line asks for a distance of ${km} km, beyond half the Earth's girth (${Math.round(HALF_GIRTH_METRES / 1000)} km).`);
  }
  return null;
}

function refuse(code: LineRefusal, message: string): LineOutcome {
  return { kind: "refused", code, message };
}

function weakTimed(excess: number): LineNote {
  return {
    code: "timed-distance-weak",
    message: `The distance is weak: periods timed at moments make the storm look ${Math.round(excess * 100)} % too far here, and the correction depends on the storm's duration and the swell's width.`,
  };
}
