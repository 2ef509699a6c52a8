import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { yorkLine } from "#lib/core/statistics/york-line.ts";
import { expectWithin } from "#tests/support/expect-within.ts";

/** Readings of a dispersion line, frequency against time since 1970, with scatter given in standard deviations. */
const readings = fc
  .array(
    fc.record({
      step: fc.double({ min: 0.0005, max: 0.004, noNaN: true }),
      xSigma: fc.double({ min: 1e-5, max: 5e-4, noNaN: true }),
      ySigma: fc.double({ min: 300, max: 7200, noNaN: true }),
      xOff: fc.double({ min: -1, max: 1, noNaN: true }),
      yOff: fc.double({ min: -1, max: 1, noNaN: true }),
    }),
    { minLength: 4, maxLength: 30 },
  )
  .map((points) => {
    let frequency = 0.04;
    return points.map(({ step, xSigma, ySigma, xOff, yOff }) => {
      frequency += step;
      return { x: frequency + xOff * xSigma, y: 1.7e9 + 6.5e6 * frequency + yOff * ySigma, xSigma, ySigma };
    });
  });

type Points = readonly { x: number; y: number; xSigma: number; ySigma: number }[];
const columns = (points: Points) => ({
  x: Float64Array.from(points, ({ x }) => x),
  y: Float64Array.from(points, ({ y }) => y),
  xSigma: Float64Array.from(points, ({ xSigma }) => xSigma),
  ySigma: Float64Array.from(points, ({ ySigma }) => ySigma),
});
const ratio = (relative: number, because: string) => ({ relative, unit: "(ratio)", because });

