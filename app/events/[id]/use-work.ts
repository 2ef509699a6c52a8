import { useCallback, useMemo, useState } from "react";
import { useDraftShelf } from "../../_components/use-draft-shelf.ts";
import type { GatheredObservations } from "#lib/core/arrival/gathered-observations.ts";
import { knownChoices } from "#lib/core/arrival/known-choices.ts";
import type { ObservationChoices } from "#lib/core/arrival/observation-choices.ts";
import { sameChoices } from "#lib/core/arrival/same-choices.ts";
import { draftText, readDraft } from "./draft.ts";
import type { ChangeView } from "./use-view.ts";
import type { EventView } from "./view.ts";

/** What is chosen of the readings; which stations are left out stands in the view, for the address holds it. */
export type ReadingChoices = Omit<ObservationChoices, "leftOutStationIds">;
export type ChangeReadings = (next: (before: ReadingChoices) => ReadingChoices) => void;

export interface Work {
  /** All of it, the stations left out included. */
  readonly choices: ObservationChoices;
  readonly reason: string;
  /** Number of the latest kept answer that was seen when it began. */
  readonly startedFrom: number;
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
  /** Begins from an answer that was kept here, or that was shown to have been kept. */
  readonly startFrom: (number: number) => void;
}

interface Start {
  readonly eventId: string;
  /** Of the data folder. */
  readonly storeId: string;
  readonly observations: GatheredObservations;
  /** Number and choices of the latest kept answer; 0 and none where there is none. */
  readonly number: number;
  readonly base: ObservationChoices;
}

/** The work on one event: choices and reason, steps that can be undone, and a draft that outlives the tab. */
export function useWork(start: Start, view: EventView, changeView: ChangeView): Work {
  const { base, number } = start;
  const steps = useSteps(start, view, changeView);
  const { choices } = steps;
  const [reason, setReason] = useState("");
  const [startedFrom, startFrom] = useState(number);
  const [broughtFrom, setBroughtFrom] = useState<number | null>(null);
  const [isForgetful, setIsForgetful] = useState(false);
  const isUnkept = reason !== "" || !sameChoices(choices, base);

  const onFound = (text: string): void => {
    const draft = readDraft(text);
    // One that knows of answers which this event does not have was made of another.
    if (draft === null || draft.startedFrom > number || isUnkept) return;
    steps.bringBack(draft.choices);
    setReason(draft.reason);
    startFrom(draft.startedFrom);
    setBroughtFrom(draft.startedFrom);
  };
  useDraftShelf({
    subject: `${start.storeId} event ${start.eventId}`,
    text: isUnkept ? draftText({ startedFrom, choices, reason }) : null,
    onFound,
    onRemembered: (isTaken) => { setIsForgetful(!isTaken); },
  });
  const discard = (): void => {
    steps.takeUp(base);
    setReason("");
    startFrom(number);
  };
  const remark = isUnkept ? remarkOf({ broughtFrom, isForgetful, startedFrom, number }) : null;
  return { ...steps, reason, startedFrom, isUnkept, remark, discard, setReason, startFrom };
}

function remarkOf({ broughtFrom, isForgetful, startedFrom, number }: { broughtFrom: number | null; isForgetful: boolean; startedFrom: number; number: number }): string | null {
  if (isForgetful) return "This browser cannot remember work that is not kept: it is lost when the page is closed.";
  const since = startedFrom < number ? ` It started from ${startedFrom === 0 ? "what was brought in" : `number ${startedFrom}`}; number ${number} was kept since.` : "";
  if (broughtFrom === null) return since === "" ? null : `This work is behind.${since}`;
  return `Work that was not kept was brought back.${since}`;
}

/** Choices, and the way back through them. */
function useSteps({ base, observations }: Start, view: EventView, changeView: ChangeView) {
  const [readings, setReadings] = useState<ReadingChoices>(() => withoutStations(base));
  const [past, setPast] = useState<readonly ReadingChoices[]>([]);
  const choices = useMemo(() => ({ ...readings, leftOutStationIds: view.without }), [readings, view.without]);

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
  /** Which stations are left out is the draft's business only where the address says nothing of it. */
  const bringBack = (draft: ObservationChoices): void => {
    const known = knownChoices(draft, observations);
    setReadings(withoutStations(known));
    if (!new URLSearchParams(globalThis.location.search).has("without")) changeView({ without: known.leftOutStationIds });
  };
  return { choices, canUndo: past.length > 0, changeReadings, undo, takeUp, bringBack };
}

function withoutStations({ droppedReadingIds, movedReadings, addedReadings, usesSuspect }: ObservationChoices): ReadingChoices {
  return { droppedReadingIds, movedReadings, addedReadings, usesSuspect };
}
