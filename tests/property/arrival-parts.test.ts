import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { effectiveReadings } from "#lib/core/arrival/effective-readings.ts";
import { meanBearing } from "#lib/core/arrival/mean-bearing.ts";
import { numberedStations } from "#lib/core/arrival/numbered-stations.ts";
import { outcomeEstimate } from "#lib/core/arrival/outcome-estimate.ts";
import type { Reading } from "#lib/core/arrival/reading.ts";
import { withoutStations } from "#lib/core/arrival/without-stations.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { INVENTED_DEPLOYMENT, inventedEvent } from "#tests/support/invented-event.ts";
import { randomStream } from "#tests/support/simulator/random.ts";

describe("how many independent readings a ridge is worth", () => {
  /** Residuals of which each remembers a part of the one before. */
  const remembering = (memory: number, count: number, seed: number) => {
    const random = randomStream(seed);
    let off = random.normal();
    return Array.from({ length: count }, () => (off = memory * off + Math.sqrt(1 - memory ** 2) * random.normal()));
  };

  it.each([0, 0.3, 0.6, 0.8])("follows the law of a memory of %d", (memory) => {
    const count = 20_000;
    const close = { relative: 0.06, unit: "(ratio)", because: "a correlation from 20 000 draws" };
    expectWithin(effectiveReadings(remembering(memory, count, 3)) / count, (1 - memory) / (1 + memory), close);
  });
  it("undoes on average what fitting a line takes off the correlation", () => {
    // The residuals of a fitted line of independent readings have a mean lag-1 correlation of about -2 / n.
    const counted = Array.from({ length: 2000 }, (_, run) => {
      const off = remembering(0, 12, run);
      const x = off.map((_, i) => i - 5.5);
      const mean = off.reduce((sum, value) => sum + value / 12, 0);
      const slope = off.reduce((sum, value, i) => sum + (value * (x[i] ?? NaN)) / 143, 0);
      return effectiveReadings(off.map((value, i) => value - mean - slope * (x[i] ?? NaN)));
    });
    const full = counted.filter((value) => value === 12).length;
    expectWithin(full / 2000, 0.5, { absolute: 0.06, unit: "(share)", because: "corrected, half of the correlations lie below zero" });
  });
  it("is all of them where neighbours differ in sign, and a nineteenth where they are alike", () => {
    expect(effectiveReadings([1, -1, 1, -1, 1, -1])).toBe(6);
    expectWithin(effectiveReadings(Array.from({ length: 40 }, () => 1)), 40 / 19, { relative: 1e-12, unit: "readings", because: "clipped at 0.9" });
  });
  it("is all of them for fewer than four, and for those that lie on the line but for rounding", () => {
    expect(effectiveReadings([1, 1, 1])).toBe(3);
    expect(effectiveReadings([0, 0, 0, 0])).toBe(4);
    expect(effectiveReadings([1e-9, 1e-9, 1e-9, 1e-9, 1e-9])).toBe(5);
    expect(effectiveReadings([1e-3, 1e-3, 1e-3, 1e-3, 1e-3])).toBeLessThan(5);
  });
});

