import { requireWithin } from "../failures/require.ts";
import type { Position } from "../units/position.ts";
import { headingVector, sphericalDirect, sphericalFrame, type Vector } from "./spherical-frame.ts";

/** All points at one angular distance from a centre, on a sphere. */
export interface SphericalRing {
  readonly centre: Position;
  readonly radiusDegrees: number;
}

export type SphericalCrossings =
  | { readonly kind: "cross"; readonly points: readonly [Position, Position] }
  | { readonly kind: "touch"; readonly points: readonly [Position] }
  | { readonly kind: "apart"; readonly gapDegrees: number }
  | { readonly kind: "same-circle" };

const TOUCH_DEGREES = 1e-9;

/**
 * Where two circles on a sphere cross. With separation d of the centres and radii r and q they cross while
 * |r - q| < d < min(r + q, 360 - r - q). Of two points the first lies right of the way from centre to centre.
 * Plane spherical trigonometry, no source needed: the half-angle formula, see `sphericalTriangleAngle`.
 *
 * @throws RangeError at `first.radiusDegrees` or `second.radiusDegrees` outside [0, 180].
 */
export function sphericalCrossings({ first, second }: { first: SphericalRing; second: SphericalRing }): SphericalCrossings {
  requireWithin(first.radiusDegrees, 0, 180, "first.radiusDegrees", "A ring's radius", "degrees");
  requireWithin(second.radiusDegrees, 0, 180, "second.radiusDegrees", "A ring's radius", "degrees");
  const frame = sphericalFrame(first.centre);
  const { up } = sphericalFrame(second.centre);
  const ahead = dot(frame.north, up);
  const aside = dot(frame.east, up);
  const separation = degrees(Math.atan2(Math.hypot(ahead, aside), dot(frame.up, up)));
  const bearing = degrees(Math.atan2(aside, ahead));
  const { radiusDegrees: r } = first;
  const { radiusDegrees: q } = second;

  const gapDegrees = Math.max(separation - r - q, Math.abs(r - q) - separation, r + q + separation - 360);
  if (gapDegrees > TOUCH_DEGREES) return { kind: "apart", gapDegrees };
  if (sameCircle(separation, r, q)) return { kind: "same-circle" };

  const angle = sphericalTriangleAngle({ adjacentDegrees: separation, otherAdjacentDegrees: r, oppositeDegrees: q });
  const pointAt = (headsTowardDegrees: number) =>
    sphericalDirect(frame, headingVector(frame, headsTowardDegrees), (r * Math.PI) / 180);
  if (gapDegrees >= -TOUCH_DEGREES) return { kind: "touch", points: [pointAt(bearing + angle)] };
  return { kind: "cross", points: [pointAt(bearing + angle), pointAt(bearing - angle)] };
}

/**
 * Angle (degrees, 0 to 180) of a spherical triangle between two of its sides, from all three, by
 * tan^2 A/2 = sin(s - b) sin(s - c) / (sin s sin(s - a)), s half the sides' sum: exact also for slim triangles.
 * Sides that close no triangle give the nearest that do, 0 or 180.
 */
export function sphericalTriangleAngle(sides: {
  adjacentDegrees: number;
  otherAdjacentDegrees: number;
  oppositeDegrees: number;
}): number {
  const { adjacentDegrees: b, otherAdjacentDegrees: c, oppositeDegrees: a } = sides;
  const s = (a + b + c) / 2;
  const above = sine(s - b) * sine(s - c);
  const below = sine(s) * sine(s - a);
  return 2 * degrees(Math.atan2(Math.sqrt(Math.max(0, above)), Math.sqrt(Math.max(0, below))));
}

/** About one centre, or about antipodes with radii that make up 180 degrees. */
function sameCircle(separation: number, r: number, q: number): boolean {
  const about = separation < TOUCH_DEGREES && Math.abs(r - q) < TOUCH_DEGREES;
  const opposite = 180 - separation < TOUCH_DEGREES && Math.abs(r + q - 180) < TOUCH_DEGREES;
  return about || opposite;
}

function dot(a: Vector, b: Vector): number {
  return a.x * b.x + a.y * b.y + a.z * b.z;
}

function sine(angleDegrees: number): number {
  return Math.sin((angleDegrees * Math.PI) / 180);
}

function degrees(radians: number): number {
  return (radians * 180) / Math.PI;
}
