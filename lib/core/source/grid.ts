import { cellArea, cellToChildren, cellToLatLng, getRes0Cells, getResolution, UNITS } from "h3-js";
import { areaRatio } from "../geodesy/quick-inverse.ts";
import { wrapLongitudeDegrees, type Position } from "../units/position.ts";

/** Coarsest level of the search: 842 cells over the Earth. */
export const FIRST_LEVEL = 1;
/** Finest: cells of 36 km2 on average. */
export const LAST_LEVEL = 6;

/** Mean edge of H3's hexagons by resolution (m), as its documentation tabulates them. [source: h3] */
const MEAN_EDGE_METRES = [1_281_256, 483_057, 182_513, 68_979, 26_072, 9_854, 3_725] as const;

/** Distance between neighbouring centres (m). */
export function spacingMetres(level: number): number {
  return (MEAN_EDGE_METRES[level] ?? NaN) * Math.sqrt(3);
}

/**
 * How far from a cell's centre any centre of its descendants may lie (m). Children overhang their parent, so it is more than
 * the edge: 1.139 mean edges at most, measured from level 1 to level 6 (tests/reference/grid.test.ts).
 */
export function reachMetres(level: number): number {
  return (MEAN_EDGE_METRES[level] ?? NaN) * 1.15;
}

/** Every cell of the coarsest level. */
export function firstCells(): string[] {
  return getRes0Cells().flatMap((cell) => cellToChildren(cell, FIRST_LEVEL));
}

export function childrenOf(cell: string): string[] {
  return cellToChildren(cell, getResolution(cell) + 1);
}

export function centreOf(cell: string): Position {
  const [latitudeDegrees, longitudeDegrees] = cellToLatLng(cell);
  return { latitudeDegrees, longitudeDegrees: wrapLongitudeDegrees(longitudeDegrees) };
}

/** Area on the ellipsoid (m2): H3's own is on the authalic sphere, and cells vary 1.9-fold at one level. */
export function areaOf(cell: string, centre: Position): number {
  return cellArea(cell, UNITS.m2) * areaRatio(centre.latitudeDegrees);
}
