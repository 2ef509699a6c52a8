import type { Reading } from "./reading.ts";

/**
 * Errors (1 sigma) that are taken for readings whose maker gave none. Common practice, no source: half an hour for a
 * peak of energy picked from hourly spectra, minutes for a stopwatch; mean directions of a swell swing by 10 degrees
 * within the hour.
 */
export const DEFAULT_ARRIVAL_SIGMA_SECONDS: Readonly<Record<Reading["kind"], number>> = { ridge: 1800, timed: 300 };
/** As a part of the frequency, or of the period. */
export const DEFAULT_FREQUENCY_SIGMA_FRACTION: Readonly<Record<Reading["kind"], number>> = { ridge: 0, timed: 0.025 };
export const DEFAULT_BEARING_SIGMA_DEGREES = 15;
