import { MEAN_RADIUS_METRES } from "../geodesy/earth.ts";
import { PLAUSIBLE_ORIGIN_SECONDS, type Network } from "./network.ts";
import { logTotal } from "./regions.ts";
import type { Peak } from "./peak.ts";
import type { WeighedCell } from "./search.ts";

/**
 * Probability (0..1) that at least two of the stations saw one storm, land disregarded: the mixture over subsets of
 * two and more, summed over the ocean, against those in which one belongs (its ring, however long, at its own time)
 * or none does (anywhere, at any plausible time). All share one flat prior of place, which drops out.
 */
export function agreementProbability(network: Network, cells: readonly WeighedCell[]): number {
  return agreementOf(network, logTotal(cells.map((cell) => cell.logFree + Math.log(cell.areaSquareMetres))));
}

/** The same before any search, each peak taken for a Gaussian hill. */
export function agreementAtPeaks(network: Network, peaks: readonly Peak[]): number {
  const hills = peaks.map(({ logFree, information: { eastEast, eastNorth, northNorth } }) => {
    return logFree + Math.log(2 * Math.PI) - 0.5 * Math.log(eastEast * northNorth - eastNorth ** 2);
  });
  return agreementOf(network, logTotal(hills));
}

function agreementOf(network: Network, together: number): number {
  const { belongPrior } = network.settings;
  const strays = Array.from(network.logStrayDensity, (density) => Math.log(1 - belongPrior) + density);
  // Added up each time and never taken apart again: with a prior of 1 a stray's log is minus infinity.
  const allStrayBut = (left: number): number => strays.reduce((sum, stray, i) => (i === left ? sum : sum + stray), 0);
  const alone = Array.from(network.distances, (distance, i) => {
    const girth = 2 * Math.PI * MEAN_RADIUS_METRES * Math.abs(Math.sin(distance / MEAN_RADIUS_METRES));
    return Math.log(belongPrior) + Math.log(girth + 1) + allStrayBut(i);
  });
  const none = allStrayBut(-1) + Math.log(4 * Math.PI * MEAN_RADIUS_METRES ** 2 * PLAUSIBLE_ORIGIN_SECONDS);
  return Math.exp(together - logTotal([together, ...alone, none]));
}
