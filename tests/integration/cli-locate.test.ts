import { beforeAll, describe, expect, it } from "vitest";
import type { LocateJson } from "#lib/contracts/locate-json.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { ridgeRows } from "#tests/support/ridge-rows.ts";
import { runOffing, type OffingRun } from "#tests/support/run-offing.ts";

/**
 * Three rings about the storm of 24 February 2004 centred 42 N 160 E (Delpey, Ardhuin, Collard & Chapron 2010), with
 * published positions standing in for receivers. Distances computed on WGS84 by an independent geodesic program.
 */
const STORM = { latitude: 42, longitude: 160, start: "2004-02-24T00:00:00Z" };
const STATIONS = "id,name,latitude,longitude\nBER,Berkeley,37.87622,-122.23558\nPOM,Port Moresby,-9.4047,147.1597\nCHR,Christmas gauge,1.985,-157.4766667\n";
const DISTANCES_KM = { BER: 6425.863562, POM: 5840.800242, CHR: 6131.501629 } as const;
const FREQUENCIES_HZ = [0.05, 0.06, 0.07, 0.08];

/** Where each pair's rings cross the second time; computed from the same distances by the same program. */
const MIRRORS = [
  { pair: ["BER", "POM"], latitude: -8.32063, longitude: -159.70266 },
  { pair: ["BER", "CHR"], latitude: -17.91072, longitude: -105.24889 },
  { pair: ["POM", "CHR"], latitude: -51.47585, longitude: -174.16998 },
] as const;

type StationId = keyof typeof DISTANCES_KM;

function readings(ids: readonly StationId[]): string {
  const rows = ids.flatMap((station) => ridgeRows({ station, distanceKm: DISTANCES_KM[station], start: STORM.start, frequenciesHz: FREQUENCIES_HZ }));
  return ["station,time,frequency_hz", ...rows].join("\n");
}

function locate(ids: readonly StationId[], more: { readonly args?: readonly string[]; readonly settings?: string } = {}) {
  const files = { "s.csv": STATIONS, "r.csv": readings(ids), "off.json": more.settings ?? '{"sight": false}' };
  const args = ["locate", "--stations", "s.csv", "--readings", "r.csv", "--settings", "off.json", ...(more.args ?? ["--json"])];
  const run = runOffing({ args, files });
  expect(run.status, run.messages.join("\n")).toBe(0);
  return run;
}

function answerOf(ids: readonly StationId[]): LocateJson {
  return JSON.parse(locate(ids).out) as LocateJson;
}

/** Kilometres on a sphere: good to 0.6 %, which is metres at the distances compared here. */
function kilometresApart(a: { latitude: number; longitude: number }, b: { latitude: number; longitude: number }): number {
  const radians = (degrees: number): number => (degrees * Math.PI) / 180;
  const half = Math.sin(radians(a.latitude - b.latitude) / 2) ** 2 +
    Math.cos(radians(a.latitude)) * Math.cos(radians(b.latitude)) * Math.sin(radians(a.longitude - b.longitude) / 2) ** 2;
  return 2 * 6371.0088 * Math.asin(Math.sqrt(half));
}

describe("locate, on three rings about a known point", () => {
  const runs: OffingRun[] = [];
  const three = (): LocateJson => JSON.parse(runs[0]?.out ?? "") as LocateJson;

  beforeAll(() => {
    runs.push(locate(["BER", "POM", "CHR"]), locate(["BER", "POM", "CHR"]));
  });

  it("places the storm within 1 km and 1 minute from exact readings", () => {
    const answer = three();
    expect(answer.outcome).toBe("located");
    expect(answer.source).not.toBeNull();
    if (answer.source === null) return;
    const because = "exact readings leave only the search's own error";
    expectWithin(kilometresApart(answer.source, STORM), 0, { absolute: 1, unit: "km", because });
    expectWithin(Date.parse(answer.source.time) / 1000, Date.parse(STORM.start) / 1000, { absolute: 60, unit: "s", because });
  });

  it.each(MIRRORS)("keeps both crossings of $pair as possible sources, and gives them longitude first", ({ pair, ...mirror }) => {
    const answer = answerOf(pair);
    expect(["located", "several"]).toContain(answer.outcome);
    for (const crossing of [STORM, mirror]) {
      const nearest = Math.min(...answer.modes.map((mode) => kilometresApart(mode, crossing)));
      expectWithin(nearest, 0, { absolute: 50, unit: "km", because: "the spread's shared scale bends a two-ring mode by less than its error" });
    }
    // The published crossings, from distances printed to the millimetre, within 1 km.
    const [crossing] = answer.crossings;
    expect(crossing?.stations).toEqual(pair);
    for (const point of [STORM, mirror]) {
      const nearest = Math.min(...(crossing?.points ?? []).map(([longitude, latitude]) => kilometresApart({ latitude, longitude }, point)));
      expectWithin(nearest, 0, { absolute: 1, unit: "km", because: "rings drawn at the same distances cross at the same points" });
    }
  });

  it("says all that the contract lists, in its units", () => {
    const answer = three();
    expect(answer.program).toMatch(/^offing \d+\.\d+\.\d+$/);
    expect(answer.inputDigest).toMatch(/^[0-9a-f]{64}$/);
    expect(answer.settings).toEqual({
      gravity: 9.80665,
      spread: { distanceKm: 150, timeHours: 6, sharedCorrelation: 0.5, azimuthScaleDegrees: 30, tiltHours: 4, scaleFraction: 0.02 },
      belongPrior: 0.95,
      sight: false,
      timed: { durationHours: 6, spectrumWidthHz: 0.012 },
      band: { lowHz: 0.03, highHz: 0.12 },
    });
    expect(answer.regions.map(({ probability }) => probability)).toEqual([0.5, 0.9, 0.95]);
    for (const { geometry, areaKm2 } of answer.regions) {
      expect(geometry.type).toBe("MultiPolygon");
      expect(areaKm2).toBeGreaterThan(0);
    }
    for (const station of answer.stations) {
      const distanceKm = DISTANCES_KM[station.id as StationId];
      expectWithin(station.ringKm ?? Number.NaN, distanceKm, { absolute: 0.1, unit: "km", because: "exact readings, times to the millisecond" });
      expect(station.readingsUsed).toBe(4);
      expect(station.belongs).toBeGreaterThan(0.95);
      expect(station.residual).toEqual({ distanceKm: expect.any(Number) as number, timeHours: expect.any(Number) as number });
    }
    expect(answer.fit?.degreesOfFreedom).toBe(3);
    expect(answer.warnings.every(({ code, message }) => code !== "" && message !== "")).toBe(true);
  });

  it("answers in the same bytes each time", () => {
    expect(runs[1]?.out).toBe(runs[0]?.out);
  });

  it("answers people in text, with the caution, and keeps warnings off standard output", () => {
    const run = locate(["BER", "POM", "CHR"], { args: [] });
    expect(run.out).toContain("42.0°\u00a0N  160.0°\u00a0E");
    expect(run.out).toContain("Settings: sight false.");
    expect(run.out).toContain("Not for navigation and not a warning service");
    expect(run.out).not.toContain("Warning:");
    expect(run.messages.some((line) => line.startsWith("Warning: r.csv, 12 rows: kind ridge and no time_sigma_s; 1800 s was used."))).toBe(true);
  });
});
