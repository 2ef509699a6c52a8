import { chiSquareSurvival } from "../statistics/chi-square.ts";
import type { SourceAnswer } from "./answer.ts";
import type { StraySet } from "./belonging.ts";
import { assess } from "./assess.ts";
import { conditionAt, planSubsets } from "./conditioned.ts";
import { exactSite } from "./exact-site.ts";
import { networkOf } from "./network.ts";
import type { Peak } from "./peak.ts";
import type { PlacedMode } from "./possible-sources.ts";
import type { SearchInput } from "./search.ts";

export interface FitAtPeak {
  readonly peak: Peak | null;
  readonly distances: Float64Array;
  readonly belongs: readonly number[];
  readonly stray: StraySet;
  readonly summary: SourceAnswer["fit"];
}

/**
 * How well the stations that belong (probability of a half and more) meet at the placed source: chi-square under the
 * spread as it was set, whether or not the misfit then raised it, with 2k - 3 degrees of freedom for k stations (two
 * coordinates and a time are fitted) less one for a clock set aside; and how far their rings miss it.
 */
export function fitAtPeak({ network: raised }: SearchInput, main: PlacedMode, belongs: readonly number[], clocksSetAside: ReadonlySet<string>): FitAtPeak {
  const network = networkOf(raised.arrivals, { settings: raised.settings, clocksSetAside });
  const site = exactSite(network, main.position);
  const stray = belongs.flatMap((probability, i) => (probability < 0.5 ? [i] : []));
  const base = { peak: main.peak, distances: site.distances, belongs, stray };
  const conditioned = conditionAt(network, site.azimuths, planSubsets(network, [stray]));
  const count = network.size - stray.length;
  if (!conditioned || count < 2) return { ...base, summary: null };

  const chiSquare = Math.max(0, assess(conditioned, site.distances).chiSquares[0] ?? NaN);
  const aside = network.arrivals.filter(({ id }, i) => clocksSetAside.has(id) && !stray.includes(i)).length;
  const degreesOfFreedom = 2 * count - 3 - aside;
  const squares = Array.from(site.distances, (distance, i) => (stray.includes(i) ? 0 : (distance - (network.distances[i] ?? NaN)) ** 2));
  return {
    ...base,
    summary: {
      chiSquare,
      degreesOfFreedom,
      pValue: chiSquareSurvival(chiSquare, degreesOfFreedom),
      ringMissMetres: Math.sqrt(squares.reduce((sum, square) => sum + square, 0) / count),
    },
  };
}
