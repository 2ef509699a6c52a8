import type { LandMask } from "../geodesy/land-mask.ts";
import type { Position } from "../units/position.ts";
import { assess, type Assessment } from "./assess.ts";
import type { StraySet } from "./belonging.ts";
import { boundWithin } from "./bound.ts";
import { conditionAt, planSubsets, type Conditioned, type SubsetPlan } from "./conditioned.ts";
import { findPeaks } from "./find-peaks.ts";
import { areaOf, centreOf, childrenOf, firstCells, FIRST_LEVEL, LAST_LEVEL, reachMetres, spacingMetres } from "./grid.ts";
import type { Network } from "./network.ts";
import type { Peak } from "./peak.ts";
import { cellsHolding } from "./regions.ts";
import { outlookFrom, quickSite, type Site } from "./site.ts";
import { logSum, subsetLogs, weigh, type Weight } from "./weigh.ts";

/** Cells whose best possible density lies this far (natural log) below the best found are left: e^-10. */
const PRUNE_DEPTH = 10;
/** Subsets of stations that at their very best lie this far below it are not summed. */
const FAINT_SUBSET = 14;
/** Level from which cells share one covariance with all their descendants: within 250 km azimuths turn little. */
const COVARIANCE_LEVEL = 2;
/** No answer stops coarser than this. */
const LEAST_LEVEL = 3;
/** Peaks this far below the best do not ask for finer cells. */
const FAINT_PEAK = 6;
const LEAST_CELLS_IN_REGION = 100;
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

interface Look {
  readonly cell: string;
  readonly centre: Position;
  readonly site: Site;
  readonly conditioned: Conditioned;
  readonly assessment: Assessment;
  readonly logs: Float64Array;
}

/**
 * The posterior over the ocean on H3 cells: from 842 cells down, keeping every cell in which a bound leaves room for
 * density, until the spacing is at most half the smallest 1-sigma axis and 100 cells lie in the 95 % region.
 * `known`: the network's free peaks, where they have been found already. [source: tarantola-valette-1982, h3]
 */
export function searchOcean(input: SearchInput, known?: readonly Peak[]): Posterior {
  const { network, sets, land } = input;
  const peaks = known ?? findPeaks(network, planSubsets(network, sets));
  let floor = Math.max(-Infinity, ...peaks.map((peak) => heldAt(peak, land)));
  const plan = planSubsets(network, weighty(peaks, sets, floor));
  const axis = finestAxisMetres(peaks);
  const apart = conditionAt(network, null, plan);
  let prospects: readonly Prospect[] = firstCells().map((cell) => ({ cell, conditioned: apart }));
  for (let level = FIRST_LEVEL; ; level++) {
    const looks = prospects.flatMap((prospect) => lookAt(network, plan, prospect) ?? []);
    if (level >= LEAST_LEVEL) {
      const cells = looks.flatMap((look) => weighCell(look, land, floor) ?? []);
      floor = cells.reduce((most, cell) => Math.max(most, cell.logHeld), floor);
      if (isFineEnough(level, cells, axis) || looks.length > MOST_CELLS) return { level, cells, peaks, plan };
    }
    const kept = looks.filter((look) => boundWithin({ ...look, reachMetres: reachMetres(level), apart: level < COVARIANCE_LEVEL }) > floor - PRUNE_DEPTH);
    prospects = kept.flatMap(({ cell, conditioned }) => childrenOf(cell).map((child) => ({ cell: child, conditioned: level < COVARIANCE_LEVEL ? null : conditioned })));
  }
}

function lookAt(network: Network, plan: SubsetPlan, prospect: Prospect): Look | null {
  const centre = centreOf(prospect.cell);
  const site = quickSite(network, centre);
  const conditioned = prospect.conditioned ?? conditionAt(network, site.azimuths, plan);
  if (!conditioned) return null;
  const assessment = assess(conditioned, site.distances);
  return { cell: prospect.cell, centre, site, conditioned, assessment, logs: subsetLogs(conditioned, assessment, site.logBearing) };
}

/** Null for a cell whose density is nothing beside the best, land or no land. */
function weighCell({ cell, centre, site, conditioned, assessment, logs }: Look, land: LandMask | null, floor: number): WeighedCell | null {
  if (logSum(logs) < floor - PRUNE_DEPTH) return null;
  const outlook = outlookFrom(conditioned.network, site, centre, land);
  return { cell, centre, areaSquareMetres: areaOf(cell, centre), ...weigh(conditioned, assessment, logs, outlook) };
}

/** Log density at a peak with land, sight and exposure held against it. */
export function heldAt({ conditioned, assessment, logs, site, position }: Peak, land: LandMask | null): number {
  return weigh(conditioned, assessment, logs, outlookFrom(conditioned.network, site, position, land)).logHeld;
}

/** The subsets that could weigh anything with no misfit at all, judged by their constants at the peaks found. */
function weighty(peaks: readonly Peak[], sets: readonly StraySet[], floor: number): readonly StraySet[] {
  if (peaks.length === 0) return sets;
  return sets.filter((_, s) => peaks.some(({ conditioned }) => (conditioned.logConstants[s] ?? -Infinity) > floor - FAINT_SUBSET));
}

function isFineEnough(level: number, cells: readonly WeighedCell[], finestAxis: number): boolean {
  if (level === LAST_LEVEL) return true;
  return spacingMetres(level) <= finestAxis / 2 && cellsHolding(cells, 0.95).length >= LEAST_CELLS_IN_REGION;
}

/** The smallest 1-sigma axis (m) among the peaks that count. */
function finestAxisMetres(peaks: readonly Peak[]): number {
  const top = peaks[0]?.logFree ?? 0;
  const counted = peaks.filter((peak) => peak.logFree > top - FAINT_PEAK);
  return Math.min(Infinity, ...counted.map(({ information: { eastEast, eastNorth, northNorth } }) => {
    return 1 / Math.sqrt((eastEast + northNorth) / 2 + Math.hypot((eastEast - northNorth) / 2, eastNorth));
  }));
}
