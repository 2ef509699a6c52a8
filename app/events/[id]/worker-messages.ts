import type { EventLayers } from "#lib/chart/event-layers.ts";
import type { BaseMap } from "#lib/chart/base-map.ts";
import type { ChartArea } from "#lib/chart/chart-point.ts";
import type { ChartWindow } from "#lib/chart/chart-window.ts";
import type { EventObservations } from "#lib/core/arrival/observations.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";
import type { EventSolution } from "#lib/core/source/solution.ts";

/** What the page asks of its worker. `ask` numbers the questions, so that an answer overtaken by a newer one is dropped. */
export type WorkerRequest =
  | {
      readonly kind: "open";
      readonly observations: EventObservations;
      readonly settings: EstimationSettings;
      readonly window: ChartWindow;
      /** As worked out by the server: drawn at once, before anything is worked out here. */
      readonly solution: EventSolution;
      /** The stations that it leaves out. */
      readonly without: readonly string[];
    }
  | { readonly kind: "solve"; readonly ask: number; readonly without: readonly string[] }
  | { readonly kind: "overlap"; readonly ask: number; readonly focus: string | null };

/** One solution and its picture, and the stations that both leave out. */
export interface Drawn {
  readonly ask: number;
  readonly without: readonly string[];
  readonly solution: EventSolution;
  readonly layers: EventLayers;
}

export type WorkerReport =
  | { readonly kind: "base-map"; readonly baseMap: BaseMap }
  | ({ readonly kind: "drawn" } & Drawn)
  | { readonly kind: "overlap"; readonly ask: number; readonly areas: readonly ChartArea[] }
  | { readonly kind: "failed"; readonly ask: number; readonly message: string };
