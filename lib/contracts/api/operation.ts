import * as z from "zod/mini";
import type { RefusalReason } from "#lib/core/failures/refusal.ts";

/** Who may do what: readers see, contributors send their stations' data, analysts work on events, reviewers accept, keepers run the server. */
export const ROLES = ["reader", "contributor", "analyst", "reviewer", "keeper"] as const;
export type Role = (typeof ROLES)[number];

/** What a request's body holds: JSON of a shape, text in CSV, or nothing. */
export type BodyShape<Body> = { readonly type: "application/json"; readonly schema: z.ZodMiniType<Body> } | { readonly type: "text/csv" } | null;

type AnswerShape =
  | { readonly status: 200 | 201; readonly type: "application/json"; readonly schema: z.ZodMiniType }
  | { readonly status: 200; readonly type: "text/csv" };

/** One thing that the programming interface does. Its route, its checks and its published description are made from this. */
export interface Operation<Body, Query> {
  readonly id: string;
  readonly method: "GET" | "POST" | "PUT" | "PATCH" | "DELETE";
  /** With its parameters in braces, as in `/api/v1/events/{id}`. */
  readonly path: `/api/v1/${string}`;
  readonly role: Role;
  readonly summary: string;
  readonly query: z.ZodMiniType<Query>;
  readonly body: BodyShape<Body>;
  /** Bytes of the largest body that is taken. */
  readonly mostBytes: number;
  readonly answer: AnswerShape;
  readonly refusals: readonly RefusalReason[];
}

/** Choices and hand-made readings, not records. */
export const MOST_JSON_BYTES = 1_000_000;

const NO_QUERY = z.strictObject({});

/** An operation that gives JSON, from its shapes. */
export function operation<Body = null, Query = Record<string, never>>(parts: {
  id: string;
  method: Operation<Body, Query>["method"];
  path: Operation<Body, Query>["path"];
  role: Role;
  summary: string;
  query?: z.ZodMiniType<Query>;
  body?: z.ZodMiniType<Body>;
  status?: 200 | 201;
  gives: z.ZodMiniType;
  refusals?: readonly RefusalReason[];
}): Operation<Body, Query> {
  const { id, method, path, role, summary, query, body, status = 200, gives, refusals = [] } = parts;
  const bodyShape: BodyShape<Body> = body === undefined ? null : { type: "application/json", schema: body };
  return {
    ...{ id, method, path, role, summary, refusals, mostBytes: MOST_JSON_BYTES },
    query: query ?? (NO_QUERY as unknown as z.ZodMiniType<Query>),
    body: bodyShape,
    answer: { status, type: "application/json", schema: gives },
  };
}
