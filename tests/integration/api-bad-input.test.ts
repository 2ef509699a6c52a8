import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { perform, send, type ApiAnswer, type ApiCall, type OperationId } from "#tests/support/api-client.ts";
import { serveDemo, type ServedDemo } from "#tests/support/served-demo.ts";

let demo: ServedDemo;
let before: unknown;
beforeAll(async () => {
  demo = await serveDemo();
  before = await everything();
});
afterAll(() => demo.stop());

async function everything(): Promise<unknown> {
  const events = await perform(demo.address, "listEvents");
  const arrivals = await perform(demo.address, "listArrivals", { query: { limit: "99999" } });
  const kept = await perform(demo.address, "listLocalizations", { params: { id: "heron" } });
  return [events.body, arrivals.body, kept.body];
}

/** The address and the message of each issue, in the order in which they are told. */
function told({ status, issues }: ApiAnswer): [string, string][] {
  expect(status).toBe(400);
  return issues.map(({ path, message }) => [path, message]);
}

const GOOD = { time: "2024-02-28T14:30:00Z", periodSeconds: 17 };
const TIME = "an ISO 8601 time with Z or an offset, such as 2024-02-28T14:30Z";

describe("a reading is refused by its field", () => {
  const faulty: [string, object, string, string][] = [
    ["no offset in its time", { time: "2024-02-28T14:30:00" }, "time", `found "2024-02-28T14:30:00"; wanted ${TIME}`],
    ["a day that the calendar does not have", { time: "2023-02-29T14:30Z" }, "time", `found "2023-02-29T14:30Z"; wanted ${TIME}`],
    ["a time that its offset carries beyond the year 9999", { time: "9999-12-31T23:59-14:00" }, "time", `found "9999-12-31T23:59-14:00"; wanted ${TIME}`],
    ["a time in seconds", { time: 1_709_130_600 }, "time", `found 1709130600; wanted ${TIME}`],
    ["no time", { time: undefined }, "time", `found nothing; wanted ${TIME}`],
    ["a period of 0", { periodSeconds: 0 }, "periodSeconds", "found 0; wanted a number of seconds from 0.5 to 1000"],
    ["a period in milliseconds", { periodSeconds: 17_000 }, "periodSeconds", "found 17000; wanted a number of seconds from 0.5 to 1000"],
    ["a negative period", { periodSeconds: -17 }, "periodSeconds", "found -17; wanted a number of seconds from 0.5 to 1000"],
    ["a period in words", { periodSeconds: "NaN" }, "periodSeconds", 'found "NaN"; wanted a number of seconds from 0.5 to 1000'],
    ["a period of null", { periodSeconds: null }, "periodSeconds", "found nothing; wanted a number of seconds from 0.5 to 1000"],
    ["a frequency in millihertz", { periodSeconds: undefined, frequencyHz: 55 }, "frequencyHz", "found 55; wanted a number of hertz from 0.001 to 2"],
    ["a period and a frequency", { frequencyHz: 0.06 }, "frequencyHz", "found 0.06; wanted periodSeconds or frequencyHz, and not both"],
    ["neither", { periodSeconds: undefined }, "periodSeconds", "found nothing; wanted periodSeconds or frequencyHz"],
    ["a negative error of its time", { timeSigmaSeconds: -600 }, "timeSigmaSeconds", "found -600; wanted a number of seconds from 0.001 to 2592000"],
    ["an error of its time beyond reason", { timeSigmaSeconds: 1e300 }, "timeSigmaSeconds", "found 1e+300; wanted a number of seconds from 0.001 to 2592000"],
    ["a negative error of its period", { periodSigmaSeconds: -1 }, "periodSigmaSeconds", "found -1; wanted a number of seconds from 0 to 1000"],
    ["two errors of one thing", { periodSigmaSeconds: 1, frequencySigmaHz: 0.01 }, "frequencySigmaHz", "found 0.01; wanted periodSigmaSeconds or frequencySigmaHz, and not both"],
    ["another kind", { kind: "guessed" }, "kind", 'found "guessed"; wanted one of ridge, timed'],
    ["a bearing beyond the circle", { comesFromDegrees: 361 }, "comesFromDegrees", "found 361; wanted a bearing that the waves come from, 0 to 360 degrees clockwise from north"],
    ["a bearing's error without a bearing", { comesFromSigmaDegrees: 10 }, "comesFromDegrees", "found nothing; wanted a bearing, since comesFromSigmaDegrees gives its error"],
    ["a flag that is none", { quality: 5 }, "quality", "found 5; wanted a quality flag: 1 good, 2 not evaluated, 3 suspect, 4 bad, 9 missing"],
    ["a flag in words", { quality: "1" }, "quality", 'found "1"; wanted a quality flag: 1 good, 2 not evaluated, 3 suspect, 4 bad, 9 missing'],
    ["a field that is none", { period: 17 }, "", 'found "period"; wanted only what it takes'],
  ];
  test.each(faulty)("for %s, in its place among good ones", async (_, fault, field, words) => {
    const readings = [GOOD, { ...GOOD, ...fault }, GOOD];
    const place = field === "" ? "readings[1]" : `readings[1].${field}`;
    expect(told(await perform(demo.address, "bringInArrival", { body: { station: "wic", readings } }))).toStrictEqual([[place, `${place}: ${words}.`]]);
  });

  test.each([["1e400", "Infinity"], ["-1e400", "-Infinity"]])("for a number beyond all numbers, %s", async (written, shown) => {
    const body = `{"station":"wic","readings":[{"time":"2024-02-28T14:30Z","periodSeconds":${written}}]}`;
    const answer = await send(demo.address, { method: "POST", path: "/api/v1/arrivals", headers: { "content-type": "application/json" }, body });
    expect(told(answer)).toStrictEqual([["readings[0].periodSeconds", `readings[0].periodSeconds: found ${shown}; wanted a number of seconds from 0.5 to 1000.`]]);
  });

  test("for a key that would change what all objects are", async () => {
    const body = '{"station":"wic","readings":[{"time":"2024-02-28T14:30Z","periodSeconds":17,"__proto__":{"quality":1}}]}';
    const answer = await send(demo.address, { method: "POST", path: "/api/v1/arrivals", headers: { "content-type": "application/json" }, body });
    expect(told(answer)).toStrictEqual([["readings[0]", 'readings[0]: found "__proto__"; wanted only what it takes.']]);
  });

  test("all faults of all readings at once, the first fifty of them and how many more", async () => {
    const two = await perform(demo.address, "bringInArrival", { body: { station: "wic", readings: [{ ...GOOD, time: "noon", kind: "x" }, 7, { ...GOOD, periodSeconds: 0 }] } });
    expect(told(two).map(([path]) => path)).toStrictEqual(["readings[0].time", "readings[0].kind", "readings[1]", "readings[2].periodSeconds"]);
    const many = await perform(demo.address, "bringInArrival", { body: { station: "wic", readings: Array.from({ length: 5000 }, () => ({})) } });
    expect(many.issues).toHaveLength(51);
    expect(many.issues.at(-1)).toStrictEqual({ code: "more-problems", path: "", message: expect.stringMatching(/^The request: \d{4,} more problems like these are not shown \(\d{4,} in all\)\.$/) as string });
  });
});

