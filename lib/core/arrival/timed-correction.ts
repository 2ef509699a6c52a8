/**
 * How much too far a storm looks when periods are timed by hand at a moment.
 *
 * At a fixed moment the shore sees the storm's spectrum (width S about its peak frequency) times the window of
 * frequencies that its duration lets arrive together (width sigma_f). The mean of the product leans toward the
 * spectrum's peak, so the frequency rises too slowly:
 *   (1)  sigma_f = T g / (4 pi L)               T the storm's duration
 *   (2)  L_apparent = L (1 + sigma_f^2 / S^2)   hence, with K = (T g / (4 pi S))^2,
 *   (3)  L^2 - L_apparent L + K = 0,  L the larger root
 * Under (2) no storm looks nearer than 2 sqrt K. Of one that does, duration and width cannot have been what was taken:
 * sqrt K is then taken for half the apparent distance, the most that it can have been, which holds the factor at its
 * turning point, 2; its error runs from there down to a factor of nearly 1, and so is as large as the correction.
 * Both widths are taken as Gaussian. Derived from the product of two Gaussian windows; no published table.
 */
export interface TimedWindow {
  readonly gravity: number;
  readonly durationSeconds: number;
  readonly spectrumWidthHz: number;
}

/** Relative standard deviations of the default duration (6 +- 3 h) and spectral width (0.012 +- 0.004 Hz). */
const DURATION_RELATIVE_SIGMA = 0.5;
const WIDTH_RELATIVE_SIGMA = 1 / 3;

export interface TimedExcess {
  /** sigma_f^2 / S^2: readings' frequencies are stretched about the peak by one plus this. */
  readonly excess: number;
  /** The excess one standard deviation of duration and width below and above; they are what C carries. */
  readonly excessLow: number;
  readonly excessHigh: number;
}

/** Excess (dimensionless, 0 to 1) for an apparent distance in metres. */
export function timedExcess(apparentMetres: number, window: TimedWindow): TimedExcess {
  const taken = (window.durationSeconds * window.gravity) / (4 * Math.PI * window.spectrumWidthHz);
  const rootK = apparentMetres > 0 ? Math.min(taken, apparentMetres / 2) : taken;
  const relativeSigma = Math.hypot(DURATION_RELATIVE_SIGMA, WIDTH_RELATIVE_SIGMA);
  return {
    excess: excessFor(apparentMetres, rootK),
    excessLow: excessFor(apparentMetres, rootK * (1 - relativeSigma)),
    excessHigh: excessFor(apparentMetres, rootK * (1 + relativeSigma)),
  };
}

function excessFor(apparentMetres: number, rootK: number): number {
  // Also for a period that rises with time, whose distance is below zero: no factor makes sense of that one.
  if (apparentMetres <= 2 * rootK) return 1;
  const discriminant = apparentMetres ** 2 - 4 * rootK ** 2;
  const distance = (apparentMetres + Math.sqrt(discriminant)) / 2; // (3)
  return apparentMetres / distance - 1;
}
