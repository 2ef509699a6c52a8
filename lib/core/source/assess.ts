import type { Conditioned, SubsetPlan } from "./conditioned.ts";
import type { Network } from "./network.ts";

/** The residuals of a candidate point, and each subset's chi-square at its own best t0 (seconds from the network's zero). */
export interface Assessment {
  readonly residual: Float64Array;
  /** P times the residual. */
  readonly column: Float64Array;
  readonly chiSquares: Float64Array;
  readonly origins: Float64Array;
}

/**
 * Residuals a = (D - L, -tau) against every subset, t0 profiled out:
 *   (1)  chi^2 = a'S^-1 a - (a'S^-1 1)^2 / 1'S^-1 1,   t0 = -a'S^-1 1 / 1'S^-1 1
 * with the subset's own forms from those of the whole (see `Conditioned`).
 * `into` is filled and given back where one is handed in.
 */
export function assess(conditioned: Conditioned, distances: Float64Array, into?: Assessment): Assessment {
  const { network, precision, timeColumn, plan } = conditioned;
  const n = network.size;
  const assessment = into ?? blankAssessment(network, plan);
  const { residual, column } = assessment;
  for (let i = 0; i < n; i++) {
    residual[i] = (distances[i] ?? NaN) - (network.distances[i] ?? NaN);
    residual[n + i] = -(network.origins[i] ?? NaN);
  }
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
  for (let s = 0; s < plan.sets.length; s++) assessSubset(conditioned, assessment, s, square, cross);
  return assessment;
}

/** Room for an assessment, to be filled again and again by a search. */
export function blankAssessment(network: Network, plan: SubsetPlan): Assessment {
  const count = plan.sets.length;
  return {
    residual: new Float64Array(2 * network.size),
    column: new Float64Array(2 * network.size),
    chiSquares: new Float64Array(count),
    origins: new Float64Array(count),
  };
}

function assessSubset(conditioned: Conditioned, assessment: Assessment, s: number, wholeSquare: number, wholeCross: number): void {
  const { plan, corrections, correctedTimes, timeInformation } = conditioned;
  const { column } = assessment;
  const rows = plan.rows[s] ?? new Int32Array();
  const m = rows.length;
  const squareStart = plan.squareStarts[s] ?? 0;
  const rowStart = plan.rowStarts[s] ?? 0;
  let square = wholeSquare;
  let cross = wholeCross;
  for (let a = 0; a < m; a++) {
    const va = column[rows[a] ?? NaN] ?? NaN;
    cross -= (correctedTimes[rowStart + a] ?? NaN) * va;
    for (let b = 0; b < m; b++) square -= va * (corrections[squareStart + a * m + b] ?? NaN) * (column[rows[b] ?? NaN] ?? NaN);
  }
  const information = timeInformation[s] ?? NaN;
  assessment.chiSquares[s] = square - (cross * cross) / information;
  assessment.origins[s] = -cross / information;
}
