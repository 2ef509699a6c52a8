import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { inventedStationFile } from "#tests/support/station-file.ts";
import { serveDemo, type ServedDemo } from "#tests/support/served-demo.ts";

interface Answered {
  readonly status: number;
  readonly body: Record<string, unknown> & { issues?: { code: string; path: string; message: string }[] };
}

let demo: ServedDemo;
beforeAll(async () => {
  demo = await serveDemo();
});
afterAll(() => demo.stop());

async function asked(path: string, method = "GET", body?: unknown, type = "application/json"): Promise<Answered> {
  const init = { method, headers: { "content-type": type }, ...(body === undefined ? {} : { body: typeof body === "string" ? body : JSON.stringify(body) }) };
  const response = await fetch(`${demo.address}api/v1/${path}`, init);
  return { status: response.status, body: (await response.json()) as Answered["body"] };
}

const DEPLOYMENT = { name: "Alder", latitudeDegrees: 10, longitudeDegrees: 20 };
const takeIn = (text: string, query = ""): Promise<Answered> => asked(`stations.csv${query}`, "POST", text, "text/csv");

describe("stations over HTTP", () => {
  test("are made, read, described anew, refused to whoever started from an older revision, and removed", async () => {
    const made = await asked("stations/a%2F1", "PUT", { revision: 0, deployments: [DEPLOYMENT] });
    expect(made).toMatchObject({ status: 200, body: { id: "a/1", revision: 1, group: "local", visibility: "group", aliases: [], licence: null, arrivals: 0, lastReading: null } });
    expect(made.body["deployments"]).toStrictEqual([{ ...DEPLOYMENT, depthMetres: null, sensor: "surface", facesFromDegrees: null, facesToDegrees: null, recordMinutes: null, stamp: null, timeZone: null, from: null, to: null, shelf: [] }]);
    expect((await asked("stations/a%2F1", "PUT", { revision: 0, deployments: [DEPLOYMENT] })).status).toBe(409);

    // All that it gives but what the server alone knows.
    const rest = Object.fromEntries(Object.entries(made.body).filter(([key]) => !["id", "arrivals", "lastReading"].includes(key)));
    const described = { ...rest, licence: " CC0 ", doi: "https://doi.org/10.1234/x", embargoUntil: "2030-01-01T10:00+10:00", note: "one\r\ntwo" };
    expect((await asked("stations/a%2F1", "PUT", described)).body).toMatchObject({ revision: 2, licence: "CC0", doi: "10.1234/x", embargoUntil: "2030-01-01T00:00:00.000Z", note: "one\ntwo" });
    expect(await asked("stations/a%2F1", "PUT", described)).toMatchObject({ status: 409, body: { issues: [{ code: "conflict", message: expect.stringContaining("is at revision 2") as string }] } });
    // What is not given is taken away.
    expect((await asked("stations/a%2F1", "PUT", { revision: 2, deployments: [DEPLOYMENT] })).body).toMatchObject({ licence: null, note: "" });
    expect((await asked("stations/a%2F1?revision=2", "DELETE")).status).toBe(409);
    expect(await asked("stations/a%2F1?revision=3", "DELETE")).toMatchObject({ status: 200, body: { id: "a/1" } });
    expect((await asked("stations/a%2F1")).status).toBe(404);
    expect((await asked("stations/a%2F1?revision=3", "DELETE")).status).toBe(404);
    expect((await asked("stations/col?revision=1", "DELETE")).body.issues?.[0]?.message).toContain("has 2 arrivals");
  });

  const SPANS = [{ ...DEPLOYMENT, to: "2020-01-01T00:00Z" }, { ...DEPLOYMENT, from: "2019-01-01T00:00Z" }];
  const faulty: [string, object, string][] = [
    ["no deployment", { deployments: [] }, "deployments"],
    ["no name", { deployments: [{ ...DEPLOYMENT, name: "  " }] }, "deployments[0].name"],
    ["a name of two lines", { deployments: [{ ...DEPLOYMENT, name: "a\nb" }] }, "deployments[0].name"],
    ["a latitude beyond the pole", { deployments: [{ ...DEPLOYMENT, latitudeDegrees: 91 }] }, "deployments[0].latitudeDegrees"],
    ["a latitude in words", { deployments: [{ ...DEPLOYMENT, latitudeDegrees: "ten" }] }, "deployments[0].latitudeDegrees"],
    ["a depth of nothing", { deployments: [{ ...DEPLOYMENT, depthMetres: 0 }] }, "deployments[0].depthMetres"],
    ["half an exposure", { deployments: [{ ...DEPLOYMENT, facesFromDegrees: 10 }] }, "deployments[0].facesToDegrees"],
    ["a zone that is none", { deployments: [{ ...DEPLOYMENT, timeZone: "Mars/Olympus" }] }, "deployments[0].timeZone"],
    ["a time without a zone", { deployments: [{ ...DEPLOYMENT, from: "2020-01-01T00:00" }] }, "deployments[0].from"],
    ["a span that runs backwards", { deployments: [{ ...DEPLOYMENT, from: "2020-01-01T00:00Z", to: "2019-01-01T00:00Z" }] }, "deployments[0].to"],
    ["deployments that overlap", { deployments: SPANS }, "deployments[1].from"],
    ["a leg without depth", { deployments: [{ ...DEPLOYMENT, shelf: [{ lengthKm: 1 }] }] }, "deployments[0].shelf[0].depthMetres"],
    ["an alias twice", { aliases: [{ scheme: "wmo", value: "1" }, { scheme: "wmo", value: "1" }] }, "aliases[1].value"],
    ["an alias with a space", { aliases: [{ scheme: "wmo", value: "1 2" }] }, "aliases[0].value"],
    ["a scheme in capitals", { aliases: [{ scheme: "WMO", value: "1" }] }, "aliases[0].scheme"],
    ["a clock that was right", { clockCorrections: [{ fastBySeconds: 0, reason: "none" }] }, "clockCorrections[0].fastBySeconds"],
    ["a correction without reason", { clockCorrections: [{ fastBySeconds: 1, reason: "" }] }, "clockCorrections[0].reason"],
    ["corrections that overlap", { clockCorrections: [{ fastBySeconds: 1, reason: "a" }, { fastBySeconds: 2, reason: "b" }] }, "clockCorrections[1].from"],
    ["a DOI that is none", { doi: "doi" }, "doi"],
    ["an unknown visibility", { visibility: "all" }, "visibility"],
    ["an embargo on a day", { embargoUntil: "2030-01-01" }, "embargoUntil"],
    ["a note as long as a book", { note: "x".repeat(4001) }, "note"],
    ["control characters", { contact: "a\u0007b" }, "contact"],
    ["a revision below none", { revision: -1 }, "revision"],
    ["a key that is none", { colour: "red" }, ""],
  ];
  test.each(faulty)("are not made with %s", async (_, part, path) => {
    const { status, body } = await asked("stations/faulty", "PUT", { revision: 0, deployments: [DEPLOYMENT], ...part });
    expect(status).toBe(400);
    expect(body.issues?.map((issue) => issue.path)).toStrictEqual([path]);
    expect(body.issues?.[0]?.message).toMatch(/; wanted .*\.$/);
    expect((await asked("stations/faulty")).status).toBe(404);
  });

  test.each(["new", "%20", ".%2F%0A"])("are not made under the id %s", async (id) => {
    const { status, body } = await asked(`stations/${id}`, "PUT", { revision: 0, deployments: [DEPLOYMENT] });
    expect([status, body.issues?.[0]?.path]).toStrictEqual([400, "id"]);
  });

  test("are given out as a file and taken back, by preview and token or at once", async () => {
    const response = await fetch(`${demo.address}api/v1/stations.csv`);
    expect(response.headers.get("content-type")).toBe("text/csv; charset=utf-8");
    expect(response.headers.get("content-disposition")).toBe('attachment; filename="stations.csv"');
    const text = await response.text();
    const { body: listed } = await asked("stations");
    const ids = (listed["stations"] as { id: string }[]).map(({ id }) => id);
    expect((await takeIn(text)).body).toMatchObject({ stored: true, added: [], changed: [], unchanged: ids });

    const file = inventedStationFile(40);
    const preview = await takeIn(file, "?preview=yes");
    expect(preview.body).toMatchObject({ stored: false, changed: [] });
    expect((await asked("stations")).body).toStrictEqual(listed);
    expect((await takeIn(file, `?token=${"0".repeat(64)}`)).status).toBe(409);
    expect((await takeIn(file, `?token=${String(preview.body["token"])}`)).body).toMatchObject({ stored: true, added: preview.body["added"] });
    expect((await takeIn(file, `?token=${"0".repeat(64)}&preview=yes`)).body.issues?.map(({ path }) => path)).toStrictEqual(["token"]);
    expect((await takeIn(file, "?token=x")).body.issues?.map(({ path }) => path)).toStrictEqual(["token"]);
    expect((await asked("stations.csv", "POST", "{}", "application/json")).status).toBe(400);
    const overlapping = await takeIn("id,name,latitude,longitude\nx,X,1,2\nx,X,1,3");
    expect(overlapping).toMatchObject({ status: 400, body: { issues: [{ code: "overlapping-deployments", path: "stations.csv, row 3, column id" }] } });
  });

  test("take an alias that is another's for a conflict", async () => {
    await asked("stations/p", "PUT", { revision: 0, deployments: [DEPLOYMENT], aliases: [{ scheme: "port", value: "P-1" }] });
    expect(await asked("stations/q", "PUT", { revision: 0, deployments: [DEPLOYMENT], aliases: [{ scheme: "port", value: "P-1" }] })).toMatchObject({ status: 409, body: { issues: [{ message: expect.stringContaining('"p"') as string }] } });
    expect((await asked("stations/q")).status).toBe(404);
  });
});
