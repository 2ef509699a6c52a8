import { feature } from "topojson-client";
import type { Feature, FeatureCollection, Position as Coordinates } from "geojson";
import type { Topology } from "topojson-specification";

/**
 * For each latitude row, the longitudes (degrees, rising) at which one passes between water and land when going east
 * from 180 W along the row's middle, which starts in water: land lies between the first and the second, the third and
 * the fourth, and from a last one without a partner to 180 E. A row that starts on land begins with -180. Outlines may
 * run either way round, be holes, cross the 180th meridian and hold the south pole; the north pole lies in water.
 *
 * @throws Error where `topology.objects.land` holds no polygons.
 */
export function rowCrossings(grid: { topology: Topology; rows: number; rowsPerDegree: number }): Float64Array[] {
  const crossings: number[][] = Array.from({ length: grid.rows }, () => []);
  for (const outline of landOutlines(grid.topology)) addOutline(crossings, outline, grid.rowsPerDegree);
  return crossings.map((longitudes) => Float64Array.from(longitudes).sort());
}

function addOutline(crossings: readonly number[][], outline: readonly Coordinates[], rowsPerDegree: number): void {
  let [fromLongitude = NaN, fromLatitude = NaN] = outline[0] ?? [];
  for (const [toLongitude = NaN, toLatitude = NaN] of outline) {
    const turns = toLongitude - fromLongitude;
    const eastward = turns > 180 ? turns - 360 : turns < -180 ? turns + 360 : turns; // the short way round
    const low = rowAbove(Math.min(fromLatitude, toLatitude), rowsPerDegree);
    const end = rowAbove(Math.max(fromLatitude, toLatitude), rowsPerDegree);
    for (let row = low; row < end; row += 1) {
      const part = ((row + 0.5) / rowsPerDegree - 90 - fromLatitude) / (toLatitude - fromLatitude);
      crossings[row]?.push(withinHalfTurn(fromLongitude + part * eastward));
    }
    if (eastward !== turns) {
      const part = eastward === 0 ? 1 : (Math.sign(eastward) * 180 - fromLongitude) / eastward; // 0: along the meridian
      const meridianLatitude = fromLatitude + part * (toLatitude - fromLatitude);
      for (const row of crossings.slice(0, rowAbove(meridianLatitude, rowsPerDegree))) row.push(-180);
    }
    fromLongitude = toLongitude;
    fromLatitude = toLatitude;
  }
}

/** The first row whose middle lies on or above a latitude: a middle on a vertex counts with the edge above it only. */
function rowAbove(latitudeDegrees: number, rowsPerDegree: number): number {
  return Math.max(0, Math.ceil((latitudeDegrees + 90) * rowsPerDegree - 0.5));
}

function withinHalfTurn(longitudeDegrees: number): number {
  if (longitudeDegrees > 180) return longitudeDegrees - 360;
  return longitudeDegrees < -180 ? longitudeDegrees + 360 : longitudeDegrees;
}

function landOutlines(topology: Topology): Coordinates[][] {
  const land = topology.objects.land;
  const found: Feature | FeatureCollection | null = land === undefined ? null : feature(topology, land);
  const features = found === null ? [] : found.type === "FeatureCollection" ? found.features : [found];
  const outlines = features.flatMap(({ geometry }) => {
    if (geometry.type === "Polygon") return geometry.coordinates;
    return geometry.type === "MultiPolygon" ? geometry.coordinates.flat() : [];
  });
  if (outlines.length > 0) return outlines;
  throw new Error("The land outlines hold no polygons under the name land.");
}
