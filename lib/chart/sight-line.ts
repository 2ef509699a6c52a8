import { geodesicDirect, geodesicInverse } from "#lib/core/geodesy/geodesic.ts";
import type { SightTable } from "#lib/core/geodesy/sight-table.ts";
import type { Position } from "#lib/core/units/position.ts";
import type { ChartLine, ChartPoint } from "./chart-point.ts";
import { pointInWindow, type ChartWindow } from "./chart-window.ts";
import { unbrokenLine } from "./unbroken-line.ts";

/** One vertex every 100 km follows a geodesic to within a quarter of a kilometre. */
const STEP_METRES = 100_000;

interface SightLine {
  /** From the station as far as it sees. */
  readonly open: ChartLine;
  /** From the land that blocks it on to the source; empty where nothing does. */
  readonly beyond: ChartLine;
  readonly blockedAt: ChartPoint | null;
}

/** The way of the swell between a station and a source, drawn outwards from the station, and where land stops it. */
export function sightLine(
  window: ChartWindow,
  way: { station: Position; source: Position; sight: SightTable | null },
): SightLine {
  const { distanceMetres, departsTowardDegrees } = geodesicInverse({ from: way.station, to: way.source });
  const at = (metres: number): Position =>
    geodesicDirect({ from: way.station, headsTowardDegrees: departsTowardDegrees, distanceMetres: metres }).position;

  const seenMetres = Math.min(distanceMetres, firstBlockMetres(way.sight, departsTowardDegrees));
  const steps = Math.max(1, Math.ceil(distanceMetres / STEP_METRES));
  const marks = Array.from({ length: steps + 1 }, (_, index) => (index / steps) * distanceMetres);
  const whole = unbrokenLine(window, [...marks.filter((mark) => mark < seenMetres), seenMetres, ...marks.filter((mark) => mark > seenMetres)].map(at));
  const openVertices = marks.filter((mark) => mark < seenMetres).length + 1;
  const blocked = seenMetres < distanceMetres;
  return {
    open: whole.slice(0, openVertices),
    beyond: blocked ? whole.slice(openVertices - 1) : [],
    blockedAt: blocked ? pointInWindow(window, at(seenMetres)) : null,
  };
}

function firstBlockMetres(sight: SightTable | null, headsTowardDegrees: number): number {
  if (sight === null) return Infinity;
  const bearings = sight.firstBlockMetres.length;
  const index = Math.round((((headsTowardDegrees % 360) + 360) % 360) / sight.stepDegrees) % bearings;
  return sight.firstBlockMetres[index] ?? Infinity;
}
