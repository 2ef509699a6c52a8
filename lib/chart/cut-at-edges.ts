import type { ChartLine, ChartPoint } from "./chart-point.ts";

/**
 * Where the chart's projection is taken to end. It runs on to infinity at the poles; the map library puts whatever
 * lies beyond 85.05 degrees on that parallel, where a line over a pole would become a stroke along the whole edge.
 */
export const EDGE_LATITUDE_DEGREES = 85;

/** The pieces of a line between the chart's northern and southern edge, ending on the edges where it crosses them. */
export function cutAtEdges(line: ChartLine): ChartLine[] {
  const pieces: ChartLine[] = [];
  let piece: ChartLine = [];
  let previous: ChartPoint | null = null;
  for (const point of line) {
    if (previous !== null && isInside(previous) !== isInside(point)) {
      piece.push(onEdge(previous, point));
      if (isInside(previous)) {
        pieces.push(piece);
        piece = [];
      }
    }
    if (isInside(point)) piece.push(point);
    previous = point;
  }
  return [...pieces, piece].filter(({ length }) => length > 1);
}

function isInside([latitude]: ChartPoint): boolean {
  return Math.abs(latitude) <= EDGE_LATITUDE_DEGREES;
}

/** The point of a side that crosses an edge where it does so. */
function onEdge(from: ChartPoint, to: ChartPoint): ChartPoint {
  const outer = isInside(from) ? to : from;
  const edge = Math.sign(outer[0]) * EDGE_LATITUDE_DEGREES;
  const fraction = (edge - from[0]) / (to[0] - from[0]);
  return [edge, from[1] + fraction * (to[1] - from[1])];
}
