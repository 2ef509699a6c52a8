import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { fitDispersionLine } from "#lib/core/arrival/dispersion-line.ts";
import type { DispersionLine, LineOutcome } from "#lib/core/arrival/line.ts";
import type { Reading } from "#lib/core/arrival/reading.ts";
import { HALF_GIRTH_METRES } from "#lib/core/geodesy/earth.ts";
import { DEFAULT_SETTINGS } from "#lib/core/source/settings.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { randomStream } from "#tests/support/simulator/random.ts";

const SECONDS_PER_METRE_AND_HERTZ = (4 * Math.PI) / 9.80665; // t = t0 + 4 pi L f / g
const ORIGIN = 1_600_000_000;
const evenly = (min: number, max: number) => fc.integer({ min: 0, max: 1e6 }).map((part) => min + ((max - min) * part) / 1e6);
const ratio = (relative: number, because: string) => ({ relative, unit: "(ratio)", because });
const seconds = (absolute: number, because: string) => ({ absolute, unit: "s", because });

interface Sample {
  readonly frequencyHz: number;
  readonly offSeconds?: number;
  readonly sigmaSeconds?: number;
  readonly frequencySigmaHz?: number;
  readonly kind?: "ridge" | "timed";
}

/** Readings of a storm at a distance, each off the line by what its sample says. */
function readingsOf(distanceMetres: number, samples: readonly Sample[]): Reading[] {
  return samples.map(({ frequencyHz, offSeconds = 0, sigmaSeconds = 1800, frequencySigmaHz = 0, kind = "ridge" }, index) => ({
    arrivalEpochSeconds: ORIGIN + SECONDS_PER_METRE_AND_HERTZ * distanceMetres * frequencyHz + offSeconds,
    frequencyHz,
    arrivalSigmaSeconds: sigmaSeconds,
    frequencySigmaHz,
    kind,
    row: index + 2,
    bearing: null,
  }));
}

function fitted(readings: readonly Reading[], settings = DEFAULT_SETTINGS): DispersionLine {
  const outcome = fitDispersionLine(readings, settings);
  if (outcome.kind !== "fitted") throw new Error(outcome.kind === "refused" ? outcome.message : outcome.kind);
  return outcome.line;
}

/** Frequencies that differ, low to high. */
const ladders = fc.array(evenly(0.0008, 0.003), { minLength: 3, maxLength: 24 }).map((steps) => {
  let frequencyHz = 0.04;
  return steps.map((step) => (frequencyHz += step));
});
const distances = evenly(8e5, 1.9e7);
/** Long enough, and far enough, for scatter to leave a slope. */
const noisy = fc.record({ ladder: ladders.map((steps) => [0.03, 0.033, 0.036, ...steps, 0.115]), seed: fc.integer({ min: 0, max: 1e6 }), distanceMetres: evenly(3e6, 1.5e7) }).map(({ ladder, seed, distanceMetres }) => {
  const random = randomStream(seed);
  return readingsOf(distanceMetres, ladder.map((frequencyHz) => ({ frequencyHz, offSeconds: 1800 * random.normal() })));
});
const even = (count: number, low = 0.045, high = 0.08) => Array.from({ length: count }, (_, i) => low + ((high - low) * i) / (count - 1));

