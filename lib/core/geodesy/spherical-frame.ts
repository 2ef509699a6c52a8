import type { Position } from "../units/position.ts";

const DEGREE = Math.PI / 180;

export interface Vector {
  readonly x: number;
  readonly y: number;
  readonly z: number;
}

/** Unit vectors up, north and east at a point of the sphere; at a pole, north and east of the meridian given. */
export interface SphericalFrame {
  readonly up: Vector;
  readonly north: Vector;
  readonly east: Vector;
}

/**
 * The frame at a position, with x through (0, 0), y through (0, 90 E) and z through the north pole. The sphere's
 * latitude is taken to be the geodetic one, which puts bearings out by at most 0.2 degrees against the ellipsoid.
 */
export function sphericalFrame({ latitudeDegrees, longitudeDegrees }: Position): SphericalFrame {
  const phi = latitudeDegrees * DEGREE;
  const lambda = longitudeDegrees * DEGREE;
  const sinPhi = Math.sin(phi);
  const cosPhi = Math.cos(phi);
  const sinLambda = Math.sin(lambda);
  const cosLambda = Math.cos(lambda);
  return {
    up: { x: cosPhi * cosLambda, y: cosPhi * sinLambda, z: sinPhi },
    north: { x: -sinPhi * cosLambda, y: -sinPhi * sinLambda, z: cosPhi },
    east: { x: -sinLambda, y: cosLambda, z: 0 },
  };
}

/** Unit vector along the surface on a heading, clockwise from north. */
export function headingVector({ north, east }: SphericalFrame, headsTowardDegrees: number): Vector {
  const sinTheta = Math.sin(headsTowardDegrees * DEGREE);
  const cosTheta = Math.cos(headsTowardDegrees * DEGREE);
  return {
    x: north.x * cosTheta + east.x * sinTheta,
    y: north.y * cosTheta + east.y * sinTheta,
    z: north.z * cosTheta + east.z * sinTheta,
  };
}

/** The position reached on the great circle of a heading after an arc; longitude in [-180, 180]. */
export function sphericalDirect({ up }: SphericalFrame, heading: Vector, arcRadians: number): Position {
  const sin = Math.sin(arcRadians);
  const cos = Math.cos(arcRadians);
  const x = up.x * cos + heading.x * sin;
  const y = up.y * cos + heading.y * sin;
  const z = up.z * cos + heading.z * sin;
  // atan2 of both, since asin loses half its digits at the poles
  return { latitudeDegrees: Math.atan2(z, Math.hypot(x, y)) / DEGREE, longitudeDegrees: Math.atan2(y, x) / DEGREE };
}
