import fc from "fast-check";
import { expect, test } from "vitest";
import { timedExcess } from "#lib/core/arrival/timed-correction.ts";
import { STANDARD_GRAVITY } from "#lib/core/units/gravity.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import "#tests/support/property-runs.ts";

const WINDOW = { gravity: STANDARD_GRAVITY, durationSeconds: 6 * 3600, spectrumWidthHz: 0.012 };
/** Equation (1) of method 2.1 at its turning point: no storm of this duration and width looks nearer. */
const NEAREST_METRES = (2 * WINDOW.durationSeconds * WINDOW.gravity) / (4 * Math.PI * WINDOW.spectrumWidthHz);

test("the true distance, stretched as the model says, is found again", () => {
  fc.assert(
    fc.property(fc.double({ min: 1.01, max: 20, noNaN: true }), (times) => {
      const trueMetres = (times * NEAREST_METRES) / 2;
      const apparentMetres = trueMetres * (1 + (NEAREST_METRES / 2 / trueMetres) ** 2);
      expectWithin(trueMetres * (1 + timedExcess(apparentMetres, WINDOW).excess), apparentMetres, { relative: 1e-9, unit: "m", because: "it is the inverse of the stretch" });
    }),
  );
});

test("a storm that looks nearer than any can is as unsure as its correction is large, the nearer the more so", () => {
  fc.assert(
    fc.property(fc.double({ min: 0.01, max: 1, noNaN: true }), (times) => {
      const { excess, excessLow, excessHigh } = timedExcess(times * NEAREST_METRES, WINDOW);
      expect([excess, excessHigh]).toStrictEqual([1, 1]);
      // (1 - 0.6)^2 of K at the bound: hardly stretched at all.
      expect(excessLow).toBeGreaterThan(0);
      expect(excessLow).toBeLessThan(0.06);
    }),
  );
  const [below, above] = [timedExcess(NEAREST_METRES * (1 - 1e-9), WINDOW), timedExcess(NEAREST_METRES * (1 + 1e-9), WINDOW)];
  expectWithin(above.excessLow, below.excessLow, { absolute: 1e-6, unit: "", because: "the two branches meet at the turning point" });
});

test("periods that rise with time have no distance, and no factor makes one of it", () => {
  expect(timedExcess(-1e6, WINDOW)).toStrictEqual({ excess: 1, excessLow: 1, excessHigh: 1 });
});
