import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { NumberedStation } from "#lib/core/arrival/numbered-stations.ts";
import type { LineOutcome } from "#lib/core/arrival/line.ts";
import type { SourceAnswer, StationVerdict } from "#lib/core/source/answer.ts";
import { DEFAULT_SETTINGS } from "#lib/core/source/settings.ts";
import type { EventSolution } from "#lib/core/source/solution.ts";
import { answerWords } from "#lib/presentation/answer-words.ts";
import { checkWords } from "#lib/presentation/check-words.ts";
import { areaWords, distanceWords, uncertainDistanceWords } from "#lib/presentation/distances.ts";
import { figure, percentWords, probabilityFigure, pValueWords, roundedToError, signedFigure, twoLeadingDigits } from "#lib/presentation/figures.ts";
import { ringSigmas } from "#lib/core/source/ring-sigma.ts";
import { counted, listWords } from "#lib/presentation/numbers-in-words.ts";
import { positionWords } from "#lib/presentation/positions.ts";
import { stationRows } from "#lib/presentation/station-rows.ts";
import { dayWords, momentWords, plusMinusHours, signedHoursFigure, uncertainMomentWords } from "#lib/presentation/times.ts";
import { expectWithin } from "#tests/support/expect-within.ts";

/** Reads as people write it: hard and thin spaces are spaces, the minus sign is a hyphen. */
const plain = (text: string): string => text.replace(/[\u00a0\u202f]/g, " ").replace(/\u2212/g, "-");
const HOUR = 3600;
const NOON = Date.UTC(2031, 1, 9, 12) / 1000;

describe("figures", () => {
  it("are grouped by threes, with a true minus and no negative zero", () => {
    expect([0, 999, 1000, 12_345, 1_234_567, -5204, -0.4].map((value) => plain(figure(value)))).toStrictEqual(["0", "999", "1 000", "12 345", "1 234 567", "-5 204", "0"]);
    expect([12.34, -0.04, 999.96].map((value) => plain(figure(value, 1)))).toStrictEqual(["12.3", "0.0", "1 000.0"]);
    expect([NaN, Infinity].map((value) => figure(value))).toStrictEqual(["–", "–"]);
    expect([38, -61, 0, 0.4, -0.4].map((value) => plain(signedFigure(value)))).toStrictEqual(["+38", "-61", "0", "0", "0"]);
    expect(figure(-1)).toBe("\u22121");
    expect(figure(1000)).toBe("1\u202f000");
  });

  it("say a probability without ever saying certain", () => {
    expect([0, 0.004, 0.005, 0.61, 0.994, 0.995, 0.9999, 1].map(probabilityFigure)).toStrictEqual(["<0.01", "<0.01", "0.01", "0.61", "0.99", ">0.99", ">0.99", ">0.99"]);
    expect([0.004, 0.614, 0.999].map((p) => plain(pValueWords(p)))).toStrictEqual(["p < 0.01", "p = 0.61", "p > 0.99"]);
    expect([0.5, 0.9, 0.95].map((p) => plain(percentWords(p)))).toStrictEqual(["50 %", "90 %", "95 %"]);
    fc.assert(
      fc.property(fc.double({ min: 0, max: 1, noNaN: true }), (p) => {
        expect(["0.00", "1.00"]).not.toContain(probabilityFigure(p));
      }),
    );
  });

  it("keep the digits that the error justifies, and no more", () => {
    expect(roundedToError(1780.4, 406.2)).toStrictEqual({ value: 1780, error: 410 });
    expect(roundedToError(5204.4, 154.4)).toStrictEqual({ value: 5200, error: 150 });
    expect(roundedToError(17_676, 1386)).toStrictEqual({ value: 17_700, error: 1400 });
    expect(roundedToError(812.3, 7.6)).toStrictEqual({ value: 812, error: 8 });
    fc.assert(
      fc.property(fc.double({ min: 0, max: 2e4, noNaN: true }), fc.double({ min: 10, max: 5e3, noNaN: true }), (value, error) => {
        const rounded = roundedToError(value, error);
        expectWithin(rounded.value, value, { absolute: error / 20 + 1e-9, unit: "km", because: "half a step of the error's second digit" });
        expectWithin(rounded.error, error, { relative: 0.051, unit: "km", because: "half a step of its second digit" });
      }),
    );
    expect([303_412, 99.6, 1_849_000].map(twoLeadingDigits)).toStrictEqual([300_000, 100, 1_800_000]);
  });
});

