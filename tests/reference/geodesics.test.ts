import { describe, expect, it } from "vitest";
import { z } from "zod";
import { turnDegrees } from "#lib/core/geodesy/bearing.ts";
import { HALF_GIRTH_METRES } from "#lib/core/geodesy/earth.ts";
import { geodesicDirect, geodesicInverse } from "#lib/core/geodesy/geodesic.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { referenceTable } from "#tests/support/reference-table.ts";

const inverseRow = z.object({
  lat1: z.number(),
  lon1: z.number(),
  azi1: z.number(),
  lat2: z.number(),
  lon2: z.number(),
  s12: z.number(),
});
const angle = { absolute: 1e-12, unit: "degrees", because: "the library's own tests allow 1e-13, and wrapping rounds" };
const positions = (row: z.output<typeof inverseRow>) => ({
  from: { latitudeDegrees: row.lat1, longitudeDegrees: row.lon1 },
  to: { latitudeDegrees: row.lat2, longitudeDegrees: row.lon2 },
});
const between = (fromDegrees: number, toDegrees: number) => turnDegrees({ fromDegrees, toDegrees });

describe("geodesics of the library's own table", () => {
  const { rows, tolerance } = referenceTable("geodesics", inverseRow.extend({ azi2: z.number() }));

  it("are twenty", () => {
    expect(rows).toHaveLength(20);
  });
  it.each(rows)("from $lat1 $lon1 to $lat2 $lon2", (row) => {
    const { from, to } = positions(row);
    const way = geodesicInverse({ from, to });
    expectWithin(way.distanceMetres, row.s12, tolerance);
    expectWithin(between(row.azi1, way.departsTowardDegrees), 0, angle);
    expectWithin(between(row.azi2, way.arrivesTowardDegrees), 0, angle);

    const end = geodesicDirect({ from, headsTowardDegrees: row.azi1, distanceMetres: row.s12 });
    expectWithin(end.position.latitudeDegrees, row.lat2, angle);
    expectWithin(between(row.lon2, end.position.longitudeDegrees), 0, angle);
    expectWithin(between(row.azi2, end.arrivesTowardDegrees), 0, angle);
  });
});

describe("the documentation's geodesic from Berkeley to Port Moresby", () => {
  const { rows, tolerance } = referenceTable("geodesic-berkeley", inverseRow);

  it("is one", () => {
    expect(rows).toHaveLength(1);
  });
  it.each(rows)("is $s12 m long and leaves toward $azi1", (row) => {
    const way = geodesicInverse(positions(row));
    expectWithin(way.distanceMetres, row.s12, tolerance);
    expectWithin(between(row.azi1, way.departsTowardDegrees), 0, angle);
  });
});

describe("half the girth", () => {
  it("is the way from pole to pole, two quadrants of 10 001 965.7293 m (published for WGS84; from memory)", () => {
    const pole = (latitudeDegrees: number) => ({ latitudeDegrees, longitudeDegrees: 0 });
    const millimetre = { absolute: 1e-3, unit: "m", because: "given to a tenth of a millimetre" };
    expectWithin(HALF_GIRTH_METRES, 2 * 10_001_965.7293, millimetre);
    expectWithin(geodesicInverse({ from: pole(-90), to: pole(90) }).distanceMetres, HALF_GIRTH_METRES, millimetre);
  });
});

describe("a latitude beyond the pole", () => {
  it("is refused by name", () => {
    const from = { latitudeDegrees: 95, longitudeDegrees: 0 };
    const to = { latitudeDegrees: 0, longitudeDegrees: 0 };
    expect(() => geodesicInverse({ from, to })).toThrow("Latitude must lie between -90 and 90 degrees; found 95.");
    expect(() => geodesicInverse({ from: to, to: from })).toThrow("found 95");
    expect(() => geodesicDirect({ from, headsTowardDegrees: 0, distanceMetres: 1 })).toThrow("found 95");
  });
});
