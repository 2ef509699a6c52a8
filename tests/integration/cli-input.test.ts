import { describe, expect, it } from "vitest";
import type { FitJson } from "#lib/contracts/fit-json.ts";
import type { LocateJson } from "#lib/contracts/locate-json.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { ridgeRows } from "#tests/support/ridge-rows.ts";
import { runOffing } from "#tests/support/run-offing.ts";

/** Invented stations about the North Pacific, and readings of an invented storm 5000 km from the first. */
const STATIONS = "id,name,latitude,longitude\nWEST,Invented West,35,140\nEAST,Invented East,37,-122\nMID,Invented Mid,21,-158\n";
const FREQUENCIES_HZ = [0.05, 0.055, 0.06, 0.065, 0.07, 0.075, 0.08];
const START = "2031-02-09T00:00:00Z";
const HEADER = "station,time,frequency_hz";
const ridge = (station: string, distanceKm: number, start = START): string[] => ridgeRows({ station, distanceKm, start, frequenciesHz: FREQUENCIES_HZ });
const csv = (header: string, rows: readonly string[]): string => `${[header, ...rows].join("\n")}\n`;

function locate({ stations = STATIONS, readings, json = true }: { readonly stations?: string; readonly readings: string; readonly json?: boolean }) {
  const args = ["locate", "--stations", "s.csv", "--readings", "r.csv", ...(json ? ["--json"] : [])];
  return runOffing({ args, files: { "s.csv": stations, "r.csv": readings } });
}

function fit(readings: string) {
  return runOffing({ args: ["fit", "--readings", "r.csv", "--json"], files: { "r.csv": readings } });
}

