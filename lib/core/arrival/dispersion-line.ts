import { HALF_GIRTH_METRES } from "../geodesy/earth.ts";
import { chiSquareSurvival } from "../statistics/chi-square.ts";
import type { SharedShift } from "./estimate.ts";
import { effectiveReadings } from "./effective-readings.ts";
import type { DispersionLine, LineOutcome, LineRefusal } from "./line.ts";
import { meanBearing } from "./mean-bearing.ts";
import type { Reading } from "./reading.ts";
import { robustLine, type LineColumns, type RobustLine } from "./robust-line.ts";
import { timedExcess, type TimedWindow } from "./timed-correction.ts";

export interface LineSettings {
  readonly gravity: number;
  readonly timed: { readonly durationSeconds: number; readonly spectrumWidthHz: number };
}

/**
 * How far away and when a storm was, from one station's readings.
 *
 * A point disturbance at distance L and time t0 arrives as a straight line in the frequency-time plane:
 *   (1)  t = t0 + s f,   L = g s / (4 pi)
 * fitted with errors in both coordinates (they are zero in frequency for readings from spectra) and robustly.
 * The covariance of (t0, s) is multiplied by n / n_eff for the correlation of neighbouring readings, then by the
 * reduced chi-square where that exceeds one. Two readings give the exact solution with the stated errors alone.
 * Readings `timed` at a moment are first stretched about their mean frequency, which stands for the swell's peak;
 * half the change between one sigma less and more of that correction enters the covariance as a shared shift.
 * Deep water all the way: the caller takes the shelf's delay off the times first.
 *
 * Refused, as a value: fewer than two distinct readings, periods that rise with time, a slope within two of its
 * standard deviations of zero, a distance beyond half the Earth's girth.
 * [source: munk-1963, york-2004]
 */
export function fitDispersionLine(readings: readonly Reading[], settings: LineSettings): LineOutcome {
  const ordered = distinct(readings);
  const unfit = unfitReadings(ordered);
  if (unfit) return unfit;

  const zeroEpochSeconds = ordered[0]?.arrivalEpochSeconds ?? NaN;
  const window: TimedWindow = { gravity: settings.gravity, ...settings.timed };
  const { line, shift, excess } = fitWithTimedCorrection(ordered, zeroEpochSeconds, window);
  const scatter = scatterOf(line);
  const metresPerSlope = settings.gravity / (4 * Math.PI); // (1)
  const distanceMetres = line.york.slope * metresPerSlope;
  const slopeSigma = Math.sqrt(line.york.slopeVariance * scatter.inflation);

  const refusal = refusalOf(line.york.slope, slopeSigma, distanceMetres);
  if (refusal) return refusal;
  return {
    kind: "fitted",
    line: {
      distanceMetres,
      originEpochSeconds: zeroEpochSeconds + line.york.intercept,
      covariance: {
        distanceVariance: slopeSigma ** 2 * metresPerSlope ** 2 + (shift?.distanceMetres ?? 0) ** 2,
        originVariance: line.york.interceptVariance * scatter.inflation + (shift?.originSeconds ?? 0) ** 2,
        distanceOriginCovariance:
          line.york.interceptSlopeCovariance * scatter.inflation * metresPerSlope +
          (shift ? shift.distanceMetres * shift.originSeconds : 0),
      },
      sharedShifts: shift ? [shift] : [],
      bearing: meanBearing(ordered),
      readingsUsed: ordered.length,
      downweightedRows: ordered.filter((_, i) => (line.weights[i] ?? 1) < 1).map((reading) => reading.row).sort((a, b) => a - b),
      reducedChiSquare: scatter.reducedChiSquare,
      pValue: scatter.pValue,
      effectiveReadings: scatter.effective,
      degreesOfFreedom: Math.max(1, scatter.effective - 2),
      meanFrequencyHz: ordered.reduce((sum, reading) => sum + reading.frequencyHz, 0) / ordered.length,
      shelfCorrected: false,
      notes: excess > 0.5 ? [weakTimed(excess)] : [],
    } satisfies DispersionLine,
  };
}

function unfitReadings(ordered: readonly Reading[]): LineOutcome | null {
  if (ordered.length < 2) return refuse("too-few-readings", `At least two distinct readings are needed; there is ${ordered.length === 1 ? "one" : "none"}.`);
  if (new Set(ordered.map((reading) => reading.frequencyHz)).size < 2) {
    return refuse("slope-undetermined", "All readings have one frequency, so nothing says how fast the period falls.");
  }
  return null;
}

