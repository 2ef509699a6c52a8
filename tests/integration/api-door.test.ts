import { setTimeout as pause } from "node:timers/promises";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import * as z from "zod/mini";
import { problemsShape } from "#lib/contracts/api/api-document.ts";
import { MOST_JSON_BYTES } from "#lib/contracts/api/operation.ts";
import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { send, type ApiAnswer } from "#tests/support/api-client.ts";
import { processFamily } from "#tests/support/process-family.ts";
import { serveDemo, type ServedDemo } from "#tests/support/served-demo.ts";

let demo: ServedDemo;
beforeAll(async () => {
  demo = await serveDemo();
});
afterAll(() => demo.stop());

const JSON_TYPE = { "content-type": "application/json" };
const operations = Object.values(OPERATIONS);
const writing = operations.filter(({ method }) => method !== "GET");
const withJson = writing.filter(({ body }) => body?.type === "application/json");
/** Of nothing that is stored: the door stands before what the address names. */
const pathTo = ({ path }: { readonly path: string }): string => path.replaceAll(/\{\w+\}/g, "1");

interface Request {
  readonly method?: string;
  readonly path?: string;
  readonly headers?: Readonly<Record<string, string>>;
  readonly body?: string | Buffer | readonly Buffer[];
}

/** Asks, and holds every refusal to its published shape: whole sentences, and nothing of the program's inside. */
async function ask({ method = "POST", path = "/api/v1/events", ...rest }: Request): Promise<ApiAnswer> {
  const answer = await send(demo.address, { method, path, ...rest });
  if (answer.status >= 400) {
    expect(z.parse(problemsShape, answer.body)).toStrictEqual(answer.body);
    for (const { message } of answer.issues) {
      expect(message).toMatch(/\.$/);
      expect(message).not.toMatch(/node_modules|\.ts\b|prisma|sqlite|select|\n|Invalid input/i);
    }
  }
  return answer;
}

const state = async (): Promise<unknown> => [(await ask({ method: "GET" })).body, (await ask({ method: "GET", path: "/api/v1/arrivals?limit=99999" })).body];

describe("every operation", () => {
  test.each(operations)("$id is refused to whoever takes this server for another", async (operation) => {
    const { port } = new URL(demo.address);
    for (const host of ["elsewhere.example", `elsewhere.example:${port}`, "127.0.0.1.elsewhere.example", "192.0.2.7"]) {
      const answer = await ask({ method: operation.method, path: pathTo(operation), headers: { host, ...JSON_TYPE } });
      expect(answer, host).toMatchObject({ status: 403, issues: [{ code: "forbidden", path: "" }] });
    }
  });

  test.each(operations)("$id takes nothing in its address that it does not know, nor anything twice", async (operation) => {
    const type = operation.body?.type ?? "application/json";
    const asked = (search: string) => ask({ method: operation.method, path: `${pathTo(operation)}?${search}`, headers: { "content-type": type }, body: operation.method === "GET" ? "" : "{}" });
    expect(await asked("surprise=1")).toMatchObject({ status: 400 });
    expect((await asked("surprise=1")).issues.map(({ code }) => code)).toContain("unknown-key");
    expect(await asked("limit=1&limit=2")).toMatchObject({ status: 400, issues: [{ code: "repeated", path: "limit" }] });
  });

  test.each(writing)("$id is refused to pages elsewhere, and from forms", async (operation) => {
    const { method } = operation;
    const path = pathTo(operation);
    const { host } = new URL(demo.address);
    const type = operation.body?.type ?? "application/json";
    for (const origin of ["http://elsewhere.example", "null", `http://${host}.elsewhere.example`, "http://localhost:1", "file://"]) {
      expect(await ask({ method, path, headers: { "content-type": type, origin }, body: "{}" }), origin).toMatchObject({ status: 403, issues: [{ code: "forbidden", message: "A page elsewhere may not write here." }] });
    }
    for (const wrong of ["text/plain", "application/x-www-form-urlencoded", "multipart/form-data; boundary=x", ""]) {
      const headers = wrong === "" ? {} : { "content-type": wrong };
      expect(await ask({ method, path, headers, body: "{}" }), wrong).toMatchObject({ status: 400, issues: [{ code: "content-type" }] });
    }
    // Its own page passes the door, and what it asks for is looked at.
    const own = await ask({ method, path, headers: { "content-type": `${type.toUpperCase()}; charset=utf-8`, origin: `http://${host}` }, body: "{}" });
    expect(own.status).not.toBe(403);
    expect(own.issues.map(({ code }) => code)).not.toContain("content-type");
  });

  test.each(withJson)("$id refuses a body that is no object of its shape", async (operation) => {
    const { method } = operation;
    const path = pathTo(operation);
    const asked = (body: string | Buffer) => ask({ method, path, headers: JSON_TYPE, body });
    expect(await asked("")).toMatchObject({ status: 400, issues: [{ code: "not-json" }] });
    expect(await asked("{")).toMatchObject({ status: 400, issues: [{ code: "not-json" }] });
    expect(await asked("{} {}")).toMatchObject({ status: 400, issues: [{ code: "not-json" }] });
    expect(await asked("NaN")).toMatchObject({ status: 400, issues: [{ code: "not-json" }] });
    expect(await asked(Buffer.from([0x7b, 0xff, 0xfe, 0x7d]))).toMatchObject({ status: 400, issues: [{ code: "not-text" }] });
    for (const other of ["null", "[]", '"text"', "7"]) expect(await asked(other), other).toMatchObject({ status: 400, issues: [{ code: "invalid_type", path: "", message: expect.stringMatching(/^The request: found .*; wanted an object\.$/) as string }] });
    const depth = 100_000;
    expect(await asked(`{"note": ${"[".repeat(depth)}${"]".repeat(depth)}}`)).toMatchObject({ status: 400, issues: [{ code: "too-deep" }] });
    for (const key of ["force", "__proto__", "constructor"]) {
      const answer = await asked(`{"${key}": {"revision": 1}}`);
      expect(answer.status).toBe(400);
      expect(answer.issues, key).toContainEqual({ code: "unknown-key", path: "", message: `The request: found "${key}"; wanted only what it takes.` });
    }
  });

  test.each(withJson)("$id refuses a body of more than it takes, with its length told or in parts", async (operation) => {
    const { method, mostBytes } = operation;
    const path = pathTo(operation);
    expect(mostBytes).toBe(MOST_JSON_BYTES);
    const tooLong = Buffer.alloc(mostBytes + 1, " ");
    expect(await ask({ method, path, headers: JSON_TYPE, body: tooLong })).toMatchObject({ status: 413, issues: [{ code: "too-large", path: "", message: `The request holds more than ${mostBytes} bytes.` }] });
    const parts = [tooLong.subarray(0, 400_000), tooLong.subarray(400_000)];
    expect(await ask({ method, path, headers: { ...JSON_TYPE, "transfer-encoding": "chunked" }, body: parts })).toMatchObject({ status: 413 });
    const full = await ask({ method, path, headers: JSON_TYPE, body: tooLong.subarray(1) });
    expect(full).toMatchObject({ status: 400, issues: [{ code: "not-json" }] });
  });
});

