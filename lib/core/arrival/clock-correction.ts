import type { ClockCorrection } from "./gathered-observations.ts";

/** The true time of a moment on a station's own clock. Corrections of one station do not overlap. */
export function trueEpochSeconds(corrections: readonly ClockCorrection[], stationId: string, clockEpochSeconds: number): number {
  const correction = corrections.find((one) => one.stationId === stationId && holds(one, clockEpochSeconds));
  return clockEpochSeconds - (correction?.fastBySeconds ?? 0);
}

function holds({ fromEpochSeconds, toEpochSeconds }: ClockCorrection, clockEpochSeconds: number): boolean {
  return (fromEpochSeconds ?? -Infinity) <= clockEpochSeconds && clockEpochSeconds < (toEpochSeconds ?? Infinity);
}
