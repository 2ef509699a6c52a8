import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { readShape } from "#lib/contracts/api/input-issues.ts";
import { newReadingShape } from "#lib/contracts/api/readings.ts";
import { clockAt, dayAfter, momentOf, readDate, readTimeOfDay } from "#lib/contracts/hand-readings/clock-time.ts";
import { EMPTY_DRAFT, EMPTY_ROW, readDraft } from "#lib/contracts/hand-readings/draft.ts";
import { readRow, type HandRow } from "#lib/contracts/hand-readings/hand-row.ts";
import { suggestedDate } from "#lib/contracts/hand-readings/next-day.ts";
import { pastedColumn, pastedRows } from "#lib/contracts/hand-readings/pasted-rows.ts";
import { readPlaced } from "#lib/contracts/hand-readings/placed-station.ts";
import { writtenNumber } from "#lib/contracts/hand-readings/written-number.ts";
import { expectWithin } from "#tests/support/expect-within.ts";

const ZONES = ["UTC", "Europe/London", "America/New_York", "Australia/Lord_Howe", "Pacific/Chatham", "Pacific/Apia", "America/St_Johns", "Asia/Tokyo"];
const anyZone = fc.constantFrom(...ZONES);
const anyEpoch = fc.integer({ min: Date.UTC(1950, 0) / 1000, max: Date.UTC(2040, 0) / 1000 });
const row = (part: Partial<HandRow>): HandRow => ({ key: 1, ...EMPTY_ROW, date: "2024-02-28", time: "14:30", ...part });

describe("a clock", () => {
  test("shows each moment in a way that leads back to it, in any zone, whatever its clocks do", () => {
    fc.assert(
      fc.property(anyEpoch, anyZone, (epochSeconds, zone) => {
        const { turn, ...shown } = clockAt(epochSeconds, zone);
        const read = { date: readDate(shown.date) ?? "", time: readTimeOfDay(shown.time) ?? "" };
        expect(read).toStrictEqual(shown);
        const outcome = momentOf(read, zone);
        if (outcome.kind === "moment") expect({ turn, at: outcome.epochSeconds }).toStrictEqual({ turn: null, at: epochSeconds });
        else if (outcome.kind === "twice") expect(turn === "earlier" ? outcome.earlierEpochSeconds : outcome.laterEpochSeconds).toBe(epochSeconds);
        else expect.fail("a clock showed a time that it skips");
      }),
    );
  });

  test.each([
    ["2024-02-29", "2024-02-29"],
    [" 20240229 ", "2024-02-29"],
    ["2024/2/9", "2024-02-09"],
    ["2024.02.29", "2024-02-29"],
    ["2023-02-29", null],
    ["29-02-2024", null],
    ["02/03/2024", null],
    ["2024-13-01", null],
    ["0024-01-01", null],
    ["2024229", null],
    ["", null],
  ])("gives a date year first, so that no day is taken for a month: %s", (text, date) => {
    expect(readDate(text)).toBe(date);
  });

  test.each([
    ["14:30", "14:30"],
    ["6:05", "06:05"],
    ["630", "06:30"],
    ["1430", "14:30"],
    ["14.30", "14:30"],
    ["14:30:15", "14:30:15"],
    ["24:00", null],
    ["12:60", null],
    ["12:00:60", null],
    ["14", null],
    ["2 pm", null],
    ["-1:30", null],
  ])("is read in hours and minutes: %s", (text, time) => {
    expect(readTimeOfDay(text)).toBe(time);
  });
});

