import { geodesicInverse } from "../geodesy/geodesic.ts";
import { straySets } from "./belonging.ts";
import { planSubsets } from "./conditioned.ts";
import { networkOf, type Network } from "./network.ts";
import { climbToPeak, type Peak } from "./peak.ts";

/**
 * How far (m) the best point moves when each station in turn is left out, in the network's order; null where fewer
 * than two would be left, or nothing is found without it.
 */
export function leaveOneOutShifts(network: Network, peak: Peak, clocksSetAside: ReadonlySet<string>): (number | null)[] {
  const strays = peak.conditioned.plan.sets[peak.best] ?? [];
  return network.arrivals.map((left, index) => {
    if (network.size < 3) return null;
    const others = networkOf(network.arrivals.filter((arrival) => arrival !== left), {
      settings: network.settings,
      spreadVarianceFactor: network.spreadVarianceFactor,
      clocksSetAside,
    });
    const straysLeft = strays.filter((i) => i !== index).map((i) => (i > index ? i - 1 : i));
    const without = climbToPeak(others, peak.position, planSubsets(others, straySets(others.size, [straysLeft])));
    return without && geodesicInverse({ from: peak.position, to: without.position }).distanceMetres;
  });
}
