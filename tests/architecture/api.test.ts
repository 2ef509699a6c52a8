import { readdirSync } from "node:fs";
import { Validator } from "@seriousme/openapi-schema-validator";
import ts from "typescript";
import { describe, expect, test } from "vitest";
import { z } from "zod";
import { apiDocument } from "#lib/contracts/api/api-document.ts";
import { ROLES } from "#lib/contracts/api/operation.ts";
import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { REFUSAL_STATUS } from "#lib/contracts/api/refusal-status.ts";
import { parseSource, readSourceTree, type SourceFile } from "#tests/support/source-tree.ts";

const ROOT = "app/api/v1";
/** Answers for every address that no operation has. */
const CATCH_ALL = `${ROOT}/[[...rest]]/route.ts`;
const METHODS = ["GET", "POST", "PUT", "PATCH", "DELETE", "HEAD", "OPTIONS"];
const operations = Object.values(OPERATIONS);
const routeFiles = readSourceTree().filter(({ path }) => path.startsWith("app/api/") && path.endsWith("/route.ts"));

interface Exported {
  readonly method: string;
  /** The operation that `route(` was given; null where the method was made in another way. */
  readonly operation: string | null;
}

function exportsOf({ tree }: SourceFile): Exported[] {
  return tree.statements.flatMap((statement): Exported[] => {
    if (ts.isExportDeclaration(statement) && statement.exportClause !== undefined && ts.isNamedExports(statement.exportClause)) {
      return statement.exportClause.elements.map(({ name }) => ({ method: name.getText(), operation: null }));
    }
    const isExported = ts.canHaveModifiers(statement) && (ts.getModifiers(statement) ?? []).some(({ kind }) => kind === ts.SyntaxKind.ExportKeyword);
    if (!isExported) return [];
    if (!ts.isVariableStatement(statement)) return [{ method: ts.isFunctionDeclaration(statement) ? (statement.name?.text ?? "") : "", operation: null }];
    return statement.declarationList.declarations.map(({ name, initializer }) => ({ method: name.getText(), operation: operationOf(initializer) }));
  });
}

function operationOf(made: ts.Expression | undefined): string | null {
  if (made === undefined || !ts.isCallExpression(made) || made.expression.getText() !== "route") return null;
  return /^OPERATIONS\.(\w+)$/.exec(made.arguments[0]?.getText() ?? "")?.[1] ?? null;
}

const addressOf = (path: string): string => `/${path.replace(/^app\//, "").replace(/\/route\.ts$/, "").replaceAll(/\[(\w+)\]/g, "{$1}")}`;

describe("the programming interface", () => {
  test("has a route for every operation, and an operation for every route", () => {
    const routes = routeFiles
      .filter(({ path }) => path !== CATCH_ALL)
      .flatMap((file) => exportsOf(file).map(({ method, operation }) => `${method} ${addressOf(file.path)}: ${operation ?? "not made by route()"}`));
    expect(routes.sort()).toStrictEqual(operations.map(({ id, method, path }) => `${method} ${path}: ${id}`).sort());
    expect(routes.length).toBeGreaterThanOrEqual(16);
  });

  test("answers elsewhere that there is nothing", () => {
    const [file] = routeFiles.filter(({ path }) => path === CATCH_ALL);
    expect(file && exportsOf(file).map(({ method }) => method).sort()).toStrictEqual(["DELETE", "GET", "PATCH", "POST", "PUT"]);
    expect(readdirSync("app/api")).toStrictEqual(["v1"]);
  });

  test("names each operation by its key, once for a method and path", () => {
    expect(Object.entries(OPERATIONS).filter(([key, { id }]) => key !== id)).toStrictEqual([]);
    expect(new Set(operations.map(({ method, path }) => `${method} ${path}`)).size).toBe(operations.length);
    for (const { id, method, body, summary, role } of operations) {
      expect(METHODS, id).toContain(method);
      expect(ROLES, id).toContain(role);
      expect(role === "reader", `${id}: only reading is for readers`).toBe(method === "GET");
      expect(body === null || method !== "GET", `${id}: GET takes no body`).toBe(true);
      expect(summary, id).toMatch(/^[A-Z].*\.$/);
    }
  });
});

