import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { buildSightTable } from "#lib/core/geodesy/build-sight-table.ts";
import { connectedOcean } from "#lib/core/geodesy/connected-ocean.ts";
import { MEAN_RADIUS_METRES } from "#lib/core/geodesy/earth.ts";
import { buildLandMask, isOcean, oceanFraction } from "#lib/core/geodesy/land-mask.ts";
import { visibleFraction, type SightTable } from "#lib/core/geodesy/sight-table.ts";
import { headingVector, sphericalDirect, sphericalFrame } from "#lib/core/geodesy/spherical-frame.ts";
import type { Position } from "#lib/core/units/position.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { block, inventedLand } from "#tests/support/land.ts";

const METRES_PER_DEGREE = (MEAN_RADIUS_METRES * Math.PI) / 180;
const at = (latitudeDegrees: number, longitudeDegrees: number): Position => ({ latitudeDegrees, longitudeDegrees });
const fraction = (absolute: number, because: string) => ({ absolute, unit: "(fraction)", because });

describe("a mask of invented land", () => {
  const mask = inventedLand([
    block(30, 40, -20, 20),
    block(170, -170, 40, 50), // over the 180th meridian
    [[-180, -80], [-90, -78], [0, -80], [90, -82], [180, -80], [-180, -80]], // round the south pole
    block(60, 80, 20, 40),
    block(-180, -175, 60, 70), // from the 180th meridian on
    block(65, 75, 25, 35), // a sea inside the last, which no ocean reaches
  ]);

  it.each([
    [at(0, 35), false],
    [at(19.9, 30.1), false],
    [at(20.1, 35), true],
    [at(0, 29.9), true],
    [at(45, 175), false],
    [at(45, -175), false],
    [at(45, 180), false],
    [at(45, 169.9), true],
    [at(65, -179.95), false],
    [at(65, 179.95), true],
    [at(59.95, 179.95), true],
    [at(45, -169.9), true],
    [at(45, 0), true],
    [at(-89, 10), false],
    [at(-83, -179.9), false],
    [at(-77, -90), true],
    [at(-79, -90), false],
    [at(-79, 179.9), true],
    [at(22, 62), false],
    [at(30, 70), false],
    [at(90, 0), true],
    [at(-90, 0), false],
  ])("%o is ocean: %s", (position, ocean) => {
    expect(isOcean(mask, position)).toBe(ocean);
    expect(isOcean(mask, at(position.latitudeDegrees, position.longitudeDegrees + 360))).toBe(ocean);
    expect(isOcean(mask, at(position.latitudeDegrees, position.longitudeDegrees - 360))).toBe(ocean);
  });

  it("takes an inland sea for ocean only where a strait joins it", () => {
    const shut = [block(0, 10, 0, 10), block(2, 8, 2, 8)];
    expect(isOcean(inventedLand(shut), at(5, 5))).toBe(false);
    expect(isOcean(inventedLand([...shut, block(4.9, 5.1, 8, 10)]), at(5, 5))).toBe(true);
  });

  it("joins water over sides, corners and the edge of the map", () => {
    const joined = (water: readonly (readonly [number, number])[][]) =>
      connectedOcean({
        water: water.map((runs, row) => runs.map(([first, last]) => ({ row, first, last }))),
        columns: 10,
        seed: { row: 0, column: 3 },
      }).map(({ row, first }) => [row, first]);
    expect(joined([[[2, 4]], [[4, 5], [8, 8]]])).toEqual([[0, 2], [1, 4]]);
    expect(joined([[[2, 4]], [[5, 6]]])).toEqual([[0, 2], [1, 5]]);
    expect(joined([[[2, 4]], [[0, 1]]])).toEqual([[0, 2], [1, 0]]);
    expect(joined([[[2, 4]], [[6, 7]]])).toEqual([[0, 2]]);
    expect(joined([[[0, 4], [9, 9]], [[5, 7]]])).toEqual([[0, 0], [0, 9], [1, 5]]);
    expect(joined([[[2, 9]], [[0, 0], [5, 5]]])).toEqual([[0, 2], [1, 5], [1, 0]]);
    expect(joined([[[5, 6]]])).toEqual([]);
  });

  it("finds no land under another name, and says so", () => {
    expect(() => buildLandMask({ type: "Topology", arcs: [], objects: {} })).toThrow("no polygons");
  });

  it("halves a disc on a straight coast, anywhere along it", () => {
    fc.assert(
      fc.property(fc.double({ min: -15, max: 15, noNaN: true }), (latitudeDegrees) => {
        const half = oceanFraction({ mask, position: at(latitudeDegrees, 30), radiusMetres: 150_000 });
        expectWithin(half, 0.5, fraction(3 / 19, "three of nineteen points lie on the coast itself"));
      }),
    );
    expect(oceanFraction({ mask, position: at(0, 35), radiusMetres: 150_000 })).toBe(0);
    expect(oceanFraction({ mask, position: at(0, -100), radiusMetres: 150_000 })).toBe(1);
  });
});

