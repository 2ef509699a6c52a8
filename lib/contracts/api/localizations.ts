import * as z from "zod/mini";
import type { ObservationChoices } from "#lib/core/arrival/observation-choices.ts";
import { InputError } from "#lib/core/failures/input-error.ts";
import type { SourceOutcome } from "#lib/core/source/answer.ts";
import type { Position } from "#lib/core/units/position.ts";
import { isoTime } from "../iso-time.ts";
import { readSettings, type PublicSettings } from "../settings.ts";
import { NOTE } from "./arrivals.ts";
import { choicesFields, choicesFromJson, choicesJson } from "./choices.ts";
import { outcomeField, sourceJson, sourceShape } from "./events.ts";
import { countField, revisionField, textField, timeField } from "./fields.ts";

export const newLocalizationShape = z.strictObject({
  startedFrom: countField({ wanted: "a whole number of 0 or more: that of the latest localization in view when the work began", from: 0 }),
  eventRevision: z.optional(revisionField),
  ...choicesFields,
  reason: z.optional(textField(NOTE)),
  settings: z.optional(z.unknown()),
});

/** What somebody asks for who wants an event's answer kept. */
export interface LocalizationRequest {
  /** Number of the latest localization in view when the work began; 0 for none. */
  readonly startedFrom: number;
  /** The event's revision in view; null where its maker does not say. */
  readonly eventRevision: number | null;
  readonly choices: ObservationChoices;
  readonly reason: string;
  readonly settings: PublicSettings;
}

/** @throws InputError for settings that are none or out of range, each by its address. */
export function localizationRequest(body: z.infer<typeof newLocalizationShape>): LocalizationRequest {
  const { startedFrom, eventRevision = null, reason = "", settings, ...choices } = body;
  return { startedFrom, eventRevision, choices: choicesFromJson(choices), reason, settings: settingsAt(settings) };
}

/** @throws InputError with addresses from the request's own root. */
function settingsAt(settings: unknown): PublicSettings {
  try {
    return readSettings(settings === undefined ? {} : settings);
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    throw new InputError(error.issues.map((issue) => ({ ...issue, path: ["settings", issue.path].filter((part) => part !== "").join(".") })));
  }
}

const summary = {
  number: z.int(),
  saved: timeField,
  actor: z.string(),
  reason: z.string(),
  eventRevision: z.int(),
  program: z.string(),
  nodeVersion: z.string(),
  inputDigest: z.string(),
  outcome: outcomeField,
  source: sourceShape,
  ...{ leftOut: z.array(z.string()), dropped: z.array(z.int()), moved: z.array(z.unknown()), added: z.array(z.unknown()), useSuspect: z.boolean() },
};

export const localizationSummaryShape = z.object(summary);
export const localizationShape = z.object({ ...summary, settings: z.unknown(), input: z.unknown(), answer: z.unknown() });

interface KeptLocalization {
  readonly number: number;
  readonly savedEpochSeconds: number;
  readonly actor: string;
  readonly reason: string;
  readonly eventRevision: number;
  readonly program: string;
  readonly nodeVersion: string;
  readonly inputDigest: string;
  readonly choices: ObservationChoices;
  readonly outcome: SourceOutcome;
  readonly source: { readonly position: Position; readonly originEpochSeconds: number } | null;
}

/** A kept answer as a list shows it. */
export function localizationJson(kept: KeptLocalization): z.infer<typeof localizationSummaryShape> {
  const { number, savedEpochSeconds, actor, reason, eventRevision, program, nodeVersion, inputDigest, outcome } = kept;
  return {
    ...{ number, saved: isoTime(savedEpochSeconds), actor, reason, eventRevision, program, nodeVersion, inputDigest, outcome },
    source: sourceJson(kept.source),
    ...choicesJson(kept.choices),
  };
}

/** What is different between two kept answers of one event. */
export const changesShape = z.object({
  from: z.int(),
  to: z.int(),
  outcome: z.object({ before: outcomeField, after: outcomeField }),
  /** From the first source to the second; null unless both have one. */
  shift: z.nullable(z.object({ km: z.number(), hours: z.number() })),
  region95Km2: z.object({ before: z.nullable(z.number()), after: z.nullable(z.number()) }),
  stationsIn: z.array(z.string()),
  stationsOut: z.array(z.string()),
  /** Of stations in both: how many readings came in, went out, or were changed in time, period or error. */
  readings: z.array(z.object({ station: z.string(), changed: z.int(), in: z.int(), out: z.int() })),
  settings: z.array(z.object({ name: z.string(), before: z.nullable(z.union([z.number(), z.boolean()])), after: z.nullable(z.union([z.number(), z.boolean()])) })),
  program: z.object({ before: z.string(), after: z.string() }),
});

export type LocalizationChanges = z.infer<typeof changesShape>;
