import type { LandMask } from "../geodesy/land-mask.ts";
import type { Position } from "../units/position.ts";
import { assess, blankAssessment, type Assessment } from "./assess.ts";
import type { StraySet } from "./belonging.ts";
import { boundAbove, type Floors } from "./bound.ts";
import { conditionAt, narrowed, planSubsets, type Conditioned, type SubsetPlan } from "./conditioned.ts";
import { areaOf, centreOf, childrenOf, firstCells, FIRST_LEVEL, LAST_LEVEL, reachMetres, spacingMetres } from "./grid.ts";
import { neighbourFinder, type NeighboursOf } from "./neighbours.ts";
import type { Network } from "./network.ts";
import type { Peak } from "./peak.ts";
import { cellsHolding } from "./regions.ts";
import { blankSite, mostFromBearings, outlookFrom, quickSite, type Site, type SiteColumns } from "./site.ts";
import { logSum, subsetLogs, weigh, type Weight } from "./weigh.ts";

/** Cells whose best possible density lies this far (natural log) below the best found are left: e^-7.5. */
const PRUNE_DEPTH = 7.5;
/** The same where land is disregarded: what is looked at only to say that it is ruled out. */
const FREE_DEPTH = 6;
/** Subsets of stations that at their very best lie this far below it are not summed. */
const FAINT_SUBSET = 10;
/** Level from which cells share one covariance with all their descendants: within 250 km azimuths turn little. */
const COVARIANCE_LEVEL = 2;
/** More stations than this fix the place so well that the covariance at the best peak serves everywhere. */
const ONE_COVARIANCE_FROM = 13;
/** No answer stops coarser than this. */
const LEAST_LEVEL = 4;
/** Peaks this far below the best do not ask for finer cells. */
const FAINT_PEAK = 6;
const LEAST_CELLS_IN_REGION = 100;
/** A posterior wider than this many cells can carry is left a level coarser: seven children each. */
const MOST_CELLS = 60_000;

export interface WeighedCell extends Weight {
  readonly cell: string;
  readonly centre: Position;
  readonly areaSquareMetres: number;
}

export interface SearchInput {
  readonly network: Network;
  readonly sets: readonly StraySet[];
  readonly land: LandMask | null;
}

export interface Posterior {
  readonly level: number;
  readonly cells: readonly WeighedCell[];
  readonly neighboursOf: NeighboursOf;
  /** Free peaks (land disregarded) by density, best first. */
  readonly peaks: readonly Peak[];
  /** The subsets of stations that weigh anything. */
  readonly plan: SubsetPlan;
}

/** A cell to look at, with the covariance of an ancestor near enough to share it. */
interface Prospect {
  readonly cell: string;
  readonly conditioned: Conditioned | null;
}

/** What every level of a search goes by. */
interface Quest {
  readonly network: Network;
  readonly land: LandMask | null;
  readonly plan: SubsetPlan;
  /** Log density of the best peak, land held against it and land disregarded. */
  readonly heldFloor: number;
  readonly freeFloor: number;
  /** The peak whose covariance serves everywhere, where one does. */
  readonly one: Peak | null;
  /** Room for one look at a cell. */
  readonly columns: SiteColumns;
  readonly blank: Assessment;
}

/**
 * The posterior over the ocean on H3 cells: from 842 cells down, keeping every cell in which a bound leaves room for
 * density, until the spacing is at most half the smallest 1-sigma axis and 100 cells lie in the 95 % region.
 * `peaks`: the network's free peaks, best first. [source: tarantola-valette-1982, h3]
 */
export function searchOcean({ network, sets, land }: SearchInput, peaks: readonly Peak[]): Posterior {
  const heldFloor = Math.max(-Infinity, ...peaks.map((peak) => heldAt(peak, land)));
  const freeFloor = Math.max(-Infinity, ...peaks.map((peak) => peak.logFree));
  const start = planSubsets(network, weighty(peaks, sets, heldFloor - mostFromBearings(network)));
  const one = network.size < ONE_COVARIANCE_FROM ? null : (peaks[0] ?? null);
  let quest: Quest = { network, land, plan: start, heldFloor, freeFloor, columns: blankSite(network), blank: blankAssessment(network, start), one };
  const wanted = wantedLevel(peaks);
  const rough = conditionAt(network, quest.one?.site.azimuths ?? null, quest.plan);
  let prospects: Prospect[] = firstCells().map((cell) => ({ cell, conditioned: rough }));
  for (let level = FIRST_LEVEL; ; level++) {
    if (level >= wanted) {
      const cells = weighCells(quest, prospects);
      const enough = cellsHolding(cells, 0.95).length >= LEAST_CELLS_IN_REGION;
      if (enough || level === LAST_LEVEL) return { level, cells, neighboursOf: neighbourFinder(cells), peaks, plan: quest.plan };
    }
    const { kept, plan } = pruned(quest, prospects, level);
    quest = { ...quest, plan };
    if (7 * kept.length > MOST_CELLS) {
      const cells = weighCells(quest, kept);
      return { level, cells, neighboursOf: neighbourFinder(cells), peaks, plan };
    }
    prospects = kept.flatMap(({ cell, conditioned }) => childrenOf(cell).map((child) => ({ cell: child, conditioned })));
  }
}

