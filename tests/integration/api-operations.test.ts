import { afterAll, beforeAll, expect, test } from "vitest";
import * as z from "zod/mini";
import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { perform, type ApiAnswer, type ApiCall, type OperationId } from "#tests/support/api-client.ts";
import { serveDemo, type ServedDemo } from "#tests/support/served-demo.ts";

let demo: ServedDemo;
beforeAll(async () => {
  demo = await serveDemo();
});
afterAll(() => demo.stop());

const done = new Set<string>();

/** Does an operation, and holds its answer to the status and the shape that are published: no field less, none more. */
async function succeed(id: OperationId, call: ApiCall = {}): Promise<ApiAnswer & { readonly body: Record<string, unknown> }> {
  const answer = await perform(demo.address, id, call);
  const declared = OPERATIONS[id].answer;
  expect(answer, JSON.stringify(answer.issues)).toMatchObject({ status: declared.status });
  expect(answer.headers["cache-control"]).toBe("no-store");
  if (declared.type === "application/json") expect(z.parse(declared.schema, answer.body)).toStrictEqual(answer.body);
  done.add(id);
  return answer as ApiAnswer & { readonly body: Record<string, unknown> };
}

const reading = (minute: string, periodSeconds: number) => ({ time: `2024-02-28T14:${minute}:00Z`, periodSeconds });

async function broughtIn(station: string, event: string | null = null): Promise<number> {
  const { body } = await succeed("bringInArrival", { body: { station, event, readings: [reading("00", 18), reading("30", 17.5)] } });
  return Number(body["id"]);
}

test("readings are brought in as an arrival, with the errors that were given or those of their kind, and found again", async () => {
  const readings = [
    { time: "2024-03-01T02:00+02:00", periodSeconds: 20, periodSigmaSeconds: 0.5, timeSigmaSeconds: 600, kind: "timed", comesFromDegrees: 211.5, quality: 1 },
    { time: "2024-03-01T03:30:15.250Z", frequencyHz: 0.0625, frequencySigmaHz: 0.001, comesFromDegrees: 200, comesFromSigmaDegrees: 7 },
    { time: "2024-03-01T05:00Z", periodSeconds: 12.5, kind: "timed" },
  ];
  const made = await succeed("bringInArrival", { body: { station: "wic", note: "From the pier", readings } });
  const { id } = made.body;
  expect(made.headers.location).toBe(`/api/v1/arrivals/${String(id)}`);
  expect(made.body).toMatchObject({ station: "wic", event: null, revision: 1, note: "From the pier", actor: "local keeper", estimate: null });
  expect(made.body["readings"]).toMatchObject([
    { row: 1, time: "2024-03-01T00:00:00.000Z", periodSeconds: 20, frequencyHz: 0.05, timeSigmaSeconds: 600, kind: "timed", comesFromDegrees: 211.5, comesFromSigmaDegrees: 15, quality: 1 },
    { row: 2, time: "2024-03-01T03:30:15.250Z", frequencyHz: 0.0625, timeSigmaSeconds: 1800, frequencySigmaHz: 0.001, kind: "ridge", comesFromDegrees: 200, comesFromSigmaDegrees: 7, quality: 2 },
    { row: 3, periodSeconds: 12.5, timeSigmaSeconds: 300, frequencySigmaHz: 0.025 * 0.08, comesFromDegrees: null, comesFromSigmaDegrees: null, quality: 2 },
  ]);
  expect((await succeed("readArrival", { params: { id: Number(id) } })).body).toStrictEqual(made.body);

  const found = await succeed("listReadings", { query: { station: "wic", from: "2024-03-01T00:00Z", to: "2024-03-01T05:00Z" } });
  expect(found.body["readings"]).toStrictEqual((made.body["readings"] as unknown[]).slice(0, 2));
  expect((await succeed("listReadings", { query: { limit: "3" } })).body["readings"]).toHaveLength(3);
  expect((await succeed("listReadings", { query: { station: "nowhere" } })).body).toStrictEqual({ readings: [] });
  const waiting = (await succeed("listArrivals", { query: { waiting: "yes", station: "wic" } })).body["arrivals"];
  expect(waiting).toStrictEqual([made.body]);
  expect((await succeed("listArrivals", { query: { event: "tern" } })).body["arrivals"]).toMatchObject([{ station: "wic" }, { station: "fen" }]);

  // Page by page, every one comes once and none is missed.
  const paged: number[] = [];
  for (let after = "0"; ; after = String(paged.at(-1))) {
    const page = (await succeed("listArrivals", { query: { limit: "7", after } })).body["arrivals"] as { id: number }[];
    paged.push(...page.map((arrival) => arrival.id));
    if (page.length < 7) break;
  }
  const whole = (await succeed("listArrivals", { query: { limit: "99999" } })).body["arrivals"] as { id: number }[];
  expect(paged).toStrictEqual(whole.map((arrival) => arrival.id));
  const [second] = (await succeed("listReadings", { query: { after: "1", limit: "1" } })).body["readings"] as { id: number }[];
  expect(second?.id).toBe(2);
});

