import { relativeDepth } from "./relative-depth.ts";
import { requireWave, requireWaveOverDepth, type WaveOverDepth } from "./wave.ts";

/**
 * How fast the energy of a swell travels (m/s) over water of any depth.
 *
 * Small-amplitude (Airy) theory, still water, flat bed. [source: ardhuin-owg] Symbols: omega angular frequency
 * (rad/s), k wavenumber (rad/m), h depth (m), g gravity (m/s2).
 *   (1)  omega^2 = g k tanh kh            dispersion relation
 *   (2)  n = 1/2 (1 + 2kh / sinh 2kh)     group speed over phase speed
 *   (3)  c = n omega / k                  group speed
 *
 * @throws RangeError at `frequencyHz`, `depthMetres` or `gravity`.
 */
export function groupSpeed(wave: WaveOverDepth): number {
  requireWaveOverDepth(wave);
  const omega = 2 * Math.PI * wave.frequencyHz;
  const kh = relativeDepth((omega * omega * wave.depthMetres) / wave.gravity); // (1)
  const n = 0.5 * (1 + (2 * kh) / Math.sinh(2 * kh)); // (2); sinh overflows to infinity in deep water, giving 1/2
  return (n * omega * wave.depthMetres) / kh; // (3)
}

/**
 * How fast the energy of a swell travels (m/s) over water deeper than half its length: c = g / (4 pi f).
 * [source: munk-1963] At 0.05 Hz and 100 m the true speed is a fifth higher.
 *
 * @throws RangeError at `frequencyHz` or `gravity`.
 */
export function deepWaterGroupSpeed(wave: { readonly frequencyHz: number; readonly gravity: number }): number {
  requireWave(wave);
  return wave.gravity / (4 * Math.PI * wave.frequencyHz);
}