/** In order of frequency; a reading told twice counts once. */
function distinct(readings: readonly Reading[]): Reading[] {
  const seen = new Map<string, Reading>();
  for (const reading of readings) {
    const key = `${reading.arrivalEpochSeconds} ${reading.frequencyHz} ${reading.kind}`;
    if (!seen.has(key)) seen.set(key, reading);
  }
  return [...seen.values()].sort((a, b) => a.frequencyHz - b.frequencyHz || a.arrivalEpochSeconds - b.arrivalEpochSeconds || a.row - b.row);
}

interface CorrectedLine {
  readonly line: RobustLine;
  readonly shift: SharedShift | null;
  readonly excess: number;
}

function fitWithTimedCorrection(readings: readonly Reading[], zeroEpochSeconds: number, window: TimedWindow): CorrectedLine {
  const timed = readings.filter((reading) => reading.kind === "timed");
  if (timed.length === 0) return { line: robustLine(columnsOf(readings, zeroEpochSeconds, null)), shift: null, excess: 0 };

  const apparentFrom = new Set(timed.map((reading) => reading.frequencyHz)).size > 1 ? timed : readings;
  const apparent = robustLine(columnsOf(apparentFrom, zeroEpochSeconds, null));
  const metresPerSlope = window.gravity / (4 * Math.PI);
  const { excess, excessLow, excessHigh } = timedExcess(apparent.york.slope * metresPerSlope, window);
  const pivotHz = timed.reduce((sum, reading) => sum + reading.frequencyHz, 0) / timed.length;

  const at = (value: number): RobustLine => robustLine(columnsOf(readings, zeroEpochSeconds, { pivotHz, factor: 1 + value }));
  const low = at(excessLow).york;
  const high = at(excessHigh).york;
  return {
    line: at(excess),
    shift: {
      cause: "timed-readings",
      distanceMetres: ((low.slope - high.slope) / 2) * metresPerSlope,
      originSeconds: (low.intercept - high.intercept) / 2,
    },
    excess,
  };
}

function columnsOf(readings: readonly Reading[], zeroEpochSeconds: number, stretch: { pivotHz: number; factor: number } | null): LineColumns {
  const factorOf = (reading: Reading): number => (stretch && reading.kind === "timed" ? stretch.factor : 1);
  const pivotHz = stretch?.pivotHz ?? 0;
  return {
    frequency: Float64Array.from(readings, (reading) => pivotHz + (reading.frequencyHz - pivotHz) * factorOf(reading)),
    frequencySigma: Float64Array.from(readings, (reading) => reading.frequencySigmaHz * factorOf(reading)),
    time: Float64Array.from(readings, (reading) => reading.arrivalEpochSeconds - zeroEpochSeconds),
    timeSigma: Float64Array.from(readings, (reading) => reading.arrivalSigmaSeconds),
  };
}

interface Scatter {
  readonly inflation: number;
  readonly effective: number;
  readonly reducedChiSquare: number | null;
  readonly pValue: number | null;
}

function scatterOf(line: RobustLine): Scatter {
  const n = line.residuals.length;
  if (n === 2) return { inflation: 1, effective: 2, reducedChiSquare: null, pValue: null };
  let chiSquare = 0;
  line.residuals.forEach((residual, i) => (chiSquare += (line.weights[i] ?? 1) * residual ** 2));
  const reducedChiSquare = chiSquare / (n - 2);
  const effective = effectiveReadings(Array.from(line.residuals, (residual, i) => residual * Math.sqrt(line.weights[i] ?? 1)));
  return {
    inflation: (n / effective) * Math.max(1, reducedChiSquare),
    effective,
    reducedChiSquare,
    pValue: chiSquareSurvival(chiSquare, n - 2),
  };
}

function refusalOf(slope: number, slopeSigma: number, distanceMetres: number): LineOutcome | null {
  if (!Number.isFinite(slope) || !Number.isFinite(slopeSigma)) {
    return refuse("slope-undetermined", "No line could be fitted: the search for it did not converge.");
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

function weakTimed(excess: number): { code: string; message: string } {
  return {
    code: "timed-distance-weak",
    message: `The distance is weak: periods timed at moments make the storm look ${Math.round(excess * 100)} % too far here, and the correction depends on the storm's duration and the swell's width.`,
  };
}