describe("distances and areas", () => {
  it("are said in the reader's unit; a nautical mile is 1852 m", () => {
    expect(plain(distanceWords(1_852_000, "nmi"))).toBe("1 000 nmi");
    expect(plain(distanceWords(1_852_000, "km"))).toBe("1 852 km");
    expect(plain(uncertainDistanceWords(1_780_400, 406_200, "km"))).toBe("1 780 ± 410 km");
    expect(plain(areaWords(303e9, "km"))).toBe("300 000 km²");
    expect(plain(areaWords(1852 ** 2 * 54_321, "nmi"))).toBe("54 000 nmi²");
    expect(plain(areaWords(42.4e6, "km"))).toBe("42 km²");
  });
});

describe("positions", () => {
  it("are said by hemisphere, to a tenth of a degree", () => {
    const said = ([latitudeDegrees, longitudeDegrees]: readonly [number, number]) => plain(positionWords({ latitudeDegrees, longitudeDegrees }));
    expect(said([43.62, 169.18])).toBe("43.6° N 169.2° E");
    expect(said([-59.94, -121.06])).toBe("59.9° S 121.1° W");
    expect(said([-0.04, 0.04])).toBe("0.0° 0.0°");
    expect(said([38.5, 188])).toBe("38.5° N 172.0° W");
  });
});

describe("times", () => {
  it("are UTC, to the minute or to what the error leaves", () => {
    const moment = NOON + 34 * 60 + 40;
    expect(plain(momentWords(moment))).toBe("9 Feb 2031 12:35 UTC");
    expect(plain(uncertainMomentWords(moment, 4 * HOUR))).toBe("9 Feb 2031 13:00 UTC");
    expect(plain(uncertainMomentWords(moment, HOUR / 2))).toBe("9 Feb 2031 12:30 UTC");
    expect(plain(uncertainMomentWords(Date.UTC(2031, 11, 31, 23, 40) / 1000, 5 * HOUR))).toBe("1 Jan 2032 00:00 UTC");
    expect(dayWords(NOON)).toBe("9 Feb 2031");
    expect([0.84, 1.94, 1.96, 4.2, 11.7].map((hours) => plain(plusMinusHours(hours * HOUR)))).toStrictEqual(["± 0.8 h", "± 1.9 h", "± 2 h", "± 4 h", "± 12 h"]);
    expect([1.14, -2, 0.01].map((hours) => plain(signedHoursFigure(hours * HOUR)))).toStrictEqual(["+1.1", "-2.0", "0.0"]);
  });
});

describe("counts and lists", () => {
  it("read as a sentence", () => {
    expect([listWords([]), listWords(["1"]), listWords(["1", "2"]), listWords(["1", "2", "3"])]).toStrictEqual(["", "1", "1 and 2", "1, 2 and 3"]);
    expect([counted(1, "station"), counted(6, "station")].map(plain)).toStrictEqual(["1 station", "6 stations"]);
  });
});