describe("the sight of a station", () => {
  const near = { absolute: 15_000, unit: "m", because: "steps of 15 km" };
  const blockAt = (table: SightTable, bearing: number) => table.firstBlockMetres[bearing / table.stepDegrees] ?? NaN;

  it("ends where a wall of land begins", () => {
    const land = inventedLand([block(30, 40, -20, 20)]);
    const table = buildSightTable({ station: at(0, 0), land });
    expect(table.firstBlockMetres).toHaveLength(720);
    expectWithin(blockAt(table, 90), 30 * METRES_PER_DEGREE, near);
    expect(blockAt(table, 0)).toBe(Infinity);
    // the long way round to the wall's other side is beyond half the girth
    expect(blockAt(table, 270)).toBe(Infinity);
    // great circle through 30 E at 10 N: tan(10) = tan(elevation) sin(30), by Napier's rule
    const elevation = (Math.atan(Math.tan(Math.PI / 18) / Math.sin(Math.PI / 6)) * 180) / Math.PI;
    const bearing = Math.round(2 * (90 - elevation)) / 2;
    const along = (Math.acos(Math.cos(Math.PI / 6) * Math.cos(Math.PI / 18)) * 180) / Math.PI;
    expectWithin(blockAt(table, bearing), along * METRES_PER_DEGREE, { ...near, absolute: 30_000 });
  });

  it("passes an island shorter than 60 km, and not one of 200 km", () => {
    const small = buildSightTable({ station: at(0, 0), land: inventedLand([block(30, 30.4, -1, 1)]) });
    expect(blockAt(small, 90)).toBe(Infinity);
    const two = buildSightTable({ station: at(0, 0), land: inventedLand([block(30, 30.4, -1, 1), block(33, 33.4, -1, 1)]) });
    expect(blockAt(two, 90)).toBe(Infinity);
    const large = buildSightTable({ station: at(0, 0), land: inventedLand([block(30, 32, -1, 1)]) });
    expectWithin(blockAt(large, 90), 30 * METRES_PER_DEGREE, near);
    const strict = { station: at(0, 0), land: inventedLand([block(30, 30.4, -1, 1)]), islandMetres: 20_000 };
    expectWithin(blockAt(buildSightTable(strict), 90), 30 * METRES_PER_DEGREE, near);
  });

  it("passes its own coast, and not what lies behind it", () => {
    const coast = inventedLand([block(-0.5, 0.8, -5, 5)]);
    expect(blockAt(buildSightTable({ station: at(0, 0), land: coast }), 90)).toBe(Infinity);
    const continent = inventedLand([block(-0.5, 20, -5, 5)]);
    expectWithin(blockAt(buildSightTable({ station: at(0, 0), land: continent }), 90), 105_000, near);
    expect(blockAt(buildSightTable({ station: at(0, 0), land: continent }), 270)).toBe(Infinity);
  });

  it("reaches over the pole and the 180th meridian", () => {
    const land = inventedLand([block(-175, -165, -10, 10)]);
    const over180 = buildSightTable({ station: at(0, 150), land });
    expectWithin(blockAt(over180, 90), 35 * METRES_PER_DEGREE, near);
    const overPole = buildSightTable({ station: at(60, 10), land });
    expectWithin(blockAt(overPole, 0), 110 * METRES_PER_DEGREE, near);
  });
});

