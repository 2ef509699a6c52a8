import { chiSquareSurvival } from "../statistics/chi-square.ts";
import type { StationArrival } from "./answer.ts";
import { straySets, type StraySet } from "./belonging.ts";
import { suspectClock, type ClockOffset } from "./clock-check.ts";
import { planSubsets } from "./conditioned.ts";
import { findPeaks } from "./find-peaks.ts";
import { networkOf, type Network, type NetworkOptions } from "./network.ts";
import { climbToPeak, type Peak } from "./peak.ts";
import type { EstimationSettings } from "./settings.ts";

/** The spread is raised where the agreeing stations' misfit is this improbable, up to a fourfold standard deviation. */
const ASKS_BELOW = 0.05;
const LEAST_STATIONS = 4;
const MOST_VARIANCE_FACTOR = 16;
const BISECTIONS = 24;

export interface Prepared {
  readonly network: Network;
  readonly sets: readonly StraySet[];
  readonly options: NetworkOptions;
  readonly clock: ClockOffset | null;
  readonly clocksSetAside: ReadonlySet<string>;
  /** The free peaks of the network. */
  readonly peaks: readonly Peak[];
}

/**
 * The network as it is to be searched: one suspect clock set aside (its distance is kept, its time is not), the
 * spread raised by the misfit of four or more stations that belong, never lowered, and the subsets worth summing.
 */
export function prepareNetwork(arrivals: readonly StationArrival[], { settings }: { settings: EstimationSettings }): Prepared {
  const plain: NetworkOptions = { settings };
  let network = networkOf(arrivals, plain);
  const { sets, peaks } = searchedSubsets(network);
  let peak = network.size < 2 ? null : (peaks[0] ?? null);
  let clock = peak ? suspectClock(network, peak) : null;
  let options = plain;
  if (peak && clock) {
    const aside: NetworkOptions = { settings, clocksSetAside: new Set([arrivals[clock.index]?.id ?? ""]) };
    const without = networkOf(arrivals, aside);
    const again = climbToPeak(without, peak.position, planSubsets(without, sets));
    // The offset is read again where the others alone put the storm; it must still stand there.
    clock = again ? suspectClock(network, again) : null;
    if (again && clock) [network, options, peak] = [without, aside, again];
  }
  const raised = peak ? raisedSpread(network, peak, options) : 1;
  if (raised > 1) {
    options = { ...options, spreadVarianceFactor: raised };
    network = networkOf(arrivals, options);
  }
  const found = options === plain ? peaks : findPeaks(network, planSubsets(network, sets));
  return { network, sets, options, clock, clocksSetAside: options.clocksSetAside ?? new Set(), peaks: found };
}

/**
 * The subsets about everyone and about the best one found, searched again until that is the one they were laid about;
 * at most so often as a few bad stations among many need. Stations of which most do not belong have no best one.
 */
function searchedSubsets(network: Network): { sets: readonly StraySet[]; peaks: readonly Peak[] } {
  let sets = straySets(network.size);
  let peaks = findPeaks(network, planSubsets(network, sets));
  for (let round = 0; 2 * round < network.size; round++) {
    const best = peaks[0] ? strayAt(peaks[0]) : [];
    const around = straySets(network.size, [best]);
    if (2 * best.length > network.size || around.every((set) => sets.some((known) => isDeepEqual(known, set)))) break;
    sets = around;
    peaks = findPeaks(network, planSubsets(network, sets));
  }
  return { sets, peaks };
}

function isDeepEqual(first: StraySet, second: StraySet): boolean {
  return first.length === second.length && first.every((station, i) => station === second[i]);
}

function strayAt(peak: Peak): StraySet {
  return peak.conditioned.plan.sets[peak.best] ?? [];
}

/** The variance factor at which chi-square equals its degrees of freedom, where the misfit asks for one. */
function raisedSpread(network: Network, peak: Peak, options: NetworkOptions): number {
  const aside = options.clocksSetAside?.size ?? 0;
  const stray = strayAt(peak);
  const degreesOfFreedom = 2 * (network.size - stray.length) - 3 - aside;
  if (network.size - stray.length < LEAST_STATIONS) return 1;
  const chiSquareAt = (factor: number): number => {
    const widened = networkOf(network.arrivals, { ...options, spreadVarianceFactor: factor });
    const at = climbToPeak(widened, peak.position, planSubsets(widened, [stray]));
    return at?.assessment.chiSquares[0] ?? NaN;
  };
  if (chiSquareSurvival(peak.assessment.chiSquares[peak.best] ?? NaN, degreesOfFreedom) >= ASKS_BELOW) return 1;
  let [low, high] = [0, Math.log(MOST_VARIANCE_FACTOR)];
  for (let i = 0; i < BISECTIONS; i++) {
    const middle = (low + high) / 2;
    if (chiSquareAt(Math.exp(middle)) > degreesOfFreedom) low = middle;
    else high = middle;
  }
  return Math.exp(high);
}
