import { factorise, invertFactored } from "../statistics/cholesky.ts";
import type { StraySet } from "./belonging.ts";
import { addOwnSpread } from "./joint-covariance.ts";
import type { Network } from "./network.ts";

/**
 * The joint covariance at one set of azimuths, turned inside out once so that many nearby points can be weighed.
 *
 * With P = S^-1 over all stations, leaving the stations O out is a correction of the quadratic forms, never another
 * inversion of S:
 *   (1)  u_B' S_BB^-1 u_B = u' P u - v_O' E v_O,   v = P u,  E = (P_OO)^-1
 *   (2)  log |S_BB| = log |S| + log |P_OO|
 * (block inverse and Schur complement).
 */
export interface Conditioned {
  readonly network: Network;
  readonly precision: Float64Array;
  /** P 1, 1 standing for one second at every origin time, and 1' P 1. */
  readonly timeColumn: Float64Array;
  readonly timeInformation: number;
  readonly subsets: readonly ConditionedSubset[];
}

export interface ConditionedSubset {
  readonly stray: StraySet;
  /** Rows of the state that are left out: distances, then times. */
  readonly rows: readonly number[];
  /** E, and E times the left-out part of the time column. */
  readonly correction: Float64Array;
  readonly correctedTime: Float64Array;
  /** 1' S_BB^-1 1: information on t0. */
  readonly timeInformation: number;
  /** All of the subset's log weight that does not depend on the residuals, t0 integrated out. */
  readonly logConstant: number;
}

/** Null where the covariance is singular to rounding. */
export function conditionAt(network: Network, azimuths: Float64Array, sets: readonly StraySet[]): Conditioned | null {
  const n = network.size;
  const matrix = Float64Array.from(network.steady);
  addOwnSpread(matrix, azimuths, network.settings, network.spreadVarianceFactor);
  const logDeterminant = factorise(matrix, 2 * n);
  if (Number.isNaN(logDeterminant)) return null;
  const precision = invertFactored(matrix, 2 * n);
  const timeColumn = new Float64Array(2 * n);
  let timeInformation = 0;
  for (let i = 0; i < 2 * n; i++) {
    let sum = 0;
    for (let j = n; j < 2 * n; j++) sum += precision[i * 2 * n + j] ?? NaN;
    timeColumn[i] = sum;
    if (i >= n) timeInformation += sum;
  }
  const whole = { network, precision, timeColumn, timeInformation };
  return { ...whole, subsets: sets.flatMap((stray) => conditionSubset(whole, logDeterminant, stray) ?? []) };
}

type Whole = Omit<Conditioned, "subsets">;

function conditionSubset(whole: Whole, logDeterminant: number, stray: StraySet): ConditionedSubset | null {
  const { network, precision, timeColumn } = whole;
  const n = network.size;
  const rows = [...stray, ...stray.map((i) => n + i)];
  const m = rows.length;
  const block = new Float64Array(m * m);
  rows.forEach((row, a) => rows.forEach((column, b) => (block[a * m + b] = precision[row * 2 * n + column] ?? NaN)));
  const logBlock = m === 0 ? 0 : factorise(block, m);
  if (Number.isNaN(logBlock)) return null;
  const correction = m === 0 ? block : invertFactored(block, m);

  const correctedTime = new Float64Array(m);
  let timeInformation = whole.timeInformation;
  for (let a = 0; a < m; a++) {
    let sum = 0;
    for (let b = 0; b < m; b++) sum += (correction[a * m + b] ?? NaN) * (timeColumn[rows[b] ?? NaN] ?? NaN);
    correctedTime[a] = sum;
    timeInformation -= sum * (timeColumn[rows[a] ?? NaN] ?? NaN);
  }
  const belonging = n - stray.length;
  const { belongPrior } = network.settings;
  const strays = stray.reduce((sum, i) => sum + Math.log(1 - belongPrior) + (network.logStrayDensity[i] ?? NaN), 0);
  const logConstant =
    belonging * Math.log(belongPrior) + strays
    - 0.5 * (logDeterminant + logBlock) // (2)
    - 0.5 * Math.log(timeInformation)
    - ((2 * belonging - 1) / 2) * Math.log(2 * Math.PI);
  return { stray, rows, correction, correctedTime, timeInformation, logConstant };
}
