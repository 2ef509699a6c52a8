import { requirePositive } from "../failures/require.ts";

/**
 * How far away the storm is (m) whose arriving frequency rises by `slopeHzPerSecond`. A point disturbance at distance
 * L and time t0 arrives over deep water as f(t) = g (t - t0) / (4 pi L), so L = g / (4 pi s). [source: munk-1963]
 *
 * @throws RangeError at `slopeHzPerSecond` or `gravity`.
 */
export function distanceFromSlope(line: { readonly slopeHzPerSecond: number; readonly gravity: number }): number {
  requirePositive(line.slopeHzPerSecond, "slopeHzPerSecond", "The rise of frequency", "hertz per second");
  requirePositive(line.gravity, "gravity", "Gravity", "metres per second squared");
  return line.gravity / (4 * Math.PI * line.slopeHzPerSecond);
}

/**
 * How fast the arriving frequency of a storm at this distance rises (Hz/s): s = g / (4 pi L). [source: munk-1963]
 *
 * @throws RangeError at `distanceMetres` or `gravity`.
 */
export function slopeFromDistance(line: { readonly distanceMetres: number; readonly gravity: number }): number {
  requirePositive(line.distanceMetres, "distanceMetres", "Distance", "metres");
  requirePositive(line.gravity, "gravity", "Gravity", "metres per second squared");
  return line.gravity / (4 * Math.PI * line.distanceMetres);
}
