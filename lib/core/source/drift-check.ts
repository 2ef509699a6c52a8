import { fitDispersionLine, type LineSettings } from "../arrival/dispersion-line.ts";
import type { Reading } from "../arrival/reading.ts";
import { geodesicInverse } from "../geodesy/geodesic.ts";
import { factorise, invertFactored } from "../statistics/cholesky.ts";
import { chiSquareSurvival } from "../statistics/chi-square.ts";
import type { SourceAnswer, StationArrival } from "./answer.ts";
import { planSubsets } from "./conditioned.ts";
import { linearFit, placeColumns } from "./linear-fit.ts";
import { networkOf, type NetworkOptions } from "./network.ts";
import { climbToPeak, type Peak } from "./peak.ts";
import { widenedForScatter } from "./widened.ts";

/** Both halves of a station's readings must make a line of their own. */
const LEAST_READINGS = 4;
const LEAST_STATIONS = 2;
const SIGNIFICANT_BELOW = 0.01;

/**
 * Did low and high frequencies come from one place? The event is solved from the lower half of every station's
 * readings and from the upper half; where the two places and times differ by more than the readings' own errors
 * explain (chi-square of three, p < 0.01), the storm moved or lived long. The model spread is common to both halves
 * and drops out of their difference, save where the halves weigh the stations differently. Periods timed at a moment
 * are left out: their line is corrected as a whole, about the swell's peak, and its halves would part by that alone.
 * Null where fewer than two stations have readings enough.
 */
export function driftBetweenHalves(arrivals: readonly StationArrival[], options: NetworkOptions, peak: Peak): SourceAnswer["drift"] {
  const halves = arrivals.flatMap((arrival) => halvesOf(arrival, options.settings) ?? []);
  if (halves.length < LEAST_STATIONS) return null;
  const low = solved(halves.map((half) => half.low), options, peak);
  const high = solved(halves.map((half) => half.high), options, peak);
  if (!low || !high) return null;

  const apart = geodesicInverse({ from: low.peak.position, to: high.peak.position });
  const heading = (apart.departsTowardDegrees * Math.PI) / 180;
  const shiftSeconds = high.originEpochSeconds - low.originEpochSeconds;
  const shift = [apart.distanceMetres * Math.sin(heading), apart.distanceMetres * Math.cos(heading), shiftSeconds];
  const covariance = low.covariance.map((value, k) => value + (high.covariance[k] ?? NaN));
  return {
    shiftMetres: apart.distanceMetres,
    shiftSeconds,
    significant: chiSquareSurvival(quadraticForm(covariance, shift), 3) < SIGNIFICANT_BELOW,
  };
}

function halvesOf(arrival: StationArrival, settings: LineSettings): { low: StationArrival; high: StationArrival } | null {
  const ridge = arrival.readings.filter((reading) => reading.kind === "ridge");
  if (ridge.length < LEAST_READINGS) return null;
  const ordered = ridge.sort((a, b) => a.frequencyHz - b.frequencyHz || a.row - b.row);
  const middle = Math.ceil(ordered.length / 2);
  const low = withReadings(arrival, ordered.slice(0, middle), settings);
  const high = withReadings(arrival, ordered.slice(ordered.length - middle), settings);
  return low && high && { low, high };
}

function withReadings(arrival: StationArrival, readings: readonly Reading[], settings: LineSettings): StationArrival | null {
  const outcome = fitDispersionLine(readings, settings);
  return outcome.kind === "fitted" ? { ...arrival, readings, estimate: { ...widenedForScatter(outcome.line), bearing: null } } : null;
}

interface HalfSolution {
  readonly peak: Peak;
  readonly originEpochSeconds: number;
  /** 3 x 3: east, north (m), time (s), from the readings' errors alone. */
  readonly covariance: Float64Array;
}

function solved(arrivals: readonly StationArrival[], options: NetworkOptions, start: Peak): HalfSolution | null {
  const network = networkOf(arrivals, options);
  const peak = climbToPeak(network, start.position, planSubsets(network, [[]]));
  const fit = peak && linearFit({ ...peak, subset: peak.best, columns: placeColumns(network, peak.site) });
  if (!peak || !fit) return null;
  const gain = [0, 1, 2].map((a) => combine(fit.weightedColumns, fit.covariance.subarray(a * 3, a * 3 + 3)));
  const covariance = new Float64Array(9);
  for (let a = 0; a < 3; a++) {
    for (let b = 0; b < 3; b++) covariance[a * 3 + b] = throughReadings(arrivals, gain[a] ?? NaN_ROW, gain[b] ?? NaN_ROW);
  }
  return { peak, originEpochSeconds: network.zeroEpochSeconds + peak.originSeconds, covariance };
}

const NaN_ROW = Float64Array.of(NaN);

function combine(columns: readonly Float64Array[], weights: Float64Array): Float64Array {
  const sum = new Float64Array(columns[0]?.length ?? 0);
  columns.forEach((column, c) => column.forEach((value, i) => (sum[i] = (sum[i] ?? 0) + value * (weights[c] ?? NaN))));
  return sum;
}

/** a' C b, C the stations' own covariances. */
function throughReadings(arrivals: readonly StationArrival[], a: Float64Array, b: Float64Array): number {
  const n = arrivals.length;
  return arrivals.reduce((sum, { estimate: { covariance } }, i) => {
    const [aD = NaN, aT = NaN, bD = NaN, bT = NaN] = [a[i], a[n + i], b[i], b[n + i]];
    return sum + aD * bD * covariance.distanceVariance + (aD * bT + aT * bD) * covariance.distanceOriginCovariance + aT * bT * covariance.originVariance;
  }, 0);
}

/** x' A^-1 x, with A scaled to unit diagonal first. */
function quadraticForm(matrix: Float64Array, vector: readonly number[]): number {
  const m = vector.length;
  const scale = vector.map((_, i) => Math.sqrt(matrix[i * m + i] ?? NaN));
  const scaled = matrix.map((value, k) => value / ((scale[Math.floor(k / m)] ?? NaN) * (scale[k % m] ?? NaN)));
  if (Number.isNaN(factorise(scaled, m))) return NaN;
  const inverse = invertFactored(scaled, m);
  const z = vector.map((value, i) => value / (scale[i] ?? NaN));
  return z.reduce((sum, zi, i) => sum + z.reduce((inner, zj, j) => inner + zi * zj * (inverse[i * m + j] ?? NaN), 0), 0);
}
