import { relativeDepth } from "./relative-depth.ts";
import { requireWaveOverDepth, type WaveOverDepth } from "./wave.ts";

/**
 * Radians of phase per metre of the way (rad/m) of a wave of small amplitude in still water over a flat bed.
 * [source: ardhuin-owg]
 *   (1)  omega^2 = g k tanh kh
 *
 * @throws RangeError at `frequencyHz`, `depthMetres` or `gravity`.
 */
export function wavenumber(wave: WaveOverDepth): number {
  requireWaveOverDepth(wave);
  const omega = 2 * Math.PI * wave.frequencyHz;
  return relativeDepth((omega * omega * wave.depthMetres) / wave.gravity) / wave.depthMetres; // (1)
}
