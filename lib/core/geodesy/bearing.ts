/** The same bearing, clockwise from true north, named within [0, 360). */
export function wrapBearingDegrees(bearingDegrees: number): number {
  const wrapped = bearingDegrees % 360;
  if (wrapped >= 0) return wrapped + 0; // no negative zero
  return wrapped + 360 < 360 ? wrapped + 360 : 0; // a hair below zero rounds up to 360
}

/** How far one must turn from the first bearing to the second, clockwise positive, within [-180, 180). */
export function turnDegrees(turn: { fromDegrees: number; toDegrees: number }): number {
  return wrapBearingDegrees(turn.toDegrees - turn.fromDegrees + 180) - 180;
}
