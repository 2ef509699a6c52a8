import { wrapLongitudeDegrees, type Position } from "#lib/core/units/position.ts";
import type { ChartLine } from "./chart-point.ts";
import { pointInWindow, type ChartWindow } from "./chart-window.ts";

/**
 * A line of neighbouring positions without a jump at any meridian: it starts in the window and its longitude then
 * changes by less than half a turn from vertex to vertex. A line round a pole ends a whole turn from its start, where
 * its copy goes on.
 */
export function unbrokenLine(window: ChartWindow, positions: readonly Position[]): ChartLine {
  const [first, ...others] = positions;
  if (first === undefined) return [];
  const line: ChartLine = [pointInWindow(window, first)];
  let previous = first.longitudeDegrees;
  let [, longitude] = pointInWindow(window, first);
  for (const position of others) {
    longitude += wrapLongitudeDegrees(position.longitudeDegrees - previous);
    previous = position.longitudeDegrees;
    line.push([position.latitudeDegrees, longitude]);
  }
  return line;
}