describe("the visible fraction of a disc", () => {
  /** A table that one sector of land blocks at one distance. */
  const sector = (from: number, to: number, blockMetres: number): SightTable => ({
    stepDegrees: 0.5,
    firstBlockMetres: Float64Array.from({ length: 720 }, (_, index) =>
      index / 2 >= from && index / 2 <= to ? blockMetres : Infinity,
    ),
  });

  it("is all or nothing well off a block", () => {
    const table = sector(80, 100, 5e6);
    const seen = (bearingDegrees: number, distanceMetres: number) =>
      visibleFraction({ table, bearingDegrees, distanceMetres, discRadiusMetres: 150_000 });
    expect(seen(90, 4.8e6)).toBe(1);
    expect(seen(90, 5.2e6)).toBe(0);
    expect(seen(0, 9e6)).toBe(1);
    expect(seen(359.9, 9e6)).toBe(1);
    expectWithin(seen(90, 5e6), 0.5, fraction(0.02, "half of the disc lies before the block"));
    expectWithin(seen(80, 9e6), 0.5, fraction(0.15, "half of the disc lies beside the block, to a bearing's width"));
  });

  it("is what falls in sight of points strewn evenly over the disc", () => {
    const sunflower = (radiusRadians: number, count: number) =>
      Array.from({ length: count }, (_, index) => ({
        arc: Math.acos(1 - ((index + 0.5) / count) * (1 - Math.cos(radiusRadians))),
        heading: index * 137.507_764,
      }));
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 359.99, noNaN: true }),
        fc.oneof(fc.double({ min: 0, max: 2.001e7, noNaN: true }), fc.constantFrom(0, 50_000, 1e5, 1.99e7, 1.995e7, 2.0015e7)),
        fc.double({ min: 100_000, max: 600_000, noNaN: true }),
        fc.double({ min: 5, max: 355, noNaN: true }),
        fc.double({ min: -1, max: 1, noNaN: true }),
        (bearingDegrees, distanceMetres, discRadiusMetres, width, offset) => {
          const edge = (bearingDegrees + 10 * offset + 360) % 360;
          const blockMetres = Math.max(0, distanceMetres + offset * discRadiusMetres);
          const table = sector(edge, edge + width, blockMetres);
          const station = sphericalFrame(at(0, 0));
          const heading = headingVector(station, bearingDegrees);
          const centre = sphericalFrame(sphericalDirect(station, heading, distanceMetres / MEAN_RADIUS_METRES));
          const points = sunflower(discRadiusMetres / MEAN_RADIUS_METRES, 4000);
          const inSight = points.filter((point) => {
            const place = sphericalDirect(centre, headingVector(centre, point.heading), point.arc);
            const phi = (place.latitudeDegrees * Math.PI) / 180;
            const lambda = (place.longitudeDegrees * Math.PI) / 180;
            const away = Math.atan2(Math.hypot(Math.sin(phi), Math.cos(phi) * Math.sin(lambda)), Math.cos(phi) * Math.cos(lambda));
            const bearing = (Math.atan2(Math.cos(phi) * Math.sin(lambda), Math.sin(phi)) * 180) / Math.PI;
            const nearest = Math.round(((bearing + 360) % 360) / 0.5) % 720;
            return away * MEAN_RADIUS_METRES <= (table.firstBlockMetres[nearest] ?? NaN);
          });
          const fromPoints = inSight.length / points.length;
          const found = visibleFraction({ table, bearingDegrees, distanceMetres, discRadiusMetres });
          const subtends = (2 * discRadiusMetres) / (MEAN_RADIUS_METRES * Math.sin(distanceMetres / MEAN_RADIUS_METRES));
          const bearings = Math.max(1, ((subtends * 180) / Math.PI) * 2);
          const coarse = fraction(0.03 + 0.6 / bearings, "a bearing's share of the disc, and 4000 points");
          expectWithin(found, fromPoints, coarse);
        },
      ),
    );
  });

  it("weighs each bearing by the disc's chord along it", () => {
    // A fine table, blocked beyond four fifths of the disc's half width on one side: a circular segment is hidden.
    const radius = 600_000 / MEAN_RADIUS_METRES;
    const edgeDegrees = (Math.asin(0.8 * radius) * 180) / Math.PI; // seen from a quarter turn away
    const table: SightTable = {
      stepDegrees: 0.05,
      firstBlockMetres: Float64Array.from({ length: 7200 }, (_, index) => {
        const bearing = index * 0.05;
        return bearing > 90 + edgeDegrees && bearing < 120 ? 1e6 : Infinity;
      }),
    };
    const distanceMetres = 90 * METRES_PER_DEGREE;
    const found = visibleFraction({ table, bearingDegrees: 90, distanceMetres, discRadiusMetres: 600_000 });
    const segment = (Math.acos(0.8) - 0.8 * 0.6) / Math.PI;
    expectWithin(1 - found, segment, fraction(0.004, "bearings of 0.05 degrees; the sphere's curvature is less"));
  });

  it("sees a disc between two bearings by the nearer of them", () => {
    const table = sector(90, 90, 1e6);
    const seen = (bearingDegrees: number, distanceMetres = 8e6) =>
      visibleFraction({ table, bearingDegrees, distanceMetres, discRadiusMetres: 5000 });
    expect(seen(90.1)).toBe(0);
    expect(seen(90.4)).toBe(1);
    expect(seen(90.1, 0.9e6)).toBe(1);
    expect(seen(89.9)).toBe(0);
  });
});