describe("a request is refused by its field", () => {
  const estimate = { distanceKm: 5000, originTime: "2024-02-20T12:00Z" };
  const tooLong = { wanted: "a list of 1 to 5000 readings" };
  const faulty: [OperationId, string, ApiCall, string, string | RegExp][] = [
    ["bringInArrival", "an unknown station", { body: { station: "nowhere", readings: [GOOD] } }, "station", 'station: found "nowhere"; wanted the id of a station that is stored.'],
    ["bringInArrival", "no station", { body: { readings: [GOOD] } }, "station", "station: found nothing; wanted the id of a station that is stored, 1 to 200 letters."],
    ["bringInArrival", "neither readings nor an estimate", { body: { station: "wic" } }, "readings", "readings: found nothing; wanted readings, or an estimate in their place."],
    ["bringInArrival", "both", { body: { station: "wic", readings: [GOOD], estimate } }, "readings", /^readings: found .*; wanted readings or an estimate, and not both\.$/],
    ["bringInArrival", "no readings", { body: { station: "wic", readings: [] } }, "readings", `readings: found []; wanted ${tooLong.wanted}.`],
    ["bringInArrival", "too many readings", { body: { station: "wic", readings: Array.from({ length: 5001 }, () => GOOD) } }, "readings", /^readings: found \[\{"time".*\.\.\.; wanted a list of 1 to 5000 readings\.$/],
    ["bringInArrival", "readings that are no list", { body: { station: "wic", readings: { 0: GOOD } } }, "readings", /^readings: found \{.*; wanted a list of 1 to 5000 readings\.$/],
    ["bringInArrival", "a ring beyond half the girth", { body: { station: "wic", estimate: { ...estimate, distanceKm: 25_000 } } }, "estimate.distanceKm", "estimate.distanceKm: found 25000; wanted a number of kilometres from 0.001 to 20003, half the Earth's girth."],
    ["bringInArrival", "an estimate's error beyond reason", { body: { station: "wic", estimate: { ...estimate, originTimeSigmaHours: 1e160 } } }, "estimate.originTimeSigmaHours", "estimate.originTimeSigmaHours: found 1e+160; wanted a number of hours from 0.001 to 720."],
    ["bringInArrival", "a correlation of -1", { body: { station: "wic", estimate: { ...estimate, correlation: -1 } } }, "estimate.correlation", "estimate.correlation: found -1; wanted a number above -1 and below 1."],
    ["bringInArrival", "a note of another kind", { body: { station: "wic", readings: [GOOD], note: 7 } }, "note", "note: found 7; wanted text of 2000 letters at most."],
    ["flagReading", "no revision", { params: { id: 1 }, body: { quality: 1 } }, "revision", "revision: found nothing; wanted the revision, a whole number, that the change starts from."],
    ["flagReading", "half a revision", { params: { id: 1 }, body: { revision: 1.5, quality: 1 } }, "revision", /found 1\.5; wanted the revision/],
    ["flagReading", "a revision beyond counting", { params: { id: 1 }, body: { revision: 2 ** 31, quality: 1 } }, "revision", /found 2147483648; wanted the revision/],
    ["moveArrival", "no event, where null means none", { params: { id: 1 }, body: { revision: 1 } }, "event", "event: found nothing; wanted the id of an event that is stored, or null for none, 1 to 200 letters."],
    ["openEvent", "no title", { body: {} }, "title", "title: found nothing; wanted a title of 1 to 200 letters on one line."],
    ["openEvent", "an empty title", { body: { title: "" } }, "title", 'title: found ""; wanted a title of 1 to 200 letters on one line.'],
    ["openEvent", "a title of a NUL", { body: { title: "\0" } }, "title", 'title: found "\\u0000"; wanted a title of 1 to 200 letters on one line.'],
    ["openEvent", "a title of spaces", { body: { title: "  " } }, "title", 'title: found "  "; wanted a title of 1 to 200 letters on one line.'],
    ["openEvent", "a title that shows nothing", { body: { title: "\u200b" } }, "title", 'title: found "\u200b"; wanted a title of 1 to 200 letters on one line.'],
    ["openEvent", "a title that turns what follows round", { body: { title: "a\u202eb" } }, "title", 'title: found "a\u202eb"; wanted a title of 1 to 200 letters on one line.'],
    ["openEvent", "half a surrogate pair", { body: { title: "x\ud800" } }, "title", 'title: found "x\\ud800"; wanted a title of 1 to 200 letters on one line.'],
    ["openEvent", "an id with a slash", { body: { title: "x", id: "a/b" } }, "id", 'id: found "a/b"; wanted an id of 1 to 80 small letters, digits and hyphens.'],
    ["openEvent", "an id with a line's end", { body: { title: "x", id: "a\n" } }, "id", /^id: found "a\\n"; wanted an id/],
    ["openEvent", "an arrival that is not stored", { body: { title: "x", arrivals: [999_999] } }, "arrivals[0]", "arrivals[0]: found 999999; wanted an arrival that is stored."],
    ["openEvent", "an arrival beyond counting", { body: { title: "x", arrivals: [2 ** 40] } }, "arrivals[0]", "arrivals[0]: found 1099511627776; wanted the id of an arrival that is stored."],
    ["openEvent", "an arrival twice", { body: { title: "x", arrivals: [1, 2, 1] } }, "arrivals[2]", "arrivals[2]: found 1; wanted each of them once."],
    ["openEvent", "too many arrivals", { body: { title: "x", arrivals: Array.from({ length: 1001 }, (_, place) => place + 1) } }, "arrivals", /wanted a list of 1000 arrivals' ids at most\.$/],
    ["describeEvent", "a book of a note", { params: { id: "heron" }, body: { revision: 1, title: "x", note: "x".repeat(2001) } }, "note", /^note: found "x{20,}\.\.\.; wanted text of 2000 letters at most\.$/],
    ["mergeEvents", "no revision of the other", { params: { id: "heron" }, body: { revision: 1, from: "tern" } }, "fromRevision", /^fromRevision: found nothing; wanted the revision/],
    ["splitEvent", "no arrivals", { params: { id: "heron" }, body: { revision: 1, title: "x", arrivals: [] } }, "arrivals", "arrivals: found []; wanted a list of 1 to 1000 arrivals' ids."],
    ["splitEvent", "an arrival of another event", { params: { id: "heron" }, body: { revision: 1, title: "x", arrivals: [1] } }, "arrivals[0]", 'arrivals[0]: found 1; wanted an arrival of event "heron".'],
    ["keepLocalization", "a reading of another event, moved", { params: { id: "heron" }, body: { startedFrom: 0, moved: [{ reading: 1, ...GOOD }] } }, "moved[0].reading", "moved[0].reading: found 1; wanted a reading of this event."],
    ["keepLocalization", "a reading of another event, dropped", { params: { id: "heron" }, body: { startedFrom: 0, dropped: [1] } }, "dropped[0]", "dropped[0]: found 1; wanted a reading of this event."],
    ["keepLocalization", "a reading moved twice", { params: { id: "heron" }, body: { startedFrom: 0, moved: [{ reading: 1, ...GOOD }, { reading: 1, ...GOOD }] } }, "moved[1].reading", "moved[1].reading: found 1; wanted each of them once."],
    ["keepLocalization", "a move without a period", { params: { id: "heron" }, body: { startedFrom: 0, moved: [{ reading: 1, time: GOOD.time }] } }, "moved[0].periodSeconds", "moved[0].periodSeconds: found nothing; wanted periodSeconds or frequencyHz."],
    ["keepLocalization", "a reading added at an unknown station", { params: { id: "heron" }, body: { startedFrom: 0, added: [{ station: "wic", time: GOOD.time, frequencyHz: 0.06 }] } }, "added[0].station", 'added[0].station: found "wic"; wanted a station of this event.'],
    ["keepLocalization", "a time deep inside", { params: { id: "heron" }, body: { startedFrom: 0, added: [{ station: "col", time: "noon", frequencyHz: 0.06 }] } }, "added[0].time", `added[0].time: found "noon"; wanted ${TIME}.`],
    ["keepLocalization", "a word for a yes", { params: { id: "heron" }, body: { startedFrom: 0, useSuspect: "yes" } }, "useSuspect", 'useSuspect: found "yes"; wanted true or false.'],
    ["keepLocalization", "settings of null", { params: { id: "heron" }, body: { startedFrom: 0, settings: null } }, "settings", /^settings: found null; wanted an object of settings\.$/],
    ["keepLocalization", "a setting that is none", { params: { id: "heron" }, body: { startedFrom: 0, settings: { spread: { kilometres: 3 } } } }, "settings.spread", /found "kilometres"; wanted only settings that exist/],
    ["keepLocalization", "all stations left out", { params: { id: "heron" }, body: { startedFrom: 0, leftOut: ["col", "gul"] } }, "leftOut", "No station is left that could be fitted, so there is no answer to keep."],
    ["listReadings", "no offset in a time", { query: { from: "2024-02-28T14:30" } }, "from", `from: found "2024-02-28T14:30"; wanted ${TIME}.`],
    ["listReadings", "a limit of 0", { query: { limit: "0" } }, "limit", 'limit: found "0"; wanted a whole number from 1 to 99999.'],
    ["listArrivals", "both waiting and of an event", { query: { waiting: "yes", event: "tern" } }, "event", 'event: found "tern"; wanted event or waiting, and not both.'],
    ["listArrivals", "another word for waiting", { query: { waiting: "no" } }, "waiting", 'waiting: found "no"; wanted one of yes.'],
  ];
  test.each(faulty)("%s: %s", async (id, _, call, path, message) => {
    const [issue, ...more] = told(await perform(demo.address, id, call));
    expect(more).toStrictEqual([]);
    expect(issue?.[0]).toBe(path);
    if (typeof message === "string") expect(issue?.[1]).toBe(message);
    else expect(issue?.[1]).toMatch(message);
  });

  test.each<[OperationId, ApiCall]>([
    ["bringInArrival", { body: { station: "wic", event: "calm", readings: [GOOD] } }],
    ["moveArrival", { params: { id: 1 }, body: { revision: 1, event: "calm" } }],
    ["moveArrival", { params: { id: 99_999 }, body: { revision: 1, event: null } }],
    ["flagReading", { params: { id: 99_999 }, body: { revision: 1, quality: 1 } }],
    ["describeEvent", { params: { id: "calm" }, body: { revision: 1, title: "x", note: "" } }],
    ["mergeEvents", { params: { id: "calm" }, body: { revision: 1, from: "tern", fromRevision: 1 } }],
    ["mergeEvents", { params: { id: "tern" }, body: { revision: 1, from: "calm", fromRevision: 1 } }],
    ["splitEvent", { params: { id: "calm" }, body: { revision: 1, arrivals: [1], title: "x" } }],
    ["keepLocalization", { params: { id: "calm" }, body: { startedFrom: 0 } }],
    ["readEvent", { params: { id: "calm" } }],
    ["readArrival", { params: { id: 99_999 } }],
    ["listLocalizations", { params: { id: "calm" } }],
    ["readLocalization", { params: { id: "heron", number: 1 } }],
  ])("%s of what is not stored is 404: %j", async (id, call) => {
    expect(await perform(demo.address, id, call)).toMatchObject({ status: 404, issues: [{ code: "not-found" }] });
  });

  test("and nothing of all this was stored", async () => {
    expect(await everything()).toStrictEqual(before);
  });
});