describe("the line of one station's readings", () => {
  it("is the line that they lie on", () => {
    fc.assert(
      fc.property(ladders, distances, (ladder, distanceMetres) => {
        const line = fitted(readingsOf(distanceMetres, ladder.map((frequencyHz) => ({ frequencyHz, sigmaSeconds: 60 }))));
        expectWithin(line.distanceMetres, distanceMetres, ratio(1e-8, "times near 1.6e9 s carry 2e-7 s"));
        expectWithin(line.originEpochSeconds, ORIGIN, seconds(1e-3, "times near 1.6e9 s carry 2e-7 s"));
        expectWithin(line.reducedChiSquare ?? NaN, 0, { absolute: 1e-12, unit: "(no unit)", because: "rounding" });
        expect(line).toMatchObject({ downweightedRows: [], readingsUsed: ladder.length, effectiveReadings: ladder.length, sharedShifts: [], notes: [] });
        expectWithin(line.pValue ?? NaN, 1, { absolute: 1e-6, unit: "(probability)", because: "the root of rounding, at one degree of freedom" });
        expect(line).toMatchObject({ degreesOfFreedom: Math.max(1, ladder.length - 2), shelfCorrected: false, bearing: null });
        const mean = ladder.reduce((sum, frequencyHz) => sum + frequencyHz / ladder.length, 0);
        expectWithin(line.meanFrequencyHz, mean, ratio(1e-12, "rounding"));
      }),
    );
  });

  it("starts as much later as all its readings are", () => {
    fc.assert(
      fc.property(noisy, evenly(-1e7, 1e7), (readings, later) => {
        const line = fitted(readings);
        const moved = fitted(readings.map((reading) => ({ ...reading, arrivalEpochSeconds: reading.arrivalEpochSeconds + later })));
        expectWithin(moved.originEpochSeconds - line.originEpochSeconds, later, seconds(0.01, "times near 1.6e9 s carry 2e-7 s"));
        expectWithin(moved.distanceMetres, line.distanceMetres, ratio(1e-7, "times near 1.6e9 s carry 2e-7 s"));
        expectWithin(moved.covariance.originVariance, line.covariance.originVariance, ratio(1e-5, "rounding of residuals"));
      }),
    );
  });

  it("lies as many times farther as its times are stretched, and as its frequencies are lowered", () => {
    fc.assert(
      fc.property(noisy, evenly(0.6, 1.3), (readings, factor) => {
        const line = fitted(readings);
        const stretched = fitted(
          readings.map((reading) => ({
            ...reading,
            arrivalEpochSeconds: ORIGIN + factor * (reading.arrivalEpochSeconds - ORIGIN),
            arrivalSigmaSeconds: factor * reading.arrivalSigmaSeconds,
          })),
        );
        const close = ratio(1e-6, "rounding of residuals");
        expectWithin(stretched.distanceMetres, factor * line.distanceMetres, close);
        expectWithin(stretched.covariance.distanceVariance, factor ** 2 * line.covariance.distanceVariance, close);
        expectWithin(stretched.reducedChiSquare ?? NaN, line.reducedChiSquare ?? NaN, close);
        const lowered = fitted(readings.map((reading) => ({ ...reading, frequencyHz: reading.frequencyHz / factor })));
        expectWithin(lowered.distanceMetres, factor * line.distanceMetres, close);
        expectWithin(lowered.originEpochSeconds, line.originEpochSeconds, seconds(0.1, "rounding of residuals"));
      }),
    );
  });

  it("is the same to the last bit in any order, and with readings told twice", () => {
    fc.assert(
      fc.property(noisy, fc.integer(), (readings, seed) => {
        const random = randomStream(seed);
        const shuffled = [...readings, ...readings.slice(1, 4)]
          .map((reading) => ({ reading, key: random.uniform() }))
          .sort((a, b) => a.key - b.key)
          .map(({ reading }) => reading);
        expect(fitDispersionLine(shuffled, DEFAULT_SETTINGS)).toEqual(fitDispersionLine(readings, DEFAULT_SETTINGS));
      }),
    );
  });

  it("does not depend on which of two readings alike states the larger error, and carries that one", () => {
    const readings = readingsOf(6e6, even(8).map((frequencyHz) => ({ frequencyHz, sigmaSeconds: 900 })));
    const [first] = readings;
    if (!first) throw new Error("there are eight");
    const surer = { ...first, arrivalSigmaSeconds: 60, row: 40 };
    const wider = { ...first, arrivalSigmaSeconds: 7200, frequencySigmaHz: 0.001, row: 41 };
    const both = fitted([surer, ...readings.slice(1), wider]);
    expect(fitted([wider, ...readings.slice(1), surer])).toEqual(both);
    expect({ ...both, notes: [] }).toEqual(fitted([wider, ...readings.slice(1)]));
    expect(both.notes).toEqual([{ code: "readings-alike", message: expect.stringContaining("rows 40 and 41.") as string }]);
  });

  it("goes through two readings with the errors that these state", () => {
    fc.assert(
      fc.property(distances, evenly(60, 3600), evenly(60, 3600), evenly(0.005, 0.04), (distanceMetres, firstSigma, secondSigma, run) => {
        const readings = readingsOf(distanceMetres, [
          { frequencyHz: 0.05, sigmaSeconds: firstSigma },
          { frequencyHz: 0.05 + run, sigmaSeconds: secondSigma },
        ]);
        const outcome = fitDispersionLine(readings, DEFAULT_SETTINGS);
        const slopeSigma = Math.hypot(firstSigma, secondSigma) / run;
        const isKnown = SECONDS_PER_METRE_AND_HERTZ * distanceMetres > 2 * slopeSigma;
        expect(outcome.kind).toBe(isKnown ? "fitted" : "refused");
        if (outcome.kind !== "fitted") return;
        const close = ratio(1e-7, "rounding");
        const { line } = outcome;
        expectWithin(line.distanceMetres, distanceMetres, close);
        expectWithin(Math.sqrt(line.covariance.distanceVariance), slopeSigma / SECONDS_PER_METRE_AND_HERTZ, close);
        // t0 = t1 (1 + f1 / run) - t2 f1 / run
        const lever = 0.05 / run;
        expectWithin(Math.sqrt(line.covariance.originVariance), Math.hypot((1 + lever) * firstSigma, lever * secondSigma), close);
        const covariance = -((1 + lever) * firstSigma ** 2 + lever * secondSigma ** 2) / run / SECONDS_PER_METRE_AND_HERTZ;
        expectWithin(line.covariance.distanceOriginCovariance, covariance, close);
        expect(line).toMatchObject({ reducedChiSquare: null, pValue: null, effectiveReadings: 2, degreesOfFreedom: 1 });
      }),
    );
  });

  it("widens with the stated errors, and with scatter beyond them, never below them", () => {
    const pattern = [0.4, -0.9, 0.7, -0.2, -0.6, 1.1, -0.8, 0.5, 0.3, -0.5]; // no neighbours alike, none an outlier
    const widthAt = (scatter: number, sigmaSeconds: number) => {
      const samples = even(10).map((frequencyHz, i) => ({ frequencyHz, offSeconds: scatter * (pattern[i] ?? NaN), sigmaSeconds }));
      return Math.sqrt(fitted(readingsOf(6e6, samples)).covariance.distanceVariance);
    };
    const stated = widthAt(0, 1800);
    expectWithin(widthAt(900, 1800), stated, ratio(1e-9, "scatter below the stated errors does not narrow them"));
    expectWithin(widthAt(0, 3600), 2 * stated, ratio(1e-9, "twice the errors"));
    expect(widthAt(5400, 1800)).toBeGreaterThan(1.5 * stated);
    expectWithin(widthAt(10_800, 1800), 2 * widthAt(5400, 1800), ratio(1e-6, "scatter alone counts there"));
  });

  it("pushes a reading down that is a day out, names it, and is not dragged along", () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 11 }), fc.constantFrom(-86_400, 86_400), fc.integer({ min: 0, max: 1e6 }), (wrong, out, seed) => {
        const random = randomStream(seed);
        const samples = even(12).map((frequencyHz, i) => ({ frequencyHz, offSeconds: 900 * random.normal() + (i === wrong ? out : 0) }));
        const line = fitted(readingsOf(6e6, samples));
        expect(line.downweightedRows).toContain(wrong + 2);
        expect(line.downweightedRows.length).toBeLessThanOrEqual(2);
        expectWithin(line.distanceMetres, 6e6, ratio(0.04, "a day out at one end would move the line by up to 16 %"));
      }),
      { numRuns: 60 },
    );
  });
});

