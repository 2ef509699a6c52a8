import type { Position } from "#lib/core/units/position.ts";
import type { MultiPolygon } from "geojson";

/**
 * Whether a region of RFC 7946 (split at the antimeridian, closed along the map's edge round a pole) holds a point:
 * the parity of the edges that a line eastward from it crosses on the plane of longitude and latitude.
 */
export function regionContains(region: MultiPolygon, { latitudeDegrees, longitudeDegrees }: Position): boolean {
  return region.coordinates.some((rings) => {
    let inside = false;
    for (const ring of rings) {
      for (let i = 1; i < ring.length; i++) {
        const [x1 = NaN, y1 = NaN] = ring[i - 1] ?? [];
        const [x2 = NaN, y2 = NaN] = ring[i] ?? [];
        if (y1 > latitudeDegrees === y2 > latitudeDegrees) continue;
        if (x1 + ((latitudeDegrees - y1) / (y2 - y1)) * (x2 - x1) > longitudeDegrees) inside = !inside;
      }
    }
    return inside;
  });
}
