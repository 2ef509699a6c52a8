import { expect } from "vitest";

/** How far a number may lie from the expected one, in its unit or as a fraction of the expected value, and why so far. */
export type Tolerance = (
  | { readonly absolute: number; readonly relative?: never }
  | { readonly relative: number; readonly absolute?: never }
) & { readonly unit: string; readonly because: string };

/** The one comparison of floating-point numbers in the tests. NaN is within nothing; an infinity only of itself. */
export function expectWithin(actual: number, expected: number, tolerance: Tolerance): void {
  const allowed = tolerance.absolute ?? tolerance.relative * Math.abs(expected);
  const off = actual - expected;
  const within = actual === expected || Math.abs(off) <= allowed;
  const message =
    `${actual} ${tolerance.unit} is ${off} ${tolerance.unit} from the expected ${expected} ${tolerance.unit}; ` +
    `allowed ${allowed} ${tolerance.unit} (${tolerance.because})`;
  expect(within, message).toBe(true);
}
