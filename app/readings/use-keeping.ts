import { useState } from "react";
import type { Issue } from "../_components/ask-server.ts";
import { bringIn, NO_PROGRESS, type Bringing, type BroughtIn, type Progress } from "./bring-in.ts";
import { placeIssues, type PlacedIssues } from "./server-issues.ts";

export interface Keeping {
  readonly isBusy: boolean;
  /** What the server has against it, where that belongs. */
  readonly refused: PlacedIssues;
  /** Sentences that belong to no field. */
  readonly refusals: readonly string[];
  readonly done: { readonly words: string; readonly event: { readonly id: string; readonly title: string } | null } | null;
}

interface Said {
  readonly issues: readonly Issue[];
  /** Of the rows that were sent. */
  readonly keys: readonly number[];
  readonly done: Keeping["done"];
}

const UNSAID: Said = { issues: [], keys: [], done: null };

/** Brings readings in, once: a try that was not answered is taken up again where it broke off. */
export function useKeeping(): Keeping & {
  /** Null where it was refused. */
  readonly start: (bringing: Bringing, keys: readonly number[], words: { readonly done: string; readonly eventTitle: string }) => Promise<Extract<BroughtIn, { kind: "in" }> | null>;
  /** Says before asking the server why nothing was sent. */
  readonly hold: (sentence: string) => void;
  readonly forget: () => void;
} {
  const [isBusy, setIsBusy] = useState(false);
  const [state, setState] = useState(UNSAID);
  const [tried, setTried] = useState<{ what: string; progress: Progress }>({ what: "", progress: NO_PROGRESS });
  const refused = placeIssues(state.issues, state.keys);
  return {
    isBusy,
    refused,
    refusals: refused.others,
    done: state.done,
    hold: (sentence) => { setState({ issues: [{ path: "", message: sentence }], keys: [], done: null }); },
    forget: () => { setState(UNSAID); },
    start: async (bringing, keys, words) => {
      if (isBusy) return null;
      setIsBusy(true);
      setState(UNSAID);
      const what = JSON.stringify([bringing.stationId, bringing.placed, bringing.readings]);
      const outcome = await bringIn(bringing, what === tried.what ? tried.progress : NO_PROGRESS);
      setIsBusy(false);
      if (outcome.kind === "refused") {
        setTried({ what, progress: outcome.progress });
        setState({ issues: outcome.issues, keys, done: null });
        return null;
      }
      setTried({ what: "", progress: NO_PROGRESS });
      setState({ ...UNSAID, done: { words: words.done, event: outcome.event && { id: outcome.event.id, title: outcome.event.title === "" ? words.eventTitle : outcome.event.title } } });
      return outcome;
    },
  };
}
