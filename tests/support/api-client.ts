import { request, type IncomingHttpHeaders } from "node:http";
import { OPERATIONS } from "#lib/contracts/api/operations.ts";

export interface ApiIssue {
  readonly code: string;
  readonly path: string;
  readonly message: string;
}

export interface ApiAnswer {
  readonly status: number;
  /** Null where there is none, text where it is no JSON. */
  readonly body: unknown;
  readonly issues: readonly ApiIssue[];
  readonly headers: IncomingHttpHeaders;
}

export interface ApiCall {
  readonly params?: Readonly<Record<string, string | number>>;
  readonly query?: Readonly<Record<string, string>>;
  readonly body?: unknown;
}

export type OperationId = keyof typeof OPERATIONS;

/** The address of an operation below the server's, its parameters filled in. */
export function pathOf(id: OperationId, { params = {}, query = {} }: ApiCall = {}): string {
  const path = OPERATIONS[id].path.replaceAll(/\{(\w+)\}/g, (_, name: string) => encodeURIComponent(String(params[name])));
  const search = new URLSearchParams(query).toString();
  return search === "" ? path : `${path}?${search}`;
}

/** Does an operation over HTTP, its body as JSON. */
export function perform(address: string, id: OperationId, call: ApiCall = {}): Promise<ApiAnswer> {
  const body = call.body === undefined ? undefined : JSON.stringify(call.body);
  const headers: Record<string, string> = body === undefined ? {} : { "content-type": "application/json" };
  return send(address, { method: OPERATIONS[id].method, path: pathOf(id, call), headers, body });
}

/** A request as it stands: `fetch` would write a Host of its own and mend the path. A list of parts is sent in chunks. */
export function send(
  address: string,
  { method, path, headers = {}, body }: { readonly method: string; readonly path: string; readonly headers?: Readonly<Record<string, string>>; readonly body?: string | Buffer | readonly Buffer[] | undefined },
): Promise<ApiAnswer> {
  const { hostname, port } = new URL(address);
  return new Promise((answer, fail) => {
    let isAnswered = false;
    // Of some methods Node sends a body without saying how long it is, which no server can read.
    const length = typeof body === "string" && body !== "" ? { "content-length": String(Buffer.byteLength(body)) } : {};
    const asked = request({ hostname, port, method, path, headers: { ...length, ...headers }, agent: false }, (response) => {
      const parts: Buffer[] = [];
      response.on("data", (part: Buffer) => parts.push(part));
      response.on("end", () => {
        isAnswered = true;
        answer(answerOf(response.statusCode ?? 0, response.headers, Buffer.concat(parts).toString("utf8")));
        asked.destroy();
      });
    });
    asked.on("error", (error) => {
      // A server that has refused a body closes on the rest of it.
      if (!isAnswered) fail(error);
    });
    if (typeof body === "string" || Buffer.isBuffer(body) || body === undefined) asked.end(body);
    else {
      for (const part of body) asked.write(part);
      asked.end();
    }
  });
}

function answerOf(status: number, headers: IncomingHttpHeaders, text: string): ApiAnswer {
  const isJson = headers["content-type"]?.startsWith("application/json") === true && text !== "";
  const body: unknown = isJson ? JSON.parse(text) : text === "" ? null : text;
  const { issues = [] } = (typeof body === "object" && body !== null ? body : {}) as { issues?: readonly ApiIssue[] };
  return { status, body, issues, headers };
}