test("an estimate is brought in with the errors that are taken where none are given", async () => {
  const made = await succeed("bringInArrival", { body: { station: "fen", estimate: { distanceKm: 5000, originTime: "2024-02-20T12:00Z" } } });
  expect(made.body).toMatchObject({ readings: [], estimate: { distanceKm: 5000, distanceSigmaKm: 400, originTime: "2024-02-20T12:00:00.000Z", originTimeSigmaHours: 12, correlation: -0.9 } });
});

test("a reading is flagged, and an arrival moved, each into its arrival's next revision", async () => {
  const id = await broughtIn("wic");
  const before = (await succeed("readArrival", { params: { id } })).body;
  const [first] = before["readings"] as { id: number }[];
  expect((await succeed("flagReading", { params: { id: first?.id ?? 0 }, body: { revision: 1, quality: 3 } })).body).toStrictEqual({ revision: 2 });
  expect((await succeed("readArrival", { params: { id } })).body).toMatchObject({ revision: 2, readings: [{ quality: 3 }, { quality: 2 }] });

  const event = (await succeed("readEvent", { params: { id: "tern" } })).body;
  expect((await succeed("moveArrival", { params: { id }, body: { revision: 2, event: "tern" } })).body).toStrictEqual({ revision: 3 });
  const grown = (await succeed("readEvent", { params: { id: "tern" } })).body;
  expect(grown["revision"]).toBe(Number(event["revision"]) + 1);
  expect((grown["arrivals"] as { id: number }[]).map((arrival) => arrival.id)).toContain(id);
  expect((await succeed("moveArrival", { params: { id }, body: { revision: 3, event: null } })).body).toStrictEqual({ revision: 4 });
  expect((await succeed("readArrival", { params: { id } })).body).toMatchObject({ event: null, revision: 4 });
});

