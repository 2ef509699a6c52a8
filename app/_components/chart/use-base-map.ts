import { useEffect, useState } from "react";
import type { BaseMap } from "#lib/chart/base-map.ts";
import type { BaseMapReport } from "./base-map-worker.ts";

/** The land in the window with this middle, drawn by a worker of its own beside whatever else a chart waits for; null until it has come. A chart without land is still one. */
export function useBaseMap(centreLongitudeDegrees: number): { baseMap: BaseMap | null; failure: string | null } {
  const [drawn, setDrawn] = useState<{ centre: number; report: BaseMapReport } | null>(null);
  useEffect(() => {
    const worker = new Worker(new URL("./base-map-worker.ts", import.meta.url), { type: "module" });
    const settle = (report: BaseMapReport): void => {
      setDrawn({ centre: centreLongitudeDegrees, report });
      worker.terminate();
    };
    worker.onmessage = ({ data }: MessageEvent<BaseMapReport>) => { settle(data); };
    worker.onerror = () => { settle({ kind: "failed", message: "The part of the page that draws the land could not be started." }); };
    worker.postMessage({ centreLongitudeDegrees });
    return () => { worker.terminate(); };
  }, [centreLongitudeDegrees]);
  if (drawn?.centre !== centreLongitudeDegrees) return { baseMap: null, failure: null };
  return drawn.report.kind === "drawn" ? { baseMap: drawn.report.baseMap, failure: null } : { baseMap: null, failure: drawn.report.message };
}
