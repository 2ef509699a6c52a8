import { yorkLine, type YorkLine } from "../statistics/york-line.ts";

/** Residuals beyond this many scales count for less (Huber 1964): about one good reading in eighty. */
const HUBER_LIMIT = 2.5;
const REWEIGHTINGS = 6;
/** Pairs of readings that the starting line is drawn from: at most this many readings, evenly chosen. */
const START_READINGS = 60;

/** Readings as columns, in order of frequency: t (s, from any fixed moment) against f (Hz), 1-sigma each. */
export interface LineColumns {
  readonly frequency: Float64Array;
  readonly time: Float64Array;
  readonly frequencySigma: Float64Array;
  readonly timeSigma: Float64Array;
}

export interface RobustLine {
  readonly york: YorkLine;
  readonly weights: Float64Array;
  /** Each reading's distance in time from the line over its own standard deviation, both coordinates counted. */
  readonly residuals: Float64Array;
}

/**
 * The line t = t0 + s f through readings of which a few may be wrong: York's fit, reweighted after Huber from a
 * start (median of pairwise slopes, Sen 1968) that a wrong reading cannot drag along.
 * [source: york-2004, huber-1964, sen-1968] Null where no line is determined: frequencies alike to rounding, a search
 * that does not settle, a reading whose distance from the line cannot be told.
 */
export function robustLine(columns: LineColumns): RobustLine | null {
  const n = columns.time.length;
  let weights = new Float64Array(n).fill(1);
  let york = fit(columns, weights);
  if (york !== null && n >= 4) {
    const start = weightsFrom(residualsFrom(columns, medianLine(columns)));
    // No start where the readings that it is drawn from have one frequency, or no error in time and a slope of zero.
    weights = start.every(isAboveZero) ? start : weightsFrom(residualsFrom(columns, york));
    for (let pass = 0; pass < REWEIGHTINGS && york !== null; pass++) {
      york = fit(columns, weights);
      if (york !== null) weights = weightsFrom(residualsFrom(columns, york));
    }
  }
  if (york === null) return null;
  const residuals = residualsFrom(columns, york);
  return residuals.every(Number.isFinite) && weights.every(isAboveZero) ? { york, weights, residuals } : null;
}

/** Null where no line is determined, as by a single reading, or where a weight is no number. */
function fit(columns: LineColumns, weights: Float64Array): YorkLine | null {
  if (weights.length < 2 || !weights.every(isAboveZero)) return null;
  const york = yorkLine({
    x: columns.frequency,
    y: columns.time,
    xSigma: columns.frequencySigma,
    ySigma: columns.timeSigma,
    weights,
  });
  return york.converged ? york : null;
}

function isAboveZero(value: number): boolean {
  return value > 0;
}

function residualsFrom(columns: LineColumns, line: { intercept: number; slope: number }): Float64Array {
  return columns.time.map((time, i) => {
    const apart = time - line.intercept - line.slope * (columns.frequency[i] ?? NaN);
    return apart / Math.hypot(columns.timeSigma[i] ?? NaN, line.slope * (columns.frequencySigma[i] ?? NaN));
  });
}

/** The scale is the readings' own scatter where that exceeds the stated errors, so that honest scatter is not pushed down. */
function weightsFrom(residuals: Float64Array): Float64Array<ArrayBuffer> {
  const scale = Math.max(1, 1.4826 * median(residuals.map(Math.abs)));
  return new Float64Array(residuals.map((residual) => Math.min(1, (HUBER_LIMIT * scale) / Math.abs(residual))));
}

function medianLine({ frequency, time }: LineColumns): { intercept: number; slope: number } {
  const stride = Math.max(1, Math.ceil(time.length / START_READINGS));
  const slopes: number[] = [];
  for (let i = 0; i < time.length; i += stride) {
    for (let j = i + stride; j < time.length; j += stride) {
      const run = (frequency[j] ?? NaN) - (frequency[i] ?? NaN);
      if (run > 0) slopes.push(((time[j] ?? NaN) - (time[i] ?? NaN)) / run);
    }
  }
  const slope = median(Float64Array.from(slopes));
  return { slope, intercept: median(time.map((t, i) => t - slope * (frequency[i] ?? NaN))) };
}

function median(values: Float64Array): number {
  const sorted = Float64Array.from(values).sort();
  const middle = sorted.length / 2;
  return ((sorted[Math.ceil(middle) - 1] ?? NaN) + (sorted[Math.floor(middle)] ?? NaN)) / 2;
}
