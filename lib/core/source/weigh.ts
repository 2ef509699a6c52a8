import type { Assessment } from "./assess.ts";
import type { Conditioned } from "./conditioned.ts";
import type { Outlook, StationTerms } from "./site.ts";

/** What a candidate point is worth. Log densities are per square metre of ocean with a flat prior, t0 integrated out. */
export interface Weight {
  /** As if there were no land and every station looked every way. */
  readonly logFree: number;
  /** With land, sight and exposure held against it. */
  readonly logHeld: number;
  /** Seconds from the network's zero, and s2. */
  readonly originMean: number;
  readonly originVariance: number;
  /** Probability, by station, that its arrival is of this storm, given that the storm was here. */
  readonly belongs: Float64Array;
}

/** Subsets this far below the best are not summed: e^-30. */
const NEGLIGIBLE = 30;

/** Log weight of each subset with no land and no exposure: its Gaussian, t0 integrated out, and the measured directions. */
export function subsetLogs({ plan, logConstants }: Conditioned, { chiSquares }: Assessment, logBearing: StationTerms): Float64Array {
  const logs = new Float64Array(plan.sets.length);
  for (let s = 0; s < logs.length; s++) {
    logs[s] = (logConstants[s] ?? NaN) - 0.5 * (chiSquares[s] ?? NaN) + (logBearing.none ? 0 : belongingTerm(logBearing, plan.rows[s]));
  }
  return logs;
}

/** Log of a sum of exponentials. */
export function logSum(logs: Float64Array): number {
  let top = -Infinity;
  for (const log of logs) if (log > top) top = log;
  if (top === -Infinity) return top;
  let sum = 0;
  for (const log of logs) if (log > top - NEGLIGIBLE) sum += Math.exp(log - top);
  return top + Math.log(sum);
}

/**
 * Weighs a point: the mixture over which stations belong. A station's share in sight multiplies what it says where it
 * belongs; a stray tells nothing of the place. [source: tarantola-valette-1982]
 */
export function weigh({ conditioned, assessment, logs, outlook }: {
  readonly conditioned: Conditioned;
  readonly assessment: Assessment;
  readonly logs: Float64Array;
  readonly outlook: Outlook;
}): Weight {
  const { network, plan, timeInformation } = conditioned;
  const helds = logs.map((log, s) => log + (outlook.logSight.none ? 0 : belongingTerm(outlook.logSight, plan.rows[s])));
  let top = -Infinity;
  for (const held of helds) if (held > top) top = held;
  const belongs = new Float64Array(network.size);
  let sum = 0;
  let mean = 0;
  let square = 0;
  for (let s = 0; s < helds.length; s++) {
    const held = (helds[s] ?? NaN) - top;
    if (!(held > -NEGLIGIBLE)) continue;
    const weight = Math.exp(held);
    const origin = assessment.origins[s] ?? NaN;
    sum += weight;
    mean += weight * origin;
    square += weight * (origin * origin + 1 / (timeInformation[s] ?? NaN));
    for (const i of plan.sets[s] ?? []) belongs[i] = (belongs[i] ?? 0) + weight;
  }
  mean /= sum;
  return {
    logFree: logSum(logs),
    logHeld: top + Math.log(sum) + outlook.logOcean,
    originMean: mean,
    originVariance: Math.max(0, square / sum - mean * mean),
    belongs: belongs.map((strayWeight) => Math.max(0, 1 - strayWeight / sum)),
  };
}

/** A sum over the stations that belong, from the sum over all. */
export function belongingTerm(terms: StationTerms, rows: Int32Array | undefined): number {
  let log = terms.sum;
  const count = (rows?.length ?? 0) / 2;
  for (let a = 0; a < count; a++) log -= terms.byStation[rows?.[a] ?? NaN] ?? NaN;
  return log;
}