describe("a row", () => {
  test("that is right makes a reading that the server takes", () => {
    const count = fc.record({ waves: fc.integer({ min: 1, max: 200 }), period: fc.integer({ min: 3, max: 30 }) });
    fc.assert(
      fc.property(anyEpoch, anyZone, count, fc.boolean(), (epochSeconds, zone, { waves, period }, isCount) => {
        const clock = clockAt(epochSeconds, zone);
        const typed = isCount ? { waves: String(waves), seconds: String(waves * period) } : { period: String(period) };
        const { issues, reading, clockEpochSeconds } = readRow({ key: 1, ...EMPTY_ROW, ...clock, ...typed }, zone);
        expect(issues).toStrictEqual([]);
        expect(clockEpochSeconds).toBe(epochSeconds);
        const taken = readShape(newReadingShape, reading);
        expect(Date.parse(taken.time) / 1000).toBe(epochSeconds + (isCount ? (waves * period) / 2 : 0));
        expectWithin(taken.periodSeconds ?? 1 / (taken.frequencyHz ?? NaN), period, { relative: 1e-12, unit: "s", because: "a quotient" });
        expect(taken.kind).toBe("timed");
      }),
    );
  });

  test.each<[string, Partial<HandRow>, string, RegExp]>([
    ["no date", { date: "", period: "14" }, "date", /year first/],
    ["a date day first", { date: "28/02/2024", period: "14" }, "date", /“28\/02\/2024” is no day/],
    ["a time that is none", { time: "25:00", period: "14" }, "time", /“25:00” is no time of day/],
    ["no period", {}, "period", /Give the period in seconds, or the number of waves/],
    ["a period and a count", { period: "14", waves: "10" }, "period", /not both/],
    ["a period in words", { period: "long" }, "period", /“long” is no period/],
    ["a period of nothing", { period: "0" }, "period", /from 0.5 to 1000/],
    ["waves without seconds", { waves: "10" }, "seconds", /as well/],
    ["seconds without waves", { seconds: "140" }, "waves", /as well/],
    ["half a wave", { waves: "10.5", seconds: "140" }, "waves", /whole number/],
    ["seconds below nothing", { waves: "10", seconds: "-140" }, "seconds", /above 0/],
    ["waves that would be ripples", { waves: "100", seconds: "10" }, "seconds", /period of 0.1 s/],
  ])("with %s says so beside its field, and gives no reading", (_, part, field, words) => {
    const { issues, reading } = readRow(row(part), "UTC");
    expect(issues.map((issue) => issue.field)).toStrictEqual([field]);
    expect(issues[0]?.message).toMatch(words);
    expect(reading).toBeNull();
  });

  test("at a time that came twice asks which, and takes the answer", () => {
    const typed = row({ date: "2024-11-03", time: "01:30", period: "14" });
    const asked = readRow(typed, "America/New_York");
    expect(asked.issues[0]?.message).toContain("the first (UTC-04:00) or the second (UTC-05:00)");
    expect(asked.reading).toBeNull();
    expect(readRow({ ...typed, turn: "earlier" }, "America/New_York").reading?.time).toBe("2024-11-03T05:30:00.000Z");
    expect(readRow({ ...typed, turn: "later" }, "America/New_York").reading?.time).toBe("2024-11-03T06:30:00.000Z");
  });

  test("at a time that did not exist says what the clocks did and what to do", () => {
    const { issues, reading } = readRow(row({ date: "2024-03-10", time: "02:30", period: "14" }), "America/New_York");
    expect(issues).toStrictEqual([{ field: "time", message: "This time did not exist in America/New_York: the clocks went forward from 02:00 to 03:00. Look at the time again, or enter it in UTC." }]);
    expect(reading).toBeNull();
  });
});

describe("the day of a row", () => {
  const above = row({ date: "2024-02-28", time: "23:40" });
  test.each([
    ["the day after, past midnight", { time: "00:20" }, "2024-02-29"],
    ["nothing for a later time", { time: "23:50" }, null],
    ["nothing where the date says so already", { date: "2024-02-29", time: "00:20" }, null],
    ["the day above, where an earlier date stands beside a later time", { date: "2024-02-27", time: "23:50" }, "2024-02-28"],
    ["nothing for a time that is none yet", { time: "0" }, null],
  ])("is offered: %s", (_, part, date) => {
    expect(suggestedDate(row(part), above)).toBe(date);
  });

  test("goes on over the ends of months and years", () => {
    expect([dayAfter("2023-12-31"), dayAfter("2024-02-28"), dayAfter("2023-02-28")]).toStrictEqual(["2024-01-01", "2024-02-29", "2023-03-01"]);
  });
});

