import { factorise, invertFactored } from "../statistics/cholesky.ts";
import type { StraySet } from "./belonging.ts";
import { addOwnSpread } from "./joint-covariance.ts";
import type { Network } from "./network.ts";

/** The subsets of a network that are to be summed, laid out once: each is the set of stations it leaves out. */
export interface SubsetPlan {
  readonly sets: readonly StraySet[];
  /** Rows of the state that each leaves out: distances, then times. */
  readonly rows: readonly Int32Array[];
  /** Where each one's numbers start in `Conditioned.corrections` and `.correctedTimes`. */
  readonly squareStarts: Int32Array;
  readonly rowStarts: Int32Array;
  /** Log prior of each, with the density of the stray arrivals. */
  readonly logPriors: Float64Array;
}

export function planSubsets(network: Network, sets: readonly StraySet[]): SubsetPlan {
  const { belongPrior } = network.settings;
  const rows = sets.map((set) => Int32Array.from([...set, ...set.map((i) => network.size + i)]));
  const squareStarts = new Int32Array(sets.length + 1);
  const rowStarts = new Int32Array(sets.length + 1);
  rows.forEach((own, s) => {
    squareStarts[s + 1] = (squareStarts[s] ?? 0) + own.length ** 2;
    rowStarts[s + 1] = (rowStarts[s] ?? 0) + own.length;
  });
  const logPriors = Float64Array.from(sets, (set) => {
    const strays = set.reduce((sum, i) => sum + Math.log(1 - belongPrior) + (network.logStrayDensity[i] ?? NaN), 0);
    return (network.size - set.length) * Math.log(belongPrior) + strays;
  });
  return { sets, rows, squareStarts, rowStarts, logPriors };
}

/**
 * The joint covariance at one set of azimuths, turned inside out once so that many nearby points can be weighed.
 *
 * With P = S^-1 over all stations, leaving the stations O out is a correction of the quadratic forms, never another
 * inversion of S (block inverse and Schur complement):
 *   (1)  u_B' S_BB^-1 u_B = u' P u - v_O' E v_O,   v = P u,  E = (P_OO)^-1
 *   (2)  log |S_BB| = log |S| + log |P_OO|
 */
export interface Conditioned {
  readonly network: Network;
  readonly plan: SubsetPlan;
  readonly precision: Float64Array;
  /** P 1, 1 standing for one second at every origin time, and 1' P 1. */
  readonly timeColumn: Float64Array;
  readonly wholeTimeInformation: number;
  /** By subset: E; E times the left-out part of the time column; 1' S_BB^-1 1, information on t0. */
  readonly corrections: Float64Array;
  readonly correctedTimes: Float64Array;
  readonly timeInformation: Float64Array;
  /** All of each subset's log weight that does not depend on the residuals, t0 integrated out. */
  readonly logConstants: Float64Array;
}

/** Null where the covariance is singular to rounding. `azimuths` null: as if no two stations saw the same part of the storm. */
export function conditionAt(network: Network, azimuths: Float64Array | null, plan: SubsetPlan): Conditioned | null {
  const size = 2 * network.size;
  const matrix = Float64Array.from(network.steady);
  addOwnSpread(matrix, azimuths, network);
  const logDeterminant = factorise(matrix, size);
  if (Number.isNaN(logDeterminant)) return null;
  const precision = invertFactored(matrix, size);
  const timeColumn = new Float64Array(size);
  let wholeTimeInformation = 0;
  for (let i = 0; i < size; i++) {
    let sum = 0;
    for (let j = network.size; j < size; j++) sum += precision[i * size + j] ?? NaN;
    timeColumn[i] = sum;
    if (i >= network.size) wholeTimeInformation += sum;
  }
  const count = plan.sets.length;
  const conditioned: Conditioned = {
    network,
    plan,
    precision,
    timeColumn,
    wholeTimeInformation,
    corrections: new Float64Array(plan.squareStarts[count] ?? 0),
    correctedTimes: new Float64Array(plan.rowStarts[count] ?? 0),
    timeInformation: new Float64Array(count),
    logConstants: new Float64Array(count),
  };
  for (let s = 0; s < count; s++) conditionSubset(conditioned, logDeterminant, s);
  return conditioned;
}

