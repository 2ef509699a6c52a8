import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { factorise, invertFactored } from "#lib/core/statistics/cholesky.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { randomStream } from "#tests/support/simulator/random.ts";

/** B B' plus a little on the diagonal: symmetric and positive definite. */
function positiveDefinite(size: number, seed: number): number[][] {
  const random = randomStream(seed);
  const b = Array.from({ length: size }, () => Array.from({ length: size }, () => random.normal()));
  return b.map((row, i) => b.map((other, j) => row.reduce((sum, value, k) => sum + value * (other[k] ?? NaN), i === j ? 0.1 : 0)));
}

/** By elimination with row exchanges, which shares nothing with Cholesky's way. */
function determinant(matrix: readonly (readonly number[])[]): number {
  const [first, ...others] = [...matrix].sort((a, b) => Math.abs(b[0] ?? NaN) - Math.abs(a[0] ?? NaN));
  if (first === undefined) return 1;
  const sorted = [first, ...others];
  const swaps = permutationSign(matrix.map((row) => sorted.indexOf(row)));
  const rest = others.map((row) => row.slice(1).map((value, k) => value - ((row[0] ?? NaN) / (first[0] ?? NaN)) * (first[k + 1] ?? NaN)));
  return swaps * (first[0] ?? NaN) * determinant(rest);
}

function permutationSign(order: readonly number[]): number {
  let sign = 1;
  order.forEach((a, i) => order.slice(i + 1).forEach((b) => (sign *= a < b ? 1 : -1)));
  return sign;
}

describe("symmetric positive definite matrices", () => {
  const cases = fc.record({ size: fc.integer({ min: 1, max: 9 }), seed: fc.integer({ min: 0, max: 1e6 }) });

  it("have the product of their pivots for a determinant, and an inverse that gives the identity back", () => {
    fc.assert(
      fc.property(cases, ({ size, seed }) => {
        const matrix = positiveDefinite(size, seed);
        const flat = Float64Array.from(matrix.flat());
        const logDeterminant = factorise(flat, size);
        expectWithin(Math.exp(logDeterminant), determinant(matrix), { relative: 1e-7, unit: "(ratio)", because: "rounding of near-singular draws" });
        const inverse = invertFactored(flat, size);
        for (let i = 0; i < size; i += 1) {
          for (let j = 0; j < size; j += 1) {
            const product = matrix[i]?.reduce((sum, value, k) => sum + value * (inverse[k * size + j] ?? NaN), 0) ?? NaN;
            expectWithin(product, i === j ? 1 : 0, { absolute: 1e-8, unit: "(no unit)", because: "rounding of near-singular draws" });
            expect(inverse[i * size + j]).toBe(inverse[j * size + i]);
          }
        }
      }),
    );
  });

  it("need nothing from their upper triangle", () => {
    const matrix = Float64Array.of(4, 99, 2, 3);
    expectWithin(factorise(matrix, 2), Math.log(8), { relative: 1e-14, unit: "(ratio)", because: "4 x 3 - 2 x 2" });
  });

  it("are told apart from others", () => {
    expect(factorise(Float64Array.of(1, 2, 2, 1), 2)).toBeNaN();
    expect(factorise(Float64Array.of(1, 1, 1, 1), 2)).toBeNaN();
    expect(factorise(Float64Array.of(-1), 1)).toBeNaN();
    expect(factorise(Float64Array.of(NaN), 1)).toBeNaN();
  });
});
