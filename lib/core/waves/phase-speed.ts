import type { WaveOverDepth } from "./wave.ts";
import { wavenumber } from "./wavenumber.ts";

/**
 * Speed of the crests (m/s) of a wave of small amplitude over a flat bed: C = omega / k. [source: ardhuin-owg]
 * Energy goes at the group speed, not at this one.
 *
 * @throws RangeError at `frequencyHz`, `depthMetres` or `gravity`.
 */
export function phaseSpeed(wave: WaveOverDepth): number {
  return (2 * Math.PI * wave.frequencyHz) / wavenumber(wave);
}
