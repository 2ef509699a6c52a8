import * as z from "zod/mini";
import { createDocument, type ZodOpenApiOperationObject, type ZodOpenApiParameters, type ZodOpenApiPathsObject, type ZodOpenApiResponsesObject } from "zod-openapi";
import type { RefusalReason } from "#lib/core/failures/refusal.ts";
import type { Operation } from "./operation.ts";
import { REFUSAL_STATUS } from "./refusal-status.ts";

/** An operation whatever its request holds. */
type AnyOperation = Pick<Operation<unknown, unknown>, "id" | "method" | "path" | "role" | "summary" | "answer" | "refusals"> & {
  readonly query: z.ZodMiniType;
  readonly body: { readonly type: "application/json"; readonly schema: z.ZodMiniType } | { readonly type: "text/csv" } | null;
};
type Schema = NonNullable<ZodOpenApiParameters["query"]>;

/** What every answer that is no success holds. */
export const problemsShape = z
  .object({ issues: z.array(z.object({ code: z.string(), path: z.string(), message: z.string() })) })
  .register(z.globalRegistry, { id: "Problems", description: "What is wrong, each a whole sentence; path is the address of the field that it is about, such as readings[2].time, or empty." });

const REFUSED: Readonly<Record<RefusalReason, string>> = {
  "not-found": "What the address or the body names is not stored.",
  conflict: "It was changed meanwhile, or stands in the way of something that is stored.",
  forbidden: "The request is meant for another host, comes from a page elsewhere, or its sender lacks the role.",
  "too-large": "The body is larger than the operation takes.",
  "too-many": "There are too many of these.",
  "cannot-store": "The server's disk is full or may not be written; nothing was stored.",
};

const ABOUT = [
  "Finds the storm behind the swell: several wave stations' arrivals become a place and a time, with their region of confidence.",
  "Times are ISO 8601 with Z or an offset; answers give them in UTC. Fields say their units; standard deviations are of 1 sigma.",
  "A change names the revision that it starts from and is answered 409 where another came first.",
  "Answers may get further fields later. Each operation names the role that it needs (x-role).",
].join(" ");

/** The published description of the programming interface (OpenAPI 3.1), made from the same operations as its routes. */
export function apiDocument(operations: readonly AnyOperation[]): object {
  const paths: ZodOpenApiPathsObject = {};
  for (const operation of operations) {
    paths[operation.path] = { ...paths[operation.path], [operation.method.toLowerCase()]: described(operation) };
  }
  const info = { title: "Offing", version: "1", description: ABOUT, license: { name: "Apache-2.0", identifier: "Apache-2.0" } };
  const document = { openapi: "3.1.1" as const, info, servers: [{ url: "/", description: "This server" }], paths };
  return createDocument(document, {
    override: ({ jsonSchema, io }) => {
      // Requests are held to the letter; answers may grow.
      if (io === "output") delete jsonSchema.additionalProperties;
    },
  });
}

function described(operation: AnyOperation): ZodOpenApiOperationObject {
  const { id, path, role, summary, query, body } = operation;
  const names = [...path.matchAll(/\{(\w+)\}/g)].map(([, name = ""]) => name);
  const pathParts = z.object(Object.fromEntries(names.map((name) => [name, z.string()])));
  return {
    operationId: id,
    summary,
    description: `${summary} Needs the role of ${role}.`,
    tags: [path.split("/")[3]?.replace(/\..*$/, "") ?? "api"],
    "x-role": role,
    requestParams: { query: query as unknown as Schema, ...(names.length === 0 ? {} : { path: pathParts }) },
    ...(body === null ? {} : { requestBody: { required: true, content: { [body.type]: { schema: body.type === "text/csv" ? z.string() : body.schema } } } }),
    responses: responses(operation),
  };
}

function responses({ answer, body, method, refusals }: AnyOperation): ZodOpenApiResponsesObject {
  const problem = (description: string) => ({ description, content: { "application/json": { schema: problemsShape } } });
  const reasons = new Set<RefusalReason>([...refusals, "forbidden", ...(body === null ? [] : (["too-large"] as const)), ...(method === "GET" ? [] : (["cannot-store"] as const))]);
  const refused = [...reasons].map((reason) => [String(REFUSAL_STATUS[reason]), problem(REFUSED[reason])] as const);
  return Object.fromEntries([
    [String(answer.status), { description: answer.status === 201 ? "Made; Location is its address." : "Done.", content: { [answer.type]: { schema: answer.type === "text/csv" ? z.string() : answer.schema } } }],
    ["400", problem("The request has not the shape that the operation takes, field by field.")],
    ...refused,
    ["500", problem("A fault of the program, with a number to report it by.")],
  ]) as ZodOpenApiResponsesObject;
}
