import { useEffect, useRef, useState } from "react";
import type { DrawnRing, RingQuestion, RingReport } from "./ring-worker.ts";

export interface RingOnChart {
  readonly ring: DrawnRing | null;
  /** Number of the drawing, for whoever waits for a newer one. */
  readonly drawing: number;
  readonly failure: string | null;
}

/** The drawing of what is asked for now; while a newer one is being drawn, of what was asked before. */
export function useRingWorker({ window, ring }: Omit<RingQuestion, "ask">): RingOnChart {
  const worker = useRef<Worker | null>(null);
  const lastAsk = useRef(0);
  const [shown, setShown] = useState<RingOnChart>({ ring: null, drawing: 0, failure: null });

  useEffect(() => {
    const started = new Worker(new URL("./ring-worker.ts", import.meta.url), { type: "module" });
    started.onmessage = ({ data }: MessageEvent<RingReport>) => {
      if (data.ask === lastAsk.current) setShown({ ring: data.ring, drawing: data.ask, failure: null });
    };
    started.onerror = () => { setShown((before) => ({ ...before, failure: "The part of the page that draws the ring could not be started." })); };
    worker.current = started;
    return () => {
      started.terminate();
      worker.current = null;
    };
  }, []);

  const { centreLongitudeDegrees } = window;
  const { latitudeDegrees, longitudeDegrees } = ring?.centre ?? { latitudeDegrees: null, longitudeDegrees: null };
  const { radiusMetres, sigmaMetres } = ring ?? { radiusMetres: 0, sigmaMetres: 0 };
  // By its numbers: each stroke of a key makes the same ring anew.
  useEffect(() => {
    lastAsk.current += 1;
    const asked = latitudeDegrees === null ? null : { centre: { latitudeDegrees, longitudeDegrees }, radiusMetres, sigmaMetres };
    const question: RingQuestion = { ask: lastAsk.current, window: { centreLongitudeDegrees }, ring: asked };
    worker.current?.postMessage(question);
  }, [centreLongitudeDegrees, latitudeDegrees, longitudeDegrees, radiusMetres, sigmaMetres]);
  return shown;
}
