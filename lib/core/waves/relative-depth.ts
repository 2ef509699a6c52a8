import { requirePositive } from "../failures/require.ts";

/**
 * Depth times wavenumber, X = kh, of the wave whose deep-water value is `deepWaterRelativeDepth`, Y = omega^2 h / g.
 *   (1)  X tanh X = Y                                     the dispersion relation, [source: ardhuin-owg]
 *   (2)  X <- X + (Y - X tanh X) / (tanh X + X sech^2 X)  Newton's step
 * Starts from Y / sqrt(tanh Y), which is within 5 % of the root at any depth (measured over Y from 1e-9 to 1e3); each
 * step squares the error, so that five reach the last digit. No units.
 *
 * @throws RangeError at `deepWaterRelativeDepth`.
 */
export function relativeDepth(deepWaterRelativeDepth: number): number {
  requirePositive(deepWaterRelativeDepth, "deepWaterRelativeDepth", "Relative depth", "radians");
  const y = deepWaterRelativeDepth;
  if (y > 20) return y; // tanh differs from 1 by less than the last digit
  let x = y / Math.sqrt(Math.tanh(y));
  for (let step = 0; step < 5; step += 1) {
    const t = Math.tanh(x);
    x += (y - x * t) / (t + x * (1 - t * t)); // (2)
  }
  return x;
}
