import { randomUUID } from "node:crypto";
import { InputError } from "#lib/core/failures/input-error.ts";
import { Refusal, type RefusalReason } from "#lib/core/failures/refusal.ts";
import { isOwnHost } from "./own-host.ts";

const STATUS = { "not-found": 404, conflict: 409, forbidden: 403, "too-large": 413, "too-many": 429 } as const satisfies Record<RefusalReason, number>;
/** Bytes of a request's body; what these routes take in are choices, not records. */
const MOST_BYTES = 1_000_000;

/** What a route gives back as JSON. */
export interface Reply {
  readonly status: 200 | 201;
  readonly body: unknown;
  /** Address of what was made. */
  readonly location?: string;
}

/**
 * Every route of the programming interface passes here: the request must be meant for this server, and one that writes
 * must not come from a page elsewhere; failures become statuses. A fault of the program shows its reader a number to
 * ask by and nothing of its inside.
 */
export async function answerRequest(request: Request, work: () => Promise<Reply>): Promise<Response> {
  try {
    requireOwnHost(request);
    if (request.method !== "GET") requireOwnPage(request);
    const { status, body, location } = await work();
    return Response.json(body, { status, headers: { ...HEADERS, ...(location === undefined ? {} : { location }) } });
  } catch (error) {
    return failed(error);
  }
}

const HEADERS = { "cache-control": "no-store" };

/**
 * A body of JSON.
 *
 * @throws Refusal `too-large`; InputError `not-json` where it is none.
 */
export async function readJson(request: Request): Promise<unknown> {
  const announced = Number(request.headers.get("content-length") ?? "0");
  const text = announced > MOST_BYTES ? null : await request.text();
  if (text === null || text.length > MOST_BYTES) throw new Refusal("too-large", `The request holds more than ${MOST_BYTES} bytes.`);
  try {
    return JSON.parse(text) as unknown;
  } catch {
    throw new InputError([{ code: "not-json", path: "", message: "The request's body is no JSON." }]);
  }
}

function requireOwnHost(request: Request): void {
  if (isOwnHost(request.headers.get("host"), process.env.OFFING_HOST ?? "127.0.0.1")) return;
  throw new Refusal("forbidden", "This server answers under the name that it was started with, and on its own machine as localhost.");
}

/** A browser names the page that a request comes from; a program that is no browser need not. */
function requireOwnPage(request: Request): void {
  const origin = request.headers.get("origin");
  if (origin !== null && origin !== `http://${request.headers.get("host") ?? ""}` && origin !== `https://${request.headers.get("host") ?? ""}`) {
    throw new Refusal("forbidden", "A page elsewhere may not write here.");
  }
  const type = request.headers.get("content-type") ?? "";
  if (!/^application\/json\b/i.test(type)) {
    throw new InputError([{ code: "not-json", path: "", message: `The request's content type is ${type === "" ? "missing" : `"${type}"`}; wanted application/json.` }]);
  }
}

/** By name: what the store throws may be made by another copy of the class than this route's, for Next bundles each apart. */
function isNamed<Failure extends Error>(error: unknown, name: Failure["name"]): error is Failure {
  return error instanceof Error && error.name === name;
}

function failed(error: unknown): Response {
  if (isNamed<InputError>(error, "InputError")) return Response.json({ issues: error.issues }, { status: 400, headers: HEADERS });
  if (isNamed<Refusal>(error, "Refusal")) {
    return Response.json({ issues: [{ code: error.reason, path: "", message: error.message }] }, { status: STATUS[error.reason], headers: HEADERS });
  }
  const reference = randomUUID().slice(0, 8);
  console.error(`Fault ${reference}:`, error); // eslint-disable-line no-console -- the server's own log
  const message = `Something went wrong inside the program. If it happens again, report it with the number ${reference}.`;
  return Response.json({ issues: [{ code: "fault", path: "", message }] }, { status: 500, headers: HEADERS });
}
