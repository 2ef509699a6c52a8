import { geodesicInverse } from "../geodesy/geodesic.ts";
import type { Position } from "../units/position.ts";
import { assess, blankAssessment } from "./assess.ts";
import { conditionAt, type SubsetPlan } from "./conditioned.ts";
import { centreOf, firstCells } from "./grid.ts";
import type { Network } from "./network.ts";
import { climbToPeak, type Peak } from "./peak.ts";
import { blankSite, quickSite } from "./site.ts";
import { logSum, subsetLogs } from "./weigh.ts";

const MOST_PEAKS = 6;
/** Climbs start well apart from one another, and peaks nearer than this are one. */
const APART_METRES = 600_000;
const MOST_CLIMBS = 16;
/** A climb that comes this near to a peak is on its way there. */
const ONE_PEAK_METRES = 200_000;

/**
 * The maxima of the density with land disregarded, best first: climbs from the best of 842 cells over the Earth,
 * ranked with the stations taken as seeing different parts of the storm, so that one covariance serves them all.
 */
export function findPeaks(network: Network, plan: SubsetPlan): Peak[] {
  const rough = conditionAt(network, null, plan);
  if (!rough) return [];
  const columns = blankSite(network);
  const blank = blankAssessment(network, plan);
  const starts = firstCells()
    .map((cell) => {
      const centre = centreOf(cell);
      const site = quickSite(network, centre, columns);
      return { centre, log: logSum(subsetLogs(rough, assess(rough, site.distances, blank), site.logBearing)) };
    })
    .sort((a, b) => b.log - a.log);
  const tried: Position[] = [];
  const found: Peak[] = [];
  for (const { centre } of starts) {
    if (found.length >= MOST_PEAKS || tried.length >= MOST_CLIMBS) break;
    if (isWithin(APART_METRES, centre, tried)) continue;
    tried.push(centre);
    const tops = found.map((peak) => peak.position);
    const peak = climbToPeak(network, centre, plan, (position) => isWithin(ONE_PEAK_METRES, position, tops));
    if (peak && !isWithin(APART_METRES, peak.position, tops)) found.push(peak);
  }
  return found.sort((a, b) => b.logFree - a.logFree);
}

function isWithin(metres: number, position: Position, places: readonly Position[]): boolean {
  return places.some((place) => geodesicInverse({ from: place, to: position }).distanceMetres < metres);
}