describe("the programming interface", () => {
  test("refuses bodies of 40 MB without taking them into memory", async () => {
    const before = await serversMegabytes();
    const parts = Array.from({ length: 40 }, () => Buffer.alloc(1_000_000, " "));
    for (let round = 0; round < 5; round += 1) {
      expect((await ask({ headers: { ...JSON_TYPE, "content-length": "40000000" }, body: parts })).status).toBe(413);
      expect((await ask({ headers: { ...JSON_TYPE, "transfer-encoding": "chunked" }, body: parts })).status).toBe(413);
    }
    // Ten of them are 400 MB; the bound leaves room for what the runtime takes and gives back by itself.
    expect((await serversMegabytes()) - before).toBeLessThan(100);
    expect((await ask({ method: "GET" })).status).toBe(200);
  });

  test("tells that there is nothing at an address that no operation has", async () => {
    for (const path of ["/api/v1", "/api/v1/storms", "/api/v1/events/tern/localizations/1/nothing", "/api/v1/openapi"]) {
      for (const method of ["GET", "POST", "DELETE"]) {
        expect(await ask({ method, path, headers: JSON_TYPE }), `${method} ${path}`).toMatchObject({ status: 404, issues: [{ code: "not-found", message: `The programming interface has nothing at ${path}.` }] });
      }
    }
  });

  test("answers HEAD as GET without the body, says what an address takes, and lets no page elsewhere read", async () => {
    const head = await send(demo.address, { method: "HEAD", path: "/api/v1/events" });
    expect(head).toMatchObject({ status: 200, body: null });
    const options = await send(demo.address, { method: "OPTIONS", path: "/api/v1/events", headers: { origin: "http://elsewhere.example", "access-control-request-method": "POST" } });
    expect(options.status).toBe(204);
    expect(options.headers.allow?.split(", ").sort()).toStrictEqual(["GET", "HEAD", "OPTIONS", "POST"]);
    const read = await send(demo.address, { method: "GET", path: "/api/v1/events", headers: { origin: "http://elsewhere.example" } });
    for (const { headers } of [head, options, read]) expect(headers["access-control-allow-origin"]).toBeUndefined();
    expect((await send(demo.address, { method: "DELETE", path: "/api/v1/events" })).status).toBe(405);
  });

  test("looks ids up as they are meant, whatever letters they have", async () => {
    for (const [written, id] of [["a%2Fb", "a/b"], ["%C3%A9%F0%9F%8C%8A", "é🌊"], ["..%2F..%2Fstations", "../../stations"], ["%22%3B--", '";--'], ["a%20b", "a b"], ["100%25", "100%"], ["a%252Fb", "a%2Fb"]] as const) {
      expect(await ask({ method: "GET", path: `/api/v1/events/${written}` }), written).toMatchObject({ status: 404, issues: [{ message: `No event "${id}" is stored.` }] });
    }
    for (const broken of ["%E0%A4%A", "%", "a%zz", "%C3"]) {
      expect(await ask({ method: "GET", path: `/api/v1/events/${broken}` }), broken).toMatchObject({ status: 400, issues: [{ code: "address", message: "The address holds a percent sign that spells no letter." }] });
    }
    for (const id of ["0", "-1", "1.5", "1e3", "x", "99999999999999999999", "999999999"]) {
      for (const path of [`/api/v1/arrivals/${id}`, `/api/v1/events/tern/localizations/${id}`]) expect((await ask({ method: "GET", path })).status, path).toBe(404);
    }
  });

  test("was not changed by anything that it refused", async () => {
    const before = await state();
    for (const operation of withJson) await ask({ method: operation.method, path: pathTo(operation), headers: { ...JSON_TYPE, origin: "null" }, body: "{}" });
    expect(await state()).toStrictEqual(before);
    expect(JSON.stringify(before)).not.toContain("local keeper");
  });
});

/** Memory that the server holds, with the processes that it started. */
async function serversMegabytes(): Promise<number> {
  await pause(300);
  return processFamily(demo.processId).reduce((sum, { megabytes }) => sum + megabytes, 0);
}
