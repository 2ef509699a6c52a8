import type { MultiPolygon, Position as Pair } from "geojson";
import type { ChartArea, ChartLine, ChartPoint } from "./chart-point.ts";
import { smoothClosedLine, smoothOpenLine } from "./smooth-line.ts";

/** A region as the chart draws it. */
export interface RegionShape {
  readonly area: ChartArea;
  /**
   * The region's true boundary. The sides that only close its polygons along the 180th meridian or over a pole are
   * left out: an outline with them would show a wall in the open sea.
   */
  readonly outline: ChartLine[];
}

/** A region as it comes in an answer: made of hexagonal cells, cut at the 180th meridian, closed over a pole. */
export function regionShape(region: MultiPolygon): RegionShape {
  const lines = region.coordinates.map((polygon) => polygon.map((line) => boundaryPieces(line.map(toPoint))));
  return {
    area: lines.map((polygon) => polygon.map((pieces) => pieces.flat())),
    outline: lines.flat(2).filter((piece) => piece.length > 1),
  };
}

/** The line in order, in pieces that end where a seam begins. A corner between two seams is a piece of one point. */
function boundaryPieces(line: ChartLine): ChartLine[] {
  const pieces: ChartLine[] = [];
  let piece: ChartLine = [];
  let previous: ChartPoint | null = null;
  for (const point of line) {
    if (previous !== null && isSeam(previous, point)) {
      pieces.push(piece);
      piece = [];
    }
    piece.push(point);
    previous = point;
  }
  const first = pieces.shift();
  if (first === undefined) return [smoothClosedLine(piece)];
  // The line's first and last point are one and the same, and no end of anything.
  return [[...piece, ...first.slice(1)], ...pieces].map(smoothOpenLine);
}

/** As close as answers round their degrees. */
const EDGE_DEGREES = 1e-5;

function isSeam(from: ChartPoint, to: ChartPoint): boolean {
  const bothAt = (degrees: number, index: 0 | 1): boolean =>
    Math.abs(Math.abs(from[index]) - degrees) < EDGE_DEGREES && Math.abs(to[index] - from[index]) < EDGE_DEGREES;
  return bothAt(180, 1) || bothAt(90, 0);
}

function toPoint([longitude = 0, latitude = 0]: Pair): ChartPoint {
  return [latitude, longitude];
}