/** The cells with room for density within them, and the subsets that weigh anything in any of them. */
function pruned(quest: Quest, prospects: readonly Prospect[], level: number): { kept: Prospect[]; plan: SubsetPlan } {
  const { network, plan, heldFloor, freeFloor } = quest;
  const apart = level < COVARIANCE_LEVEL && !quest.one;
  const floors: Floors = { held: heldFloor - PRUNE_DEPTH, free: freeFloor - FREE_DEPTH };
  const best = new Float64Array(plan.sets.length).fill(-Infinity);
  const kept = prospects.flatMap(({ cell, conditioned: shared }) => {
    const look = lookAt(quest, centreOf(cell), shared);
    const bound = look && boundAbove(floors, { ...look, reachMetres: reachMetres(level), apart });
    if (!bound) return [];
    for (let s = 0; s < best.length; s++) {
      best[s] = Math.max(best[s] ?? NaN, (bound.bySubsetHeld[s] ?? NaN) - heldFloor, (bound.bySubsetFree[s] ?? NaN) - freeFloor);
    }
    return [{ cell, conditioned: look.conditioned }];
  });
  if (apart) return { plan, kept: kept.map(({ cell }) => ({ cell, conditioned: null })) };
  const left = plan.sets.flatMap((_, s) => ((best[s] ?? NaN) > -FAINT_SUBSET ? [s] : []));
  if (left.length === plan.sets.length) return { plan, kept };
  const fewer = planSubsets(network, left.map((s) => plan.sets[s] ?? []));
  const narrow = new Map(kept.map(({ conditioned }) => [conditioned, null as Conditioned | null]));
  for (const conditioned of narrow.keys()) narrow.set(conditioned, narrowed(conditioned, fewer, left));
  return { plan: fewer, kept: kept.map(({ cell, conditioned }) => ({ cell, conditioned: narrow.get(conditioned) ?? null })) };
}

interface Look {
  readonly site: Site;
  readonly conditioned: Conditioned;
  readonly assessment: Assessment;
}

/** A look lasts until the next: its columns are written over. */
function lookAt({ network, plan, columns, blank }: Quest, centre: Position, shared: Conditioned | null): Look | null {
  const site = quickSite(network, centre, columns);
  const conditioned = shared ?? conditionAt(network, site.azimuths, plan);
  return conditioned && { site, conditioned, assessment: assess(conditioned, site.distances, blank) };
}

/** Leaves out cells whose density is nothing beside the best, land or no land. */
function weighCells(quest: Quest, prospects: readonly Prospect[]): WeighedCell[] {
  return prospects.flatMap(({ cell, conditioned: shared }) => {
    const centre = centreOf(cell);
    const look = lookAt(quest, centre, shared);
    if (!look) return [];
    const { site, conditioned, assessment } = look;
    const logs = subsetLogs(conditioned, assessment, site.logBearing);
    if (logSum(logs) < quest.heldFloor - PRUNE_DEPTH) return [];
    const outlook = outlookFrom(quest.network, site, centre, quest.land);
    const areaSquareMetres = areaOf(cell, centre);
    return [{ cell, centre, areaSquareMetres, ...weigh({ conditioned, assessment, logs, outlook }) }];
  });
}

/** Log density at a peak with land, sight and exposure held against it. */
export function heldAt({ conditioned, assessment, logs, site, position }: Peak, land: LandMask | null): number {
  return weigh({ conditioned, assessment, logs, outlook: outlookFrom(conditioned.network, site, position, land) }).logHeld;
}

/** The subsets that could weigh anything with no misfit at all, judged by their constants at the peaks found. */
function weighty(peaks: readonly Peak[], sets: readonly StraySet[], floor: number): readonly StraySet[] {
  if (peaks.length === 0) return sets;
  return sets.filter((_, s) => peaks.some(({ conditioned }) => (conditioned.logConstants[s] ?? -Infinity) > floor - FAINT_SUBSET));
}

/** The coarsest level whose spacing is at most half the smallest 1-sigma axis. */
function wantedLevel(peaks: readonly Peak[]): number {
  const axis = finestAxisMetres(peaks);
  let level = LEAST_LEVEL;
  while (level < LAST_LEVEL && spacingMetres(level) > axis / 2) level++;
  return level;
}

/** The smallest 1-sigma axis (m) among the peaks that count. */
function finestAxisMetres(peaks: readonly Peak[]): number {
  const top = peaks[0]?.logFree ?? 0;
  const counted = peaks.filter((peak) => peak.logFree > top - FAINT_PEAK);
  return Math.min(Infinity, ...counted.map(({ information: { eastEast, eastNorth, northNorth } }) => {
    return 1 / Math.sqrt((eastEast + northNorth) / 2 + Math.hypot((eastEast - northNorth) / 2, eastNorth));
  }));
}