test("an event is opened under a day or a name of its own, described, split and merged", async () => {
  const ids = [await broughtIn("wic"), await broughtIn("fen"), await broughtIn("bra")];
  const made = await succeed("openEvent", { body: { title: "Leap day", arrivals: ids } });
  expect(made.headers.location).toBe("/api/v1/events/2024-02-28");
  expect(made.body).toMatchObject({ id: "2024-02-28", title: "Leap day", note: "", revision: 1, mergedInto: null, arrivals: ids.map((id) => ({ id, event: "2024-02-28", revision: 2 })) });

  expect((await succeed("describeEvent", { params: { id: "2024-02-28" }, body: { revision: 1, title: "Leap", note: "Long swell" } })).body).toStrictEqual({ revision: 2 });
  const split = await succeed("splitEvent", { params: { id: "2024-02-28" }, body: { revision: 2, arrivals: ids.slice(2), title: "The other" } });
  expect(split.headers.location).toBe("/api/v1/events/2024-02-28-2");
  expect(split.body).toMatchObject({ id: "2024-02-28-2", title: "The other", revision: 1, arrivals: [{ id: ids[2], revision: 3 }] });

  const merged = await succeed("mergeEvents", { params: { id: "2024-02-28" }, body: { revision: 3, from: "2024-02-28-2", fromRevision: 1 } });
  expect(merged.body).toMatchObject({ id: "2024-02-28", title: "Leap", note: "Long swell", revision: 4, arrivals: ids.map((id) => ({ id })) });
  expect((await succeed("readEvent", { params: { id: "2024-02-28-2" } })).body).toMatchObject({ mergedInto: "2024-02-28", revision: 2, arrivals: [] });

  const named = await succeed("openEvent", { body: { id: "by-name", title: "Empty so far" } });
  expect(named.body).toMatchObject({ id: "by-name", arrivals: [] });
  const listed = (await succeed("listEvents")).body["events"] as { id: string }[];
  expect(listed.map(({ id }) => id)).toStrictEqual(expect.arrayContaining(["2024-02-28", "by-name", "tern"]));
  expect(listed.map(({ id }) => id)).not.toContain("2024-02-28-2");
  expect(listed.find(({ id }) => id === "2024-02-28")).toMatchObject({ stations: 3, readings: 6, estimates: 0, firstArrival: "2024-02-28T14:00:00.000Z", revision: 4, latest: null });
});

test("an answer is kept with the choices that made it, listed and read", async () => {
  const [arrival] = (await succeed("listArrivals", { query: { event: "petrel", station: "wic" } })).body["arrivals"] as { readings: { id: number }[] }[];
  const [first = { id: 0 }, second = { id: 0 }] = arrival?.readings ?? [];
  const choices = {
    leftOut: ["tho"],
    dropped: [first.id],
    moved: [{ reading: second.id, time: "2023-11-20T01:02:03.456Z", frequencyHz: 0.0712345 }],
    added: [{ station: "ott", time: "2023-11-20T00:00:00.000Z", frequencyHz: 0.07, timeSigmaSeconds: 1800, frequencySigmaHz: 0, kind: "ridge" }],
    useSuspect: true,
  };
  const made = await succeed("keepLocalization", { params: { id: "petrel" }, body: { startedFrom: 0, eventRevision: 1, reason: "Trying", settings: { spread: { timeHours: 9 } }, ...choices } });
  expect(made.headers.location).toBe("/api/v1/events/petrel/localizations/1");
  const one = await succeed("readLocalization", { params: { id: "petrel", number: 1 } });
  expect(one.body).toMatchObject({ number: 1, reason: "Trying", eventRevision: 1, answer: made.body["answer"], settings: { spread: { timeHours: 9 } }, ...choices });
  const { settings, input, answer, ...summary } = one.body;
  expect([settings, input, answer]).not.toContain(undefined);
  expect((await succeed("listLocalizations", { params: { id: "petrel" } })).body["localizations"]).toMatchObject([summary]);
  expect(((await succeed("listEvents")).body["events"] as { id: string }[]).find(({ id }) => id === "petrel")).toMatchObject({ latest: { number: 1 } });

  await succeed("keepLocalization", { params: { id: "petrel" }, body: { startedFrom: 1 } });
  expect((await succeed("compareLocalizations", { params: { id: "petrel", number: 2 }, query: { since: "1" } })).body).toMatchObject({ from: 1, to: 2 });
});

test("the description is served as it is made", async () => {
  const { body } = await succeed("describeInterface");
  expect(body["openapi"]).toMatch(/^3\.1\./);
  expect(Object.keys(body["paths"] as object)).toHaveLength(new Set(Object.values(OPERATIONS).map(({ path }) => path)).size);
});

test("no operation was left out above, but those of stations, which have a file of their own", () => {
  const stations = Object.values(OPERATIONS).filter(({ path }) => path.startsWith("/api/v1/stations"));
  expect([...done, ...stations.map(({ id }) => id)].sort()).toStrictEqual(Object.keys(OPERATIONS).sort());
});
