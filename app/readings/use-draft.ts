import { useEffect, useReducer, useState } from "react";
import { EMPTY_DRAFT, readDraft, type Draft } from "#lib/contracts/hand-readings/draft.ts";
import { isBlank } from "#lib/contracts/hand-readings/hand-row.ts";
import type { DraftShelf } from "../_components/draft-shelf.ts";
import { changedDraft, type DraftChange } from "./draft-changes.ts";

/** What is being typed, kept on this device until it is brought in: it outlives the tab. */
export function useDraft(shelf: DraftShelf, opening: { station: string | null; event: string | null; hasStations: boolean }): { draft: Draft; change: (change: DraftChange) => void; isRestored: boolean } {
  const [stored] = useState(() => readDraft(shelf.found));
  const [draft, change] = useReducer(changedDraft, null, () => openingDraft(stored, opening));
  // A browser that keeps nothing, or no more, has it on the page all the same.
  useEffect(() => { shelf.put(isTouched(draft) ? JSON.stringify(draft) : null); }, [shelf, draft]);
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

/** Whether anything was chosen or typed at all. */
function isTouched(draft: Draft): boolean {
  return hasWork(draft) || draft.station.id !== "" || draft.keep.event !== "" || draft.keep.title !== "";
}
