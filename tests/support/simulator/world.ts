import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import type { Position } from "#lib/core/units/position.ts";
import type { MultiPolygon, Polygon } from "geojson";
import { feature } from "topojson-client";
import type { GeometryCollection, Topology } from "topojson-specification";
import type { RandomStream } from "./random.ts";

/** Where there is sea, and which paths cross none but sea: after Natural Earth's 1:50 million land. */
export interface World {
  readonly isSea: (position: Position) => boolean;
  readonly isOpen: (path: { station: Position; storm: Position }) => boolean;
}

interface Edge {
  readonly west: number;
  readonly east: number;
  readonly westLatitude: number;
  readonly slope: number;
}

/** Seas that no ocean swell reaches, as [south, north, west, east]: storms are not drawn there. */
const INNER_SEAS: readonly (readonly [number, number, number, number])[] = [
  [30, 48, -5.5, 42],
  [36, 48, 46, 56],
  [53, 66, 9.5, 31],
  [51, 71, -96, -64.5],
  [12.5, 30, 32, 43.5],
  [23.5, 31, 47, 56.5],
];

export function readTopology(): Topology {
  return JSON.parse(readFileSync(createRequire(import.meta.url).resolve("world-atlas/land-50m.json"), "utf8")) as Topology;
}

export function readWorld(topology: Topology = readTopology()): World {
  const columns = edgesByDegree(topology);
  const isSea = (position: Position): boolean => !isInner(position) && !isLand(columns, position);
  return { isSea, isOpen: (path) => isOpenPath(isSea, path) };
}

/** Uniform over the sphere's sea. */
export function seaPoint(world: World, random: RandomStream): Position {
  for (;;) {
    const position = {
      latitudeDegrees: (Math.asin(random.between(-1, 1)) * 180) / Math.PI,
      longitudeDegrees: random.between(-180, 180),
    };
    if (world.isSea(position)) return position;
  }
}

/** The South Pole is land; each coast crossed on the way north from it changes land to sea or back. */
function isLand(columns: readonly (readonly Edge[])[], { latitudeDegrees, longitudeDegrees }: Position): boolean {
  let land = true;
  for (const edge of columns[Math.floor(longitudeDegrees) + 180] ?? []) {
    if (longitudeDegrees < edge.west || longitudeDegrees >= edge.east) continue;
    if (edge.westLatitude + edge.slope * (longitudeDegrees - edge.west) < latitudeDegrees) land = !land;
  }
  return land;
}

function isInner({ latitudeDegrees, longitudeDegrees }: Position): boolean {
  return INNER_SEAS.some(
    ([south, north, west, east]) => latitudeDegrees > south && latitudeDegrees < north && longitudeDegrees > west && longitudeDegrees < east,
  );
}

function edgesByDegree(topology: Topology): Edge[][] {
  const columns = Array.from({ length: 360 }, (): Edge[] => []);
  const land = feature(topology, topology.objects["land"] as GeometryCollection);
  for (const { geometry } of land.features) {
    for (const polygon of polygonsOf(geometry as Polygon | MultiPolygon)) {
      for (const ring of polygon) ring.forEach((end, i) => addEdge(columns, ring[i - 1], end));
    }
  }
  return columns;
}

function polygonsOf(geometry: Polygon | MultiPolygon): number[][][][] {
  return geometry.type === "Polygon" ? [geometry.coordinates] : geometry.coordinates;
}

function addEdge(columns: Edge[][], from: readonly number[] | undefined, to: readonly number[]): void {
  if (!from) return;
  const [x1 = NaN, y1 = NaN] = from;
  const [x2 = NaN, y2 = NaN] = to;
  if (y1 < -89.9 && y2 < -89.9) return; // the pole drawn as a line, no coast
  if (Math.abs(x2 - x1) <= 180) {
    place(columns, [x1, y1], [x2, y2]);
    return;
  }
  const turn = x2 > x1 ? -360 : 360; // crosses the 180th meridian: once on either side of the map
  place(columns, [x1, y1], [x2 + turn, y2]);
  place(columns, [x1 - turn, y1], [x2, y2]);
}

function place(columns: Edge[][], a: readonly [number, number], b: readonly [number, number]): void {
  const [[west, westLatitude], [east, eastLatitude]] = a[0] < b[0] ? [a, b] : [b, a];
  if (west === east) return;
  const edge: Edge = { west, east, westLatitude, slope: (eastLatitude - westLatitude) / (east - west) };
  for (let degree = Math.floor(west); degree < east; degree++) columns[degree + 180]?.push(edge);
}

const EARTH_METRES = 6371008.8;
const STEP_METRES = 20_000;
const OWN_COAST_METRES = 100_000;
const ISLAND_STEPS = 3;

/** Whether the great circle meets no land wider than an island (60 km), the station's own coast apart. */
function isOpenPath(isSea: (position: Position) => boolean, { station, storm }: { station: Position; storm: Position }): boolean {
  const a = unitVector(station);
  const b = unitVector(storm);
  const angle = Math.acos(a[0] * b[0] + a[1] * b[1] + a[2] * b[2]);
  const steps = Math.ceil((angle * EARTH_METRES) / STEP_METRES);
  let landSteps = 0;
  for (let step = Math.ceil(OWN_COAST_METRES / STEP_METRES); step <= steps; step++) {
    const fromA = Math.sin((1 - step / steps) * angle) / Math.sin(angle);
    const fromB = Math.sin((step / steps) * angle) / Math.sin(angle);
    const [x, y, z] = [fromA * a[0] + fromB * b[0], fromA * a[1] + fromB * b[1], fromA * a[2] + fromB * b[2]];
    const onTheWay = { latitudeDegrees: (Math.asin(z) * 180) / Math.PI, longitudeDegrees: (Math.atan2(y, x) * 180) / Math.PI };
    landSteps = isSea(onTheWay) ? 0 : landSteps + 1;
    if (landSteps >= ISLAND_STEPS) return false;
  }
  return true;
}

function unitVector({ latitudeDegrees, longitudeDegrees }: Position): readonly [number, number, number] {
  const phi = (latitudeDegrees * Math.PI) / 180;
  const lambda = (longitudeDegrees * Math.PI) / 180;
  return [Math.cos(phi) * Math.cos(lambda), Math.cos(phi) * Math.sin(lambda), Math.sin(phi)];
}
