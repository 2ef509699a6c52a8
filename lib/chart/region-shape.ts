import type { MultiPolygon, Position as Pair } from "geojson";
import type { ChartArea, ChartLine, ChartPoint } from "./chart-point.ts";

/** A region as it comes in an answer (cut at the 180th meridian, closed over a pole), ready to be copied and painted. */
export function regionArea(region: MultiPolygon): ChartArea {
  return region.coordinates.map((polygon) => polygon.map((line) => line.map(toPoint)));
}

/**
 * The region's true boundary: the sides that only close it along the 180th meridian or over a pole are no boundary of
 * anything, and an outline that drew them would show a wall in the open sea.
 */
export function regionOutline(region: MultiPolygon): ChartLine[] {
  return region.coordinates.flatMap((polygon) => polygon.flatMap(withoutSeams));
}

function withoutSeams(line: readonly Pair[]): ChartLine[] {
  const pieces: ChartLine[] = [];
  let piece: ChartLine = [];
  let previous: ChartPoint | null = null;
  for (const pair of line) {
    const point = toPoint(pair);
    if (previous !== null && isSeam(previous, point)) {
      if (piece.length > 1) pieces.push(piece);
      piece = [];
    }
    piece.push(point);
    previous = point;
  }
  if (piece.length > 1) pieces.push(piece);
  return pieces;
}

function isSeam(from: ChartPoint, to: ChartPoint): boolean {
  const alongAntimeridian = Math.abs(from[1]) === 180 && from[1] === to[1];
  const alongPole = Math.abs(from[0]) === 90 && from[0] === to[0];
  return alongAntimeridian || alongPole;
}

function toPoint([longitude = 0, latitude = 0]: Pair): ChartPoint {
  return [latitude, longitude];
}
