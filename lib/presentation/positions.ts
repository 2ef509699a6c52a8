import { wrapLongitudeDegrees, type Position } from "#lib/core/units/position.ts";

/**
 * A position as it is said at sea: degrees with one decimal (11 km of latitude), which is finer than swell can place a
 * storm and coarse enough to be read out.
 */
export function positionParts(position: Position): { latitude: string; longitude: string } {
  return {
    latitude: hemisphere(position.latitudeDegrees, "N", "S"),
    longitude: hemisphere(wrapLongitudeDegrees(position.longitudeDegrees), "E", "W"),
  };
}

export function positionWords(position: Position): string {
  const { latitude, longitude } = positionParts(position);
  return `${latitude} ${longitude}`;
}

function hemisphere(degrees: number, positive: string, negative: string): string {
  const size = Math.abs(degrees).toFixed(1);
  if (size === "0.0") return "0.0°";
  return `${size}°\u00a0${degrees < 0 ? negative : positive}`;
}
