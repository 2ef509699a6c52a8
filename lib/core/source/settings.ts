import { STANDARD_GRAVITY } from "../units/gravity.ts";

/**
 * How far stations' summaries of one storm differ beyond their own reading errors, because they see different parts
 * of its size and life (all 1 sigma): a part of distance and of time for each station, shared between stations with
 * correlation `sharedCorrelation * exp(-|difference of azimuth seen from the storm| / azimuthScaleDegrees)`; one tilt
 * for all (low and high frequencies leave at different times); one scale of all distances.
 */
export interface SpreadSettings {
  readonly distanceMetres: number;
  readonly originSeconds: number;
  readonly sharedCorrelation: number;
  readonly azimuthScaleDegrees: number;
  readonly tiltSecondsPerHz: number;
  readonly scaleFraction: number;
}

export interface EstimationSettings {
  readonly gravity: number;
  readonly spread: SpreadSettings;
  /** Prior probability that a station's arrival belongs to this storm. */
  readonly belongPrior: number;
  /** Whether land between source and station counts against a source. */
  readonly sight: boolean;
  /** How long a storm sends out each frequency, and the width of its swell's spectrum: for periods timed at a moment. */
  readonly timed: { readonly durationSeconds: number; readonly spectrumWidthHz: number };
  readonly band: { readonly lowHz: number; readonly highHz: number };
}

export const DEFAULT_SETTINGS: EstimationSettings = {
  gravity: STANDARD_GRAVITY,
  spread: {
    distanceMetres: 150_000,
    originSeconds: 6 * 3600,
    sharedCorrelation: 0.5,
    azimuthScaleDegrees: 30,
    tiltSecondsPerHz: (4 * 3600) / 0.03,
    scaleFraction: 0.02,
  },
  belongPrior: 0.95,
  sight: true,
  timed: { durationSeconds: 6 * 3600, spectrumWidthHz: 0.012 },
  band: { lowHz: 0.03, highHz: 0.12 },
};
