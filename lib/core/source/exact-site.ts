import { geodesicDirect, geodesicInverse } from "../geodesy/geodesic.ts";
import type { Position } from "../units/position.ts";
import type { Network } from "./network.ts";
import { bearingTerms, type Site } from "./site.ts";

/** A candidate point with geodesics to the last millimetre. [source: karney-2013] */
export function exactSite(network: Network, position: Position): Site {
  const geodesics = network.arrivals.map((arrival) => geodesicInverse({ from: position, to: arrival.position }));
  const bearings = Float64Array.from(geodesics, (geodesic) => geodesic.arrivesTowardDegrees + 180);
  return {
    distances: Float64Array.from(geodesics, (geodesic) => geodesic.distanceMetres),
    azimuths: Float64Array.from(geodesics, (geodesic) => (geodesic.departsTowardDegrees * Math.PI) / 180),
    bearings,
    logBearing: bearingTerms(network, bearings),
  };
}

/** The point a step east and north (metres) away, along the geodesic that leaves in that direction. */
export function stepped(position: Position, step: { readonly east: number; readonly north: number }): Position {
  const distanceMetres = Math.hypot(step.east, step.north);
  if (distanceMetres === 0) return position;
  return geodesicDirect({ from: position, headsTowardDegrees: (Math.atan2(step.east, step.north) * 180) / Math.PI, distanceMetres }).position;
}
