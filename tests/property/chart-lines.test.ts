import fc from "fast-check";
import { cellToLatLng, gridDisk, latLngToCell } from "h3-js";
import type { GeometryCollection, Topology } from "topojson-specification";
import { describe, expect, it } from "vitest";
import { baseMap } from "#lib/chart/base-map.ts";
import type { ChartLine, ChartPoint } from "#lib/chart/chart-point.ts";
import { areaCopies, lineCopies } from "#lib/chart/copies.ts";
import { cutAtEdges, EDGE_LATITUDE_DEGREES } from "#lib/chart/cut-at-edges.ts";
import { eventLayers } from "#lib/chart/event-layers.ts";
import { regionShape } from "#lib/chart/region-shape.ts";
import { sightLine } from "#lib/chart/sight-line.ts";
import { smoothClosedLine, smoothOpenLine } from "#lib/chart/smooth-line.ts";
import { buildSightTable } from "#lib/core/geodesy/build-sight-table.ts";
import { DEFAULT_SETTINGS } from "#lib/core/source/settings.ts";
import { regionGeometry } from "#lib/core/source/region-geometry.ts";
import type { Position } from "#lib/core/units/position.ts";
import { areaHolds, areaSquareMetres } from "#tests/support/chart-shapes.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { block, inventedLand, shippedLand } from "#tests/support/land.ts";
import { legBetween } from "#tests/support/simulator/ellipsoid.ts";

const at = (latitudeDegrees: number, longitudeDegrees: number): Position => ({ latitudeDegrees, longitudeDegrees });
const pairs = (line: ChartLine): { from: ChartPoint; to: ChartPoint }[] => line.slice(1).map((to, i) => ({ from: line[i] ?? to, to }));
/** What a tilt of 4 h per 0.03 Hz moves a ring by. */
const TILT_METRES = (((4 * 3600) / 0.03) * 9.80665) / (4 * Math.PI);

describe("a line on the chart", () => {
  it("is cut where it leaves the chart over a pole, and goes on where it comes back", () => {
    const overThePole: ChartLine = [[80, 10], [84, 10], [88, 20], [89, 150], [86, 180], [82, 190], [70, 190]];
    expect(cutAtEdges(overThePole)).toStrictEqual([
      [[80, 10], [84, 10], [85, 12.5]],
      [[85, 182.5], [82, 190], [70, 190]],
    ]);
    expect(cutAtEdges([[-88, 0], [-89, 90], [-87, 180]])).toStrictEqual([]);
    const inside: ChartLine = [[0, 0], [10, 10]];
    expect(cutAtEdges(inside)).toStrictEqual([inside]);
  });

  it("never lies beyond the chart's edges, and loses nothing that lies between them", () => {
    const points = fc.tuple(fc.integer({ min: -900, max: 900 }), fc.integer({ min: -3600, max: 3600 })).map(([latitude, longitude]): ChartPoint => [latitude / 10, longitude / 10]);
    fc.assert(
      fc.property(fc.array(points, { maxLength: 30 }), (line) => {
        const pieces = cutAtEdges(line);
        const inside = (sides: { from: ChartPoint; to: ChartPoint }[]): number =>
          sides.reduce((sum, { from, to }) => sum + Math.hypot(to[0] - from[0], to[1] - from[1]), 0);
        expect(pieces.flat().every(([latitude]) => Math.abs(latitude) <= EDGE_LATITUDE_DEGREES)).toBe(true);
        const kept = pairs(line).filter(({ from, to }) => Math.abs(from[0]) <= EDGE_LATITUDE_DEGREES && Math.abs(to[0]) <= EDGE_LATITUDE_DEGREES);
        expect(inside(pieces.flatMap(pairs))).toBeGreaterThanOrEqual(inside(kept) - 1e-6);
      }),
    );
  });

  it("is eased by no more than half a side, and keeps its ends", () => {
    const zigzag: ChartLine = Array.from({ length: 21 }, (_, i) => [i % 2 === 0 ? 0 : 1, i * 2]);
    const half = Math.hypot(1, 2) / 2;
    const eased = smoothOpenLine(zigzag);
    expect([eased[0], eased.at(-1)]).toStrictEqual([zigzag[0], zigzag.at(-1)]);
    for (const [y, x] of eased) expect(Math.min(...zigzag.map(([v, u]) => Math.hypot(y - v, x - u)))).toBeLessThanOrEqual(half + 1e-9);
    const inner = eased.slice(3, -3).map(([y]) => y);
    expectWithin(Math.max(...inner) - Math.min(...inner), 0, { absolute: 1e-9, unit: "degrees", because: "the middles of a zigzag's sides lie on a straight line" });

    const closed = smoothClosedLine([[0, 0], [0, 4], [4, 4], [4, 0], [0, 0]]);
    expect(closed[0]).toStrictEqual(closed.at(-1));
  });
});