describe("the line through points with errors in both coordinates", () => {
  it("goes through points that lie on one, far from the origin too", () => {
    fc.assert(
      fc.property(readings, (points) => {
        const on = points.map((point) => ({ ...point, y: 1.7e9 + 6.5e6 * (point.x - 0.06) }));
        const line = yorkLine(columns(on));
        expect(line.converged).toBe(true);
        expectWithin(line.slope, 6.5e6, ratio(1e-9, "times near 1.7e9 s carry 2e-7 s"));
        const second = { absolute: 1e-3, unit: "s", because: "times near 1.7e9 s carry 2e-7 s" };
        expectWithin(line.intercept + 0.06 * line.slope, 1.7e9, second);
      }),
    );
  });

  it("is the same line with the coordinates exchanged", () => {
    fc.assert(
      fc.property(readings, (points) => {
        const line = yorkLine(columns(points));
        const turned = yorkLine(columns(points.map(({ x, y, xSigma, ySigma }) => ({ x: y, y: x, xSigma: ySigma, ySigma: xSigma }))));
        expectWithin(turned.slope, 1 / line.slope, ratio(1e-8, "rounding of times near 1.7e9 s"));
        expectWithin(turned.chiSquare, line.chiSquare, { absolute: 1e-5, unit: "(no unit)", because: "rounding likewise" });
      }),
    );
  });

  it("stands where no nearby line has a smaller chi-square", () => {
    const misfit = (points: Points, intercept: number, slope: number) =>
      points.reduce((sum, p) => sum + (p.y - intercept - slope * p.x) ** 2 / (p.ySigma ** 2 + (slope * p.xSigma) ** 2), 0);
    fc.assert(
      fc.property(readings, (points) => {
        const near = points.map((point) => ({ ...point, y: point.y - 1.7e9 }));
        const { intercept, slope, chiSquare } = yorkLine(columns(near));
        const close = { relative: 1e-6, unit: "(ratio)", because: "rounding", };
        expectWithin(chiSquare + 1, misfit(near, intercept, slope) + 1, close);
        for (const [da, db] of [[0, 1e-3], [0, -1e-3], [50, 0], [-50, 0]] as const) {
          const pivot = 0.06 * slope * db; // turn about the middle of the band
          expect(misfit(near, intercept - pivot + da, slope * (1 + db)) + 1e-6).toBeGreaterThanOrEqual(chiSquare);
        }
      }),
    );
  });

  it("is weighted least squares where x has no error, by the normal equations", () => {
    fc.assert(
      fc.property(readings, (points) => {
        const exact = points.map((point) => ({ ...point, y: point.y - 1.7e9, xSigma: 0 }));
        let [s, sx, sy, sxx, sxy] = [0, 0, 0, 0, 0];
        for (const { x, y, ySigma } of exact) {
          const w = 1e6 / ySigma ** 2;
          [s, sx, sy, sxx, sxy] = [s + w, sx + w * x, sy + w * y, sxx + w * x * x, sxy + w * x * y];
        }
        const determinant = s * sxx - sx * sx;
        const line = yorkLine(columns(exact));
        const close = ratio(1e-7, "the normal equations lose half their digits");
        expectWithin(line.slope, (s * sxy - sx * sy) / determinant, close);
        expectWithin(line.interceptVariance, (1e6 * sxx) / determinant, close);
        expectWithin(line.slopeVariance, (1e6 * s) / determinant, close);
        expectWithin(line.interceptSlopeCovariance, (-1e6 * sx) / determinant, close);
      }),
    );
  });

  it("takes a weight as a smaller inverse variance, and none as no point", () => {
    fc.assert(
      fc.property(readings, (points) => {
        const halved = yorkLine({ ...columns(points), weights: points.map((_, index) => (index === 1 ? 0.25 : 1)) });
        const wider = points.map((point, index) =>
          index === 1 ? { ...point, xSigma: 2 * point.xSigma, ySigma: 2 * point.ySigma } : point,
        );
        expectWithin(halved.slope, yorkLine(columns(wider)).slope, ratio(1e-10, "rounding"));
        const without = yorkLine({ ...columns(points), weights: points.map((_, index) => (index === 1 ? 0 : 1)) });
        const fewer = yorkLine(columns(points.filter((_, index) => index !== 1)));
        expectWithin(without.slope, fewer.slope, ratio(1e-10, "rounding"));
        expectWithin(without.slopeVariance, fewer.slopeVariance, ratio(1e-10, "rounding"));
      }),
    );
  });

  it("says so where the x are alike, and gives no number", () => {
    const line = yorkLine({ x: [0.05, 0.05, 0.05], y: [1, 2, 3], xSigma: [0, 0, 0], ySigma: [1, 1, 1] });
    const nothing = { converged: false, slope: NaN, intercept: NaN, slopeVariance: NaN };
    expect(line).toMatchObject(nothing);
    const barely = yorkLine({ x: [0.05, 0.05 + 1e-11], y: [1, 2], xSigma: [0, 0], ySigma: [1, 1] });
    expectWithin(barely.slope, 1e11, ratio(1e-4, "the frequencies' own rounding"));
    const rounded = yorkLine({ x: [0.3, 0.1 + 0.2], y: [1, 2], xSigma: [0, 0], ySigma: [1, 1] });
    expect(rounded).toMatchObject(nothing);
    const weightless = { x: [0.05, 0.05, 0.06], y: [1, 2, 3], xSigma: [0, 0, 0], ySigma: [1, 1, 1], weights: [1, 1, 0] };
    expect(yorkLine(weightless)).toMatchObject(nothing);
  });

  it("fits a level line", () => {
    const line = yorkLine({ x: [1, 2, 3], y: [4, 4, 4], xSigma: [1, 1, 1], ySigma: [1, 1, 1] });
    expect(line).toMatchObject({ converged: true, slope: 0, intercept: 4, chiSquare: 0 });
  });

  it("settles on a line that is level but for rounding", () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: 0.1, max: 1, noNaN: true }), { minLength: 2, maxLength: 8 }), (steps) => {
        let reach = 0;
        const right = steps.map((step) => [(reach += step), step] as const);
        const points = [...right.map(([x, y]) => [-x, y] as const), ...right]; // its own mirror image
        const ones = points.map(() => 1);
        const line = yorkLine({ x: points.map(([x]) => x), y: points.map(([, y]) => y), xSigma: ones, ySigma: ones });
        expect(line.converged).toBe(true);
        expectWithin(line.slope, 0, { absolute: 1e-12, unit: "(no unit)", because: "rounding" });
      }),
    );
  });

  it("refuses one point, a missing standard deviation and columns of unlike length", () => {
    const two = { x: [1, 2], y: [1, 2], xSigma: [0, 0], ySigma: [1, 1] };
    expect(() => yorkLine({ x: [1], y: [1], xSigma: [0], ySigma: [1] })).toThrow("needs two points; found 1");
    expect(() => yorkLine({ ...two, weights: [1, 0] })).toThrow("needs two points; found 1");
    expect(() => yorkLine({ ...two, ySigma: [1, 0] })).toThrow("Point 2 needs a standard deviation");
    expect(() => yorkLine({ ...two, ySigma: [1, NaN] })).toThrow("Point 2 needs a standard deviation");
    expect(() => yorkLine({ ...two, ySigma: [1] })).toThrow("as many standard deviations");
  });
});