describe("a reading far off at an end, where it bears most on the slope", () => {
  it.each([[0, 10], [7, 10], [0, 3], [7, 3], [7, -10], [0, -1]])("does not carry the line along: reading %d, %d days out", (wrong, days) => {
    const samples = even(8).map((frequencyHz, i) => ({ frequencyHz, offSeconds: 900 * Math.sin(7 * i) + (i === wrong ? 86_400 * days : 0) }));
    const line = fitted(readingsOf(6e6, samples));
    expect(line.downweightedRows).toEqual([wrong + 2]);
    expectWithin(line.distanceMetres, 6e6, ratio(0.07, "least squares alone would start tens of per cent off"));
  });
  it("is left out among many readings too", () => {
    const samples = even(150).map((frequencyHz, i) => ({ frequencyHz, offSeconds: 900 * Math.sin(7 * i) + (i % 10 === 9 ? 4 * 86_400 : 0) }));
    const line = fitted(readingsOf(6e6, samples));
    expect(line.downweightedRows).toEqual(samples.flatMap(({ offSeconds }, i) => (offSeconds > 86_400 ? [i + 2] : [])));
    expectWithin(line.distanceMetres, 6e6, ratio(0.02, "a tenth of them are wrong"));
  });
  it("counts for less from two and a half standard deviations on (huber-1964, one good reading in eighty)", () => {
    const rowsAt = (sigmas: number) => {
      const samples = even(41).map((frequencyHz, i) => ({ frequencyHz, offSeconds: i === 20 ? 1800 * sigmas : 0 }));
      return fitted(readingsOf(6e6, samples)).downweightedRows;
    };
    // One of 41 readings takes a fortieth of its own miss with it.
    expect(rowsAt(2.5)).toEqual([]);
    expect(rowsAt(2.6)).toEqual([22]);
    expect(rowsAt(-2.6)).toEqual([22]);
  });
});