const position = { latitudeDegrees: 43.6, longitudeDegrees: 169.2 };
const stations: NumberedStation[] = ["Gannet Head", "Saltmarsh Pier", "Kelp Island"].map((name, i) => ({ number: i + 1, id: `s${i + 1}`, name, position }));
const estimate = (distanceMetres: number) => ({
  distanceMetres,
  originEpochSeconds: NOON,
  covariance: { distanceVariance: 30_000 ** 2, originVariance: HOUR ** 2, distanceOriginCovariance: 0 },
  sharedShifts: [],
  bearing: null,
});
const sentIn = (distanceMetres: number): LineOutcome => ({ kind: "sent-in", estimate: estimate(distanceMetres) });
const refused: LineOutcome = { kind: "refused", code: "too-few-readings", message: "At least two distinct readings are needed; there is one." };
const verdict = (id: string, more: Partial<StationVerdict> = {}): StationVerdict => ({
  id,
  residual: { distanceMetres: -61_000, originSeconds: 1.1 * HOUR },
  belongs: 0.97,
  leaveOneOutShiftMetres: 40_000,
  clockOffset: null,
  ...more,
});
const ANSWER: SourceAnswer = {
  outcome: "located",
  source: { position, originEpochSeconds: NOON + 900, originSigmaSeconds: 4 * HOUR, atPeak: true, onLand: false, bestInWater: null },
  regions: [0.5, 0.9, 0.95].map((probability) => ({ probability, areaSquareMetres: probability * 4e11, geometry: { type: "MultiPolygon", coordinates: [] } })),
  modes: [{ probability: 1, position, originEpochSeconds: NOON }],
  ruledOut: [],
  stations: [verdict("s1"), verdict("s2", { leaveOneOutShiftMetres: 88_000 }), verdict("s3")],
  crossings: [],
  fit: { chiSquare: 3, degreesOfFreedom: 3, pValue: 0.614, ringMissMetres: 54_000 },
  drift: { shiftMetres: 63_000, shiftSeconds: HOUR, significant: false },
  spreadRaisedBy: 1,
  warnings: [],
};
const solution = (answer: SourceAnswer | null, outcomes: readonly LineOutcome[] = [sentIn(5_204_000), sentIn(5_985_000), sentIn(3_862_000)]): EventSolution => ({
  stations: outcomes.map((outcome, i) => ({ id: `s${i + 1}`, name: stations[i]?.name ?? "", position, outcome })),
  answer,
  warnings: [],
});
const words = (said: EventSolution) => {
  const { large, time, sources, verdict: found, sentence } = answerWords({ solution: said, stations, settings: DEFAULT_SETTINGS, unit: "km" });
  const places = sources.map((source) => [source.mark, source.place, source.probability, source.time].join(" "));
  return plain([...large, time ?? "-", ...places, found, sentence].join(" | "));
};
const checks = (answer: SourceAnswer, outcomes?: readonly LineOutcome[]) => {
  const said = checkWords({ answer, solution: solution(answer, outcomes), stations, settings: DEFAULT_SETTINGS, unit: "km" });
  return { leavingOneOut: plain(said.leavingOneOut), drift: plain(said.drift), clocks: said.clocks.map(plain) };
};

