import { MEAN_RADIUS_METRES } from "../geodesy/earth.ts";
import type { Assessment } from "./assess.ts";
import type { Conditioned } from "./conditioned.ts";
import { visibleFraction } from "../geodesy/sight-table.ts";
import { DISC_RADIUS_METRES, mostFromBearings, SIGHT_FLOOR, termsOf, type Site, type StationTerms } from "./site.ts";
import { belongingTerm, logSum } from "./weigh.ts";

/** Bounds of the log density, and of each subset's part in it, land disregarded and held against it. */
export interface Bound {
  readonly logFree: number;
  readonly logHeld: number;
  readonly bySubsetFree: Float64Array;
  readonly bySubsetHeld: Float64Array;
}

/** What is known of a site whose surroundings are to be bounded. */
export interface Surroundings {
  readonly conditioned: Conditioned;
  readonly site: Site;
  readonly assessment: Assessment;
  readonly reachMetres: number;
  /**
   * True where `conditioned` takes the stations as seeing different parts of the storm and every place has a covariance
   * of its own, false where `conditioned` serves all places within the reach.
   */
  readonly apart: boolean;
}

/** Log densities below which nobody asks for a bound, land disregarded and held against it. */
export interface Floors {
  readonly free: number;
  readonly held: number;
}

/**
 * An upper bound of the log density, free of land and held against it, anywhere within the reach of a site; null where
 * it lies below both floors.
 *
 * Every subset's misfit is a squared norm of the residuals, so within the reach it is at least
 *   (1)  (|u| - r sqrt(lambda) - k)^2 / (1 + turn)
 * lambda: largest eigenvalue of the whole network's information on the position (a subset knows no more);
 * k: what the circles' curvature adds to the straight-line change of the distances, against what the stations do not
 * share; turn: how much the covariance can grow from the one used, as azimuths turn.
 * A disc that a station sees nothing of holds no smaller disc that it sees, so sight is bounded as well.
 * The determinant of a subset of b stations falls to no less than `least`^(2b) of its own.
 */
export function boundAbove(floors: Floors, surroundings: Surroundings): Bound | null {
  const logs = freeBounds(surroundings);
  const logFree = logSum(logs);
  // What lies under land's or a cape's shadow is worth no more than what does not.
  if (logFree < floors.free && logFree < floors.held) return null;
  const { plan } = surroundings.conditioned;
  const hidden = hiddenTerms(surroundings);
  if (hidden.none) return { logFree, logHeld: logFree, bySubsetFree: logs, bySubsetHeld: logs };
  const helds = logs.map((log, s) => log + belongingTerm(hidden, plan.rows[s]));
  const logHeld = logSum(helds);
  return logFree < floors.free && logHeld < floors.held ? null : { logFree, logHeld, bySubsetFree: logs, bySubsetHeld: helds };
}

/** By subset, with no land in the way. */
function freeBounds(surroundings: Surroundings): Float64Array {
  const { conditioned, site, assessment, reachMetres } = surroundings;
  const { network, plan } = conditioned;
  const { turn, least } = surroundings.apart ? turnOf(surroundings) : { turn: 0, least: 1 };
  const slack = reachMetres * Math.sqrt(largestInformation(conditioned, site)) + curvatureMetres(site, reachMetres) / network.firmness.distanceMetres;
  const room = mostFromBearings(network);
  const logs = new Float64Array(plan.sets.length);
  for (let s = 0; s < logs.length; s++) {
    const norm = Math.max(0, Math.sqrt(Math.max(0, assessment.chiSquares[s] ?? NaN)) - slack);
    const belonging = network.size - (plan.sets[s]?.length ?? 0);
    logs[s] = (conditioned.logConstants[s] ?? NaN) - (0.5 * norm * norm) / (1 + turn) - belonging * Math.log(least) + room; // (1)
  }
  return logs;
}

/** Stations that see nothing of the disc about any point within the reach have no more than the floor of sight there. */
function hiddenTerms({ conditioned: { network }, site, reachMetres }: Surroundings): StationTerms {
  return termsOf(network, (arrival, i) => {
    const disc = DISC_RADIUS_METRES + reachMetres;
    const table = arrival.sight;
    const seen = table ? visibleFraction({ table, bearingDegrees: site.bearings[i] ?? NaN, distanceMetres: site.distances[i] ?? NaN, discRadiusMetres: disc }) : 1;
    return seen > 0 ? 0 : Math.log(SIGHT_FLOOR);
  });
}

/** Largest eigenvalue (1/m2) of J' W J, W the distances' information with t0 integrated out. */
function largestInformation({ network, precision, timeColumn, wholeTimeInformation }: Conditioned, site: Site): number {
  const n = network.size;
  const sines = site.azimuths.map(Math.sin);
  const cosines = site.azimuths.map(Math.cos);
  let ee = 0;
  let en = 0;
  let nn = 0;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const w = (precision[i * 2 * n + j] ?? NaN) - ((timeColumn[i] ?? NaN) * (timeColumn[j] ?? NaN)) / wholeTimeInformation;
      ee += w * (sines[i] ?? NaN) * (sines[j] ?? NaN);
      en += w * (sines[i] ?? NaN) * (cosines[j] ?? NaN);
      nn += w * (cosines[i] ?? NaN) * (cosines[j] ?? NaN);
    }
  }
  return (ee + nn) / 2 + Math.hypot((ee - nn) / 2, en);
}

/** Root sum of squares, over stations, of what a distance can change beyond its straight-line change (m). */
function curvatureMetres(site: Site, reachMetres: number): number {
  let square = 0;
  for (const distance of site.distances) {
    const bend = reachMetres ** 2 / (2 * MEAN_RADIUS_METRES * Math.abs(Math.tan(distance / MEAN_RADIUS_METRES)) + 1);
    square += Math.min(2 * reachMetres, 1.2 * bend) ** 2;
  }
  return Math.sqrt(square);
}

/**
 * How far a covariance within the reach can stand from one with no station's spread shared: S <= (1 + turn) S_apart and
 * S >= least S_apart. Row sums (Gershgorin) of the shared correlations that azimuths can give; the spread is only a
 * part of S beside the readings' own errors, which makes its correlation count for less (`Firmness`).
 */
function turnOf({ conditioned: { network }, site, reachMetres }: Surroundings): { turn: number; least: number } {
  const { correlation } = network.firmness;
  const perRadian = 180 / Math.PI / network.settings.spread.azimuthScaleDegrees;
  const swings = site.distances.map((distance) => swing(distance, reachMetres));
  let most = 0;
  for (let i = 0; i < network.size; i++) {
    let row = 0;
    for (let j = 0; j < network.size; j++) {
      if (i === j) continue;
      const between = Math.abs((site.azimuths[i] ?? NaN) - (site.azimuths[j] ?? NaN));
      const angle = Math.min(between, 2 * Math.PI - between);
      row += Math.exp(-Math.max(0, angle - (swings[i] ?? NaN) - (swings[j] ?? NaN)) * perRadian);
    }
    most = Math.max(most, row);
  }
  return { turn: correlation * most, least: 1 - correlation };
}

/** How far (radians) the azimuth of a station can turn within the reach. */
function swing(distanceMetres: number, reachMetres: number): number {
  const across = MEAN_RADIUS_METRES * Math.abs(Math.sin(distanceMetres / MEAN_RADIUS_METRES));
  return across > reachMetres ? Math.asin(reachMetres / across) : Math.PI;
}
