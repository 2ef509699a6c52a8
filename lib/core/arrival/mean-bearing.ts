import type { Bearing, Reading } from "./reading.ts";

/** Swell's direction swings by some ten degrees within the hour, so no mean is better known. [source: gallet-young-2014] */
const LEAST_SIGMA_DEGREES = 10;

/** One direction from readings that have one: the mean of unit vectors, weighted by inverse variance. Null without any. */
export function meanBearing(readings: readonly Reading[]): Bearing | null {
  let east = 0;
  let north = 0;
  let weightSum = 0;
  for (const { bearing } of readings) {
    if (!bearing) continue;
    const weight = 1 / bearing.sigmaDegrees ** 2;
    const theta = (bearing.comesFromDegrees * Math.PI) / 180;
    east += weight * Math.sin(theta);
    north += weight * Math.cos(theta);
    weightSum += weight;
  }
  if (weightSum === 0) return null;
  return {
    comesFromDegrees: ((Math.atan2(east, north) * 180) / Math.PI + 360) % 360,
    sigmaDegrees: Math.max(LEAST_SIGMA_DEGREES, 1 / Math.sqrt(weightSum)),
  };
}