describe("what the line says of its own errors", () => {
  const frequencies = even(16);
  const runs = 1500;
  /** Fits of independent Gaussian errors of the stated size, or of errors that neighbours share. */
  const lines = (memory: number) =>
    Array.from({ length: runs }, (_, run) => {
      const random = randomStream(77, run);
      let off = random.normal();
      const samples = frequencies.map((frequencyHz) => {
        const offSeconds = 1800 * off;
        off = memory * off + Math.sqrt(1 - memory ** 2) * random.normal();
        return { frequencyHz, offSeconds };
      });
      return fitted(readingsOf(6e6, samples));
    });
  const independent = lines(0);

  it("agrees with how much fits of fresh errors differ", () => {
    const metres = 1 / SECONDS_PER_METRE_AND_HERTZ;
    const mean = frequencies.reduce((sum, f) => sum + f / frequencies.length, 0);
    const spread = frequencies.reduce((sum, f) => sum + (f - mean) ** 2, 0);
    const variance = (values: readonly number[], about: number) => values.reduce((sum, value) => sum + (value - about) ** 2 / runs, 0);
    // Three standard deviations of a variance from 1500 draws are 11 %; pushing down outliers costs some 1 %.
    const chance = ratio(0.12, "a variance from 1500 draws, three standard deviations");
    expectWithin(variance(independent.map((line) => line.distanceMetres), 6e6), (1800 * metres) ** 2 / spread, chance);
    const originVariance = 1800 ** 2 * (1 / frequencies.length + mean ** 2 / spread);
    expectWithin(variance(independent.map((line) => line.originEpochSeconds), ORIGIN), originVariance, chance);
    const product = independent.reduce((sum, line) => sum + ((line.distanceMetres - 6e6) * (line.originEpochSeconds - ORIGIN)) / runs, 0);
    expectWithin(product, (-(1800 ** 2) * metres * mean) / spread, chance);
  });

  it("states no less than the errors ask for, with their correlation", () => {
    for (const { covariance, effectiveReadings, reducedChiSquare } of independent.slice(0, 200)) {
      const { distanceVariance, originVariance, distanceOriginCovariance } = covariance;
      expect(distanceOriginCovariance / Math.sqrt(distanceVariance * originVariance)).toBeLessThan(-0.95);
      expect(effectiveReadings).toBeLessThanOrEqual(16);
      const least = (1800 / SECONDS_PER_METRE_AND_HERTZ) ** 2 / frequencies.reduce((sum, f) => sum + (f - 0.0625) ** 2, 0);
      const inflation = (16 / effectiveReadings) * Math.max(1, reducedChiSquare ?? NaN);
      expect(distanceVariance).toBeGreaterThan(0.999 * least * inflation);
      expect(distanceVariance).toBeLessThan(1.6 * least * inflation); // a few pushed down
    }
  });

  it.each([{ memory: 0 }, { memory: 0.5 }])("holds the truth within its 1-sigma distance often enough (memory $memory)", ({ memory }) => {
    const drawn = memory === 0 ? independent : lines(memory);
    const held = drawn.filter(({ distanceMetres, covariance }) => (distanceMetres - 6e6) ** 2 <= covariance.distanceVariance).length;
    // Gauss gives 68.3 % for known errors; 1500 draws leave it 3.6 % uncertain. Readings that share errors are counted as fewer.
    expect(held / runs).toBeGreaterThan(memory === 0 ? 0.647 : 0.6);
    expect(held / runs).toBeLessThan(0.9);
  });
});

