import * as z from "zod/v4/core";
import { InputError, type InputIssue } from "#lib/core/failures/input-error.ts";

const FOUND_CHARACTERS_SHOWN = 60;
/** As many as of a file: more would hide the first ones, which usually explain the rest. */
const ISSUES_SHOWN = 50;

/**
 * A request held to its shape. The shapes of `fields.ts` bring the words that follow "wanted".
 *
 * @throws InputError with an issue for each field, by its address, such as `moved[2].time`.
 */
export function readShape<Shape>(schema: z.$ZodType<Shape>, value: unknown): Shape {
  // The words for a shape that brings none are given here: what zod would say itself depends on who else has loaded it.
  const parsed = z.safeParse(schema, value, { error: wantedOf });
  if (parsed.success) return parsed.data;
  const { issues } = parsed.error;
  const shown = issues.slice(0, ISSUES_SHOWN).map((issue) => inputIssue(issue, value));
  const more = issues.length - shown.length;
  const rest = { code: "more-problems", path: "", message: `The request: ${more} more problems like these are not shown (${issues.length} in all).` };
  throw new InputError(more === 0 ? shown : [...shown, rest]);
}

function inputIssue(issue: z.$ZodIssue, value: unknown): InputIssue {
  const path = addressOf(issue.path);
  const place = path === "" ? "The request" : path;
  if (issue.code === "unrecognized_keys") {
    const keys = issue.keys.map((key) => JSON.stringify(key)).join(", ");
    return { code: "unknown-key", path, message: `${place}: found ${keys}; wanted only what it takes.` };
  }
  const found = valueAt(value, issue.path);
  return { code: issue.code, path, message: `${place}: found ${shortly(found)}; wanted ${issue.message}.` };
}

function shortly(found: unknown): string {
  if (found === undefined || found === null) return "nothing";
  // 1e400 is a number to JSON and beyond all numbers here; written as JSON again it would be null.
  const text = typeof found === "number" ? String(found) : JSON.stringify(found);
  return text.length > FOUND_CHARACTERS_SHOWN ? `${text.slice(0, FOUND_CHARACTERS_SHOWN)}...` : text;
}

/** `leftOut[2].time` */
function addressOf(path: readonly PropertyKey[]): string {
  return path.map((key) => (typeof key === "number" ? `[${key}]` : `.${String(key)}`)).join("").replace(/^\./, "");
}

function wantedOf(issue: z.$ZodRawIssue): string {
  if (issue.code === "invalid_type") return { array: "a list", object: "an object" }[String(issue.expected)] ?? `a value of the kind ${issue.expected}`;
  return "a value that this field takes";
}

function valueAt(value: unknown, path: readonly PropertyKey[]): unknown {
  return path.reduce<unknown>(
    (inner, key) => (typeof inner === "object" && inner !== null ? (inner as Record<PropertyKey, unknown>)[key] : undefined),
    value,
  );
}
