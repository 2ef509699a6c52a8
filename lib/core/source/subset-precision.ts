import type { Conditioned } from "./conditioned.ts";

/**
 * The precision of subset `s` times a vector of the whole state, P_B = P - P_:O E P_O:; what belongs to stations left
 * out comes out as zero and counts for nothing.
 */
export function applyPrecision({ network, plan, precision, corrections }: Conditioned, s: number, vector: Float64Array): Float64Array {
  const size = 2 * network.size;
  const product = new Float64Array(size);
  for (let i = 0; i < size; i++) {
    let sum = 0;
    for (let j = 0; j < size; j++) sum += (precision[i * size + j] ?? NaN) * (vector[j] ?? NaN);
    product[i] = sum;
  }
  const rows = plan.rows[s] ?? new Int32Array();
  const m = rows.length;
  const start = plan.squareStarts[s] ?? 0;
  const left = Float64Array.from(rows, (row) => product[row] ?? NaN);
  for (let a = 0; a < m; a++) {
    let weight = 0;
    for (let b = 0; b < m; b++) weight += (corrections[start + a * m + b] ?? NaN) * (left[b] ?? NaN);
    const column = rows[a] ?? NaN;
    for (let i = 0; i < size; i++) product[i] = (product[i] ?? NaN) - (precision[i * size + column] ?? NaN) * weight;
  }
  return product;
}

export function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += (a[i] ?? NaN) * (b[i] ?? NaN);
  return sum;
}
