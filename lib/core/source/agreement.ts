import { MEAN_RADIUS_METRES } from "../geodesy/earth.ts";
import { PLAUSIBLE_ORIGIN_SECONDS, type Network } from "./network.ts";
import { logTotal } from "./regions.ts";
import type { WeighedCell } from "./search.ts";

/**
 * Probability (0..1) that at least two of the stations saw one storm, land disregarded: the mixture over subsets of
 * two and more, summed over the ocean, against those in which one belongs (its ring, however long, at its own time)
 * or none does (anywhere, at any plausible time). All share one flat prior of place, which drops out.
 */
export function agreementProbability(network: Network, cells: readonly WeighedCell[]): number {
  const { belongPrior } = network.settings;
  const together = logTotal(cells.map((cell) => cell.logFree + Math.log(cell.areaSquareMetres)));
  const strays = Array.from(network.logStrayDensity, (density) => Math.log(1 - belongPrior) + density);
  const allStray = strays.reduce((sum, stray) => sum + stray, 0);
  const alone = Array.from(network.distances, (distance, i) => {
    const girth = 2 * Math.PI * MEAN_RADIUS_METRES * Math.abs(Math.sin(distance / MEAN_RADIUS_METRES));
    return Math.log(belongPrior) + Math.log(girth + 1) + allStray - (strays[i] ?? NaN);
  });
  const none = allStray + Math.log(4 * Math.PI * MEAN_RADIUS_METRES ** 2 * PLAUSIBLE_ORIGIN_SECONDS);
  return Math.exp(together - logTotal([together, ...alone, none]));
}
