import { describe, expect, it } from "vitest";
import { readArrivalsCsv } from "#lib/records/arrivals-csv.ts";
import { parseIsoTime } from "#lib/core/units/parse-iso-time.ts";
import { readReadingsCsv } from "#lib/records/readings-csv.ts";
import { readStationsCsv } from "#lib/records/stations-csv.ts";
import { expectWithin } from "#tests/support/expect-within.ts";

// The defaults are those that the public contract of the files states.
const EXACT = { relative: 1e-12, because: "one multiplication" } as const;

describe("times", () => {
  it.each([
    // Unix times of these moments as GNU date prints them.
    ["1996-01-05T15:00Z", 820854000],
    ["2024-02-29T23:59:59Z", 1709251199],
    ["2024-02-28T04:30-10:00", 1709130600],
    ["2024-02-28 20:00:00+0530", 1709130600],
    ["2000-02-29t12:00z", 951825600],
    ["1969-12-31T23:00-01:00", 0],
  ])("%s", (text, epochSeconds) => {
    expect(parseIsoTime(text)).toEqual({ kind: "time", epochSeconds });
  });

  it("keeps fractions of a second", () => {
    const outcome = parseIsoTime("1970-01-01T00:00:01.250Z");
    expect(outcome).toEqual({ kind: "time", epochSeconds: 1.25 });
  });

  it.each([
    ["2024-02-28T04:30", "no-offset"],
    ["2024-02-28T04:30:00", "no-offset"],
    ["2023-02-29T00:00Z", "no-such-time"],
    ["1900-02-29T00:00Z", "no-such-time"],
    ["2024-04-31T00:00Z", "no-such-time"],
    ["2024-13-01T00:00Z", "no-such-time"],
    ["2024-01-01T24:00Z", "no-such-time"],
    ["2024-01-01T00:60Z", "no-such-time"],
    ["2024-01-01T00:00+15:00", "no-such-time"],
    ["2024-01-01T00:00+10:75", "no-such-time"],
    ["2024-01-01", "not-a-time"],
    ["01/02/2024 00:00Z", "not-a-time"],
    ["2024-1-1T00:00Z", "not-a-time"],
  ])("refuses %s", (text, kind) => {
    expect(parseIsoTime(text)).toEqual({ kind });
  });
});

describe("readings", () => {
  it("takes 1800 s and 0 Hz for a ridge, 300 s and 2.5 % of the period for timed periods, and says so", () => {
    const { value, notes } = readReadingsCsv("station,time,period_s,kind\nA,2031-02-09T00:00Z,20,\nA,2031-02-09T01:00Z,16,timed", "r.csv");
    const [ridge, timed] = value.map(({ reading }) => reading);
    expect(ridge).toEqual({
      arrivalEpochSeconds: Date.UTC(2031, 1, 9) / 1000, frequencyHz: 0.05, arrivalSigmaSeconds: 1800, frequencySigmaHz: 0, kind: "ridge", row: 2, bearing: null,
    });
    expect(timed).toMatchObject({ frequencyHz: 0.0625, arrivalSigmaSeconds: 300, kind: "timed", row: 3 });
    // sigma_f = sigma_T / T^2 with sigma_T = 2.5 % of 16 s.
    expectWithin(timed?.frequencySigmaHz ?? Number.NaN, 0.4 / 256, { ...EXACT, unit: "Hz" });
    expect(notes.map(({ message }) => message)).toEqual([
      "r.csv, 1 row: kind ridge and no time_sigma_s; 1800 s was used.",
      "r.csv, 1 row: kind ridge and no error of the period or frequency; 0 was used.",
      "r.csv, 1 row: kind timed and no time_sigma_s; 300 s was used.",
      "r.csv, 1 row: kind timed and no error of the period or frequency; 2.5 % of the period was used.",
    ]);
  });

  it("takes errors of period or frequency, bearings, and columns in any order", () => {
    const text = "bearing_sigma_deg,period_sigma_s,time_sigma_s,bearing_deg,period_s,time,station\n7,0.5,60,300,20,2031-02-09T00:00Z,A\n";
    const { value, notes } = readReadingsCsv(text, "r.csv");
    const reading = value[0]?.reading;
    expectWithin(reading?.frequencySigmaHz ?? Number.NaN, 0.5 / 400, { ...EXACT, unit: "Hz" });
    expect(reading).toMatchObject({ arrivalSigmaSeconds: 60, bearing: { comesFromDegrees: 300, sigmaDegrees: 7 } });
    expect(notes).toEqual([]);
  });

  it("uses the frequency where period and frequency agree", () => {
    const { value } = readReadingsCsv("station,time,period_s,frequency_hz\nA,2031-02-09T00:00Z,16.7,0.06", "r.csv");
    expect(value[0]?.reading.frequencyHz).toBe(0.06);
  });
});

