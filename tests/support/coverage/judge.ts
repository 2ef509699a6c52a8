import type { SourceAnswer } from "#lib/core/source/answer.ts";
import { buildSightTable } from "#lib/core/geodesy/build-sight-table.ts";
import { buildLandMask, type LandMask } from "#lib/core/geodesy/land-mask.ts";
import type { SightTable } from "#lib/core/geodesy/sight-table.ts";
import { DEFAULT_SETTINGS } from "#lib/core/source/settings.ts";
import { solveEvent } from "#lib/core/source/solve-event.ts";
import { legBetween, roughMetres } from "../simulator/ellipsoid.ts";
import type { NetworkStation, SimulatedEvent } from "../simulator/simulated-event.ts";
import { readTopology, readWorld, type World } from "../simulator/world.ts";
import { simulate, stationPool, type RecipeName, type Simulation } from "./recipes.ts";
import { regionContains } from "./region-contains.ts";

/** What the estimator made of one simulated storm, beside the truth. */
export interface Judgement {
  readonly index: number;
  readonly sight: boolean;
  readonly held: { readonly half: boolean; readonly ninety: boolean; readonly ninetyFive: boolean };
  readonly outcome: SourceAnswer["outcome"] | "no-answer";
  /** Null where no source was placed. */
  readonly offMetres: number | null;
  readonly offSeconds: number | null;
  readonly areaSquareMetres: number;
  readonly clock: ClockJudgement;
  readonly wrongBelongs: number | null;
  readonly milliseconds: number;
}

export interface ClockJudgement {
  /** Stations whose clock is right and was called wrong. */
  readonly rightAccused: number;
  readonly rightClocks: number;
  /** Error of the wrong clock's stated offset and its stated standard deviation; null where it was not accused. */
  readonly named: { readonly offSeconds: number; readonly sigmaSeconds: number } | null;
}

export interface Bench {
  readonly world: World;
  readonly land: LandMask;
  readonly pool: readonly NetworkStation[];
  readonly sightTables: ReadonlyMap<string, SightTable>;
}

export function prepareBench(): Bench {
  const topology = readTopology();
  const world = readWorld(topology);
  const land = buildLandMask(topology);
  const pool = stationPool(world);
  const sightTables = new Map(pool.map(({ id, position }) => [id, buildSightTable({ station: position, land })]));
  return { world, land, pool, sightTables };
}

export interface Series {
  readonly recipe: RecipeName;
  readonly seed: number;
  readonly from: number;
  readonly to: number;
}

export function judgeSeries(bench: Bench, { recipe, seed, from, to }: Series): Judgement[] {
  return Array.from({ length: to - from }, (_, i) => {
    const simulation = simulate({ recipe, seed, index: from + i, world: bench.world, pool: bench.pool });
    return judge(bench, simulation, from + i);
  });
}

function judge({ land, sightTables }: Bench, { event, sight }: Simulation, index: number): Judgement {
  const started = performance.now();
  const { answer } = solveEvent({ observations: event.observations, settings: { ...DEFAULT_SETTINGS, sight }, land, sightTables, checks: false });
  const milliseconds = performance.now() - started;
  const holds = (probability: number): boolean => {
    const region = answer?.regions.find((candidate) => candidate.probability === probability);
    return region !== undefined && regionContains(region.geometry, event.truth.position);
  };
  const source = answer?.source ?? null;
  return {
    index,
    sight,
    held: { half: holds(0.5), ninety: holds(0.9), ninetyFive: holds(0.95) },
    outcome: answer?.outcome ?? "no-answer",
    offMetres: source && distanceMetres(source.position, event.truth.position),
    offSeconds: source && source.originEpochSeconds - event.truth.originEpochSeconds,
    areaSquareMetres: answer?.regions.find(({ probability }) => probability === 0.95)?.areaSquareMetres ?? NaN,
    clock: judgeClocks(event, answer),
    wrongBelongs: answer?.stations.find(({ id }) => id === event.wrongStationId)?.belongs ?? null,
    milliseconds,
  };
}

function judgeClocks(event: SimulatedEvent, answer: SourceAnswer | null): ClockJudgement {
  const wrongId = event.clockOffsetSeconds === null ? null : event.wrongStationId;
  const right = (answer?.stations ?? []).filter(({ id }) => id !== wrongId);
  const stated = answer?.stations.find(({ id }) => id === wrongId)?.clockOffset ?? null;
  return {
    rightAccused: right.filter(({ clockOffset }) => clockOffset !== null).length,
    rightClocks: right.length,
    named: stated && { offSeconds: stated.offsetSeconds - (event.clockOffsetSeconds ?? NaN), sigmaSeconds: stated.sigmaSeconds },
  };
}

/** Vincenty's series needs points that are not nearly antipodal; there a sphere does. */
function distanceMetres(a: SimulatedEvent["truth"]["position"], b: SimulatedEvent["truth"]["position"]): number {
  const rough = roughMetres(a, b);
  return rough > 19_000_000 ? rough : legBetween(a, b).distanceMetres;
}
