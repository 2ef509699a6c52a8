import { requireWithin } from "../failures/require.ts";
import { deepWaterGroupSpeed } from "./group-speed.ts";

/**
 * How long the energy of a frequency is on its way over deep water (s): 4 pi f D / g. [source: munk-1963]
 *
 * @throws RangeError at `frequencyHz`, `gravity`, or `distanceMetres` below zero.
 */
export function deepWaterTravelSeconds(way: {
  readonly frequencyHz: number;
  readonly distanceMetres: number;
  readonly gravity: number;
}): number {
  requireWithin(way.distanceMetres, 0, Infinity, "distanceMetres", "Distance", "metres");
  return way.distanceMetres / deepWaterGroupSpeed(way);
}
