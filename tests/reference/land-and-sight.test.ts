import { describe, expect, it } from "vitest";
import { z } from "zod";
import { buildSightTable } from "#lib/core/geodesy/build-sight-table.ts";
import { geodesicInverse } from "#lib/core/geodesy/geodesic.ts";
import { buildLandMask, isOcean, oceanFraction } from "#lib/core/geodesy/land-mask.ts";
import { visibleFraction } from "#lib/core/geodesy/sight-table.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { shippedLand } from "#tests/support/land.ts";
import { positionSchema, referenceTable } from "#tests/support/reference-table.ts";

const mask = buildLandMask(shippedLand());

describe("land and ocean", () => {
  const place = z.strictObject({
    place: z.string(),
    latitudeDegrees: z.number(),
    longitudeDegrees: z.number(),
    ocean: z.boolean(),
  });
  const { rows } = referenceTable("land-and-ocean", place);

  it("has 25 places", () => {
    expect(rows).toHaveLength(25);
  });
  it.each(rows)("$place: ocean $ocean", ({ latitudeDegrees, longitudeDegrees, ocean }) => {
    const position = { latitudeDegrees, longitudeDegrees };
    expect(isOcean(mask, position)).toBe(ocean);
    expect(oceanFraction({ mask, position, radiusMetres: 15_000 })).toBe(ocean ? 1 : 0);
  });
  it("covers 361.9 million km2 of 510.1 with ocean (charette-smith-2010; from memory)", () => {
    let ocean = 0;
    let all = 0;
    for (let latitudeDegrees = -89.75; latitudeDegrees < 90; latitudeDegrees += 0.5) {
      const weight = Math.cos((latitudeDegrees * Math.PI) / 180);
      for (let longitudeDegrees = -179.75; longitudeDegrees < 180; longitudeDegrees += 0.5) {
        all += weight;
        if (isOcean(mask, { latitudeDegrees, longitudeDegrees })) ocean += weight;
      }
    }
    const near = { absolute: 0.005, unit: "(fraction)", because: "half a degree apart; ice shelves and inland seas differ" };
    expectWithin(ocean / all, 361.9 / 510.1, near);
  });
});

describe("open and blocked ways over the ocean", () => {
  const way = z.strictObject({
    station: z.string(),
    source: z.string(),
    stationPosition: positionSchema,
    sourcePosition: positionSchema,
    open: z.boolean(),
  });
  const { rows, tolerance } = referenceTable("open-and-blocked-ways", way);

  it("are seventeen", () => {
    expect(rows).toHaveLength(17);
  });
  it.each(rows)("$station and $source: open $open", ({ stationPosition, sourcePosition, open }) => {
    const table = buildSightTable({ station: stationPosition, land: mask });
    const path = geodesicInverse({ from: stationPosition, to: sourcePosition });
    const fraction = visibleFraction({
      table,
      bearingDegrees: path.departsTowardDegrees,
      distanceMetres: path.distanceMetres,
      discRadiusMetres: 150_000,
    });
    expectWithin(fraction, open ? 1 : 0, tolerance);
  });
});