describe("periods timed at a moment", () => {
  const g = 9.80665;
  /** L_apparent = L (1 + sigma_f^2 / S^2), sigma_f = T g / (4 pi L): method.md 2.1. */
  const apparentOf = (distanceMetres: number, durationSeconds = 6 * 3600, widthHz = 0.012) =>
    distanceMetres * (1 + ((durationSeconds * g) / (4 * Math.PI * distanceMetres) / widthHz) ** 2);
  /** The true distance under an apparent one, by halving. */
  const trueOf = (apparentMetres: number, durationSeconds: number, widthHz: number) => {
    let [low, high] = [(durationSeconds * g) / (4 * Math.PI * widthHz), apparentMetres];
    for (let i = 0; i < 80; i += 1) {
      const middle = (low + high) / 2;
      if (apparentOf(middle, durationSeconds, widthHz) < apparentMetres) low = middle;
      else high = middle;
    }
    return low;
  };
  /** Readings on the line that looks too flat, turned about the peak of the swell's spectrum. */
  const timedReadings = (distanceMetres: number, frequencies: readonly number[]) => {
    const pivotHz = frequencies.reduce((sum, f) => sum + f / frequencies.length, 0);
    const factor = apparentOf(distanceMetres) / distanceMetres;
    const onLine = readingsOf(distanceMetres, frequencies.map((frequencyHz) => ({ frequencyHz, sigmaSeconds: 300, frequencySigmaHz: 0.0015, kind: "timed" as const })));
    return onLine.map((reading) => ({ ...reading, frequencyHz: pivotHz + (reading.frequencyHz - pivotHz) / factor }));
  };

  it("look too far by the formula, and are brought back to the truth", () => {
    fc.assert(
      fc.property(evenly(2.2e6, 1.5e7), (distanceMetres) => {
        const line = fitted(timedReadings(distanceMetres, even(12)));
        expectWithin(line.distanceMetres, distanceMetres, ratio(1e-6, "the search for the line settles to 1e-13"));
        expectWithin(line.originEpochSeconds, ORIGIN, seconds(1, "likewise, over a lever of days"));
        const excess = apparentOf(distanceMetres) / distanceMetres - 1;
        expect(line.notes.map(({ code }) => code)).toEqual(excess > 0.5 ? ["timed-distance-weak"] : []);
      }),
    );
  });

  it("warn where the correction is more than half", () => {
    const [line] = [fitted(timedReadings(1.9e6, even(12)))];
    expect(line.notes).toHaveLength(1);
    expect(line.notes[0]?.message).toContain("55 % too far");
  });

  it("carry what the duration and the width leave open into the covariance, half of it either way", () => {
    const distanceMetres = 5e6;
    const apparent = apparentOf(distanceMetres);
    const line = fitted(timedReadings(distanceMetres, even(12)));
    // One sigma of T / S: 50 % of the duration and a third of the width, taken together.
    const relative = Math.hypot(0.5, 1 / 3);
    const near = trueOf(apparent, 6 * 3600 * (1 + relative), 0.012);
    const far = trueOf(apparent, 6 * 3600 * (1 - relative), 0.012);
    const [shift] = line.sharedShifts;
    expect(line.sharedShifts).toHaveLength(1);
    expect(shift?.cause).toBe("timed-readings");
    expectWithin(shift?.distanceMetres ?? NaN, (far - near) / 2, ratio(1e-5, "rounding"));
    // The line turns about the mean frequency of the readings, so t0 moves by the slope's change times it.
    expectWithin(shift?.originSeconds ?? NaN, (-SECONDS_PER_METRE_AND_HERTZ * 0.0625 * (far - near)) / 2, ratio(1e-5, "rounding"));
    const asRidge = fitted(readingsOf(distanceMetres, even(12).map((frequencyHz) => ({ frequencyHz, sigmaSeconds: 300, frequencySigmaHz: 0.0015 * (apparent / distanceMetres) }))));
    const own = asRidge.covariance;
    const [dL, dT] = [shift?.distanceMetres ?? NaN, shift?.originSeconds ?? NaN];
    const stretched = ratio(0.1, "the same errors on a denser line");
    expectWithin(line.covariance.distanceVariance, own.distanceVariance + dL ** 2, stretched);
    expectWithin(line.covariance.originVariance, own.originVariance + dT ** 2, stretched);
    expectWithin(line.covariance.distanceOriginCovariance, own.distanceOriginCovariance + dL * dT, stretched);
  });

  it("take the settings' duration and width, and no correction from a storm of no duration", () => {
    const readings = timedReadings(5e6, even(12));
    const at = (durationSeconds: number, spectrumWidthHz: number) => fitted(readings, { ...DEFAULT_SETTINGS, timed: { durationSeconds, spectrumWidthHz } }).distanceMetres;
    expectWithin(at(0, 0.012), apparentOf(5e6), ratio(1e-6, "uncorrected"));
    expectWithin(at(4 * 3600, 0.02), trueOf(apparentOf(5e6), 4 * 3600, 0.02), ratio(1e-6, "rounding"));
  });

  it("hold the factor at two where no storm could look so near", () => {
    const flat = readingsOf(2e6, even(12).map((frequencyHz) => ({ frequencyHz, sigmaSeconds: 300, kind: "timed" as const })));
    expectWithin(fitted(flat).distanceMetres, 1e6, ratio(1e-6, "half of what it looks"));
  });

  it("leave readings from spectra beside them as they are", () => {
    const ridge = readingsOf(5e6, even(8, 0.05, 0.075).map((frequencyHz) => ({ frequencyHz, sigmaSeconds: 600 })));
    const line = fitted([...timedReadings(5e6, even(12)), ...ridge]);
    expectWithin(line.distanceMetres, 5e6, ratio(1e-6, "both lie on the true line"));
    const [single] = timedReadings(5e6, [0.0625]);
    expectWithin(fitted([...ridge, ...(single ? [single] : [])]).distanceMetres, 5e6, ratio(1e-6, "a single one is its own mean frequency"));
    expect(Math.abs(line.sharedShifts[0]?.distanceMetres ?? NaN)).toBeLessThan(Math.abs(fitted(timedReadings(5e6, even(12))).sharedShifts[0]?.distanceMetres ?? NaN));
  });
});

