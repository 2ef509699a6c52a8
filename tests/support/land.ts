import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import type { Topology } from "topojson-specification";
import { buildLandMask, type LandMask } from "#lib/core/geodesy/land-mask.ts";

/** The land that the program ships, for tests. */
export function shippedLand(): Topology {
  const path = createRequire(import.meta.url).resolve("world-atlas/land-50m.json");
  return JSON.parse(readFileSync(path, "utf8")) as Topology;
}

/** Land of invented outlines: longitude and latitude of each corner, the first repeated at the end. */
export function inventedLand(outlines: readonly (readonly [number, number])[][]): LandMask {
  return buildLandMask({
    type: "Topology",
    arcs: outlines.map((outline) => outline.map(([longitude, latitude]) => [longitude, latitude])),
    objects: { land: { type: "MultiPolygon", arcs: outlines.map((_, index) => [[index]]) } },
  });
}

/** A closed outline between two meridians and two parallels; from the western one eastward, also over 180. */
export function block(west: number, east: number, south: number, north: number): [number, number][] {
  return [
    [west, south],
    [east, south],
    [east, north],
    [west, north],
    [west, south],
  ];
}
