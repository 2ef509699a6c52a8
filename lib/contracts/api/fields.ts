import * as z from "zod/mini";
import { parseIsoTime } from "#lib/core/units/parse-iso-time.ts";

/**
 * The kinds of fields that requests are made of. Each brings the words that follow "wanted" in a message about it, and
 * the same words describe it in the published description of the interface.
 */
export function textField({ wanted, least = 0, most }: { wanted: string; least?: number; most: number }) {
  return described(z.string(wanted).check(z.minLength(least, wanted), z.maxLength(most, wanted)), wanted);
}

export function numberField({ wanted, from, above, to, below }: { wanted: string; from?: number; above?: number; to?: number; below?: number }) {
  const checks = [
    ...(from === undefined ? [] : [z.gte(from, wanted)]),
    ...(above === undefined ? [] : [z.gt(above, wanted)]),
    ...(to === undefined ? [] : [z.lte(to, wanted)]),
    ...(below === undefined ? [] : [z.lt(below, wanted)]),
  ];
  return described(z.number(wanted).check(...checks), wanted);
}

export function countField({ wanted, from }: { wanted: string; from: number }) {
  return described(z.int(wanted).check(z.gte(from, wanted)), wanted);
}

export function choiceField<const Choices extends readonly string[]>(choices: Choices) {
  const wanted = `one of ${choices.join(", ")}`;
  return described(z.enum(choices, wanted), wanted);
}

export const TIME_WANTED = "an ISO 8601 time with Z or an offset, such as 2024-02-28T14:30Z";

/** A moment; `epochOf` gives it as seconds since 1970. */
export const timeField = described(z.string(TIME_WANTED).check(z.refine((text) => parseIsoTime(text).kind === "time", TIME_WANTED)), TIME_WANTED);

/** @throws Error where the text was not held to `timeField`. */
export function epochOf(time: string): number {
  const outcome = parseIsoTime(time);
  if (outcome.kind !== "time") throw new Error(`"${time}" was to be a time.`);
  return outcome.epochSeconds;
}

export function listField<Item extends z.ZodMiniType>(item: Item, { wanted, least = 0, most = 100_000 }: { wanted: string; least?: number; most?: number }) {
  return described(z.array(item, wanted).check(z.minLength(least, wanted), z.maxLength(most, wanted)), wanted);
}

/** A list in which nothing stands twice. */
export function distinctField<Item extends z.ZodMiniType>(item: Item, wanted: string, least = 0) {
  return described(z.array(item, wanted).check(z.minLength(least, wanted), z.refine((list) => new Set(list).size === list.length, `${wanted}, each once`)), wanted);
}

export const STARTED_FROM_WANTED = "the revision, a whole number, that the change starts from";
/** The revision that its maker had seen. */
export const revisionField = countField({ wanted: STARTED_FROM_WANTED, from: 1 });

function described<Schema extends z.ZodMiniType>(schema: Schema, description: string): Schema {
  z.globalRegistry.add(schema, { description });
  return schema;
}
