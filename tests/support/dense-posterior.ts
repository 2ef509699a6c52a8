import type { Position } from "#lib/core/units/position.ts";
import { legBetween } from "./simulator/ellipsoid.ts";
import type { StatedArrival } from "./stated-arrivals.ts";

/**
 * The posterior of a storm's place by brute force on meridians and parallels: what method.md 5 says, written down
 * plainly and apart from the program. Every subset of two stations and more has its own full covariance matrix at every
 * point; the origin time is taken out by differences of times instead of being fitted; lengths are Vincenty's.
 * SI units.
 */
export interface DenseModel {
  readonly distanceSpread: number;
  readonly timeSpread: number;
  readonly sharedCorrelation: number;
  readonly azimuthScaleDegrees: number;
  /** Seconds per hertz by which high frequencies leave later. */
  readonly tilt: number;
  readonly scale: number;
  readonly middleHz: number;
  readonly gravity: number;
  readonly prior: number;
  /** Multiplies the variance of all of the spread. */
  readonly raisedVariance: number;
}

/** The defaults of contracts.md. */
export const DENSE_MODEL: DenseModel = {
  distanceSpread: 150_000,
  timeSpread: 6 * 3600,
  sharedCorrelation: 0.5,
  azimuthScaleDegrees: 30,
  tilt: (4 * 3600) / 0.03,
  scale: 0.02,
  middleHz: 0.075,
  gravity: 9.80665,
  prior: 0.95,
  raisedVariance: 1,
};

/** A stray arrival: any distance from 500 to 20,000 km, any time within ten days. */
const STRAY_DENSITY = 1 / (19_500_000 * 10 * 86_400);

export interface DenseCell {
  readonly position: Position;
  readonly areaSquareMetres: number;
  readonly logDensity: number;
  /** By station, the probability of belonging if the storm was here; and of the origin time, from the first station's. */
  readonly belongs: readonly number[];
  readonly originMean: number;
  readonly originVariance: number;
}

const COARSE_DEGREES = 2;
const FINER = 4;
/** Coarse cells whose middle lies this far below the best are left (natural log). */
const DEPTH = 12;

export function densePosterior(arrivals: readonly StatedArrival[], model: DenseModel): DenseCell[] {
  const coarse: { south: number; west: number; log: number }[] = [];
  for (let south = -90; south < 90; south += COARSE_DEGREES) {
    for (let west = -180; west < 180; west += COARSE_DEGREES) {
      const middle = { latitudeDegrees: south + COARSE_DEGREES / 2, longitudeDegrees: west + COARSE_DEGREES / 2 };
      coarse.push({ south, west, log: weighed(arrivals, model, middle).logDensity });
    }
  }
  const top = Math.max(...coarse.map(({ log }) => log));
  const step = COARSE_DEGREES / FINER;
  return coarse
    .filter(({ log }) => log > top - DEPTH)
    .flatMap(({ south, west }) =>
      Array.from({ length: FINER * FINER }, (_, index) => {
        const latitudeDegrees = south + step * (Math.floor(index / FINER) + 0.5);
        const position = { latitudeDegrees, longitudeDegrees: west + step * ((index % FINER) + 0.5) };
        return { position, areaSquareMetres: cellArea(latitudeDegrees, step), ...weighed(arrivals, model, position) };
      }),
    );
}

/** Area (m2) of the smallest region that holds a probability. */
export function denseArea(cells: readonly DenseCell[], probability: number): number {
  const total = cells.reduce((sum, cell) => sum + massOf(cell), 0);
  let [held, area] = [0, 0];
  for (const cell of [...cells].sort((a, b) => b.logDensity - a.logDensity)) {
    if (held >= probability * total) break;
    held += massOf(cell);
    area += cell.areaSquareMetres;
  }
  return area;
}

/** Mean over the posterior of anything that cells carry. */
export function denseMean(cells: readonly DenseCell[], value: (cell: DenseCell) => number): number {
  const total = cells.reduce((sum, cell) => sum + massOf(cell), 0);
  return cells.reduce((sum, cell) => sum + (massOf(cell) / total) * value(cell), 0);
}

export function densePeak(cells: readonly DenseCell[]): DenseCell {
  return cells.reduce((best, cell) => (cell.logDensity > best.logDensity ? cell : best));
}

