import { afterEach, describe, expect, test, vi } from "vitest";
import { bringIn, NO_PROGRESS, type Bringing, type Progress } from "../../app/readings/bring-in.ts";
import { placeIssues } from "../../app/readings/server-issues.ts";
import { shoreDeployment } from "#lib/contracts/hand-readings/placed-station.ts";

const placed = shoreDeployment({ id: "pier", name: "Pier", position: { latitudeDegrees: 21.6, longitudeDegrees: -158.1 }, timeZone: null });
const bringing: Bringing = {
  stationId: "pier",
  placed,
  readings: [
    { time: "2031-03-05T11:00:00.000Z", periodSeconds: 17, kind: "timed", quality: 2 },
    { time: "2031-03-05T19:00:00.000Z", frequencyHz: 20 / 301, frequencySigmaHz: 0.002, kind: "timed", quality: 2 },
  ],
  note: "",
  keep: { way: "new", title: "By hand", event: "" },
};

interface Sent {
  readonly readings?: readonly { time: string; periodSeconds?: number; frequencyHz?: number }[];
  readonly deployments?: unknown;
  readonly arrivals?: readonly number[];
}

/** What a server would have stored, and the answers that it gives by its published interface. */
function pretendServer() {
  const stations = new Map<string, unknown>();
  const arrivals: { readings: NonNullable<Sent["readings"]>; event: string | null }[] = [];
  let events = 0;
  const answer = (method: string, path: string, sent: Sent): [number, unknown] => {
    if (method === "PUT" && stations.has(path)) return [409, { issues: [{ path: "", message: "It was made since." }] }];
    if (method === "PUT") {
      stations.set(path, sent.deployments);
      return [200, {}];
    }
    if (path.startsWith("/api/v1/stations/")) return [200, { deployments: stations.get(path) }];
    if (path.startsWith("/api/v1/readings")) {
      return [200, { readings: arrivals.flatMap(({ readings }, i) => readings.map(({ time, periodSeconds, frequencyHz }) => ({ arrival: i + 1, time, frequencyHz: frequencyHz ?? 1 / (periodSeconds ?? NaN) }))) }];
    }
    if (method === "POST" && path === "/api/v1/arrivals") return [201, { id: arrivals.push({ readings: sent.readings ?? [], event: null }) }];
    if (path.startsWith("/api/v1/arrivals/")) return [200, arrivals[Number(path.split("/").at(-1)) - 1]];
    events += 1;
    for (const id of sent.arrivals ?? []) Object.assign(arrivals[id - 1] ?? {}, { event: `made-${events}` });
    return [201, { id: `made-${events}`, title: "By hand" }];
  };
  return { stations, arrivals, answer, eventCount: () => events };
}

/** The line breaks once, at the n-th request, before the server has heard it or after it has done its work. */
function serve(server: ReturnType<typeof pretendServer>, breaks: { at: number; when: "before" | "after" } | null): void {
  let count = 0;
  vi.stubGlobal("fetch", (path: string, { method, body }: { method: string; body?: string }) => {
    count += 1;
    const isBroken = breaks !== null && count === breaks.at;
    if (isBroken && breaks.when === "before") return Promise.reject(new TypeError("no network"));
    const [status, reply] = server.answer(method, path, JSON.parse(body ?? "{}") as Sent);
    return isBroken ? Promise.reject(new TypeError("no network")) : Promise.resolve(Response.json(reply, { status }));
  });
}

async function tryTwice(): Promise<{ first: string; second: string }> {
  const first = await bringIn(bringing, NO_PROGRESS);
  const progress: Progress = first.kind === "refused" ? first.progress : NO_PROGRESS;
  const second = first.kind === "in" ? first : await bringIn(bringing, progress);
  return { first: first.kind, second: second.kind };
}

afterEach(() => { vi.unstubAllGlobals(); });

describe("bringing readings in by hand", () => {
  const places = [1, 2, 3, 4].flatMap((at) => (["before", "after"] as const).map((when) => ({ at, when })));
  test.each(places)("when the line breaks at request $at, $when the server's work, goes on from there and stores all of it once", async (breaks) => {
    const server = pretendServer();
    serve(server, breaks);
    expect(await tryTwice()).toStrictEqual({ first: "refused", second: "in" });
    expect([server.stations.size, server.arrivals.length, server.eventCount()]).toStrictEqual([1, 1, 1]);
    expect(server.arrivals[0]?.event).toBe("made-1");
  });

  test("that are in already says so, and stores nothing", async () => {
    const server = pretendServer();
    serve(server, null);
    expect((await bringIn(bringing, NO_PROGRESS)).kind).toBe("in");
    const again = await bringIn({ ...bringing, placed: null }, NO_PROGRESS);
    expect(again.kind === "refused" && again.issues.map(({ message }) => message)).toStrictEqual(["The same readings of this station are in already, as arrival 1. They were not brought in again."]);
    expect([server.arrivals.length, server.eventCount()]).toStrictEqual([1, 1]);
  });

  test("at a new station whose id is taken puts that beside the id, and sends no reading", async () => {
    const server = pretendServer();
    server.stations.set("/api/v1/stations/pier", [{ latitudeDegrees: 50, longitudeDegrees: 0 }]);
    serve(server, null);
    const outcome = await bringIn(bringing, NO_PROGRESS);
    expect(outcome.kind === "refused" && placeIssues(outcome.issues, [1, 2]).placed).toMatchObject([{ field: "id" }]);
    expect(server.arrivals.length).toBe(0);
  });
});

test("what the server has against a request stands at the field that it is about", () => {
  const issue = (path: string) => ({ path, message: `about ${path}` });
  const placedAt = placeIssues(["readings[1].time", "readings[0].frequencyHz", "readings[7].time", "deployments[0].latitudeDegrees", "title", "station", "", "readings"].map(issue), [4, 9]);
  expect(placedAt.rows.map(({ key, field }) => [key, field])).toStrictEqual([[9, "time"], [4, "waves"]]);
  expect(placedAt.placed.map(({ field }) => field)).toStrictEqual(["latitude"]);
  expect([placedAt.title, placedAt.station, placedAt.event]).toStrictEqual(["about title", "about station", null]);
  // Nothing is swallowed: what has no field is said above the form's end.
  expect(placedAt.others).toStrictEqual(["about readings[7].time", "about ", "about readings"]);
});
