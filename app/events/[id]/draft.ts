import * as z from "zod/mini";
import { choicesFromJson, choicesJson, choicesShape } from "#lib/contracts/api/choices.ts";
import type { ObservationChoices } from "#lib/core/arrival/observation-choices.ts";

/** Work on an event that nobody has kept yet, as this browser remembers it. */
export interface Draft {
  /** Number of the latest kept answer that it started from. */
  readonly startedFrom: number;
  readonly choices: ObservationChoices;
  readonly reason: string;
}

const draftShape = z.object({ startedFrom: z.int(), choices: choicesShape, reason: z.string() });

export const draftKey = (eventId: string): string => `offing.draft.${eventId}`;

/** Null where there is none, or none that can be read. */
export function readDraft(eventId: string): Draft | null {
  try {
    const parsed = draftShape.safeParse(JSON.parse(globalThis.localStorage.getItem(draftKey(eventId)) ?? "null"));
    return parsed.success ? { ...parsed.data, choices: choicesFromJson(parsed.data.choices) } : null;
  } catch {
    return null;
  }
}

/** Gives whether the browser took it: it may be full, or told to remember nothing. Null forgets it. */
export function writeDraft(eventId: string, draft: Draft | null): boolean {
  try {
    if (draft === null) globalThis.localStorage.removeItem(draftKey(eventId));
    else globalThis.localStorage.setItem(draftKey(eventId), JSON.stringify({ ...draft, choices: choicesJson(draft.choices) }));
    return true;
  } catch {
    return false;
  }
}
