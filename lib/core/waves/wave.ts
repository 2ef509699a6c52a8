import { requirePositive } from "../failures/require.ts";

/** A swell of one frequency over a flat bed. `gravity` in m/s2. */
export interface WaveOverDepth {
  readonly frequencyHz: number;
  readonly depthMetres: number;
  readonly gravity: number;
}

/** @throws RangeError at `frequencyHz` or `gravity`. */
export function requireWave(wave: { readonly frequencyHz: number; readonly gravity: number }): void {
  requirePositive(wave.frequencyHz, "frequencyHz", "Wave frequency", "hertz");
  requirePositive(wave.gravity, "gravity", "Gravity", "metres per second squared");
}

/** @throws RangeError at `frequencyHz`, `gravity` or `depthMetres`. */
export function requireWaveOverDepth(wave: WaveOverDepth): void {
  requireWave(wave);
  requirePositive(wave.depthMetres, "depthMetres", "Water depth", "metres");
}
