import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { perform, type ApiAnswer, type ApiCall, type OperationId } from "#tests/support/api-client.ts";
import { serveDemo, type ServedDemo } from "#tests/support/served-demo.ts";

let demo: ServedDemo;
beforeAll(async () => {
  demo = await serveDemo();
});
afterAll(() => demo.stop());

const AT_ONCE = 20;

async function made(id: OperationId, call: ApiCall): Promise<Record<string, unknown>> {
  const { status, body, issues } = await perform(demo.address, id, call);
  expect(status, JSON.stringify(issues)).toBeLessThan(300);
  return body as Record<string, unknown>;
}

const arrival = async (event: string | null = null): Promise<number> =>
  Number((await made("bringInArrival", { body: { station: "wic", event, readings: [{ time: "2024-02-28T14:30Z", periodSeconds: 18 }, { time: "2024-02-28T20:30Z", periodSeconds: 16 }] } }))["id"]);

async function event(id: string, arrivals = 2): Promise<{ id: string; revision: number; arrivals: number[] }> {
  const ids: number[] = [];
  for (let count = 0; count < arrivals; count += 1) ids.push(await arrival());
  const { revision } = await made("openEvent", { body: { id, title: id, arrivals: ids } });
  return { id, revision: Number(revision), arrivals: ids };
}

/** Everything that bears a revision and could be changed by the edits below. */
async function standing(): Promise<unknown> {
  return [(await made("listEvents", {}))["events"], (await made("listArrivals", { query: { limit: "99999" } }))["arrivals"]];
}

/** Edits that all start from one state, made anew by `prepare`: the one asked for, and one that would differ from it. */
const EDITS: readonly { readonly id: OperationId; readonly prepare: (name: string) => Promise<(maker: number) => ApiCall> }[] = [
  {
    id: "flagReading",
    prepare: async () => {
      const id = await arrival();
      const { readings } = await made("readArrival", { params: { id } });
      const [reading] = readings as { id: number }[];
      return (maker) => ({ params: { id: reading?.id ?? 0 }, body: { revision: 1, quality: maker % 2 === 0 ? 3 : 4 } });
    },
  },
  {
    id: "moveArrival",
    prepare: async (name) => {
      const id = await arrival();
      const events = [await event(`${name}-a`, 0), await event(`${name}-b`, 0)];
      return (maker) => ({ params: { id }, body: { revision: 1, event: events[maker % 2]?.id } });
    },
  },
  {
    id: "describeEvent",
    prepare: async (name) => {
      const { id, revision } = await event(name, 0);
      return (maker) => ({ params: { id }, body: { revision, title: `Title ${maker}`, note: "" } });
    },
  },
  {
    id: "mergeEvents",
    prepare: async (name) => {
      const [into, from] = [await event(`${name}-into`), await event(`${name}-from`)];
      return () => ({ params: { id: into.id }, body: { revision: into.revision, from: from.id, fromRevision: from.revision } });
    },
  },
  {
    id: "splitEvent",
    prepare: async (name) => {
      const { id, revision, arrivals } = await event(name, 3);
      return (maker) => ({ params: { id }, body: { revision, arrivals: [arrivals[maker % 3]], title: `Part ${maker}` } });
    },
  },
  {
    id: "openEvent",
    prepare: async (name) => {
      await event("other", 0).catch(() => undefined);
      return (maker) => ({ body: { id: name, title: `Title ${maker}` } });
    },
  },
];

/** Its issue says what is stored and what the change started from. */
function expectStale({ status, issues }: ApiAnswer): void {
  expect(status).toBe(409);
  expect(issues).toMatchObject([{ code: "conflict", path: "", message: expect.stringMatching(/\.$/) as string }]);
}

describe.each(EDITS)("$id", ({ id, prepare }) => {
  test("of two edits from one revision, the second is told that it is stale and changes nothing", async () => {
    const edit = await prepare(`${id.toLowerCase()}-two`);
    expect((await perform(demo.address, id, edit(0))).status).toBeLessThan(300);
    const before = await standing();
    expectStale(await perform(demo.address, id, edit(1)));
    expect(await standing()).toStrictEqual(before);
  });

  test(`of ${AT_ONCE} at once exactly one wins`, async () => {
    const edit = await prepare(`${id.toLowerCase()}-many`);
    const answers = await Promise.all(Array.from({ length: AT_ONCE }, (_, maker) => perform(demo.address, id, edit(maker))));
    expect(answers.filter(({ status }) => status < 300)).toHaveLength(1);
    for (const answer of answers.filter(({ status }) => status >= 300)) expectStale(answer);
  });
});

