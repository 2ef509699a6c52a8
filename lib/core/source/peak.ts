import { MEAN_RADIUS_METRES } from "../geodesy/earth.ts";
import type { Position } from "../units/position.ts";
import { assess, type Assessment } from "./assess.ts";
import { conditionAt, type Conditioned, type SubsetPlan } from "./conditioned.ts";
import { exactSite, stepped } from "./exact-site.ts";
import type { Network } from "./network.ts";
import { turnFrom, type Site } from "./site.ts";
import { applyPrecision, dot } from "./subset-precision.ts";
import { logSum, subsetLogs } from "./weigh.ts";

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
  readonly assessment: Assessment;
  /** Log weight of each subset here, and of all together, land disregarded. */
  readonly logs: Float64Array;
  readonly logFree: number;
  /** Seconds from the network's zero. */
  readonly originSeconds: number;
  readonly information: PlaneInformation;
  /** The subset that weighs most here. */
  readonly best: number;
}

const MOST_STEPS = 60;
const SETTLED_METRES = 0.01;
const LONGEST_STEP_METRES = 800_000;
/** Subsets with less of the weight than this do not steer. */
const LEAST_SHARE = 1e-6;
/** Keeps a step finite where the stations tell nothing of one direction: as if the place were known to 5000 km. */
const FAINT_INFORMATION = 1 / 5_000_000 ** 2;

/**
 * The best point near `start` without regard to land: Gauss-Newton on the exact geodesics, each subset of stations
 * weighted by its share at the current point (expectation-maximisation). The covariance is taken at the current
 * azimuths and iterated with them; a step is judged under the covariance it was made with, so that readings which
 * agree exactly give exactly their common point. Null where the covariance is singular. A climb that `isKnown` ends
 * where it stands.
 * [source: tarantola-valette-1982, karney-2013]
 */
export function climbToPeak(network: Network, start: Position, plan: SubsetPlan, isKnown: (position: Position) => boolean = () => false): Peak | null {
  let here = look(network, start, plan);
  let longest = LONGEST_STEP_METRES;
  for (let count = 0; here && count < MOST_STEPS; count++) {
    const step = shortened(newtonStep(here), longest);
    const length = Math.hypot(step.east, step.north);
    if (length < SETTLED_METRES || isKnown(here.position)) break;
    const next: Look | null = look(network, stepped(here.position, step), plan);
    if (!next) return null;
    const worse = logUnder(here.conditioned, next.site) < here.logFree - 1e-9;
    if (!worse) here = next;
    else if (length < 1) break;
    longest = worse ? length / 4 : LONGEST_STEP_METRES;
  }
  return here;
}

function logUnder(conditioned: Conditioned, site: Site): number {
  return logSum(subsetLogs(conditioned, assess(conditioned, site.distances), site.logBearing));
}

interface Look extends Peak {
  readonly gradient: { readonly east: number; readonly north: number };
}

/** The mixture, its slope and its curvature at a point. */
function look(network: Network, position: Position, plan: SubsetPlan): Look | null {
  const site = exactSite(network, position);
  const conditioned = conditionAt(network, site.azimuths, plan);
  if (!conditioned) return null;
  const assessment = assess(conditioned, site.distances);
  const logs = subsetLogs(conditioned, assessment, site.logBearing);
  const logFree = logSum(logs);
  const sum = { eastEast: 0, eastNorth: 0, northNorth: 0, east: 0, north: 0, origin: 0 };
  let best = 0;
  logs.forEach((log, s) => {
    if (log > (logs[best] ?? -Infinity)) best = s;
    const share = Math.exp(log - logFree);
    if (share > LEAST_SHARE) accumulate(sum, share, withBearings(subsetSlope(conditioned, s, assessment, site), network, conditioned.plan.sets[s] ?? [], site));
  });
  return {
    position,
    site,
    conditioned,
    assessment,
    logs,
    logFree,
    originSeconds: sum.origin,
    information: { eastEast: sum.eastEast + FAINT_INFORMATION, eastNorth: sum.eastNorth, northNorth: sum.northNorth + FAINT_INFORMATION },
    best,
    gradient: { east: sum.east, north: sum.north },
  };
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
 * (-sin az, -cos az) and P_B its precision,
 *   (1)  gradient = -J' P_B (a + t0 1)
 *   (2)  information = J' (P_B - P_B 1 1' P_B / 1'P_B 1) J
 */
function subsetSlope(conditioned: Conditioned, s: number, assessment: Assessment, site: Site): Slope {
  const n = conditioned.network.size;
  const origin = assessment.origins[s] ?? NaN;
  const timeInformation = conditioned.timeInformation[s] ?? NaN;
  const east = new Float64Array(2 * n);
  const north = new Float64Array(2 * n);
  const one = new Float64Array(2 * n);
  for (let i = 0; i < n; i++) {
    east[i] = -Math.sin(site.azimuths[i] ?? NaN);
    north[i] = -Math.cos(site.azimuths[i] ?? NaN);
    one[n + i] = 1;
  }
  const residual = assessment.residual.map((value, i) => value + origin * (one[i] ?? NaN));
  const byEast = applyPrecision(conditioned, s, east);
  const byNorth = applyPrecision(conditioned, s, north);
  const timeEast = dot(byEast, one);
  const timeNorth = dot(byNorth, one);
  return {
    eastEast: dot(byEast, east) - timeEast ** 2 / timeInformation,
    eastNorth: dot(byEast, north) - (timeEast * timeNorth) / timeInformation,
    northNorth: dot(byNorth, north) - timeNorth ** 2 / timeInformation,
    east: -dot(byEast, residual),
    north: -dot(byNorth, residual),
    origin,
  };
}

/**
 * The slope with what the measured directions of the stations that belong add. A point's bearing b from a station at
 * distance D and azimuth a (seen from the point) turns with the point by
 *   (3)  db = (-cos a, sin a) / (R sin(D / R))      east, north, on the mean sphere
 */
function withBearings(slope: Slope, network: Network, strays: readonly number[], site: Site): Slope {
  if (network.noBearings) return slope;
  const sum = { ...slope };
  network.arrivals.forEach(({ estimate: { bearing } }, i) => {
    if (!bearing || strays.includes(i)) return;
    const across = MEAN_RADIUS_METRES * Math.max(0.01, Math.abs(Math.sin((site.distances[i] ?? NaN) / MEAN_RADIUS_METRES)));
    const perDegree = 180 / Math.PI / across / bearing.sigmaDegrees; // sigmas per metre
    const east = -Math.cos(site.azimuths[i] ?? NaN) * perDegree; // (3)
    const north = Math.sin(site.azimuths[i] ?? NaN) * perDegree;
    const off = turnFrom(bearing.comesFromDegrees, site.bearings[i] ?? NaN) / bearing.sigmaDegrees;
    sum.east -= off * east;
    sum.north -= off * north;
    sum.eastEast += east * east;
    sum.eastNorth += east * north;
    sum.northNorth += north * north;
  });
  return sum;
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
