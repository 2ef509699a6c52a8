import { useCallback, useEffect, useRef, useState } from "react";
import type { ObservationChoices } from "#lib/core/arrival/observation-choices.ts";
import type { ChartArea } from "#lib/chart/chart-point.ts";
import { sameChoices } from "#lib/core/arrival/same-choices.ts";
import type { Drawn, WorkerReport, WorkerRequest } from "./worker-messages.ts";

export interface EventWorker {
  readonly drawn: Drawn | null;
  readonly overlap: readonly ChartArea[];
  readonly failure: string | null;
  /** Whether what is shown, or came with the page, comes from other choices than these. */
  readonly isBehind: boolean;
  readonly findOverlap: (focus: string | null) => void;
}

/**
 * The worker of one open event: started with the page, ended with it. It is asked anew whenever the choices
 * change; answers overtaken by newer questions are dropped.
 */
export function useEventWorker(
  opening: Omit<Extract<WorkerRequest, { kind: "open" }>, "kind">,
  choices: ObservationChoices,
): EventWorker {
  const worker = useRef<Worker | null>(null);
  const lastAsk = useRef({ solve: 0, overlap: 0, choices: opening.choices });
  const openedWith = useRef(opening);
  const [drawn, setDrawn] = useState<Drawn | null>(null);
  const [overlap, setOverlap] = useState<readonly ChartArea[]>([]);
  const [failure, setFailure] = useState<string | null>(null);

  useEffect(() => {
    const started = new Worker(new URL("./event-worker.ts", import.meta.url), { type: "module" });
    started.onmessage = ({ data }: MessageEvent<WorkerReport>) => {
      if (data.kind === "failed") setFailure(data.message);
      if (data.kind === "overlap" && data.ask === lastAsk.current.overlap) setOverlap(data.areas);
      if (data.kind === "drawn" && data.ask === lastAsk.current.solve) {
        setFailure(null);
        setDrawn(data);
      }
    };
    started.onerror = () => {
      setFailure("The part of the page that draws the chart could not be started.");
    };
    worker.current = started;
    lastAsk.current.choices = openedWith.current.choices;
    post(started, { kind: "open", ...openedWith.current });
    return () => {
      started.terminate();
      worker.current = null;
    };
  }, []);

  useEffect(() => {
    if (sameChoices(choices, lastAsk.current.choices)) return;
    lastAsk.current = { ...lastAsk.current, choices, solve: lastAsk.current.solve + 1 };
    post(worker.current, { kind: "solve", ask: lastAsk.current.solve, choices });
  }, [choices]);
  const findOverlap = useCallback((focus: string | null) => {
    lastAsk.current.overlap += 1;
    post(worker.current, { kind: "overlap", ask: lastAsk.current.overlap, focus });
  }, []);

  const isBehind = !sameChoices(choices, drawn?.choices ?? opening.choices);
  return { drawn, overlap, failure, isBehind, findOverlap };
}

function post(worker: Worker | null, request: WorkerRequest): void {
  worker?.postMessage(request);
}
