import type { MultiPolygon, Position as Pair } from "geojson";

/** What RFC 7946 asks of a region cut for a flat map, and is not there: a sentence for each fault. */
export function faultsOf({ coordinates }: MultiPolygon): string[] {
  return coordinates.flatMap((rings, polygon) => rings.flatMap((ring, index) => ringFaults(ring, index === 0).map((fault) => `ring ${index} of polygon ${polygon} ${fault}`)));
}

function ringFaults(ring: readonly Pair[], isOutline: boolean): string[] {
  const faults: string[] = [];
  const [first = [], last = []] = [ring[0], ring.at(-1)];
  if (ring.length < 4) faults.push(`has ${ring.length} positions`);
  if (first[0] !== last[0] || first[1] !== last[1]) faults.push("is not closed");
  if (ring.some(([x = NaN, y = NaN]) => !(Math.abs(x) <= 180 && Math.abs(y) <= 90))) faults.push("leaves the map");
  if (twiceArea(ring) > 0 !== isOutline) faults.push(isOutline ? "runs clockwise" : "is a hole that runs counter-clockwise");
  const leaps = pairsOf(ring).filter(([[x1 = NaN, y1 = NaN], [x2 = NaN, y2 = NaN]]) => Math.abs(x2 - x1) > 180 && !(Math.abs(y1) === 90 && y1 === y2));
  if (leaps.length > 0) faults.push(`crosses the 180th meridian ${leaps.length} times`);
  return faults;
}

/** Area (m2) on WGS84 of a region whose sides are straight on the map of longitude and latitude. */
export function regionArea({ coordinates }: MultiPolygon): number {
  return coordinates.reduce((sum, rings) => sum + rings.reduce((inner, ring) => inner + ringArea(ring), 0), 0);
}

/** Counter-clockwise is positive: the zone below each side, by Simpson's rule along it. */
function ringArea(ring: readonly Pair[]): number {
  return pairsOf(ring).reduce((sum, [[x1 = NaN, y1 = NaN], [x2 = NaN, y2 = NaN]]) => {
    const zone = (zoneTo(y1) + 4 * zoneTo((y1 + y2) / 2) + zoneTo(y2)) / 6;
    return sum - (((x2 - x1) * Math.PI) / 180) * zone;
  }, 0);
}

/** Area (m2) from the equator to a latitude, a radian of longitude wide, in closed form. */
function zoneTo(latitudeDegrees: number): number {
  const [a, f] = [6_378_137, 1 / 298.257223563];
  const e = Math.sqrt(f * (2 - f));
  const sine = Math.sin((latitudeDegrees * Math.PI) / 180);
  return ((a * (1 - f)) ** 2 / 2) * (sine / (1 - (e * sine) ** 2) + Math.atanh(e * sine) / e);
}

function twiceArea(ring: readonly Pair[]): number {
  return pairsOf(ring).reduce((sum, [[x1 = NaN, y1 = NaN], [x2 = NaN, y2 = NaN]]) => sum + x1 * y2 - x2 * y1, 0);
}

function pairsOf(ring: readonly Pair[]): [Pair, Pair][] {
  return ring.slice(1).flatMap((to, index) => (ring[index] ? [[ring[index], to] as [Pair, Pair]] : []));
}
