import * as z from "zod/mini";
import { choicesFromJson, choicesJson, choicesShape } from "#lib/contracts/api/choices.ts";
import type { ObservationChoices } from "#lib/core/arrival/observation-choices.ts";

/** Work on an event that nobody has kept yet, as this browser remembers it. */
export interface Draft {
  /** Number of the latest kept answer that its maker had seen when it began. */
  readonly startedFrom: number;
  readonly choices: ObservationChoices;
  readonly reason: string;
}

const draftShape = z.object({ startedFrom: z.int(), choices: choicesShape, reason: z.string() });

/** Null for what is no draft. */
export function readDraft(text: string): Draft | null {
  try {
    const parsed = draftShape.safeParse(JSON.parse(text));
    return parsed.success ? { ...parsed.data, choices: choicesFromJson(parsed.data.choices) } : null;
  } catch {
    return null;
  }
}

export function draftText(draft: Draft): string {
  return JSON.stringify({ ...draft, choices: choicesJson(draft.choices) });
}
