import { useCallback, useEffect, useMemo, useRef, useState } from "react";
import type { GatheredObservations } from "#lib/core/arrival/gathered-observations.ts";
import { knownChoices } from "#lib/core/arrival/known-choices.ts";
import type { ObservationChoices } from "#lib/core/arrival/observation-choices.ts";
import { sameChoices } from "#lib/core/arrival/same-choices.ts";
import { draftKey, readDraft, writeDraft, type Draft } from "./draft.ts";
import type { ChangeView } from "./use-view.ts";
import type { EventView } from "./view.ts";

/** What is chosen of the readings; which stations are left out stands in the view, for the address holds it. */
export type ReadingChoices = Omit<ObservationChoices, "leftOutStationIds">;
export type ChangeReadings = (next: (before: ReadingChoices) => ReadingChoices) => void;

export interface Work {
  /** All of it, the stations left out included. */
  readonly choices: ObservationChoices;
  readonly reason: string;
  /** Whether any of it differs from the latest kept answer. */
  readonly isUnkept: boolean;
  /** What to say of a draft that was brought back, or could not be put aside. */
  readonly remark: string | null;
  readonly canUndo: boolean;
  readonly changeReadings: ChangeReadings;
  readonly undo: () => void;
  /** Goes back to the latest kept answer, or to what was brought in. */
  readonly discard: () => void;
  readonly takeUp: (choices: ObservationChoices) => void;
  readonly setReason: (reason: string) => void;
}

interface Start {
  readonly eventId: string;
  readonly observations: GatheredObservations;
  /** Number and choices of the latest kept answer; 0 and none where there is none. */
  readonly number: number;
  readonly base: ObservationChoices;
}

/** The work on one event: choices and reason, steps that can be undone, and a draft that outlives the tab. */
export function useWork(start: Start, view: EventView, changeView: ChangeView): Work {
  const { base, observations } = start;
  const [readings, setReadings] = useState<ReadingChoices>(() => withoutStations(base));
  const [past, setPast] = useState<readonly ReadingChoices[]>([]);
  const [reason, setReason] = useState("");
  const choices = useMemo(() => ({ ...readings, leftOutStationIds: view.without }), [readings, view.without]);
  const isUnkept = reason !== "" || !sameChoices(choices, base);

  const changeReadings = useCallback<ChangeReadings>((next) => {
    setPast((before) => [...before, readings]);
    setReadings(next(readings));
  }, [readings]);
  const takeUp = useCallback((taken: ObservationChoices) => {
    const known = knownChoices(taken, observations);
    setPast((before) => [...before, readings]);
    setReadings(withoutStations(known));
    changeView({ without: known.leftOutStationIds });
  }, [observations, readings, changeView]);
  const undo = useCallback(() => {
    const last = past.at(-1);
    if (last === undefined) return;
    setReadings(last);
    setPast(past.slice(0, -1));
  }, [past]);
  const discard = useCallback(() => {
    takeUp(base);
    setReason("");
  }, [takeUp, base]);

  const [broughtFrom, setBroughtFrom] = useState<number | null>(null);
  const [isForgetful, setIsForgetful] = useState(false);
  const bringBack = (draft: Draft): void => {
    const known = knownChoices(draft.choices, observations);
    setReadings(withoutStations(known));
    setReason(draft.reason);
    setBroughtFrom(draft.startedFrom);
    if (!new URLSearchParams(globalThis.location.search).has("without")) changeView({ without: known.leftOutStationIds });
  };
  useDraft(start, { choices, reason, isUnkept }, { bringBack, onRemembered: (isTaken) => { setIsForgetful(!isTaken); } });
  const remark = isUnkept ? remarkOf({ broughtFrom, isForgetful, number: start.number }) : null;
  return { choices, reason, isUnkept, remark, canUndo: past.length > 0, changeReadings, undo, discard, takeUp, setReason };
}

function remarkOf({ broughtFrom, isForgetful, number }: { broughtFrom: number | null; isForgetful: boolean; number: number }): string | null {
  if (isForgetful) return "This browser cannot remember work that is not kept: it is lost when the page is closed.";
  if (broughtFrom === null) return null;
  const since = broughtFrom < number ? ` It started from ${broughtFrom === 0 ? "what was brought in" : `number ${broughtFrom}`}; number ${number} was kept since.` : "";
  return `Work that was not kept was brought back.${since}`;
}

interface DraftKeeping {
  readonly bringBack: (draft: Draft) => void;
  readonly onRemembered: (isTaken: boolean) => void;
}

/** Brings a draft back when the page opens, and puts every change aside from then on. */
function useDraft(start: Start, work: Pick<Work, "choices" | "reason" | "isUnkept">, keeping: DraftKeeping): void {
  const { eventId, number } = start;
  const { choices, reason, isUnkept } = work;
  const isOpened = useRef(false);
  const atFirst = useRef(keeping);

  useEffect(() => {
    if (!isOpened.current) {
      isOpened.current = true;
      const draft = readDraft(eventId);
      if (draft !== null) atFirst.current.bringBack(draft);
      return;
    }
    atFirst.current.onRemembered(writeDraft(eventId, isUnkept ? { startedFrom: number, choices, reason } : null));
  }, [eventId, number, choices, reason, isUnkept]);

  // Another tab that keeps or drops its own work forgets the draft of both; this tab's is put aside again.
  useEffect(() => {
    const restore = ({ key, newValue }: StorageEvent): void => {
      if (key === draftKey(eventId) && newValue === null && isUnkept) writeDraft(eventId, { startedFrom: number, choices, reason });
    };
    globalThis.addEventListener("storage", restore);
    return () => { globalThis.removeEventListener("storage", restore); };
  }, [eventId, number, choices, reason, isUnkept]);
}

function withoutStations({ droppedReadingIds, movedReadings, addedReadings, usesSuspect }: ObservationChoices): ReadingChoices {
  return { droppedReadingIds, movedReadings, addedReadings, usesSuspect };
}
