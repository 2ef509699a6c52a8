import type { Polygon, Position as Pair } from "geojson";
import { HALF_GIRTH_METRES } from "#lib/core/geodesy/earth.ts";
import { geodesicRing } from "#lib/core/geodesy/ring.ts";
import type { Position } from "#lib/core/units/position.ts";
import type { ChartLine } from "./chart-point.ts";
import type { ChartWindow } from "./chart-window.ts";
import { unbrokenLine } from "./unbroken-line.ts";

/**
 * One vertex a degree of azimuth. A side then leaves the true circle by at most s^2 cot(r/R) / (8 R), s the side's
 * length: under 125 m for every radius, a thousandth of a ring's usual error.
 */
const RING_VERTICES = 360;

/** Nearer to the antipode than this the circle folds over itself on the ellipsoid and bounds nothing. */
const ANTIPODE_MARGIN_METRES = 100_000;

/** All points at one geodesic distance from a station, as a closed line. */
export function ringLine(window: ChartWindow, ring: { centre: Position; radiusMetres: number }): ChartLine {
  const vertices = geodesicRing({ ...ring, vertices: RING_VERTICES });
  const [first] = vertices;
  return unbrokenLine(window, first === undefined ? [] : [...vertices, first]);
}

/**
 * The band between two geodesic circles about a station, as a spherical polygon: its inside lies to the right of each
 * boundary, as d3 reads it, so that bands wider than a hemisphere or round a pole mean what they say. An inner radius
 * of zero or less leaves a disc, an outer one near half the girth leaves all that lies beyond the inner circle.
 * Null where that is the whole Earth.
 */
export function bandPolygon(band: {
  centre: Position;
  innerMetres: number;
  outerMetres: number;
}): Polygon | null {
  const { centre, innerMetres, outerMetres } = band;
  const boundaries: Pair[][] = [];
  if (outerMetres < HALF_GIRTH_METRES - ANTIPODE_MARGIN_METRES) boundaries.push(clockwise(centre, outerMetres));
  if (innerMetres > 0) boundaries.push(clockwise(centre, innerMetres).reverse());
  return boundaries.length === 0 ? null : { type: "Polygon", coordinates: boundaries };
}

function clockwise(centre: Position, radiusMetres: number): Pair[] {
  const vertices = geodesicRing({ centre, radiusMetres, vertices: RING_VERTICES });
  const [first] = vertices;
  const closed = first === undefined ? [] : [...vertices, first];
  return closed.map((vertex) => [vertex.longitudeDegrees, vertex.latitudeDegrees]);
}