describe("keepLocalization", () => {
  test("of two that started from one number, of one event's older revision, and of a revision to come: 409, and nothing kept", async () => {
    const keep = (body: object) => perform(demo.address, "keepLocalization", { params: { id: "tern" }, body });
    expect((await keep({ startedFrom: 0, eventRevision: 1 })).status).toBe(201);
    expectStale(await keep({ startedFrom: 0, eventRevision: 1 }));
    await made("describeEvent", { params: { id: "tern" }, body: { revision: 1, title: "Another", note: "" } });
    const stale = await keep({ startedFrom: 1, eventRevision: 1 });
    expectStale(stale);
    expect(stale.issues[0]?.message).toBe('Event "tern" was changed meanwhile: it is at revision 2, and this answer is of revision 1.');
    expectStale(await keep({ startedFrom: 1, eventRevision: 3 }));
    expectStale(await keep({ startedFrom: 5, eventRevision: 2 }));
    expect((await made("listLocalizations", { params: { id: "tern" } }))["localizations"]).toHaveLength(1);
  });

  test(`of ${AT_ONCE} at once exactly one is kept`, async () => {
    const answers = await Promise.all(Array.from({ length: AT_ONCE }, () => perform(demo.address, "keepLocalization", { params: { id: "fulmar" }, body: { startedFrom: 0 } })));
    expect(answers.map(({ status }) => status).sort()).toStrictEqual([201, ...Array.from({ length: AT_ONCE - 1 }, () => 409)]);
    expect((await made("listLocalizations", { params: { id: "fulmar" } }))["localizations"]).toHaveLength(1);
  });
});

describe("events", () => {
  test("that are named by the program are all made, each under a name of its own", async () => {
    const answers = await Promise.all(Array.from({ length: AT_ONCE }, (_, maker) => perform(demo.address, "openEvent", { body: { title: `Nameless ${maker}` } })));
    expect(answers.map(({ status }) => status)).toStrictEqual(Array.from({ length: AT_ONCE }, () => 201));
    expect(new Set(answers.map(({ body }) => (body as { id: string }).id)).size).toBe(AT_ONCE);
  });

  test("take no arrival away from another: of several that want one, the first has it", async () => {
    const id = await arrival();
    const answers = await Promise.all(Array.from({ length: AT_ONCE }, (_, maker) => perform(demo.address, "openEvent", { body: { title: `Wants it ${maker}`, arrivals: [id] } })));
    expect(answers.filter(({ status }) => status === 201)).toHaveLength(1);
    const stale = answers.filter(({ status }) => status !== 201);
    for (const answer of stale) expectStale(answer);
    const { event: owner } = await made("readArrival", { params: { id } });
    expect(stale[0]?.issues[0]?.message).toBe(`Arrival ${id} belongs to event "${String(owner)}". Move it from there, or split that event.`);
  });

  test("that were merged take no more changes, and are not listed", async () => {
    const [into, from] = [await event("kept-one"), await event("gone-one")];
    await made("mergeEvents", { params: { id: into.id }, body: { revision: 1, from: from.id, fromRevision: 1 } });
    const waiting = await arrival();
    const changes: [OperationId, ApiCall][] = [
      ["describeEvent", { params: { id: from.id }, body: { revision: 2, title: "x", note: "" } }],
      ["mergeEvents", { params: { id: from.id }, body: { revision: 2, from: into.id, fromRevision: 2 } }],
      ["mergeEvents", { params: { id: into.id }, body: { revision: 2, from: from.id, fromRevision: 2 } }],
      ["splitEvent", { params: { id: from.id }, body: { revision: 2, arrivals: [into.arrivals[0]], title: "x" } }],
      ["moveArrival", { params: { id: waiting }, body: { revision: 1, event: from.id } }],
      ["bringInArrival", { body: { station: "wic", event: from.id, readings: [{ time: "2024-02-28T14:30Z", periodSeconds: 18 }] } }],
      ["keepLocalization", { params: { id: from.id }, body: { startedFrom: 0 } }],
      ["openEvent", { body: { id: from.id, title: "Anew" } }],
    ];
    const before = await standing();
    for (const [id, call] of changes) expectStale(await perform(demo.address, id, call));
    expectStale(await perform(demo.address, "mergeEvents", { params: { id: into.id }, body: { revision: 2, from: into.id, fromRevision: 2 } }));
    expect(await standing()).toStrictEqual(before);
    expect(JSON.stringify(before)).not.toContain('"id":"gone-one"');
  });

  test("keep one arrival at least when they are split", async () => {
    const { id, arrivals } = await event("whole");
    expect(await perform(demo.address, "splitEvent", { params: { id }, body: { revision: 1, arrivals, title: "All" } })).toMatchObject({ status: 400, issues: [{ code: "nothing-left", path: "arrivals" }] });
  });
});
