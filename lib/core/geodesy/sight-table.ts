import { MEAN_RADIUS_METRES } from "./earth.ts";

/**
 * How far a station sees over water, by bearing: `firstBlockMetres[i]` is the distance along the great circle that
 * leaves the station on bearing `i * stepDegrees` (clockwise from true north) to the first land that blocks it, and
 * Infinity where none does within half the Earth's girth.
 */
export interface SightTable {
  readonly stepDegrees: number;
  readonly firstBlockMetres: Float64Array;
}

/** A disc about a candidate source, from the station: `bearingDegrees` is the heading on which the way leaves it. */
export interface SightedDisc {
  readonly table: SightTable;
  readonly bearingDegrees: number;
  readonly distanceMetres: number;
  readonly discRadiusMetres: number;
}

const DEGREE = Math.PI / 180;

/**
 * Fraction, 0 to 1, of a disc's area that a station sees: each of the table's bearings that the disc subtends carries
 * the part of the disc along it. Right also where the disc holds the station or its antipode, which every bearing
 * meets. On the mean sphere.
 *   (1)  sin beta = sin rho / sin delta           half the angle subtended, delta distance and rho radius as arcs
 *   (2)  tan m = tan delta cos phi                middle of the chord on a bearing phi off the centre's
 *   (3)  cos h = cos rho / sqrt(1 - sin^2 delta sin^2 phi)      half the chord
 *   (4)  cos(m - h) - cos(m + h)                  its weight: the area of the sphere between two bearings
 */
export function visibleFraction({ table, bearingDegrees, distanceMetres, discRadiusMetres }: SightedDisc): number {
  const { stepDegrees, firstBlockMetres } = table;
  const count = firstBlockMetres.length;
  const delta = Math.min(distanceMetres / MEAN_RADIUS_METRES, Math.PI);
  const rho = discRadiusMetres / MEAN_RADIUS_METRES;
  const ratio = Math.sin(rho) / Math.sin(delta);
  const halfTurn = ratio < 1 ? Math.asin(ratio) / DEGREE : 180; // (1)
  let first = Math.ceil((bearingDegrees - halfTurn) / stepDegrees);
  let last = Math.floor((bearingDegrees + halfTurn) / stepDegrees);
  if (last < first) first = last = Math.round(bearingDegrees / stepDegrees); // a disc between two bearings
  last = Math.min(last, first + count - 1);

  let nearest = Infinity;
  let farthest = 0;
  for (let index = first; index <= last; index += 1) {
    const block = firstBlockMetres[(index + 2 * count) % count] ?? NaN;
    if (block < nearest) nearest = block;
    if (block > farthest) farthest = block;
  }
  if (nearest >= distanceMetres + discRadiusMetres || nearest === Infinity) return 1;
  if (farthest <= distanceMetres - discRadiusMetres) return 0;
  return weighedFraction({ table, bearingDegrees, delta, rho, first, last });
}

/** The fraction of a disc that is in sight in part, over the bearings from `first` to `last`. */
function weighedFraction(disc: {
  table: SightTable;
  bearingDegrees: number;
  delta: number;
  rho: number;
  first: number;
  last: number;
}): number {
  const { stepDegrees, firstBlockMetres } = disc.table;
  const count = firstBlockMetres.length;
  const sinDelta = Math.sin(disc.delta);
  const cosDelta = Math.cos(disc.delta);
  const cosRho = Math.cos(disc.rho);
  let seen = 0;
  let all = 0;
  for (let index = disc.first; index <= disc.last; index += 1) {
    const phi = (index * stepDegrees - disc.bearingDegrees) * DEGREE;
    const sinOff = sinDelta * Math.sin(phi);
    const turned = Math.atan2(sinDelta * Math.cos(phi), cosDelta);
    const middle = turned < -Math.PI / 2 ? turned + 2 * Math.PI : turned; // (2); past the antipode
    const half = Math.acos(Math.min(1, cosRho / Math.sqrt(1 - sinOff * sinOff))); // (3)
    const near = Math.max(0, middle - half);
    const far = Math.min(Math.PI, middle + half);
    if (far <= near) continue;
    const block = (firstBlockMetres[(index + 2 * count) % count] ?? NaN) / MEAN_RADIUS_METRES;
    const seenTo = Math.min(far, block);
    all += Math.cos(near) - Math.cos(far); // (4)
    if (seenTo > near) seen += Math.cos(near) - Math.cos(seenTo);
  }
  return all > 0 ? seen / all : seenAtCentre(disc);
}

/** For a disc so small that no bearing of the table cuts it: whether its centre is in sight. */
function seenAtCentre(disc: { table: SightTable; delta: number; first: number }): number {
  const { firstBlockMetres } = disc.table;
  const count = firstBlockMetres.length;
  const block = firstBlockMetres[(disc.first + 2 * count) % count] ?? NaN;
  return block >= disc.delta * MEAN_RADIUS_METRES ? 1 : 0;
}
