import { useEffect, useReducer, useState } from "react";
import { EMPTY_DRAFT, readDraft, type Draft } from "#lib/contracts/hand-readings/draft.ts";
import { isBlank } from "#lib/contracts/hand-readings/hand-row.ts";
import { changedDraft, type DraftChange } from "./draft-changes.ts";

const KEY = "offing.hand-readings";

/** What is being typed, kept on this device until it is brought in: it outlives the tab. */
export function useDraft(opening: { station: string | null; event: string | null; hasStations: boolean }): { draft: Draft; change: (change: DraftChange) => void; isRestored: boolean } {
  const [stored] = useState(() => readDraft(fromDevice()));
  const [draft, change] = useReducer(changedDraft, null, () => openingDraft(stored, opening));
  useEffect(() => { toDevice(draft); }, [draft]);
  return { draft, change, isRestored: stored !== null && hasWork(stored) };
}

/** Whether there is anything that somebody would miss. */
export function hasWork(draft: Draft): boolean {
  const typed = [...Object.values(draft.station.placed), draft.note];
  return draft.rows.some((row) => !isBlank(row)) || typed.some((text) => text.trim() !== "");
}

/** An address names the station to start with; it does not take readings that were typed at another away from theirs. */
function openingDraft(stored: Draft | null, { station, event, hasStations }: { station: string | null; event: string | null; hasStations: boolean }): Draft {
  const draft = stored ?? { ...EMPTY_DRAFT, station: { ...EMPTY_DRAFT.station, way: hasStations ? ("stored" as const) : ("new" as const) } };
  const isFree = stored === null || !hasWork(stored);
  return {
    ...draft,
    ...(station !== null && isFree ? { station: { ...draft.station, way: "stored" as const, id: station } } : {}),
    ...(event !== null && isFree ? { keep: { ...draft.keep, way: "event" as const, event } } : {}),
  };
}

function fromDevice(): string | null {
  try {
    return globalThis.localStorage.getItem(KEY);
  } catch {
    return null; // a browser that keeps nothing
  }
}

function toDevice(draft: Draft): void {
  try {
    globalThis.localStorage.setItem(KEY, JSON.stringify(draft));
  } catch {
    // A browser that keeps nothing, or no more: what is typed is still on the page.
  }
}
