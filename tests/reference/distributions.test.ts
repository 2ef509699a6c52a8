import { describe, expect, it } from "vitest";
import { z } from "zod";
import { chiSquareQuantile, chiSquareSurvival } from "#lib/core/statistics/chi-square.ts";
import { studentTQuantile } from "#lib/core/statistics/student-t.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { referenceTable } from "#tests/support/reference-table.ts";

const row = z.strictObject({
  probability: z.number(),
  degreesOfFreedom: z.number(),
  value: z.number(),
  printed: z.number().optional(),
  reason: z.string().optional(),
});

describe("chi-square", () => {
  const { rows, tolerance } = referenceTable("chi-square", row);

  it("has nine values, one of them misprinted in one book", () => {
    expect(rows).toHaveLength(9);
    expect(rows.filter(({ printed, value }) => printed !== undefined && printed !== value)).toHaveLength(1);
  });
  it.each(rows)("is $value at $probability for $degreesOfFreedom", ({ probability, degreesOfFreedom, value }) => {
    expectWithin(chiSquareQuantile(probability, degreesOfFreedom), value, tolerance);
  });
  it.each(rows)("survives $value with what is left of $probability", ({ probability, degreesOfFreedom, value }) => {
    const near = { absolute: 1e-4, unit: "(probability)", because: "the value is printed to four decimals" };
    expectWithin(chiSquareSurvival(value, degreesOfFreedom), 1 - probability, near);
  });
  it("refuses what is no probability, no chi-square and no degrees of freedom", () => {
    expect(() => chiSquareQuantile(1.5, 2)).toThrow("between 0 and 1");
    expect(() => chiSquareSurvival(-1, 2)).toThrow("between 0 and");
    expect(() => chiSquareSurvival(1, 0)).toThrow("above zero");
  });
});

describe("Student's t", () => {
  const { rows, tolerance } = referenceTable("student-t", row);

  it("has eight values", () => {
    expect(rows).toHaveLength(8);
  });
  it.each(rows)("is $value at $probability for $degreesOfFreedom", ({ probability, degreesOfFreedom, value }) => {
    expectWithin(studentTQuantile(probability, degreesOfFreedom), value, tolerance);
  });
  it("refuses what is no probability", () => {
    expect(() => studentTQuantile(NaN, 2)).toThrow("between 0 and 1");
  });
});
