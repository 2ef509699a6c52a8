import { describe, expect, test } from "vitest";
import { timedPeriod } from "#lib/core/arrival/timed-period.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { countedWaves, type CountedSea } from "#tests/support/simulator/counted-waves.ts";
import { randomStream } from "#tests/support/simulator/random.ts";

const SEAS = 600;

/** The scatter (root of the mean square) of frequencies counted in simulated seas, in parts of the stated error. */
function scatterOverStated(sea: CountedSea, seed: number, statedWidthHz?: number): number {
  let sum = 0;
  for (let i = 0; i < SEAS; i += 1) {
    const seconds = countedWaves(sea, randomStream(seed, i));
    const stated = timedPeriod({ waves: sea.waves, seconds, ...(statedWidthHz === undefined ? {} : { widthHz: statedWidthHz }) });
    sum += ((stated.frequencyHz - sea.peakHz) / stated.frequencySigmaHz) ** 2;
  }
  return Math.sqrt(sum / SEAS);
}

describe("the stated error of a frequency from a count of waves", () => {
  test.each([
    { waves: 20, peakHz: 1 / 14, widthHz: 0.005, seed: 1 },
    { waves: 50, peakHz: 1 / 14, widthHz: 0.005, seed: 2 },
    { waves: 25, peakHz: 1 / 18, widthHz: 0.004, seed: 3 },
    { waves: 60, peakHz: 1 / 10, widthHz: 0.008, seed: 4 },
    { waves: 30, peakHz: 1 / 12, widthHz: 0.003, seed: 5 },
  ])("is the scatter of counts in a sea of its own width: %o", ({ seed, ...sea }) => {
    const because = "600 seas leave 3 % of chance, and the sea is not infinitely narrow";
    expectWithin(scatterOverStated(sea, seed, sea.widthHz), 1, { absolute: 0.1, unit: "of the stated error", because });
  });

  test("is no less than the scatter of counts shorter than the waves' groups", () => {
    const sea = { waves: 6, peakHz: 1 / 14, widthHz: 0.003 };
    const ratio = scatterOverStated(sea, 11, sea.widthHz);
    expect(ratio).toBeLessThan(1.1);
    expect(ratio).toBeGreaterThan(0.5);
  });

  test.each([
    ["1500 km", 1500, 21],
    ["3400 km", 3400, 22],
    ["7500 km", 7500, 23],
  ])("without a known width is right within a factor of 1.7 for a storm of 6 h at %s", (_, distanceKm, seed) => {
    // What left within 6 h and arrives together is this wide: T g / (4 pi L), method 2.1.
    const widthHz = (6 * 3600 * 9.80665) / (4 * Math.PI * distanceKm * 1000);
    const ratio = scatterOverStated({ waves: 40, peakHz: 1 / 14, widthHz }, seed);
    expect(ratio).toBeGreaterThan(1 / 1.7);
    expect(ratio).toBeLessThan(1.7);
  });

  test("is the stopwatch's where few long waves are counted in a sea of one frequency", () => {
    const sea = { waves: 3, peakHz: 1 / 20, widthHz: 1e-7 };
    expectWithin(scatterOverStated(sea, 31, 1e-7), 1, { absolute: 0.1, unit: "of the stated error", because: "600 counts leave 3 % of chance" });
  });
});

describe("a count of waves", () => {
  test("gives waves over seconds, and longer counts less error", () => {
    const short = timedPeriod({ waves: 10, seconds: 140 });
    const long = timedPeriod({ waves: 40, seconds: 560 });
    expectWithin(short.frequencyHz, 1 / 14, { relative: 1e-12, unit: "Hz", because: "a quotient" });
    expectWithin(long.frequencySigmaHz / short.frequencySigmaHz, 0.5, { relative: 0.01, unit: "", because: "the sampling error goes with the root of the time, and outweighs the watch" });
  });

  test.each([{ waves: 0, seconds: 10 }, { waves: 3, seconds: 0 }, { waves: Number.NaN, seconds: 3 }])("of nothing is no frequency: %o", (count) => {
    expect(() => timedPeriod(count)).toThrow(RangeError);
  });
});
