import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { exportStations } from "#lib/application/export-stations.ts";
import { previewStations, takeInStations } from "#lib/application/take-in-stations.ts";
import { InputError } from "#lib/core/failures/input-error.ts";
import type { Store } from "#lib/store/open-store.ts";
import { describedStations } from "#tests/support/described-stations.ts";
import { inventedEvent } from "#tests/support/invented-event.ts";
import { inventedStationFile, inventedStations } from "#tests/support/station-file.ts";
import { temporaryStore } from "#tests/support/temporary-store.ts";

const DOING = { actor: "a keeper", savedEpochSeconds: 1_700_000_000 };
const HEADER = "id,name,latitude,longitude,from,to,aliases,licence";

const take = (store: Store, text: string, token: string | null = null) => takeInStations(store, { text, fileName: "s.csv", token }, DOING);
const preview = (store: Store, text: string) => previewStations(store, { text, fileName: "s.csv" });

/** The codes and places of what is found wrong with a file. */
async function problems(work: Promise<unknown>): Promise<string[]> {
  try {
    await work;
  } catch (error) {
    if (error instanceof InputError) return error.issues.map(({ code, path }) => `${code} at ${path}`);
    throw error;
  }
  throw new Error("The file was taken.");
}

describe("stations taken in from a file", () => {
  test("are stored as described, exported to the same text, and left alone the second time", async () => {
    const { store } = await temporaryStore();
    const text = inventedStationFile(30);
    const report = await take(store, text);
    expect(report).toMatchObject({ isStored: true, changed: [], unchanged: [] });
    expect(report.added).toHaveLength(30);
    const stored = await store.listStations();
    expect(stored).toStrictEqual(inventedStations(30).map((station) => ({ ...station, revision: 1, arrivalCount: 0, lastReadingEpochSeconds: null })));
    expect(await exportStations(store)).toBe(text);
    expect(await take(store, text)).toMatchObject({ added: [], changed: [], unchanged: stored.map(({ id }) => id) });
    expect((await store.listStations()).map(({ revision }) => revision)).toStrictEqual(stored.map(() => 1));
    expect(await store.listAudit({ subject: "station st0001", limit: 9 })).toHaveLength(1);
  });

  test("come back from the database to the last digit and letter, whatever they hold", async () => {
    for (const described of fc.sample(describedStations, { numRuns: 12, seed: 7 })) {
      const { store } = await temporaryStore();
      await store.saveStations(described.map((description) => ({ description, startedFrom: 0 })), DOING);
      const byId = described.toSorted((a, b) => (a.id < b.id ? -1 : 1));
      const stored = await store.listStations();
      expect(stored.toSorted((a, b) => (a.id < b.id ? -1 : 1))).toStrictEqual(byId.map((one) => ({ ...one, revision: 1, arrivalCount: 0, lastReadingEpochSeconds: null })));
      expect(await take(store, await exportStations(store))).toMatchObject({ added: [], changed: [] });
    }
  });

  test("are told field by field before anything is stored, and stored as told", async () => {
    const { store } = await temporaryStore();
    await take(store, `${HEADER}\na,Alder,10,20,,,wmo:1,CC0\nb,Birch,1,2,,,,`);
    const file = `${HEADER}\na,Alder,10.5,20,,2020-01-01T00:00Z,wmo:1,CC-BY-4.0\na,Alder,11,20,2020-01-01T00:00Z,,,\nb,Birch,1,2,,,,\nc,Cedar,3,4,,,,`;
    const seen = await preview(store, file);
    expect(seen).toMatchObject({ isStored: false, added: ["c"], unchanged: ["b"] });
    expect(seen.changed).toStrictEqual([
      {
        id: "a",
        changes: [
          { field: "licence", deployment: null, before: "CC0", after: "CC-BY-4.0" },
          { field: "latitude", deployment: 1, before: "10", after: "10.5" },
          { field: "to", deployment: 1, before: "", after: "2020-01-01T00:00:00Z" },
          { field: "deployment", deployment: 2, before: "", after: "Alder, 11 20, 2020-01-01T00:00:00Z/.." },
        ],
      },
    ]);
    expect((await store.listStations()).map(({ id }) => id)).toStrictEqual(["a", "b"]);
    const done = await take(store, file, seen.token);
    expect({ ...done, isStored: false }).toStrictEqual(seen);
    expect((await store.loadStation("a"))?.deployments).toHaveLength(2);
    // Sent again because its answer was lost, it finds all of it done.
    expect(await take(store, file, seen.token)).toMatchObject({ added: [], changed: [], isStored: true });
  });

  test("are refused under the token of another file, or where one was changed since, and then none is stored", async () => {
    const { store } = await temporaryStore();
    await take(store, `${HEADER}\na,Alder,10,20,,,,`);
    const file = `${HEADER}\na,Alder,11,20,,,,\nb,Birch,1,2,,,,`;
    const { token } = await preview(store, file);
    await expect(take(store, `${file}\nc,Cedar,1,2,,,,`, token)).rejects.toMatchObject({ reason: "conflict" });
    await take(store, `${HEADER}\na,Alder,12,20,,,,`);
    await expect(take(store, file, token)).rejects.toMatchObject({ reason: "conflict" });
    expect((await store.listStations()).map(({ id }) => id)).toStrictEqual(["a"]);
  });

  test("keep what the file has no column for, and lose what it has an empty cell for", async () => {
    const { store } = await temporaryStore();
    await take(store, "id,name,latitude,longitude,depth_m,shelf,aliases,licence,note\na,Alder,10,20,30,12:40,wmo:1,CC0,Moored");
    const stored = await store.loadStation("a");
    await take(store, "id,name,latitude,longitude,licence,contact\na,Alder Head,10,20,,a@example.org");
    expect(await store.loadStation("a")).toStrictEqual({
      ...stored,
      revision: 2,
      licence: null,
      contact: "a@example.org",
      deployments: stored?.deployments.map((one) => ({ ...one, name: "Alder Head" })),
    });
  });

  test("keep each deployment's own where the file tells deployments apart", async () => {
    const { store } = await temporaryStore();
    const spans = ["2000-01-01T00:00Z,2010-01-01T00:00Z", "2010-01-01T00:00Z,"];
    await take(store, `id,name,latitude,longitude,from,to,depth_m\na,A,1,2,${spans[0] ?? ""},30\na,A,1,3,${spans[1] ?? ""},40`);
    await take(store, `id,name,latitude,longitude,from,to\na,A,1,2,${spans[0] ?? ""}\na,A,1,9,2011-01-01T00:00Z,`);
    expect((await store.loadStation("a"))?.deployments.map(({ depthMetres }) => depthMetres)).toStrictEqual([30, null]);
  });

  test("may hand an alias on among themselves, and may not take another station's", async () => {
    const { store } = await temporaryStore();
    await take(store, `${HEADER}\na,A,1,2,,,wmo:1,\nb,B,1,2,,,wmo:2,`);
    await take(store, `${HEADER}\na,A,1,2,,,wmo:2,\nb,B,1,2,,,wmo:1,`);
    expect((await store.listStations()).map(({ aliases }) => aliases)).toStrictEqual([[{ scheme: "wmo", value: "2" }], [{ scheme: "wmo", value: "1" }]]);
    expect(await problems(take(store, `${HEADER}\nc,C,1,2,,,,\nd,D,1,2,,,wmo:1,`))).toStrictEqual(["alias-taken at s.csv, row 3, column aliases"]);
    await expect(store.saveStations([{ description: { ...(inventedStations(1)[0] ?? fail()), aliases: [{ scheme: "wmo", value: "1" }] }, startedFrom: 0 }], DOING)).rejects.toMatchObject({ reason: "conflict" });
  });

  test("that an event has brought are described further, and stay the event's", async () => {
    const { store } = await temporaryStore();
    const event = inventedEvent("storm");
    await store.saveEvent(event);
    const [first] = await store.listStations();
    await take(store, (await exportStations(store)).replaceAll(",local,", ",coast,"));
    expect(await store.loadStation(first?.id ?? "")).toStrictEqual({ ...first, groupId: "coast", revision: 2 });
    expect((await store.loadEvent(event.id))?.observations.deployments).toStrictEqual(event.observations.deployments);
  });

  const faulty: [string, string, string[]][] = [
    ["overlapping deployments", `${HEADER}\na,A,1,2,,,,\na,A,1,3,2020-01-01T00:00Z,,,`, ["overlapping-deployments at s.csv, row 3, column id"]],
    ["rows of one station that disagree", `${HEADER}\na,A,1,2,,2020-01-01T00:00Z,,CC0\na,A,1,3,2020-01-01T00:00Z,,,MIT`, ["rows-disagree at s.csv, row 3, column licence"]],
    ["one alias for two stations", `${HEADER}\na,A,1,2,,,wmo:1,\nb,B,1,2,,,WMO:1,`, ["alias-taken at s.csv, row 3, column aliases"]],
    ["an alias without its scheme, and twice the same", `${HEADER}\na,A,1,2,,,46001,\nb,B,1,2,,,wmo:1 wmo:1,`, ["not-taken at s.csv, row 2, column aliases", "not-taken at s.csv, row 3, column aliases"]],
    ["a name that an address takes for something else", `${HEADER}\nnew,A,1,2,,,,`, ["not-taken at s.csv, row 2, column id"]],
    ["text without end", `${HEADER}\na,${"A".repeat(201)},1,2,,,,${"L".repeat(201)}`, ["not-taken at s.csv, row 2, column licence", "not-taken at s.csv, row 2, column name"]],
  ];
  test.each(faulty)("are refused by row for %s", async (_, text, expected) => {
    const { store } = await temporaryStore();
    expect((await problems(take(store, text))).toSorted()).toStrictEqual(expected);
    expect(await store.listStations()).toStrictEqual([]);
  });

  const cells: [string, string][] = [
    ["clock_corrections", "2004-02-01T00:00Z/2004-03-01T00:00Z 3600"],
    ["clock_corrections", "2004-02-01T00:00/.. 3600 no zone"],
    ["clock_corrections", "2004-03-01T00:00Z/2004-02-01T00:00Z 3600 backwards"],
    ["clock_corrections", "../.. 0 nothing"],
    ["clock_corrections", "../.. 2e9 for ever"],
    ["clock_corrections", "../2004-03-01T00:00Z 60 one | 2004-02-01T00:00Z/.. 60 two"],
    ["doi", "doi.org"],
    ["visibility", "everybody"],
    ["embargo_until", "2030-01-01"],
    ["contact", "\"two\nlines\""],
    ["group", "g".repeat(81)],
    ["note", "n".repeat(4001)],
  ];
  test.each(cells)("are refused for a faulty cell of %s: %s", async (column, cell) => {
    const { store } = await temporaryStore();
    const text = `id,name,latitude,longitude,${column}\na,A,1,2,\nb,B,1,2,${cell}`;
    expect(await problems(take(store, text))).toStrictEqual([expect.stringMatching(new RegExp(`^[\\w-]+ at s.csv, row ${cell.includes("\n") ? 4 : 3}, column ${column}$`))]);
  });

  test("are read in what people write for the same: capital letters, a DOI's address, an offset", async () => {
    const { store } = await temporaryStore();
    await take(store, "ID;Name;latitude;longitude;doi;visibility;aliases;clock_corrections\na;A;1;359;https://doi.org/10.1234/x;Public;WMO:46001;2004-02-01T10:00+10:00/.. +3600  log in local time ");
    expect(await store.loadStation("a")).toMatchObject({
      deployments: [{ position: { longitudeDegrees: -1 } }],
      doi: "10.1234/x",
      visibility: "public",
      aliases: [{ scheme: "wmo", value: "46001" }],
      clockCorrections: [{ fromEpochSeconds: Date.UTC(2004, 1, 1) / 1000, toEpochSeconds: null, fastBySeconds: 3600, reason: "log in local time" }],
    });
  });

  test("number more than one statement of the database takes", async () => {
    const { store } = await temporaryStore();
    const text = inventedStationFile(1200);
    expect((await take(store, text)).added).toHaveLength(1200);
    const changed = await take(store, text.replaceAll("CC-BY-4.0", "CC0").replaceAll(",80,", ",81,"));
    expect(changed.changed).toHaveLength(1200);
    expect(await exportStations(store)).toBe(text.replaceAll("CC-BY-4.0", "CC0").replaceAll(",80,", ",81,"));
  });
});

function fail(): never {
  throw new Error("There is no such station.");
}
