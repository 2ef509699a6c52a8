import { getPentagons, gridDisk } from "h3-js";
import { describe, expect, it } from "vitest";
import { areaOf, centreOf, childrenOf, FIRST_LEVEL, firstCells, LAST_LEVEL, reachMetres, spacingMetres } from "#lib/core/source/grid.ts";
import { MEAN_RADIUS_METRES } from "#lib/core/geodesy/earth.ts";
import type { Position } from "#lib/core/units/position.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { legBetween } from "#tests/support/simulator/ellipsoid.ts";

/** Mean edges of hexagons (m) by resolution, as the documentation of h3 tabulates them. */
const MEAN_EDGE_METRES = [1_281_256.011, 483_056.8391, 182_512.9565, 68_979.22179, 26_071.75968, 9_854.09099, 3_724.532667];

function arcMetres(from: Position, to: Position): number {
  const radian = Math.PI / 180;
  const north = Math.sin(((to.latitudeDegrees - from.latitudeDegrees) * radian) / 2);
  const east = Math.sin(((to.longitudeDegrees - from.longitudeDegrees) * radian) / 2);
  const chord = north ** 2 + Math.cos(from.latitudeDegrees * radian) * Math.cos(to.latitudeDegrees * radian) * east ** 2;
  return 2 * MEAN_RADIUS_METRES * Math.asin(Math.sqrt(chord));
}

/** The descendants of a cell at a level that lie farthest from it; those that no child can carry as far are left early. */
function farthestDescendant(cell: string, level: number, to: number): Position {
  const centre = centreOf(cell);
  let front = [{ cell, far: 0 }];
  for (let below = level + 1; below <= to; below += 1) {
    const next = front.flatMap(({ cell: parent }) => childrenOf(parent)).map((child) => ({ cell: child, far: arcMetres(centre, centreOf(child)) }));
    const top = Math.max(...next.map(({ far }) => far));
    front = next.filter(({ far }) => far > top - 1.3 * (MEAN_EDGE_METRES[below] ?? NaN));
  }
  return centreOf(front.reduce((best, one) => (one.far > best.far ? one : best)).cell);
}

/** Farthest over cells, in mean edges of their level, on the ellipsoid. */
function farthestInEdges(cells: readonly string[], level: number, to: number): number {
  const farthest = cells.map((cell) => legBetween(centreOf(cell), farthestDescendant(cell, level, to)).distanceMetres);
  return Math.max(...farthest) / (MEAN_EDGE_METRES[level] ?? NaN);
}

/** All cells of the two coarse levels; below, the pentagons with four rings of neighbours and what lies far from any. */
const CELLS: readonly (readonly string[])[] = [[], firstCells(), firstCells().flatMap(childrenOf), nearPentagons(3), nearPentagons(4), nearPentagons(5)];

function nearPentagons(level: number): string[] {
  const far = firstCells().filter((_, index) => index % 7 === 0).map((cell) => descendantOf(cell, level));
  return [...new Set([...getPentagons(level).flatMap((cell) => gridDisk(cell, 4)), ...far])];
}

function descendantOf(cell: string, level: number): string {
  let found = cell;
  for (let below = FIRST_LEVEL; below < level; below += 1) found = childrenOf(found).at(-1) ?? found;
  return found;
}

describe("the grid of the search", () => {
  it("starts from 842 cells, twelve of them pentagons, that cover the Earth", () => {
    const cells = firstCells();
    expect(cells).toHaveLength(842);
    expect(cells.filter((cell) => childrenOf(cell).length === 6)).toHaveLength(12);
    const area = cells.reduce((sum, cell) => sum + areaOf(cell, centreOf(cell)), 0);
    const close = { relative: 1e-3, unit: "(ratio)", because: "the ellipsoid's share is taken at each cell's centre" };
    expectWithin(area / 1e6, 510_065_621.724, close); // WGS84; published, from memory
  });

  it("is as fine as it says, by neighbours far from the pentagons", () => {
    for (let level = FIRST_LEVEL; level <= LAST_LEVEL; level += 1) {
      expectWithin(spacingMetres(level), (MEAN_EDGE_METRES[level] ?? NaN) * Math.sqrt(3), { relative: 2e-4, unit: "m", because: "kept to the metre or finer" });
      const cell = descendantOf(firstCells()[400] ?? "", level);
      const apart = gridDisk(cell, 1).filter((other) => other !== cell).map((other) => arcMetres(centreOf(cell), centreOf(other)));
      const mean = apart.reduce((sum, metres) => sum + metres / apart.length, 0);
      expectWithin(mean, spacingMetres(level), { relative: 0.25, unit: "m", because: "cells vary 1.9-fold in area at one level" });
    }
  });

  /** What was measured, from every level as far down as it goes: the overhang grows by less at each step. */
  const mostByDepth = [0, 0.724, 0.986, 1.088, 1.127, 1.139];
  const steps = CELLS.flatMap((cells, level) => mostByDepth.map((most, depth) => ({ level, depth, most, cells })))
    .filter(({ level, depth }) => level >= FIRST_LEVEL && depth > 0 && level + depth <= LAST_LEVEL);

  it("is measured over fifteen pairs of levels", () => {
    expect(steps).toHaveLength(15);
  });
  it.each(steps)("carries no centre further than $most mean edges from level $level, $depth down", ({ level, depth, most, cells }) => {
    const farthest = farthestInEdges(cells, level, level + depth);
    expect(farthest).toBeLessThan(most);
    expect(farthest).toBeGreaterThan(0.79 * most);
    expect(farthest * (MEAN_EDGE_METRES[level] ?? NaN)).toBeLessThan(reachMetres(level));
  });
});