/** The same covariance, for those subsets of it alone that `plan` lists: `kept[s]` is where its s-th stands in the old plan. */
export function narrowed(conditioned: Conditioned, plan: SubsetPlan, kept: readonly number[]): Conditioned {
  const old = conditioned.plan;
  const corrections = new Float64Array(plan.squareStarts[kept.length] ?? 0);
  const correctedTimes = new Float64Array(plan.rowStarts[kept.length] ?? 0);
  kept.forEach((from, s) => {
    corrections.set(conditioned.corrections.subarray(old.squareStarts[from], old.squareStarts[from + 1]), plan.squareStarts[s]);
    correctedTimes.set(conditioned.correctedTimes.subarray(old.rowStarts[from], old.rowStarts[from + 1]), plan.rowStarts[s]);
  });
  const timeInformation = Float64Array.from(kept, (from) => conditioned.timeInformation[from] ?? NaN);
  const logConstants = Float64Array.from(kept, (from) => conditioned.logConstants[from] ?? NaN);
  return { ...conditioned, plan, corrections, correctedTimes, timeInformation, logConstants };
}

/** Fills in one subset; one whose block is singular to rounding gets no weight. */
function conditionSubset(conditioned: Conditioned, logDeterminant: number, s: number): void {
  const { network, plan, timeColumn, corrections, correctedTimes } = conditioned;
  const rows = plan.rows[s] ?? new Int32Array();
  const m = rows.length;
  const logBlock = invertBlock(conditioned, rows, plan.squareStarts[s] ?? 0);
  let information = conditioned.wholeTimeInformation;
  for (let a = 0; a < m; a++) {
    let sum = 0;
    const row = (plan.squareStarts[s] ?? 0) + a * m;
    for (let b = 0; b < m; b++) sum += (corrections[row + b] ?? NaN) * (timeColumn[rows[b] ?? NaN] ?? NaN);
    correctedTimes[(plan.rowStarts[s] ?? 0) + a] = sum;
    information -= sum * (timeColumn[rows[a] ?? NaN] ?? NaN);
  }
  const belonging = network.size - m / 2;
  conditioned.timeInformation[s] = information;
  const log = (plan.logPriors[s] ?? NaN) - 0.5 * (logDeterminant + logBlock + Math.log(information)) - (belonging - 0.5) * Math.log(2 * Math.PI);
  conditioned.logConstants[s] = Number.isNaN(log) ? -Infinity : log;
}

/** Writes E = (P_OO)^-1 at `start` and gives log |P_OO|. */
function invertBlock({ network, precision, corrections }: Conditioned, rows: Int32Array, start: number): number {
  const size = 2 * network.size;
  const m = rows.length;
  if (m === 0) return 0;
  if (m === 2) {
    const [a = NaN, b = NaN] = rows;
    const aa = precision[a * size + a] ?? NaN;
    const ab = precision[a * size + b] ?? NaN;
    const bb = precision[b * size + b] ?? NaN;
    const determinant = aa * bb - ab * ab;
    corrections[start] = bb / determinant;
    corrections[start + 1] = -ab / determinant;
    corrections[start + 2] = -ab / determinant;
    corrections[start + 3] = aa / determinant;
    return Math.log(determinant);
  }
  const block = new Float64Array(m * m);
  for (let a = 0; a < m; a++) {
    for (let b = 0; b < m; b++) block[a * m + b] = precision[(rows[a] ?? NaN) * size + (rows[b] ?? NaN)] ?? NaN;
  }
  const logBlock = factorise(block, m);
  corrections.set(invertFactored(block, m), start);
  return logBlock;
}