describe("pasted text", () => {
  const cells = { date: null, turn: null, period: "", waves: "", seconds: "" };
  test.each([
    ["tabs", "14:30\t16.5\n15:00\t16,2", [{ ...cells, time: "14:30", period: "16.5" }, { ...cells, time: "15:00", period: "16,2" }]],
    ["commas", "14:30,16.5\r\n", [{ ...cells, time: "14:30", period: "16.5" }]],
    ["semicolons and decimal commas", "14:30;16,5", [{ ...cells, time: "14:30", period: "16,5" }]],
    ["a date before the time", "2024-02-28\t14:30\t16.5", [{ ...cells, date: "2024-02-28", time: "14:30", period: "16.5" }]],
    ["a date in the time", "2024-02-28 14:30,16.5", [{ ...cells, date: "2024-02-28", time: "14:30", period: "16.5" }]],
    ["counts", "14:30\t20\t310\n2024-02-28\t14:45\t20\t300", [{ ...cells, time: "14:30", waves: "20", seconds: "310" }, { ...cells, date: "2024-02-28", time: "14:45", waves: "20", seconds: "300" }]],
    ["a moment with its offset", "2024-02-28T14:30+01:00,16.5", [{ ...cells, date: "2024-02-28", time: "13:30", period: "16.5" }]],
    ["what is wrong, for its field to say", "soon\t16.5s\n,12", [{ ...cells, time: "soon", period: "16.5s" }, { ...cells, time: "", period: "12" }]],
  ])("becomes rows: %s", (_, text, rows) => {
    expect(pastedRows(text, "UTC")).toStrictEqual({ rows, leftOut: [] });
  });

  test("leaves out a header, and says which", () => {
    expect(pastedRows("time\tperiod\n14:30\t16.5", "UTC")).toStrictEqual({ rows: [{ ...cells, time: "14:30", period: "16.5" }], leftOut: ["time\tperiod"] });
  });

  test("of one cell is left to its field, and a column goes down it", () => {
    expect(pastedRows("16.5", "UTC")).toBeNull();
    expect(pastedColumn("16.5")).toBeNull();
    expect(pastedRows("16.5\n16.1\n", "UTC")).toBeNull();
    expect(pastedColumn("16.5\n\n16.1\n")).toStrictEqual(["16.5", "", "16.1"]);
  });

  test("in a repeated hour keeps which of the two it was", () => {
    const pasted = pastedRows("2024-11-03T06:30Z\t14", "America/New_York");
    expect(pasted?.rows).toStrictEqual([{ ...cells, date: "2024-11-03", time: "01:30", turn: "later", period: "14" }]);
  });

  test("of any kind loses no digit and never throws", () => {
    const digits = (text: string): string => text.replace(/\D/g, "");
    const anyCell = fc.string({ unit: fc.constantFrom("1", "2", " ", ".", "x", "-", "/", ":") });
    fc.assert(
      fc.property(fc.array(fc.array(anyCell, { minLength: 2, maxLength: 5 }), { minLength: 1, maxLength: 5 }), (table) => {
        const pasted = pastedRows(table.map((line) => line.join("\t")).join("\n"), "UTC");
        const kept = (pasted?.rows ?? []).map(({ date, time, period, waves, seconds }) => digits([date ?? "", time, period, waves, seconds].join("")));
        // A date is filled up to two digits a part, so zeros may come in; no line comes out shorter.
        const typed = table.map((line) => digits(line.join(""))).filter((line) => line !== "");
        expect(kept.length).toBe(typed.length);
        kept.forEach((line, i) => { expect(line.length).toBeGreaterThanOrEqual((typed[i] ?? "").length); });
      }),
    );
  });
});

describe("a station that is placed here", () => {
  const placed = { id: "north-point", name: "North Point", latitude: "21.6 N", longitude: "158.1 W", timeZone: "Pacific/Honolulu" };
  test.each([
    ["letters", "21.6 N", "158.1 W", 21.6, -158.1],
    ["signs", "-21.6", "-158.1", -21.6, -158.1],
    ["a true minus and a decimal comma", "\u221221,6", "158,1", -21.6, 158.1],
    ["longitudes to 360", "21.6°S", "201.9", -21.6, -158.1],
    ["the 180th meridian", "0", "180", 0, -180],
  ])("takes %s", (_, latitude, longitude, latitudeDegrees, longitudeDegrees) => {
    const { issues, position } = readPlaced({ ...placed, latitude, longitude });
    expect(issues).toStrictEqual([]);
    const tolerance = { absolute: 1e-9, unit: "degrees", because: "a turn is added or taken off" };
    expectWithin(position?.latitudeDegrees ?? NaN, latitudeDegrees, tolerance);
    expectWithin(position?.longitudeDegrees ?? NaN, longitudeDegrees, tolerance);
  });

  test.each([
    ["latitude", { latitude: "91" }],
    ["latitude", { latitude: "21.6 E" }],
    ["latitude", { latitude: "-21.6 S" }],
    ["latitude", { latitude: "" }],
    ["longitude", { longitude: "361" }],
    ["longitude", { longitude: "-181" }],
    ["longitude", { longitude: "west" }],
    ["timeZone", { timeZone: "Pacific/Nowhere" }],
    ["id", { id: " " }],
    ["id", { id: "new" }],
    ["name", { name: "x".repeat(201) }],
  ])("says beside %s what is wrong with %o, and is not stored", (field, part) => {
    const { issues, deployment } = readPlaced({ ...placed, ...part });
    expect(issues.map((issue) => issue.field)).toStrictEqual([field]);
    expect(deployment).toBeNull();
  });
});

test("a number may have a decimal comma, and nothing else beside its digits", () => {
  expect([" 13,5 ", "13.5", ".5", "\u22122"].map(writtenNumber)).toStrictEqual([13.5, 13.5, 0.5, -2]);
  expect(["", "1e3", "13s", "1,000.5", "0x10", "Infinity", "--2"].map(writtenNumber)).toStrictEqual(Array.from({ length: 7 }, () => null));
});

test("a draft comes back as it was, and what is none as nothing", () => {
  const draft = { ...EMPTY_DRAFT, note: "von Hand", rows: [row({ period: "14" }), row({ key: 2 })] };
  expect(readDraft(JSON.stringify(draft))).toStrictEqual(draft);
  for (const text of [null, "", "{", "null", "[]", JSON.stringify({ ...draft, rows: [] }), JSON.stringify({ ...draft, rows: [row({}), row({})] })]) {
    expect(readDraft(text)).toBeNull();
  }
});
