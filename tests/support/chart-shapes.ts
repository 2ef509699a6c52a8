import type { ChartArea, ChartLine } from "#lib/chart/chart-point.ts";
import type { Position } from "#lib/core/units/position.ts";

/** Radius of the sphere of the same area as WGS84 (m), and its first eccentricity squared; from memory. */
const AUTHALIC_RADIUS_METRES = 6_371_007.181;
const ECCENTRICITY_SQUARED = 0.006_694_379_990_141;

/** Whether a position lies inside, by the even-odd rule of plane geometry, in any of the area's copies. */
export function areaHolds(area: ChartArea, position: Position): boolean {
  const { latitudeDegrees: y } = position;
  return [-720, -360, 0, 360, 720].some((turn) => {
    const x = position.longitudeDegrees + turn;
    let inside = false;
    for (const line of area.flat()) if (crossingsToTheEast(line, x, y) % 2 === 1) inside = !inside;
    return inside;
  });
}

function crossingsToTheEast(line: ChartLine, x: number, y: number): number {
  let count = 0;
  line.forEach(([y1, x1], index) => {
    const [y2, x2] = line[(index + 1) % line.length] ?? [y1, x1];
    if (y1 > y !== y2 > y && x < x1 + ((y - y1) / (y2 - y1)) * (x2 - x1)) count += 1;
  });
  return count;
}

/** Area on the ellipsoid (m2): the sum of sin(authalic latitude) d(longitude) round each line, holes taken off. */
export function areaSquareMetres(area: ChartArea): number {
  let total = 0;
  for (const [outer, ...holes] of area) {
    if (outer !== undefined) total += Math.abs(lineIntegral(outer));
    for (const hole of holes) total -= Math.abs(lineIntegral(hole));
  }
  return total * AUTHALIC_RADIUS_METRES ** 2;
}

function lineIntegral(line: ChartLine): number {
  let sum = 0;
  line.forEach(([y1, x1], index) => {
    const [y2, x2] = line[(index + 1) % line.length] ?? [y1, x1];
    sum += (((x2 - x1) * Math.PI) / 180) * (sinAuthalic(y1) + sinAuthalic(y2)) * 0.5;
  });
  return sum;
}

/** Snyder 1987, Map projections: a working manual, equations 3-11 and 3-12, from memory. */
function sinAuthalic(latitudeDegrees: number): number {
  const q = snyderQ(Math.sin((latitudeDegrees * Math.PI) / 180));
  return q / snyderQ(1);
}

function snyderQ(sine: number): number {
  const e = Math.sqrt(ECCENTRICITY_SQUARED);
  const es = e * sine;
  return (1 - ECCENTRICITY_SQUARED) * (sine / (1 - es * es) - Math.log((1 - es) / (1 + es)) / (2 * e));
}
