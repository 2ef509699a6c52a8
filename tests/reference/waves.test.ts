import { describe, expect, it } from "vitest";
import { z } from "zod";
import { distanceFromSlope, slopeFromDistance } from "#lib/core/waves/dispersion-slope.ts";
import { deepWaterGroupSpeed, groupSpeed } from "#lib/core/waves/group-speed.ts";
import { phaseSpeed } from "#lib/core/waves/phase-speed.ts";
import { relativeDepth } from "#lib/core/waves/relative-depth.ts";
import { deepWaterTravelSeconds } from "#lib/core/waves/travel-time.ts";
import { wavenumber } from "#lib/core/waves/wavenumber.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { referenceFacts, referenceTable } from "#tests/support/reference-table.ts";

const GRAVITY = 9.81; // what the sources use
const METRES_PER_FOOT = 0.3048;
const METRES_PER_SECOND_PER_KNOT = 1852 / 3600;
const quantityRow = z.looseObject({ quantity: z.string(), value: z.number() });

describe("the dispersion relation", () => {
  const table = referenceTable("relative-depth", z.strictObject({ y: z.number(), x: z.number() }));

  it("has eight values", () => {
    expect(table.rows).toHaveLength(8);
  });
  it.each(table.rows)("has the root $x at $y", ({ y, x }) => {
    expectWithin(relativeDepth(y), x, table.tolerance);
  });
});

describe("group speed at 100 m over deep water", () => {
  const table = referenceTable("group-speed-ratio", z.strictObject({ frequencyHz: z.number(), ratio: z.number() }));

  it("has six values", () => {
    expect(table.rows).toHaveLength(6);
  });
  it.each(table.rows)("is $ratio at $frequencyHz Hz", ({ frequencyHz, ratio }) => {
    const shallow = groupSpeed({ frequencyHz, depthMetres: 100, gravity: GRAVITY });
    expectWithin(shallow / deepWaterGroupSpeed({ frequencyHz, gravity: GRAVITY }), ratio, table.tolerance);
  });
});

describe("rules of thumb for deep water", () => {
  const row = z.strictObject({ quantity: z.string(), factor: z.number(), power: z.number() });
  const table = referenceTable("group-speed-rules", row);
  const deep = (frequencyHz: number) => ({ frequencyHz, depthMetres: 10_000, gravity: GRAVITY });
  const found: Record<string, (frequencyHz: number) => number> = {
    phaseSpeedKnots: (f) => phaseSpeed(deep(f)) / METRES_PER_SECOND_PER_KNOT,
    groupSpeedKnots: (f) => deepWaterGroupSpeed(deep(f)) / METRES_PER_SECOND_PER_KNOT,
    wavelengthFeet: (f) => (2 * Math.PI) / wavenumber(deep(f)) / METRES_PER_FOOT,
  };

  it("are three", () => {
    expect(table.rows).toHaveLength(3);
  });
  it.each(table.rows)("$quantity is $factor T^$power", ({ quantity, factor, power }) => {
    for (const period of [8, 12, 17, 22]) {
      expectWithin(found[quantity]?.(1 / period) ?? NaN, factor * period ** power, table.tolerance);
    }
  });
  it("lie 2.8 % under the common 1.56 T kn for the group speed", () => {
    const rule = z.strictObject({ quantity: z.string(), factor: z.number(), percentHigh: z.number() });
    const { highRule } = referenceFacts("group-speed-rules", z.object({ highRule: rule }));
    const percent = 100 * (highRule.factor / (found[highRule.quantity]?.(1) ?? NaN) - 1);
    expectWithin(percent, highRule.percentHigh, { absolute: 0.05, unit: "%", because: "given to a tenth" });
  });
});

describe("a wave of 10 s in 3 m of water", () => {
  const table = referenceTable("finite-depth", quantityRow);
  const wave = { frequencyHz: 0.1, depthMetres: 3, gravity: GRAVITY };
  const found: Record<string, number> = {
    wavelengthMetres: (2 * Math.PI) / wavenumber(wave),
    phaseSpeed: phaseSpeed(wave),
  };

  it("has two printed values", () => {
    expect(table.rows).toHaveLength(2);
  });
  it.each(table.rows)("has the printed $quantity", ({ quantity, value }) => {
    expectWithin(found[quantity] ?? NaN, value, table.tolerance);
  });
});

describe("the ridge seen from Cornwall in summer 1945", () => {
  const { rows } = referenceTable("cornwall-1945", quantityRow.extend({ absolute: z.number() }));
  const inputsSchema = z.object({
    firstPeriodSeconds: z.number(),
    lastPeriodSeconds: z.number(),
    hoursBetween: z.number(),
    gravity: z.number(),
    printedDistanceMiles: z.number(),
  });
  const { inputs } = referenceFacts("cornwall-1945", z.object({ inputs: inputsSchema }));
  const firstHz = 1 / inputs.firstPeriodSeconds;
  const slopeHzPerSecond = (1 / inputs.lastPeriodSeconds - firstHz) / (inputs.hoursBetween * 3600);
  const distanceMetres = distanceFromSlope({ slopeHzPerSecond, gravity: inputs.gravity });
  const travelSeconds = deepWaterTravelSeconds({ frequencyHz: firstHz, distanceMetres, gravity: inputs.gravity });
  const found: Record<string, number> = {
    slopeHzPerSecond: slopeFromDistance({ distanceMetres, gravity: inputs.gravity }),
    distanceKilometres: distanceMetres / 1000,
    originHoursBeforeFirst: travelSeconds / 3600,
  };

  it("has three computed values", () => {
    expect(rows).toHaveLength(3);
  });
  it.each(rows)("has its computed $quantity", ({ quantity, value, absolute }) => {
    expectWithin(found[quantity] ?? NaN, value, { absolute, unit: "", because: "half of the last digit given" });
  });
  it("comes from about the printed 3000 miles, taken as nautical", () => {
    const tenth = { relative: 0.1, unit: "nmi", because: "the source says about, and not which mile" };
    expectWithin(distanceMetres / 1852, inputs.printedDistanceMiles, tenth);
  });
});

describe("arrivals of the storm of February 2004", () => {
  const row = z.strictObject({
    id: z.string(),
    distanceMetres: z.number(),
    slopeHzPerSecond: z.number(),
    frequencyHz: z.number(),
    hours: z.number(),
  });
  const table = referenceTable("arrivals-february-2004", row);

  it("are twelve", () => {
    expect(table.rows).toHaveLength(12);
  });
  it.each(table.rows)("$frequencyHz Hz reaches $id after $hours h", (arrival) => {
    expectWithin(deepWaterTravelSeconds({ ...arrival, gravity: GRAVITY }) / 3600, arrival.hours, table.tolerance);
    const seven = { relative: 5e-7, unit: "Hz/s", because: "given to seven digits" };
    expectWithin(slopeFromDistance({ ...arrival, gravity: GRAVITY }), arrival.slopeHzPerSecond, seven);
  });
});
