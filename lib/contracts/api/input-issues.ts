import type * as z from "zod/v4/core";
import { InputError, type InputIssue } from "#lib/core/failures/input-error.ts";

/** What zod says where a shape brings no words of its own. */
const UNSAID = "Invalid input";
const FOUND_CHARACTERS_SHOWN = 60;

/**
 * A request held to its shape. The shapes of `fields.ts` bring the words that follow "wanted".
 *
 * @throws InputError with an issue for each field, by its address, such as `moved[2].time`.
 */
export function readShape<Shape>(schema: z.$ZodType<Shape>, value: unknown): Shape {
  const parsed = schema["~standard"].validate(value);
  if (parsed instanceof Promise) throw new Error("Shapes of requests are read at once.");
  if (parsed.issues === undefined) return parsed.value;
  throw new InputError((parsed.issues as unknown as z.$ZodIssue[]).map((issue) => inputIssue(issue, value)));
}

function inputIssue(issue: z.$ZodIssue, value: unknown): InputIssue {
  const path = addressOf(issue.path);
  const place = path === "" ? "The request" : path;
  if (issue.code === "unrecognized_keys") {
    const keys = issue.keys.map((key) => JSON.stringify(key)).join(", ");
    return { code: "unknown-key", path, message: `${place}: found ${keys}; wanted only what it takes.` };
  }
  const found = valueAt(value, issue.path);
  const text = found === undefined ? "nothing" : JSON.stringify(found);
  const short = text.length > FOUND_CHARACTERS_SHOWN ? `${text.slice(0, FOUND_CHARACTERS_SHOWN)}...` : text;
  return { code: issue.code, path, message: `${place}: found ${short}; wanted ${wantedOf(issue)}.` };
}

/** `leftOut[2].time` */
export function addressOf(path: readonly PropertyKey[]): string {
  return path.map((key) => (typeof key === "number" ? `[${key}]` : `.${String(key)}`)).join("").replace(/^\./, "");
}

function wantedOf(issue: z.$ZodIssue): string {
  if (issue.message !== UNSAID) return issue.message;
  if (issue.code === "invalid_type") return issue.expected === "array" ? "a list" : `a value of the kind ${issue.expected}`;
  return "a value that this field takes";
}

function valueAt(value: unknown, path: readonly PropertyKey[]): unknown {
  return path.reduce<unknown>(
    (inner, key) => (typeof inner === "object" && inner !== null ? (inner as Record<PropertyKey, unknown>)[key] : undefined),
    value,
  );
}
