import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, test, vi } from "vitest";
import { ROLES, type Role } from "#lib/contracts/api/operation.ts";
import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { InputError } from "#lib/core/failures/input-error.ts";
import { Refusal, type RefusalReason } from "#lib/core/failures/refusal.ts";
import { route } from "#lib/http/answer-request.ts";
import { openStore } from "#lib/store/open-store.ts";
import { MIGRATIONS_DIRECTORY } from "#tests/support/migrations-directory.ts";

/** Routes open the data folder that the server was started with. */
let folder = "";
beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), "offing-door-"));
  await (await openStore({ dataDirectory: folder, migrationsDirectory: MIGRATIONS_DIRECTORY })).close();
  vi.stubEnv("OFFING_DATA_DIRECTORY", folder);
});
afterAll(() => {
  vi.unstubAllEnvs();
  rmSync(folder, { recursive: true, force: true });
});

const asked = (init: Pick<RequestInit, "method" | "body"> = {}): Request => new Request("http://127.0.0.1/api/v1/x", { ...init, headers: { host: "127.0.0.1", "content-type": "application/json" } });
const context = { params: Promise.resolve({}) };
const nobodyWith = (roles: readonly Role[]) => () => ({ name: "Somebody", roles });

describe("a route asks who may do it", () => {
  test.each(ROLES)("the role of %s opens what needs it, and all other roles together do not", async (role) => {
    const operation = { ...OPERATIONS.listEvents, role };
    const work = vi.fn(() => Promise.resolve({ body: { events: [] } }));
    const others = ROLES.filter((other) => other !== role);
    const refused = await route(operation, work, nobodyWith(others))(asked(), context);
    expect(refused.status).toBe(403);
    expect(await refused.json()).toStrictEqual({ issues: [{ code: "forbidden", path: "", message: `This is for those with the role of ${role}, which Somebody does not have.` }] });
    expect(work).not.toHaveBeenCalled();
    expect((await route(operation, work, nobodyWith([role]))(asked(), context)).status).toBe(200);
    expect(work).toHaveBeenCalledTimes(1);
  });

  test("before it reads a word of what is asked", async () => {
    const request = asked({ method: "POST", body: "{" });
    const refused = await route(OPERATIONS.openEvent, () => Promise.resolve({ body: null }), nobodyWith(["reader"]))(request, context);
    expect(refused.status).toBe(403);
    expect(request.bodyUsed).toBe(false);
  });

  test("and writes who it was into the work", async () => {
    const work = ({ doing }: { readonly doing: { readonly actor: string } }) => Promise.resolve({ body: doing.actor });
    const answer = await route(OPERATIONS.listEvents, work, nobodyWith(["reader"]))(asked(), context);
    expect(await answer.json()).toBe("Somebody");
  });
});

describe("a route turns failures into statuses", () => {
  const failing = (error: unknown) => route(OPERATIONS.listEvents, () => Promise.reject(error as Error))(asked(), context);
  const statuses: [RefusalReason, number][] = [["not-found", 404], ["conflict", 409], ["forbidden", 403], ["too-large", 413], ["too-many", 429]];

  test.each(statuses)("a refusal of the kind %s is %i", async (reason, status) => {
    const answer = await failing(new Refusal(reason, "No."));
    expect(answer.status).toBe(status);
    expect(await answer.json()).toStrictEqual({ issues: [{ code: reason, path: "", message: "No." }] });
  });

  test("wrong input is 400, with all its issues", async () => {
    const issues = [{ code: "a", path: "b[0]", message: "C." }, { code: "d", path: "", message: "E." }];
    const answer = await failing(new InputError(issues));
    expect(answer.status).toBe(400);
    expect(await answer.json()).toStrictEqual({ issues });
  });

  test("a sender that goes away in the middle of its body is no fault of the program", async () => {
    const log = vi.spyOn(console, "error").mockImplementation(() => undefined);
    const body = new ReadableStream({
      pull(controller) {
        controller.error(new Error("aborted"));
      },
    });
    const request = new Request("http://127.0.0.1/api/v1/x", { method: "POST", body, duplex: "half", headers: { host: "127.0.0.1", "content-type": "application/json" } } as RequestInit);
    const answer = await route(OPERATIONS.openEvent, () => Promise.resolve({ body: null }))(request, context);
    expect(answer.status).toBe(400);
    expect(await answer.json()).toMatchObject({ issues: [{ code: "not-whole" }] });
    expect(log).not.toHaveBeenCalled();
    log.mockRestore();
  });

  test("failures are known by their name, for a bundle may hold the class twice", async () => {
    const copy = Object.assign(new Error("No."), { name: "Refusal", reason: "conflict" });
    expect((await failing(copy)).status).toBe(409);
  });

  test("a fault of the program is 500 with a number to ask by, its inside in the log alone", async () => {
    const log = vi.spyOn(console, "error").mockImplementation(() => undefined);
    const answer = await failing(new Error("SELECT secret FROM /home/somebody/data"));
    const text = await answer.text();
    const number = /number (\w{8})\./.exec(text)?.[1];
    expect(answer.status).toBe(500);
    expect(text).not.toMatch(/secret|somebody|stack/);
    expect(log.mock.calls[0]?.[0]).toBe(`Fault ${String(number)}:`);
    expect(String(log.mock.calls[0]?.[1])).toContain("SELECT secret");
    log.mockRestore();
  });
});
