import { outcomeEstimate } from "#lib/core/arrival/outcome-estimate.ts";
import { ringSigmas } from "#lib/core/source/ring-sigma.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";
import type { EventSolution } from "#lib/core/source/solution.ts";
import { bandInWindow } from "./event-layers.ts";
import { bandOverlap } from "./band-overlap.ts";
import type { ChartArea } from "./chart-point.ts";
import type { ChartWindow } from "./chart-window.ts";
import { areaCopies } from "./copies.ts";

/**
 * Where the bands of each two stations overlap, one area a pair, with copies; only the pairs of the station in focus
 * where there is one. Painted over one another they are darkest where most bands meet.
 */
export function bandOverlaps(drawing: {
  window: ChartWindow;
  solution: EventSolution;
  settings: EstimationSettings;
  focus: string | null;
}): ChartArea[] {
  const { window, solution, settings, focus } = drawing;
  const spreadRaisedBy = solution.answer?.spreadRaisedBy ?? 1;
  const bands = solution.stations.flatMap((station) => {
    const estimate = outcomeEstimate(station.outcome);
    if (estimate === null) return [];
    const { distanceSigmaMetres: sigmaMetres } = ringSigmas({ estimate, settings, spreadRaisedBy });
    return [{ id: station.id, area: bandInWindow(window, { station, radiusMetres: estimate.distanceMetres, sigmaMetres }) }];
  });
  return bands.flatMap((first, index) =>
    bands
      .slice(index + 1)
      .filter((second) => focus === null || first.id === focus || second.id === focus)
      .map((second) => areaCopies(bandOverlap(first.area, second.area)))
      .filter((overlap) => overlap.length > 0),
  );
}
