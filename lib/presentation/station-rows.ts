import type { NumberedStation } from "#lib/core/arrival/numbered-stations.ts";
import { outcomeEstimate } from "#lib/core/arrival/outcome-estimate.ts";
import { ringSigmas } from "#lib/core/source/ring-sigma.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";
import type { EventSolution, StationSolution } from "#lib/core/source/solution.ts";
import { distanceFigure, signedDistanceFigure, type DistanceUnit } from "./distances.ts";
import { NO_FIGURE, probabilityFigure } from "./figures.ts";
import { signedHoursFigure } from "./times.ts";

/** A station's line in the table beside the chart, in words and figures. */
export interface StationRow {
  readonly station: NumberedStation;
  readonly included: boolean;
  /** Why there is no ring, as a sentence; null where there is one. */
  readonly refusal: string | null;
  readonly sentIn: boolean;
  readonly ring: string;
  /** The readings' own error. */
  readonly ringSigma: string;
  readonly residualDistance: string;
  readonly residualHours: string;
  /** The residual of distance in parts of the band's half width, for the bar beside it. */
  readonly residualInSigmas: number | null;
  readonly belongs: string;
  /** How far the answer moves when the station is left out. */
  readonly withoutIt: string;
}

export function stationRows(table: {
  stations: readonly NumberedStation[];
  excludedIds: readonly string[];
  solution: EventSolution;
  settings: EstimationSettings;
  unit: DistanceUnit;
}): StationRow[] {
  return table.stations.map((station) => {
    const included = !table.excludedIds.includes(station.id);
    const solved = table.solution.stations.find(({ id }) => id === station.id);
    if (!included || solved === undefined) return { station, included, ...EMPTY };
    return { station, included, ...figures(solved, table) };
  });
}

type Figures = Omit<StationRow, "station" | "included">;

const EMPTY: Figures = {
  refusal: null,
  sentIn: false,
  ring: NO_FIGURE,
  ringSigma: "",
  residualDistance: NO_FIGURE,
  residualHours: NO_FIGURE,
  residualInSigmas: null,
  belongs: NO_FIGURE,
  withoutIt: NO_FIGURE,
};

function figures(
  solved: StationSolution,
  table: { solution: EventSolution; settings: EstimationSettings; unit: DistanceUnit },
): Figures {
  if (solved.outcome.kind === "refused") return { ...EMPTY, refusal: solved.outcome.message };
  const estimate = outcomeEstimate(solved.outcome);
  if (estimate === null) return EMPTY;
  const { answer } = table.solution;
  const verdict = answer?.stations.find(({ id }) => id === solved.id);
  const residual = verdict?.residual ?? null;
  const belongs = verdict?.belongs ?? null;
  const shift = verdict?.leaveOneOutShiftMetres ?? null;
  const { distanceSigmaMetres } = ringSigmas({ estimate, settings: table.settings, spreadRaisedBy: answer?.spreadRaisedBy ?? 1 });
  return {
    refusal: null,
    sentIn: solved.outcome.kind === "sent-in",
    ring: distanceFigure(estimate.distanceMetres, table.unit),
    ringSigma: `±\u00a0${distanceFigure(Math.sqrt(estimate.covariance.distanceVariance), table.unit)}`,
    residualDistance: residual ? signedDistanceFigure(residual.distanceMetres, table.unit) : NO_FIGURE,
    residualHours: residual ? signedHoursFigure(residual.originSeconds) : NO_FIGURE,
    residualInSigmas: residual ? residual.distanceMetres / distanceSigmaMetres : null,
    belongs: belongs === null ? NO_FIGURE : probabilityFigure(belongs),
    withoutIt: shift === null ? NO_FIGURE : distanceFigure(shift, table.unit),
  };
}