describe("the answer in words", () => {
  it("says place, time, agreement and region of a located storm", () => {
    expect(words(solution(ANSWER))).toBe("43.6° N | 169.2° E | 9 Feb 2031 12:00 UTC ± 4 h | Located. | All three stations agree (p = 0.61). The 95 % region covers 380 000 km².");
  });

  it("does not count a stray station among those that agree, nor a wrong clock", () => {
    const stray = { ...ANSWER, stations: [verdict("s1"), verdict("s2", { belongs: 0.03 }), verdict("s3")] };
    expect(words(solution(stray))).toContain("Two stations of three agree (p = 0.61).");
    const clock = { ...ANSWER, stations: [verdict("s1"), verdict("s2", { clockOffset: { offsetSeconds: 24 * HOUR, sigmaSeconds: 5 * HOUR } }), verdict("s3")] };
    expect(words(solution(clock))).toContain("All three stations agree, but for the clock of 2 (p = 0.61).");
    expect(checks(clock).clocks).toStrictEqual(["2 looks 24 ± 5 h fast: check its clock and dates"]);
  });

  it("says where the best point in water is when the best point lies on land", () => {
    const ashore: SourceAnswer = { ...ANSWER, source: { position, originEpochSeconds: NOON, originSigmaSeconds: HOUR, atPeak: true, onLand: true, bestInWater: { latitudeDegrees: 42, longitudeDegrees: 170 } } };
    expect(words(solution(ashore))).toContain("The most probable point lies on land; the best one in water is 42.0° N 170.0° E.");
  });

  it("does not praise an agreement that is better than the errors allow", () => {
    const good = (pValue: number): string => words(solution({ ...ANSWER, fit: { chiSquare: 0.1, degreesOfFreedom: 3, pValue, ringMissMetres: 9000 } }));
    expect(good(0.992)).toContain("All three stations agree (p = 0.99). They agree better than the allowed errors expect: the region is probably cautious. The 95 % region");
    expect(good(0.98)).not.toContain("cautious");
  });

  it("makes none of the possible sources the answer", () => {
    const modes = [0.6, 0.4].map((probability, i) => ({ probability, position: { latitudeDegrees: 43.6 - 60 * i, longitudeDegrees: 169.2 }, originEpochSeconds: NOON }));
    expect(words(solution({ ...ANSWER, outcome: "several", modes }))).toBe(
      "Two possible sources | - | A 43.6° N 169.2° E 0.60 9 Feb 2031 12:00 UTC | B 16.4° S 169.2° E 0.40 9 Feb 2031 12:00 UTC | Not one place. | The arrivals fit each of these places with the probability beside it. Residuals, checks and sight lines are for A; its time is known to ± 4 h.",
    );
    expect(words(solution({ ...ANSWER, outcome: "several", modes: modes.slice(0, 1) }))).toContain("43.6° N | 169.2° E | 9 Feb 2031 12:00 UTC ± 4 h | Not surely placed. | The best source holds 0.60 of the probability; no other stands out.");
  });

  it("gives one station's distance with the whole error, the storm's growth included", () => {
    const alone = solution({ ...ANSWER, outcome: "ring-only", source: null, modes: [], fit: null, stations: [verdict("s1", { residual: null, belongs: null })] }, [sentIn(1_780_400)]);
    expect(words(alone)).toContain("1 780 ± 410 km | 9 Feb 2031 12:00 UTC ± 12 h | Distance only. | One station gives a ring and a time, not a place");
    expect(words(alone)).toContain("The error is more than the readings’ own 30 km: one station cannot tell a growing storm from a far one.");
    const { distanceSigmaMetres, originSigmaSeconds } = ringSigmas({ estimate: estimate(1_780_400), settings: DEFAULT_SETTINGS, spreadRaisedBy: 1 });
    // method: own error, 150 km, 4 h per 0.03 Hz by g / 4 pi, 2 % of the distance; and 1 h, 6 h, 4 h per 0.03 Hz at 0.075 Hz.
    expectWithin(distanceSigmaMetres, 1000 * Math.hypot(30, 150, ((4 * HOUR) / 0.03) * (9.80665 / (4 * Math.PI)) * 1e-3, 0.02 * 1780.4), { relative: 1e-9, unit: "m", because: "rounding" });
    expectWithin(originSigmaSeconds, HOUR * Math.hypot(1, 6, (4 / 0.03) * 0.075), { relative: 1e-9, unit: "s", because: "rounding" });
  });

  it("says what to do where there is no place", () => {
    expect(words(solution({ ...ANSWER, outcome: "no-agreement", source: null, modes: [] }))).toBe("No common source | - | No agreement. | These arrivals do not fit one storm. They miss a common point by 54 km (root mean square). Leave stations out, or look for two storms.");
    expect(words(solution(null, [refused]))).toBe("No place yet | - | Too few readings. | No ring could be drawn from Gannet Head; the table says why.");
    expect(words(solution(null, []))).toContain("Too few stations. | No station is included. Include one to see its ring, two or more to see a place.");
    const rising: LineOutcome = { kind: "refused", code: "period-rises", message: "The periods grow with time." };
    expect(words(solution(null, [refused, rising]))).toContain("No ring. | No ring could be drawn from Gannet Head and Saltmarsh Pier");
  });
});