describe("a region on the chart", () => {
  const RESOLUTION = 3;
  const DISKS = [
    { name: "in mid-ocean", centre: at(30, -40), pieces: 1 },
    { name: "across the 180th meridian", centre: at(40, 179.5), pieces: 2 },
    { name: "over the North Pole", centre: at(89, 60), pieces: 1 },
    { name: "over the South Pole", centre: at(-88, -150), pieces: 1 },
  ];
  const shapeOf = (centre: Position) => {
    const middle = latLngToCell(centre.latitudeDegrees, centre.longitudeDegrees, RESOLUTION);
    return { cells: gridDisk(middle, 8), around: gridDisk(middle, 13), shape: regionShape(regionGeometry(gridDisk(middle, 8))) };
  };

  it.each(DISKS)("holds its cells and no other: $name", ({ centre }) => {
    const { cells, around, shape } = shapeOf(centre);
    const inside = new Set(cells);
    const nearEdge = new Set(cells.flatMap((cell) => gridDisk(cell, 2)));
    for (const cell of around) {
      const [latitude, longitude] = cellToLatLng(cell);
      if (inside.has(cell)) expect(areaHolds(shape.area, at(latitude, longitude)), cell).toBe(true);
      else if (!nearEdge.has(cell)) expect(areaHolds(shape.area, at(latitude, longitude)), cell).toBe(false);
    }
  });

  it.each(DISKS)("has an outline without walls: $name", ({ centre, pieces }) => {
    const { outline } = shapeOf(centre).shape;
    expect(outline).toHaveLength(pieces);
    const walls = outline.flatMap(pairs).filter(({ from, to }) => {
      const alongMeridian = Math.abs(Math.abs(from[1]) - 180) < 1e-4 && Math.abs(to[1] - from[1]) < 1e-4;
      return alongMeridian || (Math.abs(from[0]) > 89.999 && Math.abs(to[0]) > 89.999);
    });
    expect(walls).toStrictEqual([]);
    const longest = Math.max(...outline.flatMap(pairs).map(({ from, to }) => legBetween(at(...from), at(...to)).distanceMetres));
    expect(longest, "a side of a cell is some 60 km long").toBeLessThan(120_000);
  });

  it("has the same outline from whichever vertex its lines are given", () => {
    const corners: [number, number][] = [[180, 10], [180, 20], [178, 21], [176, 20], [174, 15], [176, 10], [178, 9]];
    const outlines = corners.map((_, start) => {
      const turned = [...corners.slice(start), ...corners.slice(0, start)];
      const line = turned.concat(turned.slice(0, 1));
      return regionShape({ type: "MultiPolygon", coordinates: [[line]] }).outline;
    });
    for (const outline of outlines) expect(outline).toStrictEqual(outlines[0]);
    expect(outlines[0]?.map((piece) => [piece[0], piece.at(-1)])).toStrictEqual([[[20, 180], [10, 180]]]);
  });

  it("meets its copy across the 180th meridian", () => {
    const { outline, area } = shapeOf(at(40, 179.5)).shape;
    const ends = lineCopies(outline).flatMap((line) => [line[0], line.at(-1)]).flatMap((end) => (end === undefined ? [] : [end]));
    const onSeam = ends.filter(([, longitude]) => Math.abs(longitude - 180) < 1e-4);
    expect(onSeam).toHaveLength(4);
    for (const [latitude] of onSeam) expect(onSeam.filter(([other]) => Math.abs(other - latitude) < 1e-4)).toHaveLength(2);
    expect(areaCopies(area)).toHaveLength(3 * area.length);
  });
});

