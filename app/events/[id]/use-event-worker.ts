import { useCallback, useEffect, useRef, useState } from "react";
import type { BaseMap } from "#lib/chart/base-map.ts";
import type { ChartArea } from "#lib/chart/chart-point.ts";
import type { EventLayers } from "#lib/chart/event-layers.ts";
import type { EventSolution } from "#lib/core/source/solution.ts";
import type { WorkerReport, WorkerRequest } from "./worker-messages.ts";

export interface Drawn {
  readonly solution: EventSolution;
  readonly layers: EventLayers;
  /** The question that this answers: 0 for the solution that came with the page. */
  readonly ask: number;
}

export interface EventWorker {
  readonly baseMap: BaseMap | null;
  readonly drawn: Drawn | null;
  readonly overlap: readonly ChartArea[];
  readonly failure: string | null;
  /** Whether a question is on its way, and what is shown still answers the one before. */
  readonly isWorking: boolean;
  readonly solve: (without: readonly string[]) => void;
  readonly findOverlap: (focus: string | null) => void;
}

/** The worker of one open event: started with the page, ended with it. Answers overtaken by newer questions are dropped. */
export function useEventWorker(opening: Omit<Extract<WorkerRequest, { kind: "open" }>, "kind">): EventWorker {
  const worker = useRef<Worker | null>(null);
  const lastAsk = useRef({ solve: 0, overlap: 0 });
  const openedWith = useRef(opening);
  const [baseMap, setBaseMap] = useState<BaseMap | null>(null);
  const [drawn, setDrawn] = useState<Drawn | null>(null);
  const [overlap, setOverlap] = useState<readonly ChartArea[]>([]);
  const [failure, setFailure] = useState<string | null>(null);
  const [asked, setAsked] = useState(0);

  useEffect(() => {
    const started = new Worker(new URL("./event-worker.ts", import.meta.url), { type: "module" });
    started.onmessage = ({ data }: MessageEvent<WorkerReport>) => {
      if (data.kind === "base-map") setBaseMap(data.baseMap);
      if (data.kind === "failed") setFailure(data.message);
      if (data.kind === "overlap" && data.ask === lastAsk.current.overlap) setOverlap(data.areas);
      if (data.kind === "drawn" && data.ask === lastAsk.current.solve) {
        setFailure(null);
        setDrawn({ solution: data.solution, layers: data.layers, ask: data.ask });
      }
    };
    started.onerror = () => {
      setFailure("The part of the page that draws the chart could not be started.");
    };
    worker.current = started;
    post(started, { kind: "open", ...openedWith.current });
    return () => {
      started.terminate();
      worker.current = null;
    };
  }, []);

  const solve = useCallback((without: readonly string[]) => {
    lastAsk.current.solve += 1;
    setAsked(lastAsk.current.solve);
    post(worker.current, { kind: "solve", ask: lastAsk.current.solve, without });
  }, []);
  const findOverlap = useCallback((focus: string | null) => {
    lastAsk.current.overlap += 1;
    post(worker.current, { kind: "overlap", ask: lastAsk.current.overlap, focus });
  }, []);

  const isWorking = failure === null && asked !== (drawn?.ask ?? 0);
  return { baseMap, drawn, overlap, failure, isWorking, solve, findOverlap };
}

function post(worker: Worker | null, request: WorkerRequest): void {
  worker?.postMessage(request);
}