describe("a disc cut by a straight coast", () => {
  const quarter = inventedLand([block(0, 60, 0, 60)]); // land to the north-east of where the meridian meets the equator
  /** Mean over four discs about a place, since a disc's middle row of points lies on one side of a coast or the other. */
  const shareAt = ({ latitudeDegrees, longitudeDegrees }: Position) =>
    [[-1, -1], [-1, 1], [1, -1], [1, 1]].reduce((sum, [north = NaN, east = NaN]) => {
      const position = at(latitudeDegrees + 0.06 * north, longitudeDegrees + 0.06 * east);
      return sum + (1 - oceanFraction({ mask: quarter, position, radiusMetres: 150_000 })) / 4;
    }, 0);

  it.each([
    ["to the west", at(20, 0), 0.5],
    ["to the south", at(0, 20), 0.5],
    ["to the east", at(20, 60), 0.5],
    ["at its corner", at(0, 0), 0.25],
    ["far inland", at(30, 30), 1],
    ["far off", at(-30, -30), 0],
  ])("is land by its share: %s", (_, position, share) => {
    expectWithin(shareAt(position), share, fraction(0.03, "nineteen points, each for an equal area"));
  });
});

describe("a disc too small for any bearing of the table", () => {
  const tableAt = (metres: number): SightTable => ({ stepDegrees: 0.5, firstBlockMetres: new Float64Array(720).fill(metres) });
  const seen = (bearingDegrees: number, blockMetres: number) =>
    visibleFraction({ table: tableAt(blockMetres), bearingDegrees, distanceMetres: 5_000_000, discRadiusMetres: 1000 });

  it.each([100.2, 0.2, 359.8, -0.2, -120.3])("is seen whole or not at all by its middle, on bearing %d", (bearingDegrees) => {
    expect(seen(bearingDegrees, 5_000_500)).toBe(1);
    expect(seen(bearingDegrees, 4_999_500)).toBe(0);
  });
});