describe("what the check of routes sees", () => {
  const cases: [string, Exported[]][] = [
    ["export const GET = route(OPERATIONS.readEvent, work);", [{ method: "GET", operation: "readEvent" }]],
    ["export const GET = guarded(OPERATIONS.readEvent, work);", [{ method: "GET", operation: null }]],
    ["export const GET = route(somewhere.else, work);", [{ method: "GET", operation: null }]],
    ["export async function POST() { return new Response(); }", [{ method: "POST", operation: null }]],
    ['export { POST as PUT } from "../other/route.ts";', [{ method: "PUT", operation: null }]],
    ["const GET = 1;", []],
  ];
  test.each(cases)("%s", (text, seen) => {
    expect(exportsOf(parseSource("app/api/v1/x/route.ts", text))).toStrictEqual(seen);
  });
});

const Described = z.object({
  openapi: z.string(),
  paths: z.record(z.string(), z.record(z.string(), z.looseObject({
    operationId: z.string(),
    description: z.string(),
    "x-role": z.string(),
    parameters: z.optional(z.array(z.looseObject({ in: z.string(), name: z.string(), schema: z.looseObject({}) }))),
    requestBody: z.optional(z.looseObject({ content: z.record(z.string(), z.object({ schema: z.looseObject({ type: z.string() }) })) })),
    responses: z.record(z.string(), z.object({ description: z.string(), content: z.record(z.string(), z.object({ schema: z.looseObject({}) })) })),
  }))),
});

describe("the published description", () => {
  const written = JSON.stringify(apiDocument(operations));
  const document = Described.parse(JSON.parse(written));
  const describedOperations = Object.entries(document.paths).flatMap(([path, methods]) => Object.entries(methods).map(([method, described]) => ({ path, method, ...described })));

  test("is valid by OpenAPI's own schema [source: openapi-3.1]", async () => {
    const validator = new Validator();
    const { valid, errors } = await validator.validate(JSON.parse(written) as Record<string, unknown>);
    expect(errors).toBeUndefined();
    expect(valid).toBe(true);
    expect(validator.version).toBe("3.1");
  });

  test("is not valid by that schema when broken", async () => {
    const broken = written.replace('"responses"', '"answers"');
    expect((await new Validator().validate(JSON.parse(broken) as Record<string, unknown>)).valid).toBe(false);
  });

  test.each(operations)("says of $id all that is asked, answered and refused, and the role", ({ id, method, path, role, body, answer, refusals }) => {
    const described = describedOperations.find(({ operationId }) => operationId === id);
    expect(described).toMatchObject({ path, method: method.toLowerCase(), "x-role": role, description: expect.stringContaining(`role of ${role}.`) as string });
    const inPath = described?.parameters?.filter((parameter) => parameter.in === "path").map(({ name }) => name) ?? [];
    expect(inPath).toStrictEqual([...path.matchAll(/\{(\w+)\}/g)].map(([, name]) => name));
    expect(Object.keys(described?.requestBody?.content ?? {})).toStrictEqual(body === null ? [] : [body.type]);
    const statuses = [answer.status, 400, 403, 500, ...(body === null ? [] : [413]), ...(method === "GET" ? [] : [503]), ...refusals.map((reason) => REFUSAL_STATUS[reason])];
    expect(Object.keys(described?.responses ?? {})).toStrictEqual([...new Set(statuses)].map(String).sort());
    expect(Object.keys(described?.responses[answer.status]?.content ?? {})).toStrictEqual([answer.type]);
    expect(described?.responses["403"]?.content["application/json"]?.schema).toStrictEqual({ $ref: "#/components/schemas/Problems" });
  });

  test("takes the words and bounds of the shapes over, closes what comes in and leaves open what goes out", () => {
    const bringIn = describedOperations.find(({ operationId }) => operationId === "bringInArrival");
    const request = bringIn?.requestBody?.content["application/json"]?.schema;
    expect(request).toMatchObject({
      additionalProperties: false,
      required: ["station"],
      properties: { readings: { maxItems: 5000, items: { additionalProperties: false, properties: { periodSeconds: { minimum: 0.5, maximum: 1000, description: "a number of seconds from 0.5 to 1000" } } } } },
    });
    expect(JSON.stringify(bringIn?.responses)).not.toContain("additionalProperties");
    const query = describedOperations.find(({ operationId }) => operationId === "listReadings")?.parameters;
    expect(query).toMatchObject([{ name: "station", in: "query" }, { name: "from" }, { name: "to", schema: { description: expect.stringContaining("ISO 8601") as string } }, { name: "after" }, { name: "limit" }]);
  });
});
