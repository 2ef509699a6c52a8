import { get } from "node:http";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { serveDemo, type ServedDemo } from "#tests/support/served-demo.ts";

interface Answered {
  readonly status: number;
  readonly body: Record<string, unknown> & { issues?: { code: string; path: string; message: string }[] };
  readonly location: string | null;
}

let demo: ServedDemo;
beforeAll(async () => {
  demo = await serveDemo();
});
afterAll(() => demo.stop());

const ofEvent = (id: string): string => `${demo.address}api/v1/events/${id}/localizations`;

async function asked(address: string, init?: RequestInit): Promise<Answered> {
  const response = await fetch(address, init);
  return { status: response.status, body: (await response.json()) as Answered["body"], location: response.headers.get("location") };
}

const keep = (id: string, body: unknown, headers: Record<string, string> = {}): Promise<Answered> =>
  asked(ofEvent(id), { method: "POST", headers: { "content-type": "application/json", ...headers }, body: typeof body === "string" ? body : JSON.stringify(body) });

describe("the localizations of an event over HTTP", () => {
  test("are made by the server, listed, read one by one, and refused to whoever started from an older one", async () => {
    expect(await asked(ofEvent("petrel"))).toMatchObject({ status: 200, body: { localizations: [] } });
    const first = await keep("petrel", { startedFrom: 0, reason: "First look" });
    expect(first).toMatchObject({ status: 201, body: { number: 1, answer: { outcome: "located" } }, location: "/api/v1/events/petrel/localizations/1" });
    const second = await keep("petrel", { startedFrom: 1, leftOut: ["wic"], settings: { spread: { timeHours: 9 } } });
    expect(second.status).toBe(201);
    const late = await keep("petrel", { startedFrom: 1 });
    expect(late).toMatchObject({ status: 409, body: { issues: [{ code: "conflict", message: expect.stringContaining("Number 2 of event") as string }] } });

    const { body } = await asked(ofEvent("petrel"));
    expect(body["localizations"]).toMatchObject([{ number: 2, leftOut: ["wic"], actor: "local keeper" }, { number: 1, reason: "First look", outcome: "located" }]);
    const one = await asked(`${demo.address}api/v1/events/petrel/localizations/2`);
    expect(one.body).toMatchObject({ number: 2, settings: { spread: { timeHours: 9, distanceKm: 150 } }, answer: second.body["answer"] });
  });

  test("are not found where there are none", async () => {
    expect((await asked(ofEvent("calm"))).status).toBe(404);
    expect((await keep("calm", { startedFrom: 0 })).status).toBe(404);
    for (const number of ["9", "x", "-1"]) expect((await asked(`${ofEvent("tern")}/${number}`)).status).toBe(404);
  });

  const faulty: [string, unknown, string][] = [
    ["no startedFrom", {}, "startedFrom"],
    ["half a number", { startedFrom: 0.5 }, "startedFrom"],
    ["stations that are no list", { startedFrom: 0, leftOut: "wic" }, "leftOut"],
    ["a station of another event", { startedFrom: 0, leftOut: ["nowhere"] }, "leftOut[0]"],
    ["a reason as long as a book", { startedFrom: 0, reason: "x".repeat(3000) }, "reason"],
    ["a setting out of range", { startedFrom: 0, settings: { spread: { timeHours: -1 } } }, "settings.spread.timeHours"],
    ["a key that is none", { startedFrom: 0, force: true }, ""],
    ["a list", [], ""],
    ["no JSON", "{", ""],
  ];
  test.each(faulty)("are not made from %s", async (_, body, path) => {
    const { status, body: answer } = await keep("heron", body);
    expect(status).toBe(400);
    expect(answer.issues).toHaveLength(1);
    expect(answer.issues?.[0]?.path).toBe(path);
    expect(answer.issues?.[0]?.message).toMatch(/\.$/);
    expect((await asked(ofEvent("heron"))).body["localizations"]).toStrictEqual([]);
  });

  test("are not made for a page elsewhere, from a form, from too much, or for another host", async () => {
    expect((await keep("heron", { startedFrom: 0 }, { origin: "http://elsewhere.example" })).status).toBe(403);
    expect((await keep("heron", "startedFrom=0", { "content-type": "application/x-www-form-urlencoded" })).status).toBe(400);
    expect((await keep("heron", { startedFrom: 0, reason: "x".repeat(2_000_000) })).status).toBe(413);
    const status = await new Promise((answer, reject) => {
      get(ofEvent("heron"), { headers: { host: "elsewhere.example" } }, (response) => {
        response.resume();
        answer(response.statusCode);
      }).on("error", reject);
    });
    expect(status).toBe(403);
    expect((await asked(ofEvent("heron"))).body["localizations"]).toStrictEqual([]);
  });
});
