import { baseMap, type BaseMap } from "#lib/chart/base-map.ts";
import type { ChartWindow } from "#lib/chart/chart-window.ts";
import { fetchLand } from "./fetch-land.ts";

export type BaseMapReport = { readonly kind: "drawn"; readonly baseMap: BaseMap } | { readonly kind: "failed"; readonly message: string };

function report(message: BaseMapReport): void {
  postMessage(message);
}

/** Brings the land into a chart's window, away from the page: it takes longer than a hand should wait. */
addEventListener("message", (event: MessageEvent<ChartWindow>) => {
  fetchLand()
    .then((topology) => { report({ kind: "drawn", baseMap: baseMap(event.data, topology) }); })
    .catch((error: unknown) => { report({ kind: "failed", message: error instanceof Error ? error.message : String(error) }); });
});
