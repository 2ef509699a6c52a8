import type { EventLayers } from "#lib/chart/event-layers.ts";
import type { ChartArea } from "#lib/chart/chart-point.ts";
import type { ChartWindow } from "#lib/chart/chart-window.ts";
import type { GatheredObservations } from "#lib/core/arrival/gathered-observations.ts";
import type { ObservationChoices } from "#lib/core/arrival/observation-choices.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";
import type { EventSolution } from "#lib/core/source/solution.ts";

/** What the page asks of its worker. `ask` numbers the questions, so that an answer overtaken by a newer one is dropped. */
export type WorkerRequest =
  | {
      readonly kind: "open";
      readonly observations: GatheredObservations;
      readonly settings: EstimationSettings;
      readonly window: ChartWindow;
      /** As worked out by the server: drawn at once, before anything is worked out here. */
      readonly solution: EventSolution;
      /** What it was worked out from. */
      readonly choices: ObservationChoices;
    }
  | { readonly kind: "solve"; readonly ask: number; readonly choices: ObservationChoices }
  | { readonly kind: "overlap"; readonly ask: number; readonly focus: string | null };

/** One solution and its picture, and the choices that both come from. */
export interface Drawn {
  readonly ask: number;
  readonly choices: ObservationChoices;
  readonly solution: EventSolution;
  readonly layers: EventLayers;
}

export type WorkerReport =
  | ({ readonly kind: "drawn" } & Drawn)
  | { readonly kind: "overlap"; readonly ask: number; readonly areas: readonly ChartArea[] }
  | { readonly kind: "failed"; readonly ask: number; readonly message: string };
