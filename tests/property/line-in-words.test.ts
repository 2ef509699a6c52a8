import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { fitDispersionLine } from "#lib/core/arrival/dispersion-line.ts";
import type { DispersionLine } from "#lib/core/arrival/line.ts";
import { lineAtFrequency, shortenedBy } from "#lib/core/arrival/line-at-frequency.ts";
import type { Reading } from "#lib/core/arrival/reading.ts";
import { DEFAULT_SETTINGS } from "#lib/core/source/settings.ts";
import { linePlot } from "#lib/presentation/line-plot.ts";
import { lineWords, periodWords, usedWords } from "#lib/presentation/line-words.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { GRAVITY, travelSeconds } from "#tests/support/simulator/deep-water.ts";

const ORIGIN = Date.UTC(2031, 2, 3, 6) / 1000;
const PERIODS = [20, 19, 18, 17, 16, 15, 14, 13];
const SIZE = { width: 480, height: 180, left: 34, right: 10, top: 18, bottom: 34 };

/** Swell of a point storm at a distance, each period at its own time; `late` puts one reading off the line. */
function readingsFrom(distanceMetres: number, kind: Reading["kind"], late = 0): Reading[] {
  return PERIODS.map((period, i) => ({
    arrivalEpochSeconds: ORIGIN + travelSeconds({ frequencyHz: 1 / period, distanceMetres }) + (i === 3 ? late : 0),
    frequencyHz: 1 / period,
    arrivalSigmaSeconds: kind === "ridge" ? 1800 : 300,
    frequencySigmaHz: kind === "ridge" ? 0 : 0.025 / period,
    ...{ kind, row: i + 1, bearing: null },
  }));
}

function lineOf(readings: readonly Reading[]): DispersionLine {
  const outcome = fitDispersionLine(readings, DEFAULT_SETTINGS);
  if (outcome.kind !== "fitted") throw new Error("These readings make a line.");
  return outcome.line;
}

const anyDistance = fc.double({ min: 1.5e6, max: 1.5e7, noNaN: true });
const words = (line: DispersionLine, unit: "km" | "nmi" = "km") => lineWords(line, { unit, settings: DEFAULT_SETTINGS });

describe("a line at one frequency", () => {
  test("lets each period arrive when deep water brings it, and is surest where the readings lie", () => {
    fc.assert(
      fc.property(anyDistance, (distanceMetres) => {
        const line = lineOf(readingsFrom(distanceMetres, "ridge"));
        const at = (period: number) => lineAtFrequency(line, 1 / period, GRAVITY);
        for (const period of [25, 16, 10]) {
          expectWithin(at(period).arrivalEpochSeconds, ORIGIN + travelSeconds({ frequencyHz: 1 / period, distanceMetres }), { absolute: 30, unit: "s", because: "the readings are exact; the fit's own precision" });
        }
        const [low, middle, high] = [at(30).sigmaSeconds, at(15.5).sigmaSeconds, at(9).sigmaSeconds];
        expect(middle).toBeLessThan(low);
        expect(middle).toBeLessThan(high);
        // Eight readings of half an hour each pin the middle to a good quarter hour.
        expect(middle).toBeLessThan(1000);
      }),
    );
  });

  test("was shortened by as much as the readings looked too far", () => {
    fc.assert(
      fc.property(anyDistance, (distanceMetres) => {
        // The readings lie exactly on the line that they seem to make, so its distance is the one they were made with.
        const line = lineOf(readingsFrom(distanceMetres, "timed"));
        const shortened = shortenedBy(line, { gravity: GRAVITY, durationSeconds: 6 * 3600, spectrumWidthHz: 0.012 });
        expectWithin(line.distanceMetres * (1 + shortened), distanceMetres, { relative: 1e-4, unit: "m", because: "the same correction, undone" });
      }),
    );
  });
});

