import * as z from "zod/mini";
import { InputError } from "#lib/core/failures/input-error.ts";
import type { SourceOutcome } from "#lib/core/source/answer.ts";
import type { Position } from "#lib/core/units/position.ts";
import { isoTime } from "./iso-time.ts";
import { readSettings, type PublicSettings } from "./settings.ts";

const MOST_LETTERS = 2000;

const requestShape = z.strictObject({
  startedFrom: z.int().check(z.gte(0)),
  leftOut: z.optional(z.array(z.string())),
  reason: z.optional(z.string().check(z.maxLength(MOST_LETTERS))),
  settings: z.optional(z.unknown()),
});

/** What somebody asks for who wants an event's answer kept. */
export interface LocalizationRequest {
  /** Number of the latest localization in view when the work began; 0 for none. */
  readonly startedFrom: number;
  readonly leftOut: readonly string[];
  readonly reason: string;
  readonly settings: PublicSettings;
}

/**
 * `{startedFrom, leftOut?, reason?, settings?}`, settings over the defaults.
 *
 * @throws InputError for keys that are none, values of the wrong kind or out of range, each by its address.
 */
export function readLocalizationRequest(body: unknown): LocalizationRequest {
  const parsed = requestShape.safeParse(body);
  if (!parsed.success) {
    throw new InputError(
      parsed.error.issues.map((issue) => {
        const path = issue.path.join(".");
        return { code: issue.code, path, message: `${path === "" ? "The request" : path}: found what does not fit; wanted ${WANTED[String(issue.path[0] ?? "")] ?? WHOLE}.` };
      }),
    );
  }
  const { startedFrom, leftOut = [], reason = "", settings } = parsed.data;
  return { startedFrom, leftOut, reason, settings: readSettings(settings ?? {}) };
}

const WHOLE = "an object with startedFrom, and if need be leftOut, reason and settings";
const WANTED: Readonly<Record<string, string>> = {
  startedFrom: "a whole number of 0 or more: that of the latest localization in view when the work began",
  leftOut: "a list of station ids",
  reason: `text of ${MOST_LETTERS} letters at most`,
};

interface KeptLocalization {
  readonly number: number;
  readonly savedEpochSeconds: number;
  readonly actor: string;
  readonly reason: string;
  readonly program: string;
  readonly nodeVersion: string;
  readonly inputDigest: string;
  readonly leftOut: readonly string[];
  readonly outcome: SourceOutcome;
  readonly source: { readonly position: Position; readonly originEpochSeconds: number } | null;
}

/** A kept answer as a list shows it. */
export function localizationJson(kept: KeptLocalization) {
  const { number, savedEpochSeconds, actor, reason, program, nodeVersion, inputDigest, leftOut, outcome, source } = kept;
  return {
    ...{ number, saved: isoTime(savedEpochSeconds), actor, reason, program, nodeVersion, inputDigest, leftOut, outcome },
    source: source && {
      latitude: source.position.latitudeDegrees,
      longitude: source.position.longitudeDegrees,
      time: isoTime(source.originEpochSeconds),
    },
  };
}