/** No event here has densities so small or so large that their exponentials leave the range of numbers. */
function massOf(cell: DenseCell): number {
  return Math.exp(cell.logDensity + 100) * cell.areaSquareMetres;
}

function cellArea(latitudeDegrees: number, stepDegrees: number): number {
  const [a, f] = [6_378_137, 1 / 298.257223563];
  const [e2, phi, step] = [f * (2 - f), (latitudeDegrees * Math.PI) / 180, (stepDegrees * Math.PI) / 180];
  return (a ** 2 * (1 - e2) * Math.cos(phi) * step ** 2) / (1 - e2 * Math.sin(phi) ** 2) ** 2;
}

function weighed(arrivals: readonly StatedArrival[], model: DenseModel, position: Position): Omit<DenseCell, "position" | "areaSquareMetres"> {
  const legs = arrivals.map((arrival) => legTo(position, arrival.position));
  const covariance = covarianceOf(arrivals, legs.map(({ headsTowardDegrees }) => headsTowardDegrees), model);
  const first = arrivals[0]?.originEpochSeconds ?? NaN;
  const misses = [
    ...arrivals.map(({ distanceMetres }, i) => (legs[i]?.distanceMetres ?? NaN) - distanceMetres),
    ...arrivals.map(({ originEpochSeconds }) => originEpochSeconds - first),
  ];
  const directions = arrivals.map((arrival) => logDirection(arrival, position));
  const belongs = arrivals.map(() => 0);
  let [sum, mean, square] = [0, 0, 0];
  for (const stations of subsetsOfTwoAndMore(arrivals.length)) {
    const weight =
      model.prior ** stations.length *
      ((1 - model.prior) * STRAY_DENSITY) ** (arrivals.length - stations.length) *
      Math.exp(logGaussian(stations, misses, covariance) + stations.reduce((total, i) => total + (directions[i] ?? NaN), 0));
    const origin = originGiven(stations, misses, covariance);
    sum += weight;
    mean += weight * origin.mean;
    square += weight * (origin.mean ** 2 + origin.variance);
    for (const i of stations) belongs[i] = (belongs[i] ?? NaN) + weight;
  }
  return {
    logDensity: Math.log(sum),
    belongs: belongs.map((weight) => weight / sum),
    originMean: mean / sum,
    originVariance: square / sum - (mean / sum) ** 2,
  };
}

/** Log density of the direction that a station measured, over that of any direction; nothing where it measured none. */
function logDirection({ position: station, bearing }: StatedArrival, position: Position): number {
  if (!bearing) return 0;
  const off = ((legTo(station, position).headsTowardDegrees - bearing.comesFromDegrees + 540) % 360) - 180;
  return Math.log(360 / (Math.sqrt(2 * Math.PI) * bearing.sigmaDegrees)) - (off / bearing.sigmaDegrees) ** 2 / 2;
}

/** Where Vincenty's iteration fails, near the antipode, a point is as good as nowhere: half the girth away. */
function legTo(from: Position, to: Position): { distanceMetres: number; headsTowardDegrees: number } {
  try {
    return legBetween(from, to);
  } catch {
    return { distanceMetres: 20_000_000, headsTowardDegrees: 0 };
  }
}

/** Covariance of (D - L) of all stations, then of their origin times: rows and columns in that order. */
function covarianceOf(arrivals: readonly StatedArrival[], azimuths: readonly number[], model: DenseModel): number[][] {
  const n = arrivals.length;
  // A storm that sends f at t0 + q (f - middle) arrives on a line of slope 4 pi D / g + q through t0 - q middle.
  const farther = arrivals.map(() => (model.tilt * model.gravity) / (4 * Math.PI));
  const earlier = arrivals.map(() => -model.tilt * model.middleHz);
  const tilt = [...farther.map((metres) => -metres), ...earlier];
  const scale = arrivals.map(({ distanceMetres }) => model.scale * distanceMetres);
  const at = (row: number, column: number): number => {
    const [i, j] = [row % n, column % n];
    const [one, other] = [arrivals[i], arrivals[j]];
    if (!one || !other) return NaN;
    const turn = Math.abs((((azimuths[i] ?? NaN) - (azimuths[j] ?? NaN) + 540) % 360) - 180);
    const shared = i === j ? 1 : model.sharedCorrelation * Math.exp(-turn / model.azimuthScaleDegrees);
    let spread = (tilt[row] ?? NaN) * (tilt[column] ?? NaN);
    if (row < n && column < n) spread += model.distanceSpread ** 2 * shared + (scale[i] ?? NaN) * (scale[j] ?? NaN);
    if (row >= n && column >= n) spread += model.timeSpread ** 2 * shared;
    if (i !== j) return model.raisedVariance * spread;
    // An estimate that is too far is too early: the sign of a miss D - L is the other way round from L's.
    const [rowSigma, columnSigma] = [row, column].map((k) => (k < n ? -one.distanceSigmaMetres : one.originSigmaSeconds));
    const own = (rowSigma ?? NaN) * (columnSigma ?? NaN) * (row === column ? 1 : one.correlation);
    return model.raisedVariance * spread + own;
  };
  return Array.from({ length: 2 * n }, (_, row) => Array.from({ length: 2 * n }, (__, column) => at(row, column)));
}

