import type { Conditioned, ConditionedSubset } from "./conditioned.ts";

/**
 * The precision of a subset of the stations times a vector of the whole state, P_B = P - P_:O E P_O:; what belongs to
 * stations left out comes out as zero and counts for nothing.
 */
export function applyPrecision({ precision }: Conditioned, subset: ConditionedSubset, vector: Float64Array): Float64Array {
  const size = vector.length;
  const product = new Float64Array(size);
  for (let i = 0; i < size; i++) {
    let sum = 0;
    for (let j = 0; j < size; j++) sum += (precision[i * size + j] ?? NaN) * (vector[j] ?? NaN);
    product[i] = sum;
  }
  const { rows, correction } = subset;
  const m = rows.length;
  const left = rows.map((row) => product[row] ?? NaN);
  const weights = rows.map((_, a) => left.reduce((sum, value, b) => sum + (correction[a * m + b] ?? NaN) * value, 0));
  for (let i = 0; i < size; i++) {
    weights.forEach((weight, a) => (product[i] = (product[i] ?? NaN) - (precision[i * size + (rows[a] ?? NaN)] ?? NaN) * weight));
  }
  return product;
}

export function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += (a[i] ?? NaN) * (b[i] ?? NaN);
  return sum;
}
