import { outcomeEstimate } from "#lib/core/arrival/outcome-estimate.ts";
import type { SightTable } from "#lib/core/geodesy/sight-table.ts";
import type { SourceAnswer } from "#lib/core/source/answer.ts";
import { ringSigmas } from "#lib/core/source/ring-sigma.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";
import type { EventSolution, StationSolution } from "#lib/core/source/solution.ts";
import type { ChartArea, ChartLine, ChartPoint } from "./chart-point.ts";
import { pointInWindow, type ChartWindow } from "./chart-window.ts";
import { areaCopies, lineCopies } from "./copies.ts";
import { cutAtEdges } from "./cut-at-edges.ts";
import { areaIntoWindow } from "./into-window.ts";
import { regionShape } from "./region-shape.ts";
import { bandPolygon, ringLine } from "./ring-shape.ts";
import { sightLine } from "./sight-line.ts";

export interface RingLayer {
  readonly stationId: string;
  readonly line: ChartLine[];
  readonly band: ChartArea;
}

export interface RegionLayer {
  readonly probability: number;
  readonly area: ChartArea;
  readonly outline: ChartLine[];
}

/** The way of the swell to one station, and where land stops it. */
export interface SightLayer {
  readonly stationId: string;
  readonly open: ChartLine[];
  readonly beyond: ChartLine[];
  readonly blockedAt: ChartPoint | null;
}

/** One solution as the chart draws it: copies included where a shape may run over an edge of the window. */
export interface EventLayers {
  readonly rings: readonly RingLayer[];
  readonly regions: readonly RegionLayer[];
  readonly crossings: readonly { readonly stations: readonly [string, string]; readonly points: ChartPoint[] }[];
  readonly possibleSources: readonly { readonly probability: number; readonly point: ChartPoint }[];
  readonly ruledOut: readonly { readonly reason: string; readonly point: ChartPoint }[];
  readonly source: ChartPoint | null;
  readonly bestInWater: ChartPoint | null;
  readonly sightLines: readonly SightLayer[];
}

export function eventLayers(drawing: {
  window: ChartWindow;
  solution: EventSolution;
  settings: EstimationSettings;
  /** How far each station sees, by its id; a station without an entry sees everything. */
  sightTables: ReadonlyMap<string, SightTable>;
}): EventLayers {
  const { window, solution } = drawing;
  const { answer } = solution;
  const at = (holder: { position: StationSolution["position"] }): ChartPoint => pointInWindow(window, holder.position);
  return {
    rings: ringLayers(drawing),
    regions: regionLayers(answer),
    crossings: (answer?.crossings ?? []).map(({ stations, points }) => ({
      stations,
      points: points.map((position) => pointInWindow(window, position)),
    })),
    possibleSources: (answer?.modes ?? []).map((mode) => ({ probability: mode.probability, point: at(mode) })),
    ruledOut: (answer?.ruledOut ?? []).map((point) => ({ reason: point.reason, point: at(point) })),
    source: answer?.source ? at(answer.source) : null,
    bestInWater: answer?.source?.bestInWater ? pointInWindow(window, answer.source.bestInWater) : null,
    sightLines: sightLines(drawing),
  };
}

function ringLayers(drawing: { window: ChartWindow; solution: EventSolution; settings: EstimationSettings }): RingLayer[] {
  const { window, solution, settings } = drawing;
  const spreadRaisedBy = solution.answer?.spreadRaisedBy ?? 1;
  return solution.stations.flatMap((station): RingLayer[] => {
    const estimate = outcomeEstimate(station.outcome);
    if (estimate === null) return [];
    const { distanceSigmaMetres: sigmaMetres } = ringSigmas({ estimate, settings, spreadRaisedBy });
    return [
      {
        stationId: station.id,
        line: lineCopies(cutAtEdges(ringLine(window, { centre: station.position, radiusMetres: estimate.distanceMetres }))),
        band: areaCopies(bandInWindow(window, { station, radiusMetres: estimate.distanceMetres, sigmaMetres })),
      },
    ];
  });
}

/** A station's band, one sigma to either side of its ring, once and without copies. */
export function bandInWindow(
  window: ChartWindow,
  band: { station: StationSolution; radiusMetres: number; sigmaMetres: number },
): ChartArea {
  const polygon = bandPolygon({
    centre: band.station.position,
    innerMetres: band.radiusMetres - band.sigmaMetres,
    outerMetres: band.radiusMetres + band.sigmaMetres,
  });
  return polygon === null ? [] : areaIntoWindow(window, polygon);
}

/** Widest first, so that the surer region lies on top. */
function regionLayers(answer: SourceAnswer | null): RegionLayer[] {
  const regions = [...(answer?.regions ?? [])].sort((a, b) => b.probability - a.probability);
  return regions.map(({ probability, geometry }) => {
    const { area, outline } = regionShape(geometry);
    return { probability, area: areaCopies(area), outline: lineCopies(outline.flatMap(cutAtEdges)) };
  });
}

function sightLines(drawing: {
  window: ChartWindow;
  solution: EventSolution;
  sightTables: ReadonlyMap<string, SightTable>;
}): SightLayer[] {
  const source = drawing.solution.answer?.source;
  if (!source) return [];
  return drawing.solution.stations
    .filter((station) => outcomeEstimate(station.outcome) !== null)
    .map((station) => {
      const sight = drawing.sightTables.get(station.id) ?? null;
      const line = sightLine(drawing.window, { station: station.position, source: source.position, sight });
      return {
        stationId: station.id,
        open: lineCopies(cutAtEdges(line.open)),
        beyond: lineCopies(cutAtEdges(line.beyond)),
        blockedAt: line.blockedAt,
      };
    });
}
