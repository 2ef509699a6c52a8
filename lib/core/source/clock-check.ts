import type { StraySet } from "./belonging.ts";
import { assess } from "./assess.ts";
import { conditionAt, planSubsets } from "./conditioned.ts";
import { linearFit, placeColumns, unitColumn } from "./linear-fit.ts";
import type { Network } from "./network.ts";
import type { Peak } from "./peak.ts";

/** A clock is named where its offset stands this many standard deviations from zero: one right clock in a hundred. */
const NAMED_SIGMAS = 2.6;
/** Its distance must fit: a station that misses in both has seen something else. */
const DISTANCE_FITS_SIGMAS = 2.6;
/** The other suspects must explain the misfit worse by this much chi-square. */
const CLEAR_OF_OTHERS = 2;
const LEAST_STATIONS = 3;

export interface ClockOffset {
  readonly index: number;
  /** Positive: the clock is fast. */
  readonly offsetSeconds: number;
  readonly sigmaSeconds: number;
}

/**
 * The station whose clock is suspect, if any: its distance fits the others' storm and its time does not.
 *
 * For each station in turn the best point is fitted again with one more unknown, the offset of its clock, and once
 * more with an offset of its distance beside it (generalised least squares about the peak, over the stations that
 * belong and this one). At most one is named: the one whose offset explains the misfit best, clear of the others.
 */
export function suspectClock(network: Network, peak: Peak): ClockOffset | null {
  const tried = network.arrivals.flatMap((_, index) => clockOffsetOf(network, peak, index) ?? []);
  const ranked = [...tried].sort((a, b) => b.gain - a.gain);
  const [first, second] = ranked;
  if (!first || first.gain < NAMED_SIGMAS ** 2 || !first.distanceFits) return null;
  if (second && first.gain - second.gain < CLEAR_OF_OTHERS) return null;
  return first;
}

interface Suspicion extends ClockOffset {
  /** Chi-square that the offset takes away. */
  readonly gain: number;
  readonly distanceFits: boolean;
}

function clockOffsetOf(network: Network, peak: Peak, index: number): Suspicion | null {
  const n = network.size;
  const stray: StraySet = (peak.conditioned.plan.sets[peak.best] ?? []).filter((i) => i !== index);
  if (n - stray.length < LEAST_STATIONS) return null;
  const conditioned = conditionAt(network, peak.site.azimuths, planSubsets(network, [stray]));
  if (!conditioned) return null;
  const assessment = assess(conditioned, peak.site.distances);

  const clock = unitColumn(2 * n, n + index);
  const columns = [...placeColumns(network, peak.site), clock];
  const withClock = linearFit({ conditioned, assessment, subset: 0, columns });
  const withBoth = linearFit({ conditioned, assessment, subset: 0, columns: [...columns, unitColumn(2 * n, index)] });
  if (!withClock || !withBoth) return null;
  const offsetSeconds = withClock.corrections[3] ?? NaN;
  const variance = withClock.covariance[3 * 4 + 3] ?? NaN;
  const distanceMiss = (withBoth.corrections[4] ?? NaN) ** 2 / (withBoth.covariance[4 * 5 + 4] ?? NaN);
  return {
    index,
    offsetSeconds,
    sigmaSeconds: Math.sqrt(variance),
    gain: offsetSeconds ** 2 / variance,
    distanceFits: distanceMiss < DISTANCE_FITS_SIGMAS ** 2,
  };
}
