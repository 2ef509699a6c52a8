import type { Position } from "../units/position.ts";
import type { StraySet } from "./belonging.ts";
import { conditionAt, type Conditioned, type ConditionedSubset } from "./conditioned.ts";
import { exactSite, stepped } from "./exact-site.ts";
import type { Network } from "./network.ts";
import type { Site } from "./site.ts";
import { applyPrecision, dot } from "./subset-precision.ts";
import { misfit, originOf, project, weigh, type Projection } from "./weigh.ts";

/** Information on a position, east and north (1/m2): the inverse of its covariance. */
export interface PlaneInformation {
  readonly eastEast: number;
  readonly eastNorth: number;
  readonly northNorth: number;
}

export interface Peak {
  readonly position: Position;
  readonly site: Site;
  readonly conditioned: Conditioned;
  /** Seconds from the network's zero. */
  readonly originSeconds: number;
  readonly information: PlaneInformation;
  readonly logFree: number;
  /** The set of stations left out that weighs most here, with its chi-square and that of its t0. */
  readonly best: { readonly subset: ConditionedSubset; readonly chiSquare: number; readonly weight: number };
}

const MOST_STEPS = 60;
const SETTLED_METRES = 0.01;
const LONGEST_STEP_METRES = 800_000;
/** Keeps a step finite where the stations tell nothing of one direction: as if the place were known to 5000 km. */
const FAINT_INFORMATION = 1 / 5_000_000 ** 2;

/**
 * The best point near `start` without regard to land: Gauss-Newton on the exact geodesics, each subset of stations
 * weighted by its share at the current point (expectation-maximisation). The covariance is taken at the current
 * azimuths and iterated with them; a step is judged under the covariance it was made with, so that readings which
 * agree exactly give exactly their common point. Null where the covariance is singular.
 * [source: tarantola-valette-1982, karney-2013]
 */
export function climbToPeak(network: Network, start: Position, sets: readonly StraySet[]): Peak | null {
  let here = look(network, start, sets);
  let longest = LONGEST_STEP_METRES;
  for (let count = 0; here && count < MOST_STEPS; count++) {
    const step = shortened(newtonStep(here), longest);
    const length = Math.hypot(step.east, step.north);
    if (length < SETTLED_METRES) break;
    const next: Look | null = look(network, stepped(here.position, step), sets);
    if (!next) return null;
    const worse = weigh(here.conditioned, next.site).logFree < here.logFree - 1e-9;
    if (!worse) here = next;
    else if (length < 1) break;
    longest = worse ? length / 4 : LONGEST_STEP_METRES;
  }
  return here;
}

interface Look extends Peak {
  readonly gradient: { readonly east: number; readonly north: number };
}

/** The mixture, its slope and its curvature at a point. */
function look(network: Network, position: Position, sets: readonly StraySet[]): Look | null {
  const site = exactSite(network, position, null);
  const conditioned = conditionAt(network, site.azimuths, sets);
  if (!conditioned) return null;
  const projection = project(conditioned, site);
  const weighed = weigh(conditioned, site);
  const shares = sharesOf(conditioned, site, projection);
  const sum = { eastEast: 0, eastNorth: 0, northNorth: 0, east: 0, north: 0, origin: 0 };
  let best: Peak["best"] | null = null;
  conditioned.subsets.forEach((subset, s) => {
    const share = shares[s] ?? 0;
    if (!best || share > best.weight) best = { subset, weight: share, chiSquare: misfit(subset, projection) };
    if (share < 1e-6) return;
    accumulate(sum, share, subsetSlope(conditioned, subset, projection, site));
  });
  if (!best) return null;
  return {
    position,
    site,
    conditioned,
    originSeconds: sum.origin,
    information: { eastEast: sum.eastEast + FAINT_INFORMATION, eastNorth: sum.eastNorth, northNorth: sum.northNorth + FAINT_INFORMATION },
    logFree: weighed.logFree,
    best,
    gradient: { east: sum.east, north: sum.north },
  };
}

function sharesOf(conditioned: Conditioned, site: Site, projection: Projection): Float64Array {
  const logs = Float64Array.from(conditioned.subsets, (subset) => {
    const bearing = subset.stray.reduce((log, i) => log - (site.logBearing.byStation[i] ?? NaN), site.logBearing.sum);
    return subset.logConstant - 0.5 * misfit(subset, projection) + bearing;
  });
  const top = logs.reduce((most, log) => Math.max(most, log), -Infinity);
  const weights = logs.map((log) => Math.exp(log - top));
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  return weights.map((weight) => weight / total);
}

interface Slope {
  readonly eastEast: number;
  readonly eastNorth: number;
  readonly northNorth: number;
  readonly east: number;
  readonly north: number;
  readonly origin: number;
}

function accumulate(sum: { -readonly [K in keyof Slope]: number }, share: number, slope: Slope): void {
  for (const key of ["eastEast", "eastNorth", "northNorth", "east", "north", "origin"] as const) sum[key] += share * slope[key];
}

/**
 * One subset's gradient of log w and its information, by position. With J the derivative of the distances
 * (-sin az, -cos az) and P_B = P - P_:O E P_O:,
 *   (1)  gradient = -J' P_B (a + t0 1)
 *   (2)  information = J' (P_B - P_B 1 1' P_B / 1'P_B 1) J
 */
function subsetSlope(conditioned: Conditioned, subset: ConditionedSubset, projection: Projection, site: Site): Slope {
  const n = conditioned.network.size;
  const origin = originOf(subset, projection);
  const east = new Float64Array(2 * n);
  const north = new Float64Array(2 * n);
  const one = new Float64Array(2 * n);
  for (let i = 0; i < n; i++) {
    east[i] = -Math.sin(site.azimuths[i] ?? NaN);
    north[i] = -Math.cos(site.azimuths[i] ?? NaN);
    one[n + i] = 1;
  }
  const residual = projection.residual.map((value, i) => value + origin * (one[i] ?? NaN));
  const byEast = applyPrecision(conditioned, subset, east);
  const byNorth = applyPrecision(conditioned, subset, north);
  const timeEast = dot(byEast, one);
  const timeNorth = dot(byNorth, one);
  return {
    eastEast: dot(byEast, east) - timeEast ** 2 / subset.timeInformation,
    eastNorth: dot(byEast, north) - (timeEast * timeNorth) / subset.timeInformation,
    northNorth: dot(byNorth, north) - timeNorth ** 2 / subset.timeInformation,
    east: -dot(byEast, residual),
    north: -dot(byNorth, residual),
    origin,
  };
}

function newtonStep({ gradient, information }: Look): { east: number; north: number } {
  const { eastEast, eastNorth, northNorth } = information;
  const determinant = eastEast * northNorth - eastNorth ** 2;
  return {
    east: (northNorth * gradient.east - eastNorth * gradient.north) / determinant,
    north: (eastEast * gradient.north - eastNorth * gradient.east) / determinant,
  };
}

function shortened(step: { east: number; north: number }, longest: number): { east: number; north: number } {
  const scale = Math.min(1, longest / Math.hypot(step.east, step.north));
  return { east: step.east * scale, north: step.north * scale };
}
