import type { Position } from "#lib/core/units/position.ts";
import { legBetween, pointAlong, roughMetres } from "./ellipsoid.ts";
import type { RandomStream } from "./random.ts";
import type { NetworkStation } from "./simulated-event.ts";
import { seaPoint, type World } from "./world.ts";

const NEAREST_METRES = 1_500_000;
const FARTHEST_METRES = 12_000_000;
const COAST_METRES = 300_000;

export interface DrawnNetwork {
  readonly stations: readonly NetworkStation[];
  readonly storm: Position;
}

interface NetworkChoice {
  readonly world: World;
  readonly random: RandomStream;
  readonly count: number;
  /** How far from the middle of the network its stations lie at most; small for stations of one coast. */
  readonly reachMetres?: number;
  /** Stations to choose from; drawn anew along the coasts where there are none. */
  readonly pool?: readonly NetworkStation[];
  /** Only storms that every station sees over open water. */
  readonly inSight?: boolean;
}

/** Stations off the coasts of one ocean, and a storm anywhere in the sea 1500 to 12,000 km from each of them. */
export function drawNetwork(choice: NetworkChoice): DrawnNetwork {
  for (;;) {
    const stations = drawStations(choice);
    if (!stations) continue;
    for (let attempt = 0; attempt < 60; attempt++) {
      const storm = seaPoint(choice.world, choice.random);
      if (stations.every(({ position }) => suits(choice, position, storm))) return { stations, storm };
    }
  }
}

/** Stations off coasts all over the world, for `pool`. */
export function drawCoastalStations({ world, random, count }: { world: World; random: RandomStream; count: number }): NetworkStation[] {
  const stations: NetworkStation[] = [];
  while (stations.length < count) {
    const position = seaPoint(world, random);
    if (Math.abs(position.latitudeDegrees) < 62 && isCoastal(world, position)) stations.push({ id: `p${stations.length + 1}`, position });
  }
  return stations;
}

export function isWithinReach(station: Position, storm: Position): boolean {
  if (roughMetres(station, storm) > 1.01 * FARTHEST_METRES) return false;
  const { distanceMetres } = legBetween(station, storm);
  return distanceMetres >= NEAREST_METRES && distanceMetres <= FARTHEST_METRES;
}

function suits(choice: NetworkChoice, station: Position, storm: Position): boolean {
  return isWithinReach(station, storm) && (!choice.inSight || choice.world.isOpen({ station, storm }));
}

function drawStations(choice: NetworkChoice): NetworkStation[] | null {
  const { world, random, count, pool, reachMetres = 6_500_000 } = choice;
  const centre = seaPoint(world, random);
  const near = (position: Position): boolean => roughMetres(centre, position) < reachMetres;
  if (pool) {
    const candidates = pool.filter(({ position }) => near(position));
    if (candidates.length < count) return null;
    return Array.from({ length: count }, () => candidates.splice(random.whole(0, candidates.length - 1), 1)).flat();
  }
  const stations: NetworkStation[] = [];
  for (let attempt = 0; attempt < 4000 && stations.length < count; attempt++) {
    const position = pointAlong(centre, {
      distanceMetres: reachMetres * Math.sqrt(random.uniform()),
      headsTowardDegrees: random.between(0, 360),
    });
    if (Math.abs(position.latitudeDegrees) > 62 || !world.isSea(position) || !isCoastal(world, position)) continue;
    stations.push({ id: `s${stations.length + 1}`, position });
  }
  return stations.length === count ? stations : null;
}

function isCoastal(world: World, position: Position): boolean {
  return [0, 45, 90, 135, 180, 225, 270, 315].some((headsTowardDegrees) =>
    [COAST_METRES / 3, COAST_METRES].some((distanceMetres) => !world.isSea(pointAlong(position, { distanceMetres, headsTowardDegrees }))),
  );
}
