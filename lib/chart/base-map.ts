import { feature, mesh } from "topojson-client";
import type { GeometryCollection, Topology } from "topojson-specification";
import type { MultiPolygon } from "geojson";
import type { ChartArea, ChartLine } from "./chart-point.ts";
import type { ChartWindow } from "./chart-window.ts";
import { areaIntoWindow, linesIntoWindow } from "./into-window.ts";

/** Land to paint, and its coast to draw over it. */
export interface BaseMap {
  readonly land: ChartArea;
  readonly coast: ChartLine[];
}

/**
 * Natural Earth's land in the window. The coast is the mesh of the land's arcs, not the outline of the painted areas:
 * the sides that close those at the window's edge or over the South Pole are no coast.
 */
export function baseMap(window: ChartWindow, topology: Topology<{ land: GeometryCollection }>): BaseMap {
  const { land } = topology.objects;
  const collection = feature(topology, land);
  const polygons = collection.features.flatMap(({ geometry }): MultiPolygon["coordinates"] => {
    if (geometry.type === "Polygon") return [geometry.coordinates];
    return geometry.type === "MultiPolygon" ? geometry.coordinates : [];
  });
  return {
    land: areaIntoWindow(window, { type: "MultiPolygon", coordinates: polygons }),
    coast: linesIntoWindow(window, mesh(topology, land)),
  };
}
