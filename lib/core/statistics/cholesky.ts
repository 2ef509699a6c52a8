/**
 * Symmetric positive definite matrices, row-major in a Float64Array of size * size.
 * Textbook Cholesky factorisation A = G G'; no pivoting, so a matrix that is singular to rounding is reported.
 */

/** Replaces the lower triangle of `matrix` by its Cholesky factor. Gives log |A|, or NaN where A is not positive definite. */
export function factorise(matrix: Float64Array, size: number): number {
  let logDeterminant = 0;
  for (let column = 0; column < size; column++) {
    const top = column * size;
    let pivot = matrix[top + column] ?? NaN;
    for (let k = 0; k < column; k++) pivot -= (matrix[top + k] ?? NaN) ** 2;
    if (!(pivot > 0)) return NaN;
    const root = Math.sqrt(pivot);
    matrix[top + column] = root;
    logDeterminant += 2 * Math.log(root);
    for (let row = column + 1; row < size; row++) {
      const left = row * size;
      let sum = matrix[left + column] ?? NaN;
      for (let k = 0; k < column; k++) sum -= (matrix[left + k] ?? NaN) * (matrix[top + k] ?? NaN);
      matrix[left + column] = sum / root;
    }
  }
  return logDeterminant;
}

/** A^-1 (full, symmetric) from the factor that `factorise` left in the lower triangle. */
export function invertFactored(factor: Float64Array, size: number): Float64Array {
  const lower = invertLowerTriangle(factor, size);
  const inverse = new Float64Array(size * size);
  for (let i = 0; i < size; i++) {
    for (let j = 0; j <= i; j++) {
      let sum = 0;
      for (let k = i; k < size; k++) sum += (lower[k * size + i] ?? NaN) * (lower[k * size + j] ?? NaN);
      inverse[i * size + j] = sum;
      inverse[j * size + i] = sum;
    }
  }
  return inverse;
}

function invertLowerTriangle(factor: Float64Array, size: number): Float64Array {
  const inverse = new Float64Array(size * size);
  for (let column = 0; column < size; column++) {
    inverse[column * size + column] = 1 / (factor[column * size + column] ?? NaN);
    for (let row = column + 1; row < size; row++) {
      let sum = 0;
      for (let k = column; k < row; k++) sum -= (factor[row * size + k] ?? NaN) * (inverse[k * size + column] ?? NaN);
      inverse[row * size + column] = sum / (factor[row * size + row] ?? NaN);
    }
  }
  return inverse;
}
