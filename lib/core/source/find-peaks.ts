import { geodesicInverse } from "../geodesy/geodesic.ts";
import type { Position } from "../units/position.ts";
import type { StraySet } from "./belonging.ts";
import { conditionAt } from "./conditioned.ts";
import { centreOf, firstCells } from "./grid.ts";
import type { Network } from "./network.ts";
import { climbToPeak, type Peak } from "./peak.ts";
import { quickSite } from "./site.ts";
import { weigh } from "./weigh.ts";

const MOST_PEAKS = 6;
/** Climbs start well apart from one another, and peaks nearer than this are one. */
const APART_METRES = 600_000;
const MOST_CLIMBS = 24;

/**
 * The maxima of the density with land disregarded, best first: climbs from the best of 842 cells over the Earth.
 * A maximum narrower than a cell is not lost, for a climb starts from every cell in turn until they are found.
 */
export function findPeaks(network: Network, sets: readonly StraySet[]): Peak[] {
  const starts = firstCells()
    .flatMap((cell) => {
      const centre = centreOf(cell);
      const site = quickSite(network, centre, null);
      const conditioned = conditionAt(network, site.azimuths, sets);
      return conditioned ? [{ centre, log: weigh(conditioned, site).logFree }] : [];
    })
    .sort((a, b) => b.log - a.log);
  const found: Peak[] = [];
  for (const { centre } of starts.slice(0, MOST_CLIMBS)) {
    if (found.length >= MOST_PEAKS) break;
    const peak = climbToPeak(network, centre, sets);
    if (peak && !isNear(found, peak.position)) found.push(peak);
  }
  return found.sort((a, b) => b.logFree - a.logFree);
}

function isNear(peaks: readonly Peak[], position: Position): boolean {
  return peaks.some((peak) => geodesicInverse({ from: peak.position, to: position }).distanceMetres < APART_METRES);
}
