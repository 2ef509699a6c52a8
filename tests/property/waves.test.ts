import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { distanceFromSlope, slopeFromDistance } from "#lib/core/waves/dispersion-slope.ts";
import { deepWaterGroupSpeed, groupSpeed } from "#lib/core/waves/group-speed.ts";
import { phaseSpeed } from "#lib/core/waves/phase-speed.ts";
import { relativeDepth } from "#lib/core/waves/relative-depth.ts";
import { shelfDelaySeconds } from "#lib/core/waves/shelf-delay.ts";
import { deepWaterTravelSeconds } from "#lib/core/waves/travel-time.ts";
import { wavenumber } from "#lib/core/waves/wavenumber.ts";
import { expectWithin } from "#tests/support/expect-within.ts";

const gravity = 9.80665;
const frequencies = fc.double({ min: 0.02, max: 0.3, noNaN: true });
const depths = fc.double({ min: 1, max: 6000, noNaN: true });
const rounding = { relative: 1e-12, unit: "(ratio)", because: "rounding only" };

describe("waves over any depth", () => {
  it("have a root of X tanh X = Y that gives Y back", () => {
    fc.assert(
      fc.property(fc.double({ min: -9, max: 3, noNaN: true }), (power) => {
        const y = 10 ** power;
        const x = relativeDepth(y);
        expectWithin(x * Math.tanh(x), y, rounding);
      }),
    );
  });

  it("carry energy at d omega / d k, by differences of the wavenumber", () => {
    fc.assert(
      fc.property(frequencies, depths, (frequencyHz, depthMetres) => {
        const step = 1e-4 * frequencyHz;
        const k = (f: number) => wavenumber({ frequencyHz: f, depthMetres, gravity });
        const byDifference = (4 * Math.PI * step) / (k(frequencyHz + step) - k(frequencyHz - step));
        const close = { relative: 1e-6, unit: "(ratio)", because: "central difference over 1e-4 of the frequency" };
        expectWithin(groupSpeed({ frequencyHz, depthMetres, gravity }), byDifference, close);
      }),
    );
  });

  it("go at the root of g h where it is shallow, and at half the phase speed where it is deep", () => {
    const shallow = { frequencyHz: 0.001, depthMetres: 1, gravity };
    const near = { relative: 1e-5, unit: "m/s", because: "the limit is reached to the square of k h" };
    expectWithin(groupSpeed(shallow), Math.sqrt(gravity), near);
    expectWithin(phaseSpeed(shallow), Math.sqrt(gravity), near);
    const deep = { frequencyHz: 0.1, depthMetres: 6000, gravity };
    expectWithin(groupSpeed(deep), phaseSpeed(deep) / 2, rounding);
    expectWithin(groupSpeed(deep), deepWaterGroupSpeed(deep), rounding);
  });

  it("refuse a depth, a frequency or a gravity that is none, by name", () => {
    expect(() => groupSpeed({ frequencyHz: 0.05, depthMetres: 0, gravity })).toThrow("Water depth must be");
    expect(() => groupSpeed({ frequencyHz: NaN, depthMetres: 9, gravity })).toThrow("Wave frequency must be");
    expect(() => deepWaterGroupSpeed({ frequencyHz: 0.05, gravity: -1 })).toThrow("Gravity must be");
    expect(() => deepWaterTravelSeconds({ frequencyHz: 0.05, distanceMetres: -1, gravity })).toThrow("Distance must lie");
  });
});

describe("slope and distance", () => {
  it("turn into each other", () => {
    fc.assert(
      fc.property(fc.double({ min: 1e4, max: 2e7, noNaN: true }), (distanceMetres) => {
        const slopeHzPerSecond = slopeFromDistance({ distanceMetres, gravity });
        expectWithin(distanceFromSlope({ slopeHzPerSecond, gravity }), distanceMetres, rounding);
      }),
    );
  });

  it("agree with travel times of two frequencies", () => {
    fc.assert(
      fc.property(fc.double({ min: 1e4, max: 2e7, noNaN: true }), (distanceMetres) => {
        const seconds = (frequencyHz: number) => deepWaterTravelSeconds({ frequencyHz, distanceMetres, gravity });
        const slope = 0.03 / (seconds(0.08) - seconds(0.05));
        expectWithin(distanceFromSlope({ slopeHzPerSecond: slope, gravity }), distanceMetres, rounding);
      }),
    );
  });
});

describe("the way over deep water", () => {
  it("takes no time where there is none, and in proportion to its length", () => {
    expect(deepWaterTravelSeconds({ frequencyHz: 0.05, distanceMetres: 0, gravity })).toBe(0);
    fc.assert(
      fc.property(frequencies, fc.double({ min: 1e-3, max: 2e7, noNaN: true }), (frequencyHz, distanceMetres) => {
        const expected = (4 * Math.PI * frequencyHz * distanceMetres) / gravity;
        expectWithin(deepWaterTravelSeconds({ frequencyHz, distanceMetres, gravity }), expected, rounding);
      }),
    );
  });
});

describe("the delay over a shelf", () => {
  it("is nothing over deep water or without legs", () => {
    expect(shelfDelaySeconds({ frequencyHz: 0.06, legs: [], gravity })).toBe(0);
    const legs = [{ lengthMetres: 1e6, depthMetres: 5000 }];
    const nothing = { absolute: 1e-6, unit: "s", because: "5 km is deeper than half of any swell's length" };
    expectWithin(shelfDelaySeconds({ frequencyHz: 0.06, legs, gravity }), 0, nothing);
  });

  it("is the time over the shelf less the time over deep water", () => {
    fc.assert(
      fc.property(frequencies, depths, depths, (frequencyHz, near, far) => {
        const legs = [
          { lengthMetres: 20_000, depthMetres: near },
          { lengthMetres: 50_000, depthMetres: far },
        ];
        const over = (depthMetres: number) => groupSpeed({ frequencyHz, depthMetres, gravity });
        const deep = deepWaterTravelSeconds({ frequencyHz, distanceMetres: 70_000, gravity });
        const expected = 20_000 / over(near) + 50_000 / over(far) - deep;
        const close = { absolute: 1e-6, unit: "s", because: "a difference of hours" };
        expectWithin(shelfDelaySeconds({ frequencyHz, legs, gravity }), expected, close);
      }),
    );
  });

  it("is negative at 100 m for 20 s swell, which the shelf speeds up, and positive at 10 m", () => {
    const delay = (depthMetres: number) =>
      shelfDelaySeconds({ frequencyHz: 0.05, legs: [{ lengthMetres: 10_000, depthMetres }], gravity });
    expect(delay(100)).toBeLessThan(0);
    expect(delay(10)).toBeGreaterThan(0);
  });

  it("names the leg that is wrong", () => {
    const legs = [
      { lengthMetres: 1000, depthMetres: 50 },
      { lengthMetres: 1000, depthMetres: -2 },
    ];
    expect(() => shelfDelaySeconds({ frequencyHz: 0.05, legs, gravity })).toThrow("legs[1].depthMetres: Water depth");
  });
});