describe("wrong input ends with status 2, nothing on standard output, and a line for each problem", () => {
  it.each([
    ["NaN", csv("station,time,period_s", ["WEST,2031-02-11T00:00Z,18", "WEST,2031-02-11T06:00Z,NaN"]), [/^r\.csv, row 3, column period_s: found "NaN"; wanted a number of seconds from 0\.5 to 1000\.$/]],
    ["a local time without an offset", csv("station,time,period_s", ["WEST,2031-02-11T00:00,18"]), [/^r\.csv, row 2, column time: found "2031-02-11T00:00"; wanted a time that ends in Z or an offset/]],
    ["periods in milliseconds", csv("station,time,period_s", ["WEST,2031-02-11T00:00Z,18000", "WEST,2031-02-11T06:00Z,17"]), [/^r\.csv, row 2, column period_s: found "18000"; wanted a number of seconds from 0\.5 to 1000\.$/]],
    ["frequencies in millihertz", csv(HEADER, ["WEST,2031-02-11T00:00Z,55", "WEST,2031-02-11T06:00Z,0.06"]), [/^r\.csv, row 2, column frequency_hz: found "55"; wanted a number of hertz from 0\.001 to 2\.$/]],
    ["an error of a time beyond reason", csv(`${HEADER},time_sigma_s`, ["WEST,2031-02-11T00:00Z,0.05,1e300", "WEST,2031-02-11T06:00Z,0.06,1e-300"]), [
      /^r\.csv, row 2, column time_sigma_s: found "1e300"; wanted a number of seconds, 0 or from 0\.001 to 2592000\.$/,
      /^r\.csv, row 3, column time_sigma_s: found "1e-300"/,
    ]],
    ["an unknown station", csv(HEADER, [...ridge("WEST", 5000), ...ridge("NORTH", 5000).slice(0, 1)]), [/^r\.csv, row 9, column station: found "NORTH"; wanted a station of s\.csv \(WEST, EAST, MID\)\.$/]],
  ])("%s", (_, readings, lines) => {
    const run = locate({ readings });
    expect(run).toMatchObject({ status: 2, out: "" });
    expect(run.messages).toHaveLength(lines.length);
    lines.forEach((line, index) => expect(run.messages[index]).toMatch(line));
  });

  it("a sent-in ring beyond half the girth", () => {
    const arrivals = "station,distance_km,origin_time\nWEST,25000,2031-02-09T00:00Z\nEAST,5000,2031-02-09T00:00Z\n";
    const run = runOffing({ args: ["locate", "--stations", "s.csv", "--arrivals", "a.csv", "--json"], files: { "s.csv": STATIONS, "a.csv": arrivals } });
    expect(run).toMatchObject({ status: 2, out: "" });
    expect(run.messages).toEqual(["a.csv, row 2, column distance_km: found \"25000\"; wanted a number of kilometres from 0.001 to 20003, half the Earth's girth."]);
  });

  it.each([
    ["1e160", "12", /^a\.csv, row 2, column distance_sigma_km: found "1e160"; wanted a number of kilometres from 0\.001 to 20003\.$/],
    ["100", "1e160", /^a\.csv, row 2, column origin_time_sigma_h: found "1e160"; wanted a number of hours from 0\.001 to 720\.$/],
    ["1e-160", "12", /^a\.csv, row 2, column distance_sigma_km: found "1e-160"/],
  ])("errors of an estimate beyond reason: %s km and %s h", (sigmaKm, sigmaHours, line) => {
    const arrivals = `station,distance_km,origin_time,distance_sigma_km,origin_time_sigma_h\nWEST,5000,${START},${sigmaKm},${sigmaHours}\nEAST,6000,${START},100,12\n`;
    const run = runOffing({ args: ["locate", "--stations", "s.csv", "--arrivals", "a.csv", "--json"], files: { "s.csv": STATIONS, "a.csv": arrivals } });
    expect(run).toMatchObject({ status: 2, out: "" });
    expect(run.messages).toHaveLength(1);
    expect(run.messages[0]).toMatch(line);
  });

  it("latitude 95, beside a problem in another file", () => {
    const run = locate({ stations: STATIONS.replace("35,140", "95,140"), readings: csv("station,time,period_s", ["WEST,2031-02-11T00:00Z,-18"]) });
    expect(run).toMatchObject({ status: 2, out: "" });
    expect(run.messages).toHaveLength(2);
    expect(run.messages[0]).toMatch(/^s\.csv, row 2, column latitude: found "95"; wanted a latitude of -90 to 90 degrees/);
    expect(run.messages[1]).toMatch(/^r\.csv, row 2, column period_s: found "-18"/);
  });

  it.each([
    ["periods that rise", ridge("WEST", 5000).map((row, index) => `${row.slice(0, row.lastIndexOf(","))},${0.08 - 0.005 * index}`), /^Station WEST: The period rises with time/],
    ["one reading", ridge("WEST", 5000).slice(0, 1), /^Station WEST: At least two distinct readings/],
    ["equal times", FREQUENCIES_HZ.map((hz) => `WEST,2031-02-11T00:00Z,${hz}`), /^Station WEST: .*slope/],
    ["a ring beyond half the girth", ridge("WEST", 25_000), /^Station WEST: .*beyond half the Earth's girth/],
  ])("%s at the only station: none could be fitted", (_, rows, reason) => {
    for (const run of [locate({ readings: csv(HEADER, rows) }), fit(csv(HEADER, rows))]) {
      expect(run).toMatchObject({ status: 2, out: "" });
      expect(run.messages[0]).toBe("No station could be fitted.");
      expect(run.messages[1]).toMatch(reason);
    }
  });

  it("no stations file: not given, or not there", () => {
    const readings = csv(HEADER, ridge("WEST", 5000));
    const notGiven = runOffing({ args: ["locate", "--readings", "r.csv", "--json"], files: { "r.csv": readings } });
    expect(notGiven).toMatchObject({ status: 2, out: "" });
    expect(notGiven.messages).toEqual(["offing locate: found no --stations; wanted a file that says where the stations are. See: offing locate --help"]);
    const notThere = runOffing({ args: ["locate", "--stations", "s.csv", "--readings", "r.csv"], files: { "r.csv": readings } });
    expect(notThere).toMatchObject({ status: 2, out: "", messages: ["s.csv: found no such file; wanted a file that can be read."] });
  });

  it.each([
    ["no verb", [], /^offing <verb>/],
    ["an unknown verb", ["find"], /found "find"; wanted one of fit, locate/],
    ["a verb of a later version", ["scan", "--stations", "s.csv"], /^offing scan: not in this version/],
    ["an unknown option", ["fit", "--reading", "r.csv"], /^offing fit: Unknown option '--reading'/],
    ["an option twice", ["fit", "--readings", "r.csv", "--readings", "r.csv"], /--readings is given 2 times/],
    ["neither readings nor arrivals", ["locate", "--stations", "s.csv"], /neither --readings nor --arrivals/],
    ["a folder for a file", ["fit", "--readings", "."], /^\.: found a folder/],
    ["settings that do not exist", ["fit", "--readings", "r.csv", "--settings", "odd.json"], /^odd\.json, spread: found "kilometres"; wanted only settings that exist \(distanceKm, /],
    ["settings that are no JSON", ["fit", "--readings", "r.csv", "--settings", "r.csv"], /^r\.csv: found text that is not JSON/],
  ])("a wrong call: %s", (_, args, message) => {
    const run = runOffing({ args, files: { "r.csv": csv(HEADER, ridge("WEST", 5000)), "s.csv": STATIONS, "odd.json": '{"spread": {"kilometres": 3}}' } });
    expect(run).toMatchObject({ status: 2, out: "" });
    expect(run.messages[0]).toMatch(message);
  });
});

describe("odd input that has an answer ends with status 0", () => {
  it("one faulty station among good ones gets an error of its own, and the rest goes on", () => {
    const rising = ridge("MID", 4000).map((row, index) => `${row.slice(0, row.lastIndexOf(","))},${0.08 - 0.005 * index}`);
    const run = locate({ readings: csv(HEADER, [...ridge("WEST", 5000), ...ridge("EAST", 6000), ...rising]) });
    expect(run.status).toBe(0);
    const { stations, warnings, source } = JSON.parse(run.out) as LocateJson;
    expect(stations.map(({ id, error }) => [id, error !== undefined])).toEqual([["WEST", false], ["EAST", false], ["MID", true]]);
    expect(stations[2]).toMatchObject({ readingsUsed: 0, distanceKm: null, originTime: null, ringKm: null, belongs: null, clockOffset: null });
    expect(warnings.some(({ code, message }) => code === "period-rises" && message.startsWith("MID: "))).toBe(true);
    expect(source).not.toBeNull();
  });

  const MOMENT = "2031-02-11T00:00Z";
  it.each([
    ["frequencies that differ by rounding", `${HEADER},kind,time_sigma_s`, [0.05, 0.05000000000000001, 0.05].map((hz, hour) => `MID,2031-02-11T0${hour}:00Z,${hz},ridge,1800`)],
    ["four timed at one moment without an error of time", `${HEADER},kind,time_sigma_s`, [0.05, 0.055, 0.06, 0.065].map((hz) => `MID,${MOMENT},${hz},timed,0`)],
    ["three of four at one moment without an error of time", `${HEADER},kind,time_sigma_s`, [0.05, 0.055, 0.06].map((hz) => `MID,${MOMENT},${hz},timed,0`).concat("MID,2031-02-11T00:01Z,0.0600001,timed,0")],
  ])("one station of %s is the only one that is not fitted", (_, header, rows) => {
    const good = [...ridge("WEST", 5000), ...ridge("EAST", 6000)].map((row) => `${row},ridge,1800`);
    const run = locate({ readings: csv(header, [...good, ...rows]) });
    expect(run.status, run.messages.join("\n")).toBe(0);
    const { stations, source } = JSON.parse(run.out) as LocateJson;
    expect(stations.map(({ id, errorCode }) => [id, errorCode])).toEqual([["WEST", undefined], ["EAST", undefined], ["MID", "slope-undetermined"]]);
    expect(source).not.toBeNull();
    const alone = JSON.parse(fit(csv(header, [...good, ...rows])).out) as FitJson;
    expect(alone.stations[2]?.error).toMatch(/^[A-Z].*\.$/);
  });

  it("names once the stations without a shelf, and says of each whether its delay was taken off", () => {
    const stations = STATIONS.replace("longitude\n", "longitude,shelf\n").replace("35,140", "35,140,").replace("37,-122", "37,-122,20:60").replace("21,-158", "21,-158,");
    const files = { "s.csv": stations, "r.csv": csv(HEADER, [...ridge("WEST", 5000), ...ridge("EAST", 6000)]), "a.csv": `station,distance_km,origin_time\nMID,4000,${START}\n` };
    const args = ["--stations", "s.csv", "--readings", "r.csv", "--json"];
    for (const run of [runOffing({ args: ["locate", ...args, "--arrivals", "a.csv"], files }), runOffing({ args: ["fit", ...args], files })]) {
      const answer = JSON.parse(run.out) as FitJson;
      const said = answer.warnings.filter(({ code }) => code === "no-shelf").map(({ message }) => message);
      expect(said).toEqual(["No shelf profile is known, and so no delay over the shelf was taken off: WEST."]);
      expect(answer.stations.map(({ id, shelfCorrected }) => [id, shelfCorrected]).slice(0, 2)).toEqual([["WEST", false], ["EAST", true]]);
      expect(answer.stations.slice(2).map(({ shelfCorrected }) => shelfCorrected)).toEqual(answer.stations.slice(2).map(() => null));
    }
  });

  it("takes the larger error of rows alike in time and frequency, whichever stands first, and names them", () => {
    const rows = ridge("WEST", 5000);
    const answers = [["60", "1800"], ["1800", "60"]].map(([first = "", second = ""]) => {
      const alike = [`${rows[0]},${first}`, ...rows.slice(1).map((row) => `${row},900`), `${rows[0]},${second}`];
      return JSON.parse(fit(csv(`${HEADER},time_sigma_s`, alike)).out) as FitJson;
    });
    const alone = JSON.parse(fit(csv(`${HEADER},time_sigma_s`, rows.map((row, index) => `${row},${index === 0 ? 1800 : 900}`))).out) as FitJson;
    for (const { stations, warnings } of answers) {
      expect(stations).toEqual(alone.stations);
      expect(warnings.filter(({ code }) => code === "readings-alike").map(({ message }) => message)).toEqual([
        "WEST: Readings of one time and one frequency count once, with the largest of their errors: rows 2 and 9.",
      ]);
    }
    expect(alone.warnings.map(({ code }) => code)).not.toContain("readings-alike");
  });

  it("rings that miss each other by 3000 km are no agreement, not a failure", () => {
    // WEST and EAST stand 8300 km apart (spherical law of cosines): rings of 2650 km leave 3000 km between them.
    const run = locate({ readings: csv(HEADER, [...ridge("WEST", 2650), ...ridge("EAST", 2650)]) });
    expect(run.status).toBe(0);
    const answer = JSON.parse(run.out) as LocateJson;
    expect(answer).toMatchObject({ outcome: "no-agreement", source: null });
    expect(answer.warnings.some(({ code }) => code === "no-agreement")).toBe(true);
  });

  it("repeated rows count once, semicolons and a byte order mark are read: the answer is the plain file's", () => {
    const rows = [...ridge("WEST", 5000), ...ridge("EAST", 6000)];
    const odd = `\uFEFF${csv(HEADER, [...rows, ...rows.slice(0, 1)]).replaceAll(",", ";").replaceAll("\n", "\r\n")}`;
    const plain = JSON.parse(locate({ readings: csv(HEADER, rows) }).out) as LocateJson;
    const run = locate({ readings: odd });
    const answer = JSON.parse(run.out) as LocateJson;
    expect(answer.source).toEqual(plain.source);
    expect(answer.inputDigest).toBe(plain.inputDigest);
    expect(answer.warnings.filter(({ code }) => code === "duplicate-rows").map(({ message }) => message)).toEqual([
      "r.csv: repeated rows were used once: row 16 repeats row 2.",
    ]);
  });

  it("reads and fits 100,000 rows", () => {
    const frequencies = Array.from({ length: 50_000 }, (_, index) => 0.045 + index * 7e-7);
    const rows = [["WEST", 5000] as const, ["EAST", 6000] as const].flatMap(([station, distanceKm]) =>
      ridgeRows({ station, distanceKm, start: START, frequenciesHz: frequencies }),
    );
    const run = locate({ readings: csv(HEADER, rows) });
    expect(run.status, run.messages.join("\n")).toBe(0);
    expect((JSON.parse(run.out) as LocateJson).stations.map(({ readingsUsed }) => readingsUsed)).toEqual([50_000, 50_000]);
    expect(run.seconds).toBeLessThan(20);
  });

  it("fit needs no stations, says what it took them for, and echoes changed settings", () => {
    const args = ["fit", "--readings", "r.csv", "--settings", "g.json", "--json"];
    const run = runOffing({ args, files: { "r.csv": csv(HEADER, ridge("WEST", 5000)), "g.json": '{"gravity": 9.81}' } });
    expect(run.status).toBe(0);
    const answer = JSON.parse(run.out) as FitJson;
    expect(answer.settings.gravity).toBe(9.81);
    expect(answer.warnings.map(({ code }) => code)).toContain("stations-unknown");
    // Distances go as gravity: the rows were made with 9.80665.
    const because = "exact readings, times to the millisecond";
    expectWithin(answer.stations[0]?.distanceKm ?? Number.NaN, 5000 * (9.81 / 9.80665), { absolute: 0.1, unit: "km", because });
  });

  it.each([["--help"], ["fit", "--help"], ["locate", "--help"]])("%s %s explains on standard output", (...args) => {
    const run = runOffing({ args });
    expect(run).toMatchObject({ status: 0, messages: [] });
    expect(run.out).toMatch(/^offing /);
    expect(run.out).not.toMatch(/offing (arrivals|scan|onward)|^ +(arrivals|scan|onward) /m);
  });
});