describe("arrivals", () => {
  it("takes 8 %, 12 h and -0.9 where no errors are given, and says so", () => {
    const { value, notes } = readArrivalsCsv("station,distance_km,origin_time\nA,5000,2031-02-09T00:00Z", "a.csv");
    const covariance = value[0]?.estimate.covariance;
    expectWithin(covariance?.distanceVariance ?? Number.NaN, 400_000 ** 2, { ...EXACT, unit: "m2" });
    expectWithin(covariance?.originVariance ?? Number.NaN, 43_200 ** 2, { ...EXACT, unit: "s2" });
    expectWithin(covariance?.distanceOriginCovariance ?? Number.NaN, -0.9 * 400_000 * 43_200, { ...EXACT, unit: "m s" });
    expect(notes).toHaveLength(3);
  });

  it("takes what is given", () => {
    const header = "station,distance_km,origin_time,distance_sigma_km,origin_time_sigma_h,correlation";
    const { value, notes } = readArrivalsCsv(`${header}\nA,5000,2031-02-09T00:00Z,100,2,0`, "a.csv");
    expect(value[0]?.estimate).toMatchObject({
      distanceMetres: 5e6,
      covariance: { distanceVariance: 1e10, originVariance: 7200 ** 2, distanceOriginCovariance: 0 },
    });
    expect(notes).toEqual([]);
  });
});

describe("stations", () => {
  it("reads every column, and takes longitudes beyond 180 for west ones", () => {
    const header = "id,name,latitude,longitude,depth_m,sensor,faces_from_deg,faces_to_deg,record_minutes,stamp,time_zone,from,to,shelf";
    const row = 'A,"Invented, West",-20.5,200.25,35,ground,350,90,20,end,Pacific/Honolulu,2030-01-01T00:00Z,2031-01-01T00:00+10:00,12:40 35.5:90';
    expect(readStationsCsv(`${header}\n${row}`, "s.csv").value).toEqual([
      {
        stationId: "A", name: "Invented, West", position: { latitudeDegrees: -20.5, longitudeDegrees: -159.75 },
        depthMetres: 35, sensor: "ground", exposure: { facesFromDegrees: 350, facesToDegrees: 90 }, recordMinutes: 20, stamp: "end",
        timeZone: "Pacific/Honolulu", fromEpochSeconds: Date.UTC(2030, 0, 1) / 1000, toEpochSeconds: Date.UTC(2030, 11, 31, 14) / 1000,
        shelf: [{ lengthMetres: 12_000, depthMetres: 40 }, { lengthMetres: 35_500, depthMetres: 90 }],
      },
    ]);
  });

  it("takes deployments that follow one another", () => {
    const text = "id,name,latitude,longitude,from,to\nA,A,1,2,2031-01-01T00:00Z,\nA,A,1,3,,2031-01-01T00:00Z";
    expect(readStationsCsv(text, "s.csv").value.map(({ position }) => position.longitudeDegrees)).toEqual([2, 3]);
  });
});
