import type { LandMask } from "../geodesy/land-mask.ts";
import type { Position } from "../units/position.ts";
import type { StraySet } from "./belonging.ts";
import { boundWithin } from "./bound.ts";
import { conditionAt, type Conditioned } from "./conditioned.ts";
import { areaOf, centreOf, childrenOf, firstCells, FIRST_LEVEL, LAST_LEVEL, reachMetres, spacingMetres } from "./grid.ts";
import { findPeaks } from "./find-peaks.ts";
import type { Network } from "./network.ts";
import type { Peak } from "./peak.ts";
import { cellsHolding } from "./regions.ts";
import { quickSite, type Site } from "./site.ts";
import { weigh, type Weight } from "./weigh.ts";

/** Cells whose best possible density lies this far (natural log) below the best found are left: e^-10. */
const PRUNE_DEPTH = 10;
/** Level whose cells share one covariance with all their descendants: azimuths turn little within 70 km. */
const COVARIANCE_LEVEL = 3;
/** Peaks this far below the best do not ask for finer cells. */
const FAINT_PEAK = 6;
const LEAST_CELLS_IN_REGION = 100;
const MOST_CELLS = 60_000;

export interface WeighedCell extends Weight {
  readonly cell: string;
  readonly centre: Position;
  readonly areaSquareMetres: number;
}

export interface Posterior {
  readonly level: number;
  readonly cells: readonly WeighedCell[];
  /** Free peaks (land disregarded) by density, best first. */
  readonly peaks: readonly Peak[];
}

export interface SearchInput {
  readonly network: Network;
  readonly sets: readonly StraySet[];
  readonly land: LandMask | null;
}

/** A cell to look at, with the covariance of an ancestor near enough to share it. */
interface Prospect {
  readonly cell: string;
  readonly conditioned: Conditioned | null;
}

interface Candidate extends WeighedCell {
  readonly site: Site;
  readonly conditioned: Conditioned;
}

/**
 * The posterior over the ocean on H3 cells: from 842 cells down, keeping every cell in which a bound leaves room for
 * density, until the spacing is at most half the smallest 1-sigma axis and 100 cells lie in the 95 % region.
 * [source: tarantola-valette-1982, h3]
 */
export function searchOcean(input: SearchInput): Posterior {
  let prospects: readonly Prospect[] = firstCells().map((cell) => ({ cell, conditioned: null }));
  const peaks = findPeaks(input.network, input.sets);
  let floor = -Infinity;
  for (let level = FIRST_LEVEL; ; level++) {
    const cells = prospects.flatMap((prospect) => lookAt(input, prospect) ?? []);
    floor = best(cells.map((cell) => cell.logHeld), peaks.map((peak) => heldAt(input, peak)), [floor]);
    if (isFineEnough(level, cells, finestAxisMetres(peaks))) return { level, cells, peaks };

    const reach = reachMetres(level);
    const kept = cells.filter((cell) => boundWithin(cell.conditioned, cell.site, reach) > floor - PRUNE_DEPTH);
    if (kept.length * 7 > MOST_CELLS && level >= COVARIANCE_LEVEL) return { level, cells, peaks };
    const shares = level >= COVARIANCE_LEVEL;
    prospects = kept.flatMap((cell) => childrenOf(cell.cell).map((child) => ({ cell: child, conditioned: shares ? cell.conditioned : null })));
  }
}

function lookAt({ network, sets, land }: SearchInput, prospect: Prospect): Candidate | null {
  const centre = centreOf(prospect.cell);
  const site = quickSite(network, centre, land);
  const conditioned = prospect.conditioned ?? conditionAt(network, site.azimuths, sets);
  if (!conditioned) return null;
  return { cell: prospect.cell, centre, areaSquareMetres: areaOf(prospect.cell, centre), site, conditioned, ...weigh(conditioned, site) };
}

function heldAt({ network, land }: SearchInput, peak: Peak): number {
  return weigh(peak.conditioned, quickSite(network, peak.position, land)).logHeld;
}

function isFineEnough(level: number, cells: readonly WeighedCell[], finestAxis: number): boolean {
  if (level < COVARIANCE_LEVEL) return false;
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

function best(...lists: readonly (readonly number[])[]): number {
  let most = -Infinity;
  for (const list of lists) for (const value of list) if (value > most) most = value;
  return most;
}
