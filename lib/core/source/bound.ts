import { MEAN_RADIUS_METRES } from "../geodesy/earth.ts";
import type { Conditioned } from "./conditioned.ts";
import type { Site } from "./site.ts";
import { project, misfit } from "./weigh.ts";

/**
 * An upper bound of the log density (land disregarded) anywhere within `reachMetres` of a site.
 *
 * Every subset's misfit is a squared norm of the residuals, so within the reach it is at least
 *   (1)  (|u| - r sqrt(lambda) - k)^2 / (1 + turn)
 * lambda: largest eigenvalue of the whole network's information on the position (a subset knows no more);
 * k: what the circles' curvature adds to the straight-line change of the distances, against the spread's
 * uncorrelated share; turn: how much the covariance can grow while the azimuths turn (its own part never falls
 * under 1 - rho of itself, so it changes by that factor at the most). The subset's determinant and time
 * information shrink by no more than (1 - turn)^size.
 */
export function boundWithin(conditioned: Conditioned, site: Site, reachMetres: number): number {
  const { network } = conditioned;
  const { distanceMetres, sharedCorrelation } = network.settings.spread;
  const uncorrelated = distanceMetres * Math.sqrt(network.spreadVarianceFactor * (1 - sharedCorrelation));
  const curvature = curvatureMetres(site, reachMetres) / uncorrelated;
  const slack = reachMetres * Math.sqrt(largestInformation(conditioned, site)) + curvature;
  const turn = turnShare(conditioned, site, reachMetres);
  const projection = project(conditioned, site);
  const bearingRoom = bearingGain(conditioned);

  let top = -Infinity;
  const logs = conditioned.subsets.map((subset) => {
    const norm = Math.max(0, Math.sqrt(Math.max(0, misfit(subset, projection))) - slack);
    const shrink = (network.size - subset.stray.length) * -Math.log(1 - Math.min(0.5, turn));
    const log = subset.logConstant - (0.5 * norm ** 2) / (1 + turn) + shrink + bearingRoom; // (1)
    top = Math.max(top, log);
    return log;
  });
  return top + Math.log(logs.reduce((sum, log) => sum + Math.exp(log - top), 0));
}

/** Largest eigenvalue (1/m2) of J' W J, W the distances' information with t0 integrated out. */
function largestInformation({ network, precision, timeColumn, timeInformation }: Conditioned, site: Site): number {
  const n = network.size;
  let ee = 0;
  let en = 0;
  let nn = 0;
  for (let i = 0; i < n; i++) {
    const [ei, ni] = [Math.sin(site.azimuths[i] ?? NaN), Math.cos(site.azimuths[i] ?? NaN)];
    for (let j = 0; j < n; j++) {
      const w = (precision[i * 2 * n + j] ?? NaN) - ((timeColumn[i] ?? NaN) * (timeColumn[j] ?? NaN)) / timeInformation;
      const [ej, nj] = [Math.sin(site.azimuths[j] ?? NaN), Math.cos(site.azimuths[j] ?? NaN)];
      ee += w * ei * ej;
      en += w * ei * nj;
      nn += w * ni * nj;
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

/** Largest row sum, over the uncorrelated share, of what the shared correlations can change as azimuths turn. */
function turnShare({ network }: Conditioned, site: Site, reachMetres: number): number {
  const { sharedCorrelation, azimuthScaleDegrees } = network.settings.spread;
  const swing = Array.from(site.distances, (distance) => {
    const across = MEAN_RADIUS_METRES * Math.abs(Math.sin(distance / MEAN_RADIUS_METRES));
    return across > reachMetres ? Math.asin(reachMetres / across) : Math.PI;
  });
  let most = 0;
  for (let i = 0; i < network.size; i++) {
    let row = 0;
    for (let j = 0; j < network.size; j++) {
      if (i === j) continue;
      const apart = Math.abs((site.azimuths[i] ?? NaN) - (site.azimuths[j] ?? NaN));
      const turn = Math.min(apart, 2 * Math.PI - apart);
      const now = Math.exp((-turn * 180) / Math.PI / azimuthScaleDegrees);
      const room = Math.min(turn, (swing[i] ?? NaN) + (swing[j] ?? NaN));
      const nearer = Math.exp((-(turn - room) * 180) / Math.PI / azimuthScaleDegrees);
      row += Math.max(nearer - now, now - now * Math.exp((-room * 180) / Math.PI / azimuthScaleDegrees));
    }
    most = Math.max(most, (sharedCorrelation * row) / (1 - sharedCorrelation));
  }
  return most;
}

/** The most that measured directions can add. */
function bearingGain({ network }: Conditioned): number {
  return network.arrivals.reduce((sum, { estimate: { bearing } }) => {
    return sum + (bearing ? Math.max(0, Math.log(360 / (bearing.sigmaDegrees * Math.sqrt(2 * Math.PI)))) : 0);
  }, 0);
}
