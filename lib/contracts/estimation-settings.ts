import type { EstimationSettings } from "#lib/core/source/settings.ts";
import { SECONDS_PER_HOUR } from "#lib/core/units/time.ts";
import type { PublicSettings } from "./settings.ts";

const METRES_PER_KM = 1000;
/** `tiltHours` is stated over this step of frequency. */
const TILT_STEP_HZ = 0.03;

/** The settings in the units of the core. */
export function toEstimationSettings(settings: PublicSettings): EstimationSettings {
  const { spread, timed } = settings;
  return {
    gravity: settings.gravity,
    spread: {
      distanceMetres: spread.distanceKm * METRES_PER_KM,
      originSeconds: spread.timeHours * SECONDS_PER_HOUR,
      sharedCorrelation: spread.sharedCorrelation,
      azimuthScaleDegrees: spread.azimuthScaleDegrees,
      tiltSecondsPerHz: (spread.tiltHours * SECONDS_PER_HOUR) / TILT_STEP_HZ,
      scaleFraction: spread.scaleFraction,
    },
    belongPrior: settings.belongPrior,
    sight: settings.sight,
    timed: { durationSeconds: timed.durationHours * SECONDS_PER_HOUR, spectrumWidthHz: timed.spectrumWidthHz },
    band: settings.band,
  };
}
