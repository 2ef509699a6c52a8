import { wrapLongitudeDegrees, type Position } from "#lib/core/units/position.ts";
import type { ChartPoint } from "./chart-point.ts";

/**
 * The piece of the endless chart that is shown: 360 degrees of longitude with the network in the middle, so that what
 * belongs together is not torn apart at the 180th meridian. Areas are cut at its two edges, as far away as can be.
 */
export interface ChartWindow {
  readonly centreLongitudeDegrees: number;
}

/**
 * The window with these positions in its middle: the direction of the sum of their unit vectors in the equator's
 * plane. Longitude 0 where they cancel out (two stations on opposite meridians, or none at all).
 */
export function windowAround(positions: readonly Position[]): ChartWindow {
  let east = 0;
  let north = 0;
  for (const position of positions) {
    const lambda = (position.longitudeDegrees * Math.PI) / 180;
    east += Math.cos(lambda);
    north += Math.sin(lambda);
  }
  if (Math.hypot(east, north) < 1e-6) return { centreLongitudeDegrees: 0 };
  return { centreLongitudeDegrees: Math.round((Math.atan2(north, east) * 180) / Math.PI) };
}

/** The position's own place in the window: its longitude within 180 degrees of the middle. */
export function pointInWindow(window: ChartWindow, position: Position): ChartPoint {
  const fromCentre = wrapLongitudeDegrees(position.longitudeDegrees - window.centreLongitudeDegrees);
  return [position.latitudeDegrees, window.centreLongitudeDegrees + fromCentre];
}
