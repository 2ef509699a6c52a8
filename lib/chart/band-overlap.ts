import intersect from "@turf/intersect";
import { featureCollection, multiPolygon } from "@turf/helpers";
import type { Position as Pair } from "geojson";
import type { ChartArea, ChartLine } from "./chart-point.ts";

/**
 * Where two bands overlap. Both must already lie in one and the same window: there the boundaries are plane lines,
 * and what crosses the 180th meridian or holds a pole has been cut and closed.
 */
export function bandOverlap(first: ChartArea, second: ChartArea): ChartArea {
  if (first.length === 0 || second.length === 0) return [];
  const overlap = intersect(featureCollection([multiPolygon(first.map(toPairs)), multiPolygon(second.map(toPairs))]));
  if (overlap === null) return [];
  const { geometry } = overlap;
  const polygons = geometry.type === "Polygon" ? [geometry.coordinates] : geometry.coordinates;
  return polygons.map((polygon) => polygon.map((line) => line.map(([x = 0, y = 0]) => [y, x])));
}

function toPairs(polygon: readonly ChartLine[]): Pair[][] {
  return polygon.map((line) => line.map(([latitude, longitude]) => [longitude, latitude]));
}
