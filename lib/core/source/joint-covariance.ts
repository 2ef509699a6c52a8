import type { StationArrival } from "./answer.ts";
import type { EstimationSettings } from "./settings.ts";

/**
 * The covariance of all stations' (distance, origin time) together: their own errors plus the model spread.
 *
 *   (1)  S = C + F (own + tilt tilt' + scale scale')
 *   (2)  own_ij = sd^2 R_ij for distances and for times;  R_ii = 1,
 *        R_ij = rho exp(-|azimuth_i - azimuth_j| / scale), azimuths seen from the storm
 *   (3)  tilt = q (-g / 4 pi at each distance, f_mid at each time), q the settings' seconds per hertz: a storm that
 *        sends frequency f at t0 + q (f - f_mid) looks farther by q g / 4 pi and earlier by q f_mid
 *   (4)  scale = the settings' fraction of each distance
 * C couples stations where they share a shift (timed periods). State order: n distances, then n times; signs are
 * those of u = (D - L, t0 - tau). F raises the spread when the misfit of many stations asks for it.
 */
export function steadyCovariance(arrivals: readonly StationArrival[], settings: EstimationSettings, spreadVarianceFactor: number): Float64Array {
  const n = arrivals.length;
  const matrix = new Float64Array(4 * n * n);
  arrivals.forEach(({ estimate }, i) => {
    add(matrix, 2 * n, i, i, estimate.covariance.distanceVariance);
    add(matrix, 2 * n, i, n + i, estimate.covariance.distanceOriginCovariance);
    add(matrix, 2 * n, n + i, i, estimate.covariance.distanceOriginCovariance);
    add(matrix, 2 * n, n + i, n + i, estimate.covariance.originVariance);
  });
  addSharedShifts(matrix, arrivals);

  const { tiltSecondsPerHz, scaleFraction } = settings.spread;
  const midHz = (settings.band.lowHz + settings.band.highHz) / 2;
  const tilt = new Float64Array(2 * n);
  const scale = new Float64Array(2 * n);
  arrivals.forEach(({ estimate }, i) => {
    tilt[i] = (-tiltSecondsPerHz * settings.gravity) / (4 * Math.PI); // (3)
    tilt[n + i] = tiltSecondsPerHz * midHz;
    scale[i] = scaleFraction * estimate.distanceMetres; // (4)
  });
  addOuter(matrix, tilt, spreadVarianceFactor);
  addOuter(matrix, scale, spreadVarianceFactor);
  return matrix;
}

/** Adds (2) for a storm from which the stations are seen at `azimuths` (radians), in place; null: all R_ij are zero. */
export function addOwnSpread(
  matrix: Float64Array,
  azimuths: Float64Array | null,
  { size: n, settings, spreadVarianceFactor }: { readonly size: number; readonly settings: EstimationSettings; readonly spreadVarianceFactor: number },
): void {
  const { distanceMetres, originSeconds, sharedCorrelation, azimuthScaleDegrees } = settings.spread;
  const perRadian = 180 / Math.PI / azimuthScaleDegrees;
  const distanceVariance = distanceMetres ** 2 * spreadVarianceFactor;
  const originVariance = originSeconds ** 2 * spreadVarianceFactor;
  for (let i = 0; i < n; i++) {
    for (let j = azimuths ? 0 : i; j <= i; j++) {
      const apart = Math.abs((azimuths?.[i] ?? NaN) - (azimuths?.[j] ?? NaN));
      const turn = Math.min(apart, 2 * Math.PI - apart);
      const correlation = i === j ? 1 : sharedCorrelation * Math.exp(-turn * perRadian); // (2)
      add(matrix, 2 * n, i, j, distanceVariance * correlation);
      add(matrix, 2 * n, n + i, n + j, originVariance * correlation);
      if (i === j) continue;
      add(matrix, 2 * n, j, i, distanceVariance * correlation);
      add(matrix, 2 * n, n + j, n + i, originVariance * correlation);
    }
  }
}

/** Each station's own covariance holds its shifts already; here is what two stations of one cause have in common. */
function addSharedShifts(matrix: Float64Array, arrivals: readonly StationArrival[]): void {
  const n = arrivals.length;
  arrivals.forEach((first, i) => {
    arrivals.forEach((second, j) => {
      if (i === j) return;
      for (const a of first.estimate.sharedShifts) {
        for (const b of second.estimate.sharedShifts) {
          if (a.cause !== b.cause) continue;
          add(matrix, 2 * n, i, j, a.distanceMetres * b.distanceMetres);
          add(matrix, 2 * n, i, n + j, a.distanceMetres * b.originSeconds);
          add(matrix, 2 * n, n + i, j, a.originSeconds * b.distanceMetres);
          add(matrix, 2 * n, n + i, n + j, a.originSeconds * b.originSeconds);
        }
      }
    });
  });
}

function addOuter(matrix: Float64Array, vector: Float64Array, factor: number): void {
  const size = vector.length;
  for (let i = 0; i < size; i++) {
    for (let j = 0; j < size; j++) add(matrix, size, i, j, factor * (vector[i] ?? NaN) * (vector[j] ?? NaN));
  }
}

function add(matrix: Float64Array, size: number, row: number, column: number, value: number): void {
  matrix[row * size + column] = (matrix[row * size + column] ?? NaN) + value;
}
