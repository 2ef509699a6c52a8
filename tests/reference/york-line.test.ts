import { describe, expect, it } from "vitest";
import { z } from "zod";
import { yorkLine } from "#lib/core/statistics/york-line.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { referenceFacts, referenceTable } from "#tests/support/reference-table.ts";

const sigmas = (weights: readonly number[]) => weights.map((weight) => 1 / Math.sqrt(weight));
const quantity = z.strictObject({ quantity: z.string(), value: z.number() });

describe("a line through Pearson's points with York's weights", () => {
  const numbers = z.array(z.number());
  const pointsSchema = z.object({ x: numbers, y: numbers, xWeight: numbers, yWeight: numbers });
  const { points } = referenceFacts("york-pearson", z.object({ points: pointsSchema }));
  const line = yorkLine({ x: points.x, y: points.y, xSigma: sigmas(points.xWeight), ySigma: sigmas(points.yWeight) });
  const found: Record<string, number> = {
    intercept: line.intercept,
    slope: line.slope,
    interceptSigma: Math.sqrt(line.interceptVariance),
    slopeSigma: Math.sqrt(line.slopeVariance),
    reducedChiSquare: line.chiSquare / (points.x.length - 2),
  };
  const values = referenceTable("york-pearson", quantity);
  const errors = referenceTable("york-pearson-errors", quantity);

  it("compares every published number", () => {
    expect(values.rows).toHaveLength(2);
    expect(errors.rows).toHaveLength(3);
    expect(line.converged).toBe(true);
  });
  it.each(values.rows)("gives the published $quantity", (row) => {
    expectWithin(found[row.quantity] ?? NaN, row.value, values.tolerance);
  });
  it.each(errors.rows)("gives the published $quantity", (row) => {
    expectWithin(found[row.quantity] ?? NaN, row.value, errors.tolerance);
  });
});

describe("an unweighted line through NIST's Norris data", () => {
  const table = referenceTable("norris", z.strictObject({ x: z.number(), y: z.number() }));
  const { certified, computed } = referenceFacts(
    "norris",
    z.object({
      certified: z.object({ intercept: z.number(), interceptSigma: z.number(), slope: z.number(), slopeSigma: z.number() }),
      computed: z.object({ zeroCrossing: z.number(), zeroCrossingSigma: z.number() }),
    }),
  );
  const { rows, tolerance } = table;
  const line = yorkLine({
    x: rows.map(({ x }) => x),
    y: rows.map(({ y }) => y),
    xSigma: rows.map(() => 0),
    ySigma: rows.map(() => 1),
  });
  const scatter = line.chiSquare / (rows.length - 2);

  it("has all 36 points", () => {
    expect(rows).toHaveLength(36);
  });
  it("gives the certified coefficients", () => {
    expectWithin(line.intercept, certified.intercept, tolerance);
    expectWithin(line.slope, certified.slope, tolerance);
  });
  it("gives the certified standard deviations, scaled by the scatter", () => {
    expectWithin(Math.sqrt(line.interceptVariance * scatter), certified.interceptSigma, tolerance);
    expectWithin(Math.sqrt(line.slopeVariance * scatter), certified.slopeSigma, tolerance);
  });
  it("gives the zero crossing's error through the covariance", () => {
    const crossing = -line.intercept / line.slope;
    const { interceptVariance, slopeVariance, interceptSlopeCovariance } = line;
    const variance = interceptVariance + 2 * crossing * interceptSlopeCovariance + crossing ** 2 * slopeVariance;
    expectWithin(crossing, computed.zeroCrossing, tolerance);
    const nine = { relative: 1e-8, unit: "(data units)", because: "given to nine digits" };
    expectWithin(Math.sqrt(variance * scatter) / line.slope, computed.zeroCrossingSigma, nine);
  });
});
