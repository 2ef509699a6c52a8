import type { Conditioned, ConditionedSubset } from "./conditioned.ts";
import type { Site } from "./site.ts";

/** What a candidate point is worth. Log densities are per square metre of ocean with a flat prior, t0 integrated out. */
export interface Weight {
  /** As if there were no land and every station looked every way. */
  logFree: number;
  /** With land, sight and exposure held against it. */
  logHeld: number;
  /** Seconds from the network's zero, and s2. */
  originMean: number;
  originVariance: number;
  /** Probability, by station, that its arrival is of this storm, given that the storm was here. */
  belongs: Float64Array;
}

/** Subsets this far below the best are not summed: e^-30. */
const NEGLIGIBLE = 30;

/**
 * Weighs a point: the mixture over which stations belong, t0 integrated out of each subset's Gaussian.
 *   (1)  log w_B = constant - 1/2 (a'S^-1 a - (a'S^-1 1)^2 / 1'S^-1 1),   a = (D - L, -tau)
 * A station's sight and bearing multiply what it says where it belongs; a stray tells nothing of the place.
 * [source: tarantola-valette-1982]
 */
export function weigh(conditioned: Conditioned, site: Site): Weight {
  const { network, subsets } = conditioned;
  const n = network.size;
  const scratch = project(conditioned, site);
  const logs = new Float64Array(subsets.length);
  const helds = new Float64Array(subsets.length);
  let top = -Infinity;
  let topHeld = -Infinity;
  subsets.forEach((subset, s) => {
    const log = subset.logConstant - 0.5 * misfit(subset, scratch) + siteTerm(subset, site.logBearing);
    const held = log + siteTerm(subset, site.logSight);
    logs[s] = log;
    helds[s] = held;
    if (log > top) top = log;
    if (held > topHeld) topHeld = held;
  });

  const belongs = new Float64Array(n);
  let sumFree = 0;
  let sumHeld = 0;
  let mean = 0;
  let square = 0;
  subsets.forEach((subset, s) => {
    const log = logs[s] ?? NaN;
    if (log > top - NEGLIGIBLE) sumFree += Math.exp(log - top);
    const held = (helds[s] ?? NaN) - topHeld;
    if (held < -NEGLIGIBLE) return;
    const weight = Math.exp(held);
    sumHeld += weight;
    const origin = originOf(subset, scratch);
    mean += weight * origin;
    square += weight * (origin ** 2 + 1 / subset.timeInformation);
    for (let i = 0; i < n; i++) belongs[i] = (belongs[i] ?? 0) + weight;
    for (const i of subset.stray) belongs[i] = (belongs[i] ?? 0) - weight;
  });
  mean /= sumHeld;
  for (let i = 0; i < n; i++) belongs[i] = Math.max(0, (belongs[i] ?? 0) / sumHeld);
  return {
    logFree: top + Math.log(sumFree),
    logHeld: topHeld + Math.log(sumHeld) + site.logOcean,
    originMean: mean,
    originVariance: Math.max(0, square / sumHeld - mean ** 2),
    belongs,
  };
}

/** v = P a for a site, and the two forms that every subset corrects. */
export interface Projection {
  readonly residual: Float64Array;
  readonly column: Float64Array;
  readonly square: number;
  readonly cross: number;
}

export function project({ network, precision, timeColumn }: Conditioned, site: Site): Projection {
  const n = network.size;
  const residual = new Float64Array(2 * n);
  for (let i = 0; i < n; i++) {
    residual[i] = (site.distances[i] ?? NaN) - (network.distances[i] ?? NaN);
    residual[n + i] = -(network.origins[i] ?? NaN);
  }
  const column = new Float64Array(2 * n);
  let square = 0;
  let cross = 0;
  for (let i = 0; i < 2 * n; i++) {
    let sum = 0;
    const row = i * 2 * n;
    for (let j = 0; j < 2 * n; j++) sum += (precision[row + j] ?? NaN) * (residual[j] ?? NaN);
    column[i] = sum;
    square += sum * (residual[i] ?? NaN);
    cross += (timeColumn[i] ?? NaN) * (residual[i] ?? NaN);
  }
  return { residual, column, square, cross };
}

/** Chi-square of a subset at the point, at its own best t0. */
export function misfit(subset: ConditionedSubset, projection: Projection): number {
  const { square, cross } = corrected(subset, projection);
  return square - cross ** 2 / subset.timeInformation;
}

/** The subset's best t0 at the point, in seconds from the network's zero. */
export function originOf(subset: ConditionedSubset, projection: Projection): number {
  return -corrected(subset, projection).cross / subset.timeInformation;
}

function corrected(subset: ConditionedSubset, projection: Projection): { square: number; cross: number } {
  const { rows, correction, correctedTime } = subset;
  const m = rows.length;
  let { square, cross } = projection;
  for (let a = 0; a < m; a++) {
    const va = projection.column[rows[a] ?? NaN] ?? NaN;
    cross -= (correctedTime[a] ?? NaN) * va;
    for (let b = 0; b < m; b++) square -= va * (correction[a * m + b] ?? NaN) * (projection.column[rows[b] ?? NaN] ?? NaN);
  }
  return { square, cross };
}

function siteTerm(subset: ConditionedSubset, terms: { readonly byStation: Float64Array; readonly sum: number }): number {
  let log = terms.sum;
  for (const i of subset.stray) log -= terms.byStation[i] ?? NaN;
  return log;
}
