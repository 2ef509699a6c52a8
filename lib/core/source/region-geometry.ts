import { geoEquirectangular } from "d3-geo";
import { geoProject } from "d3-geo-projection";
import type { MultiPolygon, Position as Pair } from "geojson";
import { cellsToMultiPolygon } from "h3-js";

/** Digits kept of a degree: a metre. */
const DECIMALS = 5;

/**
 * The outline of cells as RFC 7946 asks for it: split at the antimeridian, closed over a pole, outlines
 * counter-clockwise and holes clockwise. Sides between vertices are as the cells have them.
 * [source: h3, rfc-7946]
 */
export function regionGeometry(cells: readonly string[]): MultiPolygon {
  if (cells.length === 0) return { type: "MultiPolygon", coordinates: [] };
  // On the sphere the inside of a line is at its right hand for d3, at its left for GeoJSON.
  const spherical = cellsToMultiPolygon([...cells], true).map((polygon) => polygon.map((line) => [...line].reverse()));
  const plate = geoEquirectangular().scale(180 / Math.PI).translate([0, 0]).precision(0);
  const projected = geoProject({ type: "MultiPolygon", coordinates: spherical }, plate);
  const polygons: Pair[][][] =
    projected?.type === "MultiPolygon" ? projected.coordinates : projected?.type === "Polygon" ? [projected.coordinates] : [];
  return { type: "MultiPolygon", coordinates: polygons.map((polygon) => polygon.map((line, i) => wound(line.map(turnedUp), i === 0))) };
}

/** Screen coordinates run down; here north is up again. */
function turnedUp([x = NaN, y = NaN]: Pair): Pair {
  return [rounded(x), rounded(-y)];
}

function rounded(degrees: number): number {
  return Math.round(degrees * 10 ** DECIMALS) / 10 ** DECIMALS + 0;
}

function wound(line: Pair[], counterClockwise: boolean): Pair[] {
  let twiceArea = 0;
  line.forEach(([x = NaN, y = NaN], i) => {
    const [nextX = NaN, nextY = NaN] = line[(i + 1) % line.length] ?? [];
    twiceArea += x * nextY - nextX * y;
  });
  return twiceArea > 0 === counterClockwise ? line : line.reverse();
}
