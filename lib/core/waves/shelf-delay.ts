import { requirePositive } from "../failures/require.ts";
import { deepWaterGroupSpeed, groupSpeed } from "./group-speed.ts";

/** A leg of the way over the shelf, seaward from the gauge. */
export interface ShelfLeg {
  readonly lengthMetres: number;
  readonly depthMetres: number;
}

/**
 * How much later (s) the energy of a frequency reaches the gauge than it would over deep water all the way. Negative
 * where the shelf is the faster: energy speeds up by up to a fifth before it slows down. Each leg is a flat bed and
 * bends no ray; period is conserved. [source: munk-1963]
 *   (1)  delay = sum over legs of length (1 / c(f, h) - 4 pi f / g)
 *
 * @throws RangeError at `frequencyHz`, `gravity`, `legs[i].lengthMetres` or `legs[i].depthMetres`.
 */
export function shelfDelaySeconds(way: {
  readonly frequencyHz: number;
  readonly legs: readonly ShelfLeg[];
  readonly gravity: number;
}): number {
  const { frequencyHz, legs, gravity } = way;
  const deepSpeed = deepWaterGroupSpeed({ frequencyHz, gravity });
  let delaySeconds = 0;
  for (const [index, { lengthMetres, depthMetres }] of legs.entries()) {
    requirePositive(lengthMetres, `legs[${index}].lengthMetres`, "The length of a leg", "metres");
    requirePositive(depthMetres, `legs[${index}].depthMetres`, "Water depth", "metres");
    delaySeconds += lengthMetres * (1 / groupSpeed({ frequencyHz, depthMetres, gravity }) - 1 / deepSpeed); // (1)
  }
  return delaySeconds;
}