describe("copies within reach", () => {
  it("are those of all copies that come into it, in the same order", () => {
    const line = fc.array(fc.tuple(fc.double({ min: -85, max: 85, noNaN: true }), fc.double({ min: -190, max: 190, noNaN: true })), { minLength: 1, maxLength: 4 });
    fc.assert(
      fc.property(fc.array(line, { maxLength: 6 }), fc.integer({ min: -180, max: 180 }), fc.integer({ min: 1, max: 300 }), (lines, middleDegrees, degrees) => {
        const comesIn = (piece: readonly (readonly number[])[]): boolean => piece.some(([, longitude = NaN]) => Math.abs(longitude - middleDegrees) <= degrees);
        expect(lineCopies(lines, { middleDegrees, degrees })).toStrictEqual(lineCopies(lines).filter(comesIn));
        const area = lines.map((outer) => [outer, [[0, 0] as [number, number]]]);
        expect(areaCopies(area, { middleDegrees, degrees })).toStrictEqual(areaCopies(area).filter((polygon) => polygon.some(comesIn)));
      }),
    );
  });
});

describe("an event's layers", () => {
  const window = { centreLongitudeDegrees: 170 };
  const station = at(-17, 178);
  const estimate = {
    distanceMetres: 4e6,
    originEpochSeconds: 0,
    covariance: { distanceVariance: 0, originVariance: 0, distanceOriginCovariance: 0 },
    sharedShifts: [],
    bearing: null,
  };
  const geometry = regionGeometry(gridDisk(latLngToCell(-50, -170, 3), 3));
  const layers = eventLayers({
    window,
    settings: DEFAULT_SETTINGS,
    sightTables: new Map(),
    solution: {
      stations: [
        { id: "a", name: "A", position: station, outcome: { kind: "sent-in", estimate } },
        { id: "b", name: "B", position: station, outcome: { kind: "refused", code: "too-few-readings", message: "" } },
      ],
      answer: {
        outcome: "several",
        source: { position: at(-50, -170), originEpochSeconds: 0, originSigmaSeconds: 1, atPeak: true, onLand: false, bestInWater: null },
        regions: [0.5, 0.95, 0.9].map((probability) => ({ probability, areaSquareMetres: 1, geometry })),
        modes: [{ probability: 1, position: at(-50, -170), originEpochSeconds: 0 }],
        ruledOut: [{ position: at(10, -179), reason: "land" }],
        stations: [],
        crossings: [{ stations: ["a", "b"], points: [at(0, -20)] }],
        fit: null,
        drift: null,
        spreadRaisedBy: 2,
        warnings: [],
      },
      warnings: [],
    },
  });

  it("are drawn three times where they may run over the window's edge", () => {
    const shapes = [...layers.rings.flatMap(({ line, band }) => [line, band.flat()]), ...layers.regions.flatMap(({ area, outline }) => [area.flat(), outline]), ...layers.sightLines.map(({ open }) => open)];
    expect(shapes).toHaveLength(2 + 6 + 1);
    for (const lines of shapes) {
      const third = lines.length / 3;
      for (const [west, east] of [[0, third], [third, 2 * third]] as const) {
        const apart = (lines[west] ?? []).map(([, longitude], i) => Math.abs((lines[east]?.[i]?.[1] ?? NaN) - longitude - 360));
        expectWithin(Math.max(...apart), 0, { absolute: 1e-9, unit: "degrees", because: "rounding" });
      }
    }
  });

  it("hold one ring for each station that has one, its band by the spread that the misfit raised", () => {
    expect(layers.rings.map(({ stationId }) => stationId)).toStrictEqual(["a"]);
    const latitudes = (lines: ChartLine[]): number => Math.max(...lines.flat().map(([latitude]) => latitude));
    const [ring] = layers.rings;
    const widthMetres = legBetween(at(latitudes(ring?.line ?? []), 178), at(latitudes(ring?.band.flat() ?? []), 178)).distanceMetres;
    expectWithin(widthMetres, 2 * Math.hypot(150_000, 0.02 * 4e6, TILT_METRES), { relative: 0.01, unit: "m", because: "vertices a degree of azimuth apart" });
  });

  it("put the surest region on top, and every point in the window", () => {
    expect(layers.regions.map(({ probability }) => probability)).toStrictEqual([0.95, 0.9, 0.5]);
    expect([layers.source, layers.possibleSources[0]?.point, layers.ruledOut[0]?.point, layers.crossings[0]?.points[0]]).toStrictEqual([[-50, 190], [-50, 190], [10, 181], [0, 340]]);
  });
});