describe("one direction from many", () => {
  const from = (comesFromDegrees: number, sigmaDegrees: number): Reading => ({
    ...{ arrivalEpochSeconds: 0, frequencyHz: 0.05, arrivalSigmaSeconds: 1, frequencySigmaHz: 0, kind: "ridge", row: 2 },
    bearing: { comesFromDegrees, sigmaDegrees },
  });
  const bearingOf = (readings: readonly Reading[]) => meanBearing(readings).bearing;
  const degrees = { absolute: 1e-9, unit: "degrees", because: "rounding" };

  it("is none where no reading has one", () => {
    expect(meanBearing([])).toEqual({ bearing: null, notes: [] });
    expect(meanBearing([{ ...from(10, 5), bearing: null }])).toEqual({ bearing: null, notes: [] });
  });
  it("is right across north", () => {
    expectWithin(Math.cos(((bearingOf([from(350, 20), from(10, 20)])?.comesFromDegrees ?? NaN) * Math.PI) / 180), 1, degrees);
    expectWithin(bearingOf([from(350, 20), from(20, 20)])?.comesFromDegrees ?? NaN, 5, degrees);
  });
  it("leans toward the surer one by the inverse of the variances", () => {
    const mean = bearingOf([from(100, 20), from(104, 40), { ...from(0, 1), bearing: null }]);
    expectWithin(mean?.comesFromDegrees ?? NaN, 100.8, { absolute: 0.01, unit: "degrees", because: "vectors for small angles" });
    expectWithin(mean?.sigmaDegrees ?? NaN, 1 / Math.sqrt(1 / 400 + 1 / 1600), degrees);
  });
  it("is never surer than ten degrees, and says so where a reading is", () => {
    expect(meanBearing(Array.from({ length: 50 }, () => from(250, 15)))).toMatchObject({ bearing: { sigmaDegrees: 10 }, notes: [] });
    const surer = meanBearing([from(250, 4), from(250, 10), from(251, 9.9)]);
    expect(surer.bearing?.sigmaDegrees).toBe(10);
    expect(surer.notes).toEqual([{ code: "bearing-sigma-raised", message: expect.stringMatching(/^2 directions state errors below 10 degrees;/) as string }]);
  });
  it("is as wide as the directions scatter, however many they are", () => {
    // Half of them 30 degrees to either side: their unit vectors' mean is cos 30, a circular deviation of 30.7 degrees.
    const fan = (count: number) => bearingOf(Array.from({ length: count }, (_, i) => from(i % 2 === 0 ? 60 : 120, 12)));
    for (const count of [2, 40]) {
      expectWithin(fan(count)?.comesFromDegrees ?? NaN, 90, degrees);
      expectWithin(fan(count)?.sigmaDegrees ?? NaN, 30.73, { absolute: 0.01, unit: "degrees", because: "sqrt(-2 ln cos 30) by hand; common practice, no source" });
    }
  });
  it("is none where directions contradict each other, and says so", () => {
    for (const apart of [180, 150]) {
      const opposed = Array.from({ length: 9 }, (_, i) => from(i % 2 === 0 ? 20 : 20 + apart, 5));
      expect(meanBearing(opposed)).toEqual({ bearing: null, notes: [expect.objectContaining({ code: "bearings-contradict" })] });
    }
    // A hundred and twenty degrees apart the mean vector is just half as long as each.
    expect(bearingOf([from(100, 15), from(219, 15)])?.comesFromDegrees).toBeGreaterThan(159);
    expect(bearingOf([from(100, 15), from(221, 15)])).toBeNull();
  });
  it("turns with all of them", () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 359 }), (turn) => {
        const mean = bearingOf([from(turn, 12), from((turn + 30) % 360, 30)]);
        const still = bearingOf([from(0, 12), from(30, 30)]);
        const off = (mean?.comesFromDegrees ?? NaN) - (still?.comesFromDegrees ?? NaN) - turn;
        expectWithin(Math.sin((off * Math.PI) / 360), 0, { ...degrees, unit: "(sine of half)" });
        expect(mean?.comesFromDegrees).toBeGreaterThanOrEqual(0);
        expect(mean?.comesFromDegrees).toBeLessThan(360);
      }),
    );
  });
});

describe("the stations of an event", () => {
  const { observations } = inventedEvent("x");

  it("are numbered in the order of deployments, if they were heard", () => {
    const silent = { ...INVENTED_DEPLOYMENT, stationId: "silent" };
    const numbered = numberedStations({ ...observations, deployments: [silent, ...observations.deployments] });
    expect(numbered.map(({ number, id, name }) => [number, id, name])).toEqual([
      [1, "north-mole", "North Mole"],
      [2, "far-rock", "Far Rock"],
    ]);
  });
  it("have the name and the place at which they stood when they heard the event", () => {
    const deployments = observations.deployments.map((deployment) =>
      deployment.name === "North Mole, outer" ? { ...deployment, position: { latitudeDegrees: 44, longitudeDegrees: -125 } } : deployment,
    );
    const later = observations.readings.map((entry) => ({ ...entry, reading: { ...entry.reading, arrivalEpochSeconds: entry.reading.arrivalEpochSeconds + 1e7 } }));
    const [mole] = numberedStations({ ...observations, deployments, readings: later });
    expect(mole).toEqual({ number: 1, id: "north-mole", name: "North Mole, outer", position: { latitudeDegrees: 44, longitudeDegrees: -125 } });
  });
  it("keep their deployments when their arrivals are left out", () => {
    const left = withoutStations(observations, ["far-rock"]);
    expect(left.deployments).toEqual(observations.deployments);
    expect(left.estimates).toEqual([]);
    expect(left.readings).toEqual(observations.readings);
    expect(withoutStations(observations, ["north-mole"]).readings).toEqual([]);
    expect(withoutStations(observations, [])).toEqual(observations);
  });
  it("say what they say by a line or by an estimate, or not at all", () => {
    const estimate = observations.estimates[0]?.estimate;
    if (!estimate) throw new Error("the invented event has an estimate");
    expect(outcomeEstimate({ kind: "sent-in", estimate })).toBe(estimate);
    expect(outcomeEstimate({ kind: "refused", code: "period-rises", message: "" })).toBeNull();
  });
});