function subsetsOfTwoAndMore(n: number): number[][] {
  const all = Array.from({ length: 2 ** n }, (_, bits) => Array.from({ length: n }, (__, i) => i).filter((i) => (bits >> i) & 1));
  return all.filter((stations) => stations.length >= 2);
}

/** Log density of the distances' misses and of the times' differences from the subset's first time. */
function logGaussian(stations: readonly number[], misses: readonly number[], covariance: readonly (readonly number[])[]): number {
  const n = misses.length / 2;
  const [first = NaN, ...others] = stations;
  const rows = [...stations.map((i) => [[i, 1]] as const), ...others.map((i) => [[n + i, 1], [n + first, -1]] as const)];
  const vector = rows.map((row) => row.reduce((sum, [k, sign]) => sum + sign * (misses[k] ?? NaN), 0));
  const matrix = rows.map((row) =>
    rows.map((column) => row.reduce((sum, [k, a]) => sum + column.reduce((inner, [l, b]) => inner + a * b * (covariance[k]?.[l] ?? NaN), 0), 0)),
  );
  const { solution, logDeterminant } = solved(matrix, vector);
  const chiSquare = vector.reduce((sum, value, i) => sum + value * (solution[i] ?? NaN), 0);
  return -0.5 * (chiSquare + logDeterminant + vector.length * Math.log(2 * Math.PI));
}

/** Generalised least squares for t0, the storm's place given. */
function originGiven(stations: readonly number[], misses: readonly number[], covariance: readonly (readonly number[])[]): { mean: number; variance: number } {
  const n = misses.length / 2;
  const rows = [...stations, ...stations.map((i) => n + i)];
  const matrix = rows.map((k) => rows.map((l) => covariance[k]?.[l] ?? NaN));
  const ones = rows.map((k) => (k < n ? 0 : 1));
  const { solution } = solved(matrix, ones);
  const information = solution.reduce((sum, value, i) => sum + value * (ones[i] ?? NaN), 0);
  return { mean: solution.reduce((sum, value, i) => sum + value * (misses[rows[i] ?? NaN] ?? NaN), 0) / information, variance: 1 / information };
}

/** Gauss's elimination with the largest pivot of the column; metres and seconds differ little enough for it. */
function solved(matrix: readonly (readonly number[])[], vector: readonly number[]): { solution: number[]; logDeterminant: number } {
  const size = vector.length;
  const rows = matrix.map((row, i) => [...row, vector[i] ?? NaN]);
  let logDeterminant = 0;
  for (let column = 0; column < size; column += 1) {
    const below = rows.slice(column).sort((a, b) => Math.abs(b[column] ?? NaN) - Math.abs(a[column] ?? NaN));
    rows.splice(column, below.length, ...below);
    const pivotRow = rows[column] ?? [];
    const pivot = pivotRow[column] ?? NaN;
    logDeterminant += Math.log(Math.abs(pivot));
    for (const [index, row] of rows.entries()) {
      if (index === column) continue;
      const factor = (row[column] ?? NaN) / pivot;
      if (factor !== 0) for (let k = column; k <= size; k += 1) row[k] = (row[k] ?? NaN) - factor * (pivotRow[k] ?? NaN);
    }
  }
  return { solution: rows.map((row, i) => (row[size] ?? NaN) / (row[i] ?? NaN)), logDeterminant };
}
