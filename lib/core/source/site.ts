import { oceanFraction, type LandMask } from "../geodesy/land-mask.ts";
import { frameAt, quickAzimuth, quickDistance } from "../geodesy/quick-inverse.ts";
import { visibleFraction } from "../geodesy/sight-table.ts";
import type { Position } from "../units/position.ts";
import type { StationArrival } from "./answer.ts";
import type { Network } from "./network.ts";

/** Storms are wide: what counts is how much of a disc of this radius lies in water and in sight. */
export const DISC_RADIUS_METRES = 150_000;
/** A coastline's error must never rule the truth out for good: the least that a station's sight can count. */
export const SIGHT_FLOOR = 0.02;
/** The same for a point far inland. */
const OCEAN_FLOOR = 1e-3;

/** A logarithm by station, and their sum; `none` where all are zero. */
export interface StationTerms {
  readonly byStation: Float64Array;
  readonly sum: number;
  readonly none: boolean;
}

/** A candidate point as the stations have it: how far, at which azimuth. */
export interface Site {
  readonly distances: Float64Array;
  /** Radians from north, of each station seen from the point. */
  readonly azimuths: Float64Array;
  /** Degrees from north, of the point seen from each station. */
  readonly bearings: Float64Array;
  /** Log likelihood ratio of each station's measured direction. */
  readonly logBearing: StationTerms;
}

/** What stands against a point: land under it, land or a cape before it. Logs of shares of the disc about it. */
export interface Outlook {
  readonly logSight: StationTerms;
  readonly logOcean: number;
}

/** The columns of a site, to be filled again and again by a search. */
export type SiteColumns = Pick<Site, "distances" | "azimuths" | "bearings">;

export function blankSite({ size }: Network): SiteColumns {
  return { distances: new Float64Array(size), azimuths: new Float64Array(size), bearings: new Float64Array(size) };
}

/** Distances as `quickDistance` has them, for the search; `exactSite` finishes. Writes into the columns it is given. */
export function quickSite(network: Network, position: Position, columns: SiteColumns): Site {
  const frame = frameAt(position);
  const { distances, azimuths, bearings } = columns;
  for (let i = 0; i < network.size; i++) {
    const station = network.frames[i] ?? frame;
    distances[i] = quickDistance(station, frame);
    azimuths[i] = quickAzimuth(frame, station);
    bearings[i] = (quickAzimuth(station, frame) * 180) / Math.PI;
  }
  return { distances, azimuths, bearings, logBearing: bearingTerms(network, bearings) };
}

export function bearingTerms(network: Network, bearings: Float64Array): StationTerms {
  return network.noBearings ?? termsOf(network, (arrival, i) => bearingTerm(arrival, bearings[i] ?? NaN));
}

export function outlookFrom(network: Network, site: Site, position: Position, land: LandMask | null): Outlook {
  const logSight = termsOf(network, (arrival, i) => {
    const share = shareInSight(arrival, site.bearings[i] ?? NaN, site.distances[i] ?? NaN);
    return Math.log(Math.max(SIGHT_FLOOR, share.sight * share.exposure));
  });
  const ocean = land ? oceanFraction({ mask: land, position, radiusMetres: DISC_RADIUS_METRES }) : 1;
  return { logSight, logOcean: Math.log(Math.max(OCEAN_FLOOR, ocean)) };
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

/** The most (natural log) that the measured directions can add anywhere. */
export function mostFromBearings(network: Network): number {
  return network.arrivals.reduce((sum, { estimate: { bearing } }) => sum + (bearing ? Math.max(0, logPeak(bearing.sigmaDegrees)) : 0), 0);
}

function logPeak(sigmaDegrees: number): number {
  return Math.log(360 / (sigmaDegrees * Math.sqrt(2 * Math.PI)));
}

/** Log density of the measured direction if the storm is on this bearing, over that of any direction. */
function bearingTerm({ estimate: { bearing } }: StationArrival, bearingDegrees: number): number {
  if (!bearing) return 0;
  const apart = turnFrom(bearing.comesFromDegrees, bearingDegrees);
  return logPeak(bearing.sigmaDegrees) - 0.5 * (apart / bearing.sigmaDegrees) ** 2;
}

export function termsOf(network: Network, term: (arrival: StationArrival, i: number) => number): StationTerms {
  const byStation = new Float64Array(network.size);
  let sum = 0;
  let none = true;
  network.arrivals.forEach((arrival, i) => {
    const log = term(arrival, i);
    byStation[i] = log;
    sum += log;
    if (log !== 0) none = false;
  });
  return { byStation, sum, none };
}

/** Clockwise from the first bearing to the second, -180 to 180 degrees. */
export function turnFrom(firstDegrees: number, secondDegrees: number): number {
  return positive(secondDegrees - firstDegrees + 180) - 180;
}

function positive(degrees: number): number {
  return ((degrees % 360) + 360) % 360;
}
