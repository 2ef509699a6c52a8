import fc from "fast-check";
import { describe, it } from "vitest";
import { chiSquareQuantile, chiSquareSurvival } from "#lib/core/statistics/chi-square.ts";
import { studentTQuantile } from "#lib/core/statistics/student-t.ts";
import { expectWithin } from "#tests/support/expect-within.ts";

const probabilities = fc.double({ min: 0.001, max: 0.999, noNaN: true });

describe("distributions", () => {
  it("turn chi-square into a probability and back", () => {
    fc.assert(
      fc.property(probabilities, fc.integer({ min: 1, max: 60 }), (probability, degreesOfFreedom) => {
        const value = chiSquareQuantile(probability, degreesOfFreedom);
        const close = { absolute: 1e-9, unit: "(probability)", because: "two approximations of the gamma function" };
        expectWithin(chiSquareSurvival(value, degreesOfFreedom), 1 - probability, close);
      }),
    );
  });

  it("have exponential chi-square tails at two degrees", () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 60, noNaN: true }), (value) => {
        const close = { absolute: 1e-14, unit: "(probability)", because: "taken as one less the distribution function" };
        expectWithin(chiSquareSurvival(value, 2), Math.exp(-value / 2), close);
      }),
    );
  });

  it("are even for Student's t, and Cauchy's at one degree", () => {
    fc.assert(
      fc.property(probabilities, fc.double({ min: 1, max: 50, noNaN: true }), (probability, degreesOfFreedom) => {
        const close = { absolute: 1e-6, unit: "(no unit)", because: "the quantile is iterated" };
        const value = studentTQuantile(probability, degreesOfFreedom);
        expectWithin(studentTQuantile(1 - probability, degreesOfFreedom), -value, close);
        const cauchy = Math.tan(Math.PI * (probability - 0.5));
        expectWithin(studentTQuantile(probability, 1), cauchy, { ...close, absolute: 1e-9 * (1 + Math.abs(cauchy)) });
      }),
    );
  });
});
