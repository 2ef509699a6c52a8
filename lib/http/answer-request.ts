import { randomUUID } from "node:crypto";
import { readShape } from "#lib/contracts/api/input-issues.ts";
import type { BodyShape, Operation, Role } from "#lib/contracts/api/operation.ts";
import { REFUSAL_STATUS } from "#lib/contracts/api/refusal-status.ts";
import { InputError } from "#lib/core/failures/input-error.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import { isOwnHost } from "./own-host.ts";
import { parseJson, readText } from "./read-body.ts";
import { runningProgram, type RunningProgram } from "./running-program.ts";
import { whoAsks, type Person } from "./who-asks.ts";

/** What a route is given: the request as its operation describes it, who asks, and what it is lent. */
export interface Asked<Body, Query> {
  /** Parts of the address, as they are meant: Next has decoded them, which it does for routes and not for pages. */
  readonly params: Readonly<Record<string, string>>;
  readonly query: Query;
  readonly body: Body;
  readonly program: RunningProgram;
  /** For the audit trail. */
  readonly doing: { readonly actor: string; readonly savedEpochSeconds: number };
}

/** What a route gives back, as its operation says: a value for JSON, or text. */
export interface Reply {
  readonly body: unknown;
  /** Address of what was made. */
  readonly location?: string;
  /** Under which a browser saves it. */
  readonly fileName?: string;
}

type Handler = (request: Request, context: { params: Promise<Record<string, string> | undefined> }) => Promise<Response>;

/**
 * The one door of the programming interface: every route is made here from its operation. The request must be meant for
 * this server, one that writes must not come from a page elsewhere, who asks must have the operation's role, and what
 * is asked must have its shape; failures become statuses. A fault of the program shows its reader a number to ask by
 * and nothing of its inside.
 */
export function route<Body, Query>(operation: Operation<Body, Query>, work: (asked: Asked<Body, Query>) => Promise<Reply>, asks: () => Person = whoAsks): Handler {
  return async (request, context) => {
    try {
      requireOwnHost(request);
      if (request.method !== "GET" && request.method !== "HEAD") requireOwnPage(request, operation.body);
      const person = asks();
      requireRole(person, operation.role);
      const query = readShape(operation.query, queryOf(request));
      const params = (await context.params) ?? {}; // an address without parts comes with none
      const body = await readBody(request, operation);
      const doing = { actor: person.name, savedEpochSeconds: Date.now() / 1000 };
      return respond(operation.answer, await work({ params, query, body, program: await runningProgram(), doing }));
    } catch (error) {
      return failed(error);
    }
  };
}

const HEADERS = { "cache-control": "no-store" };

/** For addresses that no operation has: in JSON like every other refusal, and not a page. */
export function nothingHere(request: Request): Response {
  return failed(new Refusal("not-found", `The programming interface has nothing at ${new URL(request.url).pathname}.`));
}

function respond(answer: Operation<unknown, unknown>["answer"], { body, location, fileName }: Reply): Response {
  const headers = {
    ...HEADERS,
    ...(location === undefined ? {} : { location }),
    ...(fileName === undefined ? {} : { "content-disposition": `attachment; filename="${fileName}"` }),
  };
  if (answer.type === "application/json") return Response.json(body, { status: answer.status, headers });
  return new Response(String(body), { status: answer.status, headers: { ...headers, "content-type": `${answer.type}; charset=utf-8` } });
}

async function readBody<Body, Query>(request: Request, { body, mostBytes }: Operation<Body, Query>): Promise<Body> {
  // Without a body there is nothing to read, and an operation of CSV is given its text as it stands.
  if (body === null) return null as Body;
  const text = await readText(request, mostBytes);
  return body.type === "text/csv" ? (text as Body) : readShape(body.schema, parseJson(text));
}

/** @throws InputError `repeated` for what stands in the address twice: one of them would count for nothing. */
function queryOf(request: Request): Record<string, string> {
  const { searchParams } = new URL(request.url);
  const names = [...searchParams.keys()];
  const twice = [...new Set(names.filter((name, place) => names.indexOf(name) !== place))];
  if (twice.length > 0) throw new InputError(twice.map((path) => ({ code: "repeated", path, message: `${path}: found more than one; wanted it once.` })));
  return Object.fromEntries(searchParams);
}

function requireOwnHost(request: Request): void {
  if (isOwnHost(request.headers.get("host"), process.env.OFFING_HOST ?? "127.0.0.1")) return;
  throw new Refusal("forbidden", "This server answers under the name that it was started with, and on its own machine as localhost.");
}

/** A browser names the page that a request comes from; a program that is no browser need not. */
function requireOwnPage(request: Request, body: BodyShape<unknown>): void {
  const origin = request.headers.get("origin");
  if (origin !== null && origin !== `http://${request.headers.get("host") ?? ""}` && origin !== `https://${request.headers.get("host") ?? ""}`) {
    throw new Refusal("forbidden", "A page elsewhere may not write here.");
  }
  const type = request.headers.get("content-type") ?? "";
  const wanted = body?.type ?? "application/json";
  if (type.split(";", 1)[0]?.trim().toLowerCase() === wanted) return;
  throw new InputError([{ code: "content-type", path: "", message: `The request's content type is ${type === "" ? "missing" : `"${type}"`}; wanted ${wanted}.` }]);
}

function requireRole({ name, roles }: Person, role: Role): void {
  if (roles.includes(role)) return;
  throw new Refusal("forbidden", `This is for those with the role of ${role}, which ${name} does not have.`);
}

/** By name: what the store throws may be made by another copy of the class than this route's, for Next bundles each apart. */
function isNamed<Failure extends Error>(error: unknown, name: Failure["name"]): error is Failure {
  return error instanceof Error && error.name === name;
}

function failed(error: unknown): Response {
  if (isNamed<InputError>(error, "InputError")) return Response.json({ issues: error.issues }, { status: 400, headers: HEADERS });
  if (isNamed<Refusal>(error, "Refusal")) {
    return Response.json({ issues: [{ code: error.reason, path: "", message: error.message }] }, { status: REFUSAL_STATUS[error.reason], headers: HEADERS });
  }
  const reference = randomUUID().slice(0, 8);
  console.error(`Fault ${reference}:`, error); // eslint-disable-line no-console -- the server's own log
  const message = `Something went wrong inside the program. If it happens again, report it with the number ${reference}.`;
  return Response.json({ issues: [{ code: "fault", path: "", message }] }, { status: 500, headers: HEADERS });
}
