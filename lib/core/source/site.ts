import { oceanFraction, type LandMask } from "../geodesy/land-mask.ts";
import { frameAt, quickAzimuth, quickDistance } from "../geodesy/quick-inverse.ts";
import { visibleFraction } from "../geodesy/sight-table.ts";
import type { Position } from "../units/position.ts";
import type { StationArrival } from "./answer.ts";
import type { Network } from "./network.ts";

/** Storms are wide: what counts is how much of a disc of this radius lies in water and in sight. */
export const DISC_RADIUS_METRES = 150_000;
/** A coastline's error must never rule the truth out for good: the least that a station's sight can count. */
const SIGHT_FLOOR = 0.02;
/** The same for a point far inland. */
const OCEAN_FLOOR = 1e-3;

interface StationTerms {
  readonly byStation: Float64Array;
  readonly sum: number;
}

/** A candidate point as the stations have it: how far, at which azimuth, how well in sight. */
export interface Site {
  readonly distances: Float64Array;
  /** Radians from north, of each station seen from the point. */
  readonly azimuths: Float64Array;
  /** Log of the share in sight by station, and log likelihood ratio of its mean direction. */
  readonly logSight: StationTerms;
  readonly logBearing: StationTerms;
  readonly logOcean: number;
}

/** Distances as `quickDistance` has them, for the search; `exactSite` finishes. */
export function quickSite(network: Network, position: Position, land: LandMask | null): Site {
  const frame = frameAt(position);
  const distances = Float64Array.from(network.frames, (station) => quickDistance(station, frame));
  const azimuths = Float64Array.from(network.frames, (station) => quickAzimuth(frame, station));
  const bearings = Float64Array.from(network.frames, (station) => (quickAzimuth(station, frame) * 180) / Math.PI);
  return siteFrom({ network, position, land, distances, azimuths, bearings });
}

export function siteFrom(input: {
  readonly network: Network;
  readonly position: Position;
  readonly land: LandMask | null;
  readonly distances: Float64Array;
  readonly azimuths: Float64Array;
  readonly bearings: Float64Array;
}): Site {
  const { network, position, land, distances, azimuths, bearings } = input;
  const logSight = new Float64Array(network.size);
  const logBearing = new Float64Array(network.size);
  network.arrivals.forEach((arrival, i) => {
    const share = shareInSight(arrival, bearings[i] ?? NaN, distances[i] ?? NaN);
    logSight[i] = Math.log(Math.max(SIGHT_FLOOR, share.sight * share.exposure));
    logBearing[i] = bearingTerm(arrival, bearings[i] ?? NaN);
  });
  const ocean = land ? oceanFraction({ mask: land, position, radiusMetres: DISC_RADIUS_METRES }) : 1;
  return {
    distances,
    azimuths,
    logSight: { byStation: logSight, sum: sumOf(logSight) },
    logBearing: { byStation: logBearing, sum: sumOf(logBearing) },
    logOcean: Math.log(Math.max(OCEAN_FLOOR, ocean)),
  };
}

/** How much of the disc about a point the station sees past land (0..1), and how much of it lies where it is open. */
export function shareInSight(arrival: StationArrival, bearingDegrees: number, distanceMetres: number): { sight: number; exposure: number } {
  const sight = arrival.sight
    ? visibleFraction({ table: arrival.sight, bearingDegrees, distanceMetres, discRadiusMetres: DISC_RADIUS_METRES })
    : 1;
  return { sight, exposure: exposedShare(arrival, bearingDegrees, distanceMetres) };
}

/** Share of the disc's width, as an angle at the station, within the bearings that the station is open to. */
function exposedShare({ exposure }: StationArrival, bearingDegrees: number, distanceMetres: number): number {
  if (!exposure) return 1;
  const opening = positive(exposure.facesToDegrees - exposure.facesFromDegrees) || 360;
  const halfWidth = Math.max(0.5, (Math.atan2(DISC_RADIUS_METRES, distanceMetres) * 180) / Math.PI);
  const inside = positive(bearingDegrees - exposure.facesFromDegrees);
  const toEdge = inside <= opening ? Math.min(inside, opening - inside) : -Math.min(inside - opening, 360 - inside);
  return opening >= 360 ? 1 : Math.min(1, Math.max(0, 0.5 + toEdge / (2 * halfWidth)));
}

/** Log density of the measured direction if the storm is on this bearing, over that of any direction. */
function bearingTerm({ estimate: { bearing } }: StationArrival, bearingDegrees: number): number {
  if (!bearing) return 0;
  const apart = positive(bearingDegrees - bearing.comesFromDegrees + 180) - 180;
  return Math.log(360 / (bearing.sigmaDegrees * Math.sqrt(2 * Math.PI))) - 0.5 * (apart / bearing.sigmaDegrees) ** 2;
}

function positive(degrees: number): number {
  return ((degrees % 360) + 360) % 360;
}

function sumOf(values: Float64Array): number {
  return values.reduce((sum, value) => sum + value, 0);
}