describe("the checks in words", () => {
  it("name the station that moves the answer most, and what drift means", () => {
    expect(checks(ANSWER)).toStrictEqual({ leavingOneOut: "moves it at most 88 km (without 2)", drift: "63 km and 1.0 h apart, within the error: no drift seen", clocks: ["none suspect"] });
    const moved = { ...ANSWER, drift: { shiftMetres: 463_000, shiftSeconds: -5 * HOUR, significant: true } };
    expect(checks(moved).drift).toBe("463 km and 5 h apart, more than the error: a moving or long-lived storm");
  });

  it("tell too few stations from stations that leave no place", () => {
    const unmoved = ANSWER.stations.map((station) => ({ ...station, leaveOneOutShiftMetres: null }));
    expect(checks({ ...ANSWER, stations: unmoved }).leavingOneOut).toBe("leaves no place to compare");
    expect(checks({ ...ANSWER, stations: unmoved.slice(1) }).leavingOneOut).toBe("needs three stations");
    expect(checks({ ...ANSWER, drift: null }).drift).toBe("not checked: too few stations with readings enough in each half");
    expect(checks({ ...ANSWER, drift: null, stations: unmoved.slice(2) }).drift).toBe("needs two stations");
  });

  it("point at the dates of a stray whose distance fits, and of no other", () => {
    // The band of a ring of 5985 km: own error, 150 km, 2 % of the distance, and a tilt of 4 h per 0.03 Hz.
    const bandKm = Math.hypot(30, 150, 0.02 * 5985, (((4 * 3600) / 0.03) * 9.80665) / (4 * Math.PI) / 1000);
    const stray = (belongs: number, bands: number, hours: number) => {
      const residual = { distanceMetres: bands * bandKm * 1000, originSeconds: hours * HOUR };
      return checks({ ...ANSWER, stations: [verdict("s1"), verdict("s2", { belongs, residual }), verdict("s3")] }).clocks;
    };
    expect(stray(0.02, -1.99, -48.2)).toStrictEqual(["2 fits in distance and is 48 h early: look at its dates"]);
    expect(stray(0.49, 1.99, 72)).toStrictEqual(["2 fits in distance and is 72 h late: look at its dates"]);
    expect(stray(0.02, 2.01, -48)).toStrictEqual(["none suspect"]);
    expect(stray(0.51, 0.1, -48)).toStrictEqual(["none suspect"]);
  });
});

describe("the table of stations", () => {
  it("has a row for every station, with figures only where there are any", () => {
    const rows = stationRows({ stations, excludedIds: ["s3"], solution: solution({ ...ANSWER, stations: [verdict("s1")] }, [sentIn(5_204_000), refused]), settings: DEFAULT_SETTINGS, unit: "km" });
    expect(rows.map((row) => [row.included, row.refusal !== null, plain(row.ring), plain(row.residualDistance), row.residualHours, row.belongs, row.withoutIt])).toStrictEqual([
      [true, false, "5 204", "-61", "+1.1", "0.97", "40"],
      [true, true, "–", "–", "–", "–", "–"],
      [false, false, "–", "–", "–", "–", "–"],
    ]);
    // A station just left out, of which the answer before still speaks.
    const early = stationRows({ stations, excludedIds: ["s1"], solution: solution(ANSWER), settings: DEFAULT_SETTINGS, unit: "km" });
    expect(early.map(({ included, ring }) => [included, plain(ring)])).toStrictEqual([[false, "–"], [true, "5 985"], [true, "3 862"]]);
    const [first] = rows;
    // The error beside the ring is the readings' own; the bar is in parts of the band, which holds 150 km, 2 % of the
    // distance, and a tilt of 4 h per 0.03 Hz as well.
    expect(plain(first?.ringSigma ?? "")).toBe("± 30");
    const sigmaKm = Math.hypot(30, 150, 0.02 * 5204, (((4 * 3600) / 0.03) * 9.80665) / (4 * Math.PI) / 1000);
    expectWithin(first?.residualInSigmas ?? NaN, -61 / sigmaKm, { relative: 1e-9, unit: "sigma", because: "rounding" });
  });
});
