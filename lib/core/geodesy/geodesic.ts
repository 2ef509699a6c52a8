import geographiclib from "geographiclib-geodesic";
import { requireWithin } from "../failures/require.ts";
import type { Position } from "../units/position.ts";
import { wrapBearingDegrees } from "./bearing.ts";

/** The shortest way over the ellipsoid. Both bearings are headings (toward), clockwise from true north, in [0, 360). */
export interface Geodesic {
  readonly distanceMetres: number;
  readonly departsTowardDegrees: number;
  readonly arrivesTowardDegrees: number;
}

const { WGS84 } = geographiclib.Geodesic;

/**
 * Distance and headings of the shortest way between two points on the WGS84 ellipsoid, to 15 nanometres.
 * [source: karney-2013] Between antipodes and between the poles several ways are equally short, and one is given;
 * between coincident points the headings mean nothing.
 *
 * @throws RangeError at `from.latitudeDegrees` or `to.latitudeDegrees` beyond 90 degrees.
 */
export function geodesicInverse({ from, to }: { from: Position; to: Position }): Geodesic {
  requireLatitude(from, "from.latitudeDegrees");
  requireLatitude(to, "to.latitudeDegrees");
  const { latitudeDegrees, longitudeDegrees } = from;
  const way = WGS84.Inverse(latitudeDegrees, longitudeDegrees, to.latitudeDegrees, to.longitudeDegrees);
  return {
    distanceMetres: way.s12 ?? NaN,
    departsTowardDegrees: wrapBearingDegrees(way.azi1 ?? NaN),
    arrivesTowardDegrees: wrapBearingDegrees(way.azi2 ?? NaN),
  };
}

/**
 * Where one arrives by keeping to the geodesic that leaves `from` on a heading, and the heading there; right also
 * beyond half the girth, where the geodesic is no longer the shortest way. [source: karney-2013]
 *
 * @throws RangeError at `from.latitudeDegrees` beyond 90 degrees.
 */
export function geodesicDirect(leg: { from: Position; headsTowardDegrees: number; distanceMetres: number }): {
  position: Position;
  arrivesTowardDegrees: number;
} {
  const { from, headsTowardDegrees, distanceMetres } = leg;
  requireLatitude(from, "from.latitudeDegrees");
  const end = WGS84.Direct(from.latitudeDegrees, from.longitudeDegrees, headsTowardDegrees, distanceMetres);
  return {
    position: { latitudeDegrees: end.lat2 ?? NaN, longitudeDegrees: end.lon2 ?? NaN },
    arrivesTowardDegrees: wrapBearingDegrees(end.azi2 ?? NaN),
  };
}

function requireLatitude(position: Position, path: string): void {
  requireWithin(position.latitudeDegrees, -90, 90, path, "Latitude", "degrees");
}
