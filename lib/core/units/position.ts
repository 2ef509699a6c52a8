/** A point on the WGS84 ellipsoid: geodetic latitude, north positive; longitude, east positive, -180 to 180. */
export interface Position {
  readonly latitudeDegrees: number;
  readonly longitudeDegrees: number;
}

/** The same meridian, named within [-180, 180). One that is named so already keeps its last digit. */
export function wrapLongitudeDegrees(longitudeDegrees: number): number {
  if (longitudeDegrees >= -180 && longitudeDegrees < 180) return longitudeDegrees;
  return ((((longitudeDegrees + 180) % 360) + 360) % 360) - 180;
}