describe("the base map", () => {
  const topology = shippedLand() as Topology<{ land: GeometryCollection }>;
  const CENTRES = [0, 180, -75, 178];
  /** Places that any atlas shows well inside land or sea [source: common-knowledge]. */
  const LAND = [at(50, 20), at(-25, 135), at(65, 175), at(67, -177), at(-89, 30), at(-80, 100), at(0, 22), at(40, -100), at(73, -40)];
  const SEA = [at(0, -160), at(-15, -179.95), at(-30, 179.95), at(90, 0), at(-58, -65), at(40, 180), at(-60, 0), at(30, -45), at(0, 0)];

  it.each(CENTRES)("has land where land is and sea where sea is, with its middle at %s", (centreLongitudeDegrees) => {
    const { land } = baseMap({ centreLongitudeDegrees }, topology);
    expect(LAND.filter((place) => !areaHolds(land, place))).toStrictEqual([]);
    expect(SEA.filter((place) => areaHolds(land, place))).toStrictEqual([]);
    expectWithin(areaSquareMetres(land), 148.9e12, { relative: 0.02, unit: "m2", because: "the land's share of the Earth, from memory; the Ross and Ronne ice shelves are sea here" });
  });

  it.each(CENTRES)("draws no coast along the window's edges or over the pole, with its middle at %s", (centreLongitudeDegrees) => {
    const { coast } = baseMap({ centreLongitudeDegrees }, topology);
    const sides = coast.flatMap(pairs);
    expect(sides.length).toBeGreaterThan(10_000);
    expect(sides.filter(({ from, to }) => Math.abs(to[1] - from[1]) > 20)).toStrictEqual([]);
    const walls = sides.filter(({ from, to }) => [from, to].every(([, longitude]) => Math.abs(Math.abs(longitude - centreLongitudeDegrees) - 180) < 1e-6) && Math.abs(to[0] - from[0]) > 0.5);
    expect(walls).toStrictEqual([]);
  });
});

describe("a sight line", () => {
  const window = { centreLongitudeDegrees: 180 };

  it("runs along the equator to its source without a block, across 180", () => {
    const line = sightLine(window, { station: at(0, 170), source: at(0, -160), sight: null });
    expect([line.open[0], line.open.at(-1)].map((end) => end?.map(Math.round))).toStrictEqual([[0, 170], [0, 200]]);
    expect(line).toMatchObject({ beyond: [], blockedAt: null });
    expect(Math.max(...pairs(line.open).map(({ from, to }) => Math.abs(to[1] - from[1])))).toBeLessThan(1.1);
  });

  it("ends at the land that blocks it, and goes on beyond it to the source", () => {
    const land = inventedLand([block(185, 190, -20, 20)]);
    const station = at(0, 170);
    const line = sightLine(window, { station, source: at(0, -160), sight: buildSightTable({ station, land }) });
    expectWithin(line.blockedAt?.[1] ?? NaN, 185, { absolute: 0.5, unit: "degrees", because: "a table of bearings on the mean sphere" });
    expect(line.open.at(-1)).toStrictEqual(line.beyond[0]);
    expectWithin(line.beyond.at(-1)?.[1] ?? NaN, 200, { absolute: 1e-6, unit: "degrees", because: "rounding" });
  });
});
