import type { NetworkStation, SimulatedEvent } from "../simulator/simulated-event.ts";
import { drawCoastalStations } from "../simulator/draw-network.ts";
import { drawMatchedEvent } from "../simulator/matched-storm.ts";
import { drawPhysicalEvent, type ReadingWay } from "../simulator/physical-readings.ts";
import { randomStream, type RandomStream } from "../simulator/random.ts";
import type { World } from "../simulator/world.ts";
import { drawWrongDayEvent } from "../simulator/wrong-day.ts";
import { drawWrongStationEvent } from "../simulator/wrong-station.ts";

/** A kind of simulated storm, by name: the same seed and number always give the same one. */
export type RecipeName = keyof typeof RECIPES;

interface Ingredients {
  readonly world: World;
  readonly pool: readonly NetworkStation[];
  readonly random: RandomStream;
  /** Land is looked at, and the stations come from the pool whose sight is known. */
  readonly inSight: boolean;
}

export interface Simulation {
  readonly event: SimulatedEvent;
  readonly sight: boolean;
}

/** One storm in so many is simulated and placed with sight on. */
const SIGHT_EVERY = 4;
const POOL_SIZE = 90;

const ONE_COAST_METRES = 900_000;
const CORRECTED: ReadingWay = { kind: "ridge", binWidthHz: 0.005, frequency: "energy-mean" };

const RECIPES = {
  matched: (from: Ingredients) => drawMatchedEvent({ ...from, ...network(from, from.random.whole(3, from.inSight ? 6 : 8)) }),
  "wrong-station": (from: Ingredients) => drawWrongStationEvent({ ...from, ...network(from, 5) }),
  "wrong-day": (from: Ingredients) => drawWrongDayEvent({ ...from, ...network(from, 6), from: "stated-spread" }),
  "wrong-day-waves": (from: Ingredients) => drawWrongDayEvent({ ...from, ...network(from, 6), from: "waves" }),
  "waves-bins-0.005-corrected": (from: Ingredients) => physical(from, CORRECTED),
  "waves-bins-0.005": (from: Ingredients) => physical(from, { ...CORRECTED, frequency: "bin-centre" }),
  "waves-bins-0.01-corrected": (from: Ingredients) => physical(from, { ...CORRECTED, binWidthHz: 0.01 }),
  "waves-bins-0.01": (from: Ingredients) => physical(from, { kind: "ridge", binWidthHz: 0.01, frequency: "bin-centre" }),
  "waves-timed": (from: Ingredients) => physical(from, { kind: "timed", everyHours: 3 }),
  "waves-one-coast": (from: Ingredients) => physical(from, CORRECTED, ONE_COAST_METRES),
} as const;

export function simulate({ recipe, seed, index, world, pool }: { recipe: RecipeName; seed: number; index: number; world: World; pool: readonly NetworkStation[] }): Simulation {
  const sight = index % SIGHT_EVERY === SIGHT_EVERY - 1 && recipe !== "waves-one-coast";
  const random = randomStream(seed, index);
  return { event: RECIPES[recipe]({ world, pool, random, inSight: sight }), sight };
}

export function stationPool(world: World): NetworkStation[] {
  return drawCoastalStations({ world, random: randomStream(1), count: POOL_SIZE });
}

function network({ inSight, pool }: Ingredients, count: number): { count: number; inSight: boolean; pool?: readonly NetworkStation[] } {
  return inSight ? { count, inSight, pool } : { count, inSight };
}

function physical(from: Ingredients, way: ReadingWay, reachMetres?: number): SimulatedEvent {
  const { world, random } = from;
  return drawPhysicalEvent({ world, random, way, ...network(from, 5), ...(reachMetres === undefined ? {} : { reachMetres }) });
}
