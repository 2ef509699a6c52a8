import type { Position } from "../units/position.ts";
import { MEAN_RADIUS_METRES } from "./earth.ts";
import { maskColumn, maskRow, oceanAt, type LandMask } from "./land-mask.ts";
import type { SightTable } from "./sight-table.ts";
import { headingVector, sphericalFrame, type SphericalFrame, type Vector } from "./spherical-frame.ts";

const STEP_DEGREES = 0.5;
const STEP_METRES = 15_000;
const STEPS = Math.floor((Math.PI * MEAN_RADIUS_METRES) / STEP_METRES);

/**
 * How far a station sees over water, by marching along great circles of the mean sphere in steps of 15 km, on bearings
 * half a degree apart. A run of land shorter than `islandMetres` is passed, since swell closes behind it; land within
 * `stationToleranceMetres` is the station's own coast and is ignored. Distances of land are right to a step and, with
 * the sphere for the ellipsoid, 0.6 %. [source: snodgrass-1966]
 */
export function buildSightTable(view: {
  station: Position;
  land: LandMask;
  stationToleranceMetres?: number;
  islandMetres?: number;
}): SightTable {
  const { station, land, stationToleranceMetres = 100_000, islandMetres = 60_000 } = view;
  const frame = sphericalFrame(station);
  const stepsOut = {
    land,
    firstStep: Math.floor(stationToleranceMetres / STEP_METRES) + 1,
    blockingSteps: Math.max(1, Math.ceil(islandMetres / STEP_METRES)),
    arcs: arcsOfSteps(),
  };
  const firstBlockMetres = Float64Array.from({ length: 360 / STEP_DEGREES }, (_, index) =>
    firstBlock(frame, headingVector(frame, index * STEP_DEGREES), stepsOut),
  );
  return { stepDegrees: STEP_DEGREES, firstBlockMetres };
}

interface March {
  readonly land: LandMask;
  readonly firstStep: number;
  readonly blockingSteps: number;
  readonly arcs: readonly { readonly sin: number; readonly cos: number }[];
}

function firstBlock({ up }: SphericalFrame, heading: Vector, march: March): number {
  const { land, firstStep, blockingSteps, arcs } = march;
  let landSteps = 0;
  for (let step = firstStep; step < arcs.length; step += 1) {
    const { sin, cos } = arcs[step] ?? { sin: NaN, cos: NaN };
    const latitude = Math.asin(up.z * cos + heading.z * sin);
    const longitude = Math.atan2(up.y * cos + heading.y * sin, up.x * cos + heading.x * sin);
    const wet = oceanAt(land, maskRow((latitude * 180) / Math.PI), maskColumn((longitude * 180) / Math.PI));
    landSteps = wet ? 0 : landSteps + 1;
    if (landSteps === blockingSteps) return (step - blockingSteps + 1) * STEP_METRES;
  }
  return Infinity;
}

function arcsOfSteps(): { sin: number; cos: number }[] {
  return Array.from({ length: STEPS + 1 }, (_, step) => {
    const arc = (step * STEP_METRES) / MEAN_RADIUS_METRES;
    return { sin: Math.sin(arc), cos: Math.cos(arc) };
  });
}
