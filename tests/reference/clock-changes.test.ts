import { describe, expect, test } from "vitest";
import { clockAt, momentOf } from "#lib/contracts/hand-readings/clock-time.ts";

const utc = (text: string): number => Date.parse(text) / 1000;

/**
 * When clocks of a place changed, as its government decreed: common knowledge where the change is a yearly one, from
 * memory otherwise. [source: common-knowledge]
 */
describe("clock times of a zone", () => {
  test.each([
    ["a winter's day in Honolulu, ten hours behind", "Pacific/Honolulu", "2024-02-28", "14:30", "2024-02-29T00:30Z"],
    ["half an hour off the hour in Kolkata", "Asia/Kolkata", "2024-02-29", "00:15", "2024-02-28T18:45Z"],
    ["a quarter off it on the Chatham Islands, in their summer", "Pacific/Chatham", "2024-01-10", "12:00", "2024-01-09T22:15Z"],
    ["UTC", "UTC", "2024-02-29", "23:59:30", "2024-02-29T23:59:30Z"],
    ["London before its clocks went back", "Europe/London", "2024-10-27", "00:59", "2024-10-26T23:59Z"],
    ["London after they went back", "Europe/London", "2024-10-27", "02:00", "2024-10-27T02:00Z"],
  ])("are one moment: %s", (_, zone, date, time, moment) => {
    expect(momentOf({ date, time }, zone)).toStrictEqual({ kind: "moment", epochSeconds: utc(moment) });
  });

  test.each([
    ["London", "Europe/London", "2024-10-27", "01:30", "2024-10-27T00:30Z", "2024-10-27T01:30Z"],
    ["New York", "America/New_York", "2024-11-03", "01:00", "2024-11-03T05:00Z", "2024-11-03T06:00Z"],
    ["Lord Howe Island, by half an hour", "Australia/Lord_Howe", "2024-04-07", "01:45", "2024-04-06T14:45Z", "2024-04-06T15:15Z"],
  ])("came twice when the clocks went back in %s", (_, zone, date, time, earlier, later) => {
    expect(momentOf({ date, time }, zone)).toStrictEqual({ kind: "twice", earlierEpochSeconds: utc(earlier), laterEpochSeconds: utc(later) });
    expect(clockAt(utc(earlier), zone)).toStrictEqual({ date, time, turn: "earlier" });
    expect(clockAt(utc(later), zone)).toStrictEqual({ date, time, turn: "later" });
  });

  test.each([
    ["New York", "America/New_York", "2024-03-10", "02:30", ["2024-03-10", "02:00"], ["2024-03-10", "03:00"]],
    ["London, to the minute", "Europe/London", "2024-03-31", "01:00", ["2024-03-31", "01:00"], ["2024-03-31", "02:00"]],
    ["Samoa, which went over the date line and left out a day", "Pacific/Apia", "2011-12-30", "12:00", ["2011-12-30", "00:00"], ["2011-12-31", "00:00"]],
  ])("did not exist when the clocks went forward in %s", (_, zone, date, time, [fromDate = "", fromTime = ""], [toDate = "", toTime = ""]) => {
    expect(momentOf({ date, time }, zone)).toStrictEqual({ kind: "skipped", from: { date: fromDate, time: fromTime }, to: { date: toDate, time: toTime } });
  });
});
