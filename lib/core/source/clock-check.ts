import { SECONDS_PER_HOUR } from "../units/time.ts";
import type { StraySet } from "./belonging.ts";
import { assess } from "./assess.ts";
import { conditionAt, planSubsets } from "./conditioned.ts";
import { linearFit, placeColumns, unitColumn } from "./linear-fit.ts";
import type { Network } from "./network.ts";
import type { Peak } from "./peak.ts";
import { logSum } from "./weigh.ts";

const DAY_SECONDS = 24 * SECONDS_PER_HOUR;
/** Wrong clocks: half of them by a date slipped one day, half by some hours either way. Common practice, no source. */
const SLIPPED_DATES = 0.5;
const HOURS_SIGMA_SECONDS = 12 * SECONDS_PER_HOUR;
/** Of stations whose times ask for a look, one in ten is taken to have a wrong clock. */
const WRONG_PRIOR = 0.1;
/** Named where it is this probable: in simulations, nine days in ten that are wrong and one right clock in a hundred. */
const NAMED_PROBABILITY = 0.29;
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
 * belong and this one). What the two fits say is weighed by Bayes' rule over all that may have happened, each beside
 * nothing at all: with the offset o +- s and the distance's d +- q,
 *   (1)  clock of this station:  WRONG_PRIOR [ p(o) / N(o; 0, s) ],  p the wrong clocks' law, blurred by s
 *   (2)  station of another storm:  (1 - belongPrior) stray density / [ N(o; 0, s) N(d; 0, q) ]
 * At most one is named: the most probable clock.
 */
export function suspectClock(network: Network, peak: Peak): ClockOffset | null {
  const tried = network.arrivals.flatMap((_, index) => suspicionOf(network, peak, index) ?? []);
  const total = logSum(Float64Array.from([0, ...tried.flatMap(({ logClock, logStray }) => [logClock, logStray])]));
  const [first] = [...tried].sort((a, b) => b.logClock - a.logClock);
  return first && first.logClock - total > Math.log(NAMED_PROBABILITY) ? first : null;
}

interface Suspicion extends ClockOffset {
  /** Log odds against nothing being wrong: that the clock is, that the station saw another storm. */
  readonly logClock: number;
  readonly logStray: number;
}

function suspicionOf(network: Network, peak: Peak, index: number): Suspicion | null {
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
  const sigmaSeconds = Math.sqrt(withClock.covariance[3 * 4 + 3] ?? NaN);
  const distance = { value: withBoth.corrections[4] ?? NaN, sigma: Math.sqrt(withBoth.covariance[4 * 5 + 4] ?? NaN) };
  const logRight = logNormal(offsetSeconds, sigmaSeconds);
  const { belongPrior } = network.settings;
  return {
    index,
    offsetSeconds,
    sigmaSeconds,
    logClock: Math.log(WRONG_PRIOR) + logWrong(offsetSeconds, sigmaSeconds) - logRight, // (1)
    logStray: Math.log(1 - belongPrior) + (network.logStrayDensity[index] ?? NaN) - logRight - logNormal(distance.value, distance.sigma), // (2)
  };
}

/** Log density of an offset read with error where the clock is wrong. */
function logWrong(offsetSeconds: number, sigmaSeconds: number): number {
  const hours = Math.log(1 - SLIPPED_DATES) + logNormal(offsetSeconds, Math.hypot(sigmaSeconds, HOURS_SIGMA_SECONDS));
  const slipped = [-DAY_SECONDS, DAY_SECONDS].map((day) => Math.log(SLIPPED_DATES / 2) + logNormal(offsetSeconds - day, sigmaSeconds));
  return logSum(Float64Array.from([hours, ...slipped]));
}

function logNormal(value: number, sigma: number): number {
  return -0.5 * (value / sigma) ** 2 - Math.log(sigma * Math.sqrt(2 * Math.PI));
}
