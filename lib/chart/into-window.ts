import { geoEquirectangular, type GeoProjection } from "d3-geo";
import { geoProject } from "d3-geo-projection";
import type { Geometry, MultiLineString, MultiPolygon, Polygon, Position as Pair } from "geojson";
import type { ChartArea, ChartLine } from "./chart-point.ts";
import type { ChartWindow } from "./chart-window.ts";

/**
 * Spherical areas and lines, cut to the window and closed over a pole where they hold one.
 *
 * The projection is the identity of longitude and latitude in degrees with its cut at the window's edges. Screen
 * coordinates run down, so latitudes come out negated and are turned back here: letting the projection do it would
 * turn holes into outlines. Sides between vertices are great circles, subdivided to within 0.05 degrees.
 */
export function areaIntoWindow(window: ChartWindow, area: Polygon | MultiPolygon): ChartArea {
  const projected = geoProject(area, identityCutAtEdges(window));
  return polygonsOf(projected).map((polygon) => polygon.map(turnedUp));
}

export function linesIntoWindow(window: ChartWindow, lines: MultiLineString): ChartLine[] {
  const projected = geoProject(lines, identityCutAtEdges(window));
  if (projected?.type === "LineString") return [turnedUp(projected.coordinates)];
  if (projected?.type === "MultiLineString") return projected.coordinates.map(turnedUp);
  return [];
}

function identityCutAtEdges(window: ChartWindow): GeoProjection {
  const middle = window.centreLongitudeDegrees;
  return geoEquirectangular()
    .rotate([-middle, 0])
    .scale(180 / Math.PI)
    .translate([middle, 0])
    .precision(0.05);
}

function polygonsOf(geometry: Geometry | null): Pair[][][] {
  if (geometry?.type === "Polygon") return [geometry.coordinates];
  if (geometry?.type === "MultiPolygon") return geometry.coordinates;
  return [];
}

function turnedUp(line: readonly Pair[]): ChartLine {
  return line.map(([x = 0, y = 0]) => [-y, x]);
}