describe("readings that make no line", () => {
  const codeOf = (outcome: LineOutcome) => (outcome.kind === "refused" ? outcome.code : outcome.kind);
  const fit = (readings: readonly Reading[]) => fitDispersionLine(readings, DEFAULT_SETTINGS);
  const one = readingsOf(5e6, [{ frequencyHz: 0.05 }]);

  it("are refused where there are fewer than two that differ", () => {
    expect(codeOf(fit([]))).toBe("too-few-readings");
    expect(fit([])).toMatchObject({ message: "At least two distinct readings are needed; there is none." });
    expect(fit(one)).toMatchObject({ code: "too-few-readings", message: "At least two distinct readings are needed; there is one." });
    expect(codeOf(fit([...one, ...one, ...one]))).toBe("too-few-readings");
  });
  it("are refused where all have one frequency", () => {
    const same = one.flatMap((reading) => [reading, { ...reading, arrivalEpochSeconds: reading.arrivalEpochSeconds + 9000 }]);
    expect(fit(same)).toMatchObject({ code: "slope-undetermined", message: expect.stringContaining("one frequency") as string });
  });
  it("are refused where frequencies differ by rounding alone, and where no distance from the line can be told", () => {
    const rounding = [0.05, 0.05000000000000001, 0.05].map((frequencyHz, i) => ({ frequencyHz, offSeconds: 3600 * i }));
    expect(codeOf(fit(readingsOf(5e6, rounding)))).toBe("slope-undetermined");
    const atOnce = even(4).map((frequencyHz) => ({ frequencyHz, frequencySigmaHz: 0.001, sigmaSeconds: 0, kind: "timed" as const }));
    expect(codeOf(fit(readingsOf(0, atOnce)))).toBe("slope-undetermined");
  });
  it("are none that only seem to have no start: most of one frequency, evenly chosen", () => {
    const samples = Array.from({ length: 120 }, (_, i) => ({ frequencyHz: i < 119 ? 0.05 : 0.06, offSeconds: i < 119 ? i - 59 : 0 }));
    expectWithin(fitted(readingsOf(8e6, samples)).distanceMetres, 8e6, ratio(1e-3, "a minute over a lever of a day"));
  });
  it("are a value too, whatever the reader lets through, and a line's numbers are numbers", () => {
    const extremes = fc.record({
      arrivalEpochSeconds: fc.oneof(fc.constantFrom(ORIGIN, ORIGIN + 0.001, 0, -6e10, 2e11), evenly(ORIGIN, ORIGIN + 1e6)),
      frequencyHz: fc.oneof(fc.constantFrom(0.001, 0.05, 0.05000000000000001, 2), evenly(0.04, 0.1)),
      arrivalSigmaSeconds: fc.constantFrom(0, 0.001, 1800, 2_592_000),
      frequencySigmaHz: fc.constantFrom(1e-9, 0.0005, 1),
      kind: fc.constantFrom("ridge" as const, "timed" as const),
      row: fc.integer({ min: 2, max: 99 }),
      bearing: fc.option(fc.record({ comesFromDegrees: evenly(0, 360), sigmaDegrees: fc.constantFrom(1e-9, 5, 180) })),
    });
    const timed = fc.record({ durationSeconds: fc.constantFrom(0, 1, 21_600, 1e6), spectrumWidthHz: fc.constantFrom(1e-6, 0.012, 1) });
    fc.assert(
      fc.property(fc.array(extremes, { minLength: 1, maxLength: 70, size: "max" }), timed, (readings, window) => {
        const outcome = fitDispersionLine(readings, { ...DEFAULT_SETTINGS, timed: window });
        if (outcome.kind !== "fitted") return;
        const { distanceMetres, originEpochSeconds, covariance } = outcome.line;
        const { distanceVariance, originVariance, distanceOriginCovariance } = covariance;
        expect([distanceMetres, originEpochSeconds, distanceVariance, originVariance, distanceOriginCovariance].every(Number.isFinite)).toBe(true);
        expect(Math.min(distanceMetres, distanceVariance, originVariance)).toBeGreaterThan(0);
      }),
      { numRuns: 400 },
    );
  });
  it("are refused where the period rises with time", () => {
    expect(codeOf(fit(readingsOf(-5e6, even(6).map((frequencyHz) => ({ frequencyHz })))))).toBe("period-rises");
    const timed = readingsOf(-5e6, even(6).map((frequencyHz) => ({ frequencyHz, sigmaSeconds: 300, kind: "timed" as const })));
    for (const durationSeconds of [0, 21_600]) {
      expect(codeOf(fitDispersionLine(timed, { ...DEFAULT_SETTINGS, timed: { durationSeconds, spectrumWidthHz: 0.012 } }))).toBe("period-rises");
    }
  });
  it("are refused where they lie too close together for a slope", () => {
    const close = [0.06, 0.0601].map((frequencyHz) => ({ frequencyHz, sigmaSeconds: 7200 }));
    expect(codeOf(fit(readingsOf(5e6, close)))).toBe("slope-undetermined");
    const risesALittle = [0.06, 0.0601].map((frequencyHz) => ({ frequencyHz, sigmaSeconds: 7200 }));
    expect(codeOf(fit(readingsOf(-5e6, risesALittle)))).toBe("slope-undetermined");
  });
  it("are refused from two standard deviations of the slope down, and told apart from periods that rise", () => {
    const slopeSigma = (1800 * Math.SQRT2) / 0.01;
    const at = (sigmas: number) => codeOf(fit(readingsOf((sigmas * slopeSigma) / SECONDS_PER_METRE_AND_HERTZ, [{ frequencyHz: 0.05 }, { frequencyHz: 0.06 }])));
    expect([2.05, 1.95, 0.1, -1.95, -2.05].map(at)).toEqual(["fitted", "slope-undetermined", "slope-undetermined", "slope-undetermined", "period-rises"]);
  });
  it("are refused beyond half the girth, with the distance that they ask for, and not before", () => {
    const at = (distanceMetres: number) => fit(readingsOf(distanceMetres, even(8).map((frequencyHz) => ({ frequencyHz, sigmaSeconds: 600 }))));
    expect(at(2.2e7)).toMatchObject({ code: "beyond-half-girth", message: expect.stringContaining("22000 km") as string });
    expect(codeOf(at(HALF_GIRTH_METRES + 1000))).toBe("beyond-half-girth");
    expect(codeOf(at(HALF_GIRTH_METRES - 1000))).toBe("fitted");
  });
});
