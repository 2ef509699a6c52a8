import { factorise, invertFactored } from "../statistics/cholesky.ts";
import type { Assessment } from "./assess.ts";
import type { Conditioned } from "./conditioned.ts";
import type { Network } from "./network.ts";
import type { Site } from "./site.ts";
import { applyPrecision, dot } from "./subset-precision.ts";

/** Generalised least squares about a point: parameters' corrections, their covariance (row-major), and the gain P_B A. */
export interface LinearFit {
  readonly corrections: Float64Array;
  readonly covariance: Float64Array;
  readonly weightedColumns: readonly Float64Array[];
}

/** Derivatives of the state u by the place east and north (1/m scaled to m) and by t0: the columns every fit has. */
export function placeColumns(network: Network, site: Site): Float64Array[] {
  const n = network.size;
  const east = new Float64Array(2 * n);
  const north = new Float64Array(2 * n);
  const origin = new Float64Array(2 * n);
  for (let i = 0; i < n; i++) {
    east[i] = -Math.sin(site.azimuths[i] ?? NaN);
    north[i] = -Math.cos(site.azimuths[i] ?? NaN);
    origin[n + i] = 1;
  }
  return [east, north, origin];
}

/** One station's row of the state: `offset` 0 for its distance, `size` for its time. */
export function unitColumn(size: number, row: number): Float64Array {
  const column = new Float64Array(size);
  column[row] = 1;
  return column;
}

export interface LinearProblem {
  readonly conditioned: Conditioned;
  readonly assessment: Assessment;
  /** Which of the conditioned subsets is fitted. */
  readonly subset: number;
  /** Derivatives of the state by each parameter. */
  readonly columns: readonly Float64Array[];
}

/** Null where the columns do not determine the parameters. */
export function linearFit({ conditioned, assessment, subset, columns }: LinearProblem): LinearFit | null {
  const n = conditioned.network.size;
  const origin = assessment.origins[subset] ?? NaN;
  const residual = assessment.residual.map((value, i) => (i < n ? value : value + origin));
  const weightedColumns = columns.map((column) => applyPrecision(conditioned, subset, column));
  const m = columns.length;
  // Columns differ by many orders of magnitude (metres, seconds): scaled to unit information before inverting.
  const scale = weightedColumns.map((weighted, a) => 1 / Math.sqrt(dot(weighted, columns[a] ?? weighted)));
  const normal = new Float64Array(m * m);
  for (let a = 0; a < m; a++) {
    for (let b = 0; b < m; b++) {
      normal[a * m + b] = dot(weightedColumns[a] ?? residual, columns[b] ?? residual) * (scale[a] ?? NaN) * (scale[b] ?? NaN);
    }
  }
  if (!(factorise(normal, m) > -60)) return null;
  const covariance = invertFactored(normal, m).map((value, k) => value * (scale[Math.floor(k / m)] ?? NaN) * (scale[k % m] ?? NaN));
  const gradient = weightedColumns.map((weighted) => dot(weighted, residual));
  const corrections = Float64Array.from(columns, (_, a) => -gradient.reduce((sum, value, b) => sum + (covariance[a * m + b] ?? NaN) * value, 0));
  return { corrections, covariance, weightedColumns };
}
