import { cellToChildren, getRes0Cells, gridDisk, latLngToCell } from "h3-js";
import { describe, expect, it } from "vitest";
import { areaOf, centreOf } from "#lib/core/source/grid.ts";
import { regionGeometry } from "#lib/core/source/region-geometry.ts";
import type { Position } from "#lib/core/units/position.ts";
import { regionContains } from "#tests/support/coverage/region-contains.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { faultsOf, regionArea } from "#tests/support/region-checks.ts";

const at = (latitudeDegrees: number, longitudeDegrees: number): Position => ({ latitudeDegrees, longitudeDegrees });
const about = ({ latitudeDegrees, longitudeDegrees }: Position, level: number, rings: number) => gridDisk(latLngToCell(latitudeDegrees, longitudeDegrees, level), rings);

const areaOfAll = (cells: readonly string[]) => cells.reduce((sum, cell) => sum + areaOf(cell, centreOf(cell)), 0);

describe("the outline of cells", () => {
  const places: readonly [string, Position, number, number, number][] = [
    ["in mid-ocean", at(20, -150), 4, 6, 0.006],
    ["on the 180th meridian", at(-20, 180), 4, 6, 0.006],
    ["on the 180th meridian in the far north", at(75, -179.9), 3, 5, 0.006],
    ["round the north pole", at(90, 0), 3, 6, 0.006],
    ["round the south pole", at(-90, 0), 3, 4, 0.006],
    ["with the north pole in one cell", at(90, 0), 2, 0, 0.25],
    ["beside a pole and across the meridian", at(86, 178), 3, 3, 0.006],
    ["about a pentagon", at(10.45, 58.16), 3, 4, 0.006],
  ];
  it.each(places)("is fit for a map %s", (_, place, level, rings, share) => {
    const cells = about(place, level, rings);
    const geometry = regionGeometry(cells);
    expect(faultsOf(geometry)).toEqual([]);
    const because = "a cell's sides are great circles; straight on the map they bulge, and round a pole by much";
    expectWithin(regionArea(geometry), areaOfAll(cells), { relative: share, unit: "m2", because });
    const missed = cells.map(centreOf).filter((centre) => Math.abs(centre.longitudeDegrees) < 179.99 && !regionContains(geometry, centre));
    expect(missed).toEqual([]);
    const outside = about(place, level, rings + 2).filter((cell) => !cells.includes(cell)).map(centreOf);
    expect(outside.filter((centre) => regionContains(geometry, centre))).toEqual([]);
  });

  it("leaves holes out, clockwise", () => {
    const cells = about(at(0, -100), 4, 5).filter((cell) => !about(at(0, -100), 4, 2).includes(cell));
    const geometry = regionGeometry(cells);
    expect(geometry.coordinates.map((rings) => rings.length)).toEqual([2]);
    expect(faultsOf(geometry)).toEqual([]);
    expect(regionContains(geometry, at(0, -100))).toBe(false);
    expectWithin(regionArea(geometry), areaOfAll(cells), { relative: 0.003, unit: "m2", because: "bent sides" });
  });

  it("has a polygon for each part", () => {
    const geometry = regionGeometry([...about(at(0, -100), 4, 2), ...about(at(40, 20), 4, 2)]);
    expect(geometry.coordinates).toHaveLength(2);
    expect(faultsOf(geometry)).toEqual([]);
  });

  it("is kept to a metre, and empty for no cells", () => {
    const [[[[x = NaN, y = NaN] = []] = []] = []] = regionGeometry(about(at(20, -150), 5, 1)).coordinates;
    expect([x, y].map((degrees) => Number(degrees.toFixed(5)))).toEqual([x, y]);
    expect(regionGeometry([])).toEqual({ type: "MultiPolygon", coordinates: [] });
  });

  it("is fit for a map over a half of the Earth, and over a belt right round it", () => {
    const all = getRes0Cells().flatMap((cell) => cellToChildren(cell, 2));
    for (const holds of [
      ({ latitudeDegrees }: Position) => latitudeDegrees > 10,
      ({ latitudeDegrees }: Position) => latitudeDegrees < -35,
      ({ latitudeDegrees }: Position) => Math.abs(latitudeDegrees) < 25,
      ({ longitudeDegrees }: Position) => Math.abs(longitudeDegrees) > 100,
    ]) {
      const cells = all.filter((cell) => holds(centreOf(cell)));
      const geometry = regionGeometry(cells);
      expect(faultsOf(geometry)).toEqual([]);
      expectWithin(regionArea(geometry), areaOfAll(cells), { relative: 0.003, unit: "m2", because: "bent sides" });
    }
  });
});
