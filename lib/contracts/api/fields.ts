import * as z from "zod/mini";
import { isLine } from "#lib/core/arrival/station-limits.ts";
import { parseIsoTime } from "#lib/core/units/parse-iso-time.ts";
import { isoTime } from "../iso-time.ts";

/**
 * The kinds of fields that requests are made of. Each brings the words that follow "wanted" in a message about it, and
 * the same words describe it in the published description of the interface.
 */
export function textField({ wanted, least = 0, most }: { wanted: string; least?: number; most: number }) {
  return described(z.string(wanted).check(z.minLength(least, wanted), z.maxLength(most, wanted), z.refine(isPlain, `${wanted}, without control characters`)), wanted);
}

/** Text on one line that shows something. */
export function lineField({ wanted, most }: { wanted: string; most: number }) {
  return described(z.string(wanted).check(z.refine((text) => isLine(text, most), wanted)), wanted);
}

/** The database can keep no half of a surrogate pair as it is, and takes a NUL for the end of a text where it counts. */
function isPlain(text: string): boolean {
  return !/(?![\t\n\r])[\p{Cc}\p{Cs}]/u.test(text);
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

/** As far as the database counts. */
const MOST_COUNTED = 2 ** 31 - 1;

export function countField({ wanted, from }: { wanted: string; from: number }) {
  return described(z.int(wanted).check(z.gte(from, wanted), z.lte(MOST_COUNTED, wanted)), wanted);
}

export function choiceField<const Choices extends readonly string[]>(choices: Choices) {
  const wanted = `one of ${choices.join(", ")}`;
  return described(z.enum(choices, wanted), wanted);
}

const TIME_WANTED = "an ISO 8601 time with Z or an offset, such as 2024-02-28T14:30Z";

/** A moment; `epochOf` gives it as seconds since 1970. */
export const timeField = described(z.string(TIME_WANTED).check(z.refine(isTime, TIME_WANTED)), TIME_WANTED);

/** One that can be written back in UTC as well: an offset can carry the first and the last day out of the years of four digits. */
function isTime(text: string): boolean {
  const outcome = parseIsoTime(text);
  return outcome.kind === "time" && parseIsoTime(isoTime(outcome.epochSeconds)).kind === "time";
}

/** @throws Error where the text was not held to `timeField`. */
export function epochOf(time: string): number {
  const outcome = parseIsoTime(time);
  if (outcome.kind !== "time") throw new Error(`"${time}" was to be a time.`);
  return outcome.epochSeconds;
}

export function listField<Item extends z.ZodMiniType>(item: Item, { wanted, least = 0, most = 100_000 }: { wanted: string; least?: number; most?: number }) {
  return described(z.array(item, wanted).check(z.minLength(least, wanted), z.maxLength(most, wanted)), wanted);
}

/** A list in which nothing stands twice, by the field `by` of its items where that is given. */
export function distinctField<Item extends z.ZodMiniType>(item: Item, { wanted, least = 0, most = 10_000, by }: { wanted: string; least?: number; most?: number; by?: keyof z.infer<Item> & string }) {
  const eachOnce = z.check<z.infer<Item>[]>(({ value: list, issues }) => {
    const seen = new Set<unknown>();
    for (const [place, one] of list.entries()) {
      const named = by === undefined ? one : one[by];
      if (seen.has(named)) issues.push({ code: "custom", path: by === undefined ? [place] : [place, by], message: "each of them once", input: named });
      seen.add(named);
    }
  });
  return described(z.array(item, wanted).check(z.minLength(least, wanted), z.maxLength(most, wanted), eachOnce), wanted);
}

const STARTED_FROM_WANTED = "the revision, a whole number, that the change starts from";
/** The revision that its maker had seen. */
export const revisionField = countField({ wanted: STARTED_FROM_WANTED, from: 1 });

function described<Schema extends z.ZodMiniType>(schema: Schema, description: string): Schema {
  z.globalRegistry.add(schema, { description });
  return schema;
}
