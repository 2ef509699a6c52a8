import { describe, expect, it } from "vitest";
import { z } from "zod";
import { fitDispersionLine } from "#lib/core/arrival/dispersion-line.ts";
import type { DispersionLine } from "#lib/core/arrival/line.ts";
import type { Reading } from "#lib/core/arrival/reading.ts";
import { DEFAULT_SETTINGS } from "#lib/core/source/settings.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { referenceFacts, referenceTable } from "#tests/support/reference-table.ts";

const ridge = { arrivalSigmaSeconds: 1800, frequencySigmaHz: 0, kind: "ridge", row: 0, bearing: null } as const;

function lineOf(readings: readonly Reading[], gravity: number): DispersionLine {
  const outcome = fitDispersionLine(readings, { ...DEFAULT_SETTINGS, gravity });
  if (outcome.kind !== "fitted") throw new Error(`no line: ${outcome.kind}`);
  return outcome.line;
}

describe("the line of the ridge seen from Cornwall in summer 1945", () => {
  const { rows } = referenceTable("cornwall-1945", z.looseObject({ quantity: z.string(), value: z.number(), absolute: z.number() }));
  const numbers = z.object({
    firstPeriodSeconds: z.number(),
    lastPeriodSeconds: z.number(),
    hoursBetween: z.number(),
    gravity: z.number(),
    printedDistanceMiles: z.number(),
  });
  const { inputs } = referenceFacts("cornwall-1945", z.object({ inputs: numbers }));
  const firstEpochSeconds = -773_000_000; // some hour of 1945: the source gives none
  const line = lineOf(
    [
      { ...ridge, arrivalEpochSeconds: firstEpochSeconds, frequencyHz: 1 / inputs.firstPeriodSeconds },
      { ...ridge, arrivalEpochSeconds: firstEpochSeconds + 3600 * inputs.hoursBetween, frequencyHz: 1 / inputs.lastPeriodSeconds },
    ],
    inputs.gravity,
  );
  const found: Record<string, number> = {
    slopeHzPerSecond: inputs.gravity / (4 * Math.PI * line.distanceMetres),
    distanceKilometres: line.distanceMetres / 1000,
    originHoursBeforeFirst: (firstEpochSeconds - line.originEpochSeconds) / 3600,
  };

  it("has three computed values", () => {
    expect(rows).toHaveLength(3);
  });
  it.each(rows)("has the computed $quantity", ({ quantity, value, absolute }) => {
    expectWithin(found[quantity] ?? NaN, value, { absolute, unit: "", because: "half of the last digit given" });
  });
  it("comes from about the printed 3000 miles, taken as nautical", () => {
    const tenth = { relative: 0.1, unit: "nmi", because: "the source says about, and not which mile" };
    expectWithin(line.distanceMetres / 1852, inputs.printedDistanceMiles, tenth);
  });
});

describe("the errors of a line through readings of frequency", () => {
  const row = z.strictObject({ distanceMetres: z.number(), slopePercent: z.number(), originHours: z.number() });
  const { rows, tolerance } = referenceTable("line-errors", row);
  const shape = z.strictObject({ count: z.number(), lowHz: z.number(), highHz: z.number(), sigmaHz: z.number(), gravity: z.number() });
  const { readings } = referenceFacts("line-errors", z.object({ readings: shape }));

  it("are given for three distances", () => {
    expect(rows).toHaveLength(3);
  });
  it.each(rows)("are $slopePercent % and $originHours h at $distanceMetres m", ({ distanceMetres, slopePercent, originHours }) => {
    const { count, lowHz, highHz, sigmaHz, gravity } = readings;
    const line = lineOf(
      Array.from({ length: count }, (_, index) => {
        const frequencyHz = lowHz + ((highHz - lowHz) * index) / (count - 1);
        const arrivalEpochSeconds = (4 * Math.PI * frequencyHz * distanceMetres) / gravity;
        return { ...ridge, arrivalEpochSeconds, frequencyHz, arrivalSigmaSeconds: 0, frequencySigmaHz: sigmaHz, row: index + 2 };
      }),
      gravity,
    );
    expectWithin((100 * Math.sqrt(line.covariance.distanceVariance)) / line.distanceMetres, slopePercent, tolerance);
    expectWithin(Math.sqrt(line.covariance.originVariance) / 3600, originHours, tolerance);
  });
});
