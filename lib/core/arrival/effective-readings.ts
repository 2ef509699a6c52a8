/** Residuals, in standard deviations, that say nothing of how readings scatter. */
const ROUNDING = 1e-6;

/**
 * How many independent readings a ridge of correlated ones is worth.
 *
 *   (1)  r = (r1 + 2/n) / (1 - 3/n)     r1 the residuals' lag-1 correlation in order of frequency; the two terms
 *                                       undo the bias that fitting a line of two parameters gives it
 *   (2)  n_eff = n (1 - r) / (1 + r)    r clipped to 0..0.9
 * With fewer than four readings (1) has no meaning and they count in full; so do readings that lie on the line to
 * a millionth of their errors, whose residuals are rounding.
 * @param residuals in order of frequency, each over its own standard deviation
 */
export function effectiveReadings(residuals: readonly number[]): number {
  const n = residuals.length;
  if (n < 4) return n;
  let power = 0;
  let product = 0;
  residuals.forEach((residual, index) => {
    power += residual ** 2;
    product += residual * (residuals[index + 1] ?? 0);
  });
  if (power <= n * ROUNDING ** 2) return n;
  const r = (product / power + 2 / n) / (1 - 3 / n); // (1)
  const clipped = Math.min(0.9, Math.max(0, r));
  return (n * (1 - clipped)) / (1 + clipped); // (2)
}