describe("a line in words", () => {
  test("says distance and time with digits that their errors leave, in either unit", () => {
    const line = lineOf(readingsFrom(5e6, "ridge"));
    expect(words(line).distance).toMatch(/^[45]\u202f\d\d0 ±\u00a0\d{2,3}\u00a0km$/);
    expect(words(line, "nmi").distance).toMatch(/^2\u202f\d{2,3} ±\u00a0\d{2,3}\u00a0nmi$/);
    expect(words(line).time).toMatch(/^3 Mar 2031 06:00\u00a0UTC ±\u00a0\d(\.\d)?\u00a0h$/);
    expect(words(line).together).toMatch(/correlation beyond \u22120\.99|correlation \u22120\.9\d/);
    expect(words(line).together).toContain("earlier");
  });

  test("says how the readings scatter, which count less, and what the correction took off", () => {
    expect(words(lineOf(readingsFrom(5e6, "ridge"))).scatter).toContain("less than their errors say (p\u00a0>\u00a00.99)");
    const stray = words(lineOf(readingsFrom(5e6, "ridge", 5 * 3600)));
    expect(stray.scatter).toContain("more than their errors say");
    expect(stray.remarks).toContain("Reading 4 lies off the line and counts less.");
    expect(words(lineOf(readingsFrom(5e6, "ridge").slice(0, 2))).scatter).toContain("Two readings fit any line");
    expect(words(lineOf(readingsFrom(4e6, "timed"))).remarks[0]).toMatch(/the line as read \(dashed\) gave \d\d\u202f% more/);
    expect(words(lineOf(readingsFrom(1.4e7, "timed"))).remarks).toStrictEqual([]);
  });

  test("counts what is used, and rounds periods", () => {
    expect([usedWords(1, 1), usedWords(5, 6)]).toStrictEqual(["1\u00a0reading", "5 of 6\u00a0readings"]);
    expect([periodWords(16.04, 0.38), periodWords(16.04, null)]).toStrictEqual(["16.0 ±\u00a00.4\u00a0s", "16.0\u00a0s"]);
  });
});

describe("the plot of a line", () => {
  test("keeps every reading inside, later ones to the right and longer periods below", () => {
    fc.assert(
      fc.property(anyDistance, fc.constantFrom(240, 480, 900), (distanceMetres, width) => {
        const readings = readingsFrom(distanceMetres, "timed");
        const size = { ...SIZE, width };
        const plot = linePlot({ readings, estimate: lineOf(readings), settings: DEFAULT_SETTINGS, size });
        const dots = plot?.dots ?? [];
        expect(dots.map(({ row }) => row)).toStrictEqual([1, 2, 3, 4, 5, 6, 7, 8]);
        dots.forEach(({ x, y }, i) => {
          expect(x > size.left && x < width - size.right && y > size.top && y < size.height - size.bottom).toBe(true);
          const before = dots[i - 1];
          if (before !== undefined) expect(x > before.x && y < before.y).toBe(true);
        });
        const ticks = plot?.times ?? [];
        expect(ticks.length).toBeGreaterThan(0);
        ticks.forEach((tick, i) => { expect(tick.x - (ticks[i - 1]?.x ?? -Infinity)).toBeGreaterThan(40); });
        expect(ticks.filter(({ day }) => day !== "").length).toBeGreaterThan(0);
        expect((plot?.periods ?? []).length).toBeGreaterThan(1);
      }),
    );
  });

  test("draws nothing without readings, no line without an estimate, and a single reading in its middle", () => {
    const draw = (readings: readonly Reading[]) => linePlot({ readings, estimate: null, settings: DEFAULT_SETTINGS, size: SIZE });
    expect(draw([])).toBeNull();
    const one = draw(readingsFrom(5e6, "timed").slice(0, 1));
    expect([one?.line, one?.spread, one?.asRead]).toStrictEqual(["", "", ""]);
    expectWithin(one?.dots[0]?.x ?? NaN, (SIZE.left + SIZE.width - SIZE.right) / 2, { absolute: 0.01, unit: "px", because: "as much air on both sides" });
  });

  test("shows the line as read only where the correction is worth seeing", () => {
    const asRead = (distanceMetres: number, kind: Reading["kind"]) => {
      const readings = readingsFrom(distanceMetres, kind);
      return linePlot({ readings, estimate: lineOf(readings), settings: DEFAULT_SETTINGS, size: SIZE })?.asRead;
    };
    expect(asRead(4e6, "timed")).not.toBe("");
    expect(asRead(1.4e7, "timed")).toBe("");
    expect(asRead(4e6, "ridge")).toBe("");
  });
});
