import type { LineNote } from "./line.ts";
import type { Bearing, Reading } from "./reading.ts";

/** Swell's direction swings by some ten degrees within the hour, so no mean is better known. [source: gallet-young-2014] */
const LEAST_SIGMA_DEGREES = 10;
/** Mean length of the unit vectors below which directions have no mean worth the name: a scatter of 67 degrees. */
const LEAST_RESULTANT = 0.5;
const DEGREES_PER_RADIAN = 180 / Math.PI;

export interface MeanBearing {
  /** Null without any direction, and where the directions contradict each other. */
  readonly bearing: Bearing | null;
  readonly notes: readonly LineNote[];
}

/**
 * One direction from readings that have one: the mean of unit vectors, weighted by inverse variance. Its standard
 * deviation is the largest of ten degrees, what the stated errors give, and the directions' own scatter
 *   (1)  sqrt(-2 ln R)      R the mean length of the unit vectors; the circular standard deviation
 * undivided by their number, for neighbouring readings see one swell and share their error.
 */
export function meanBearing(readings: readonly Reading[]): MeanBearing {
  const bearings = readings.flatMap(({ bearing }) => bearing ?? []);
  if (bearings.length === 0) return { bearing: null, notes: [] };
  let east = 0;
  let north = 0;
  let weightSum = 0;
  for (const { comesFromDegrees, sigmaDegrees } of bearings) {
    const weight = 1 / sigmaDegrees ** 2;
    const theta = comesFromDegrees / DEGREES_PER_RADIAN;
    east += weight * Math.sin(theta);
    north += weight * Math.cos(theta);
    weightSum += weight;
  }
  const resultant = Math.min(1, Math.hypot(east, north) / weightSum);
  if (resultant < LEAST_RESULTANT) return { bearing: null, notes: [CONTRADICTORY] };
  const scatterDegrees = Math.sqrt(-2 * Math.log(resultant)) * DEGREES_PER_RADIAN; // (1)
  const sigmaDegrees = Math.max(LEAST_SIGMA_DEGREES, 1 / Math.sqrt(weightSum), scatterDegrees);
  const comesFromDegrees = (Math.atan2(east, north) * DEGREES_PER_RADIAN + 360) % 360;
  return { bearing: { comesFromDegrees, sigmaDegrees }, notes: raisedNotes(bearings) };
}

const CONTRADICTORY: LineNote = {
  code: "bearings-contradict",
  message: "Its readings' directions contradict each other, so none of them is used.",
};

function raisedNotes(bearings: readonly Bearing[]): LineNote[] {
  const surer = bearings.filter(({ sigmaDegrees }) => sigmaDegrees < LEAST_SIGMA_DEGREES).length;
  if (surer === 0) return [];
  const stated = surer === 1 ? "A direction states an error" : `${surer} directions state errors`;
  const message = `${stated} below ${LEAST_SIGMA_DEGREES} degrees; the station's direction counts with no less than that, for swell's direction swings so much within the hour.`;
  return [{ code: "bearing-sigma-raised", message }];
}
