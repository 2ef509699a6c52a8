import { requirePositive, requireWithin } from "../failures/require.ts";
import type { Position } from "../units/position.ts";
import { HALF_GIRTH_METRES } from "./earth.ts";
import { geodesicDirect } from "./geodesic.ts";

/** All points at one geodesic distance from a centre. */
export interface Ring {
  readonly centre: Position;
  readonly radiusMetres: number;
}

/**
 * Vertices of a geodesic circle, by the direct problem at evenly spaced headings clockwise from north; the first is
 * not repeated at the end. Longitudes are in [-180, 180]: neighbours may lie on either side of the 180th meridian.
 *
 * @throws RangeError at `radiusMetres` beyond half the girth, or at `vertices`.
 */
export function geodesicRing({ centre, radiusMetres, vertices }: Ring & { readonly vertices: number }): Position[] {
  requireWithin(radiusMetres, 0, HALF_GIRTH_METRES, "radiusMetres", "A ring's radius", "metres");
  requirePositive(vertices, "vertices", "The number of vertices", "points");
  return Array.from({ length: vertices }, (_, index) => {
    const headsTowardDegrees = (360 * index) / vertices;
    return geodesicDirect({ from: centre, headsTowardDegrees, distanceMetres: radiusMetres }).position;
  });
}
