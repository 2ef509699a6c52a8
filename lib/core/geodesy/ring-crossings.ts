import { requireWithin } from "../failures/require.ts";
import type { Position } from "../units/position.ts";
import { bracketedRoot } from "./bracketed-root.ts";
import { HALF_GIRTH_METRES } from "./earth.ts";
import { geodesicDirect, geodesicInverse, type Geodesic } from "./geodesic.ts";
import type { Ring } from "./ring.ts";
import { sphericalTriangleAngle } from "./spherical-crossings.ts";

export type RingCrossings =
  | { readonly kind: "cross"; readonly points: readonly [Position, Position] }
  | { readonly kind: "touch"; readonly points: readonly [Position] }
  | { readonly kind: "apart"; readonly gapMetres: number }
  | { readonly kind: "same-circle" };

const TOUCH_METRES = 1;
const SETTLED_METRES = 1e-3;
/** How far from half the girth the flattening lets antipodes and the circles about them differ, and some more. */
const ANTIPODAL_METRES = 70_000;

/** A point of the first ring, by its heading from the first centre, and its distance from the second centre. */
interface OnFirst {
  readonly headsTowardDegrees: number;
  readonly distanceMetres: number;
}

/**
 * Where two geodesic circles of the ellipsoid cross: both points on both rings to a millimetre.
 *
 * Going round the first ring, the distance from the second centre rises from its least, straight toward that centre,
 * to its greatest on the other side, and falls again; the crossings are where it equals the second radius. The
 * spherical triangle gives a first guess of the heading. Of two points the first lies right of the way from the first
 * centre to the second. Rings that miss each other by less than 1 m touch. Rings about (nearly) antipodal centres
 * that differ nowhere by more than the flattening makes of one circle (70 km) are the same circle: their crossings
 * would say nothing.
 *
 * @throws RangeError at `first.radiusMetres` or `second.radiusMetres` beyond half the girth.
 */
export function ringCrossings({ first, second }: { first: Ring; second: Ring }): RingCrossings {
  requireWithin(first.radiusMetres, 0, HALF_GIRTH_METRES, "first.radiusMetres", "A ring's radius", "metres");
  requireWithin(second.radiusMetres, 0, HALF_GIRTH_METRES, "second.radiusMetres", "A ring's radius", "metres");
  const between = geodesicInverse({ from: first.centre, to: second.centre });
  const missBy = (headsTowardDegrees: number) =>
    distanceFromSecond(first, second, headsTowardDegrees) - second.radiusMetres;
  const nearest = onFirst(first, second, between.departsTowardDegrees);
  const farthest = farthestOnFirst(first, second, between);
  const slack = between.distanceMetres > HALF_GIRTH_METRES - ANTIPODAL_METRES ? ANTIPODAL_METRES : TOUCH_METRES;
  const below = nearest.distanceMetres - second.radiusMetres;
  const above = farthest.distanceMetres - second.radiusMetres;

  const round = first.radiusMetres > TOUCH_METRES; // a ring without a radius is a point, and meets no ring twice
  if (round && Math.abs(below) <= slack && Math.abs(above) <= slack) return { kind: "same-circle" };
  if (below > TOUCH_METRES) return { kind: "apart", gapMetres: below };
  if (above < -TOUCH_METRES) return { kind: "apart", gapMetres: -above };
  if (below > -TOUCH_METRES) return { kind: "touch", points: [pointOn(first, nearest.headsTowardDegrees)] };
  if (above < TOUCH_METRES) return { kind: "touch", points: [pointOn(first, farthest.headsTowardDegrees)] };

  const start = nearest.headsTowardDegrees;
  const guess = guessedAngle(first, second, between);
  const end = start + ((farthest.headsTowardDegrees - start + 720) % 360);
  const right = crossingBetween({ missBy, start, end, guess: start + guess, below, above });
  const left = crossingBetween({ missBy, start: start + 360, end, guess: start + 360 - guess, below, above });
  return { kind: "cross", points: [pointOn(first, right), pointOn(first, left)] };
}

/** The heading between the nearest and the farthest point at which the first ring meets the second. */
function crossingBetween(part: {
  missBy: (headsTowardDegrees: number) => number;
  start: number;
  end: number;
  guess: number;
  below: number;
  above: number;
}): number {
  const { missBy, start, end, guess, below, above } = part;
  const search = { evaluate: missBy, settledWithin: SETTLED_METRES };
  const inside = (guess - start) * (guess - end) < 0;
  if (!inside) return bracketedRoot({ ...search, low: start, lowValue: below, high: end, highValue: above });
  const value = missBy(guess);
  if (Math.abs(value) <= SETTLED_METRES) return guess;
  return value < 0
    ? bracketedRoot({ ...search, low: end, lowValue: above, high: guess, highValue: value })
    : bracketedRoot({ ...search, low: start, lowValue: below, high: guess, highValue: value });
}

/**
 * The point of the first ring that is farthest from the second centre. It lies straight away from that centre while
 * the way there, over the first centre, is a shortest way; past the antipodes it is looked for.
 */
function farthestOnFirst(first: Ring, second: Ring, between: Geodesic): OnFirst {
  const away = onFirst(first, second, between.departsTowardDegrees + 180);
  const antipodal = between.distanceMetres > HALF_GIRTH_METRES - ANTIPODAL_METRES;
  const shortest = between.distanceMetres + first.radiusMetres < HALF_GIRTH_METRES - ANTIPODAL_METRES;
  const clear = away.distanceMetres > second.radiusMetres + ANTIPODAL_METRES && !antipodal;
  if (shortest || clear) return away;

  let best = away;
  for (let widthDegrees = 180; widthDegrees > 1e-4; widthDegrees /= 3) {
    const middle = best.headsTowardDegrees;
    for (let step = -4; step <= 4; step += 1) {
      const candidate = onFirst(first, second, middle + (step * widthDegrees) / 4);
      if (candidate.distanceMetres > best.distanceMetres) best = candidate;
    }
  }
  return best;
}

function guessedAngle(first: Ring, second: Ring, between: Geodesic): number {
  const degreesOf = (metres: number) => (180 * metres) / HALF_GIRTH_METRES;
  return sphericalTriangleAngle({
    adjacentDegrees: degreesOf(between.distanceMetres),
    otherAdjacentDegrees: degreesOf(first.radiusMetres),
    oppositeDegrees: degreesOf(second.radiusMetres),
  });
}

function onFirst(first: Ring, second: Ring, headsTowardDegrees: number): OnFirst {
  return { headsTowardDegrees, distanceMetres: distanceFromSecond(first, second, headsTowardDegrees) };
}

function distanceFromSecond(first: Ring, second: Ring, headsTowardDegrees: number): number {
  return geodesicInverse({ from: second.centre, to: pointOn(first, headsTowardDegrees) }).distanceMetres;
}

function pointOn({ centre, radiusMetres }: Ring, headsTowardDegrees: number): Position {
  return geodesicDirect({ from: centre, headsTowardDegrees, distanceMetres: radiusMetres }).position;
}
