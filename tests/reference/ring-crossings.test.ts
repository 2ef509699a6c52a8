import { describe, expect, it } from "vitest";
import { z } from "zod";
import { geodesicInverse } from "#lib/core/geodesy/geodesic.ts";
import { ringCrossings } from "#lib/core/geodesy/ring-crossings.ts";
import { sphericalCrossings } from "#lib/core/geodesy/spherical-crossings.ts";
import type { Position } from "#lib/core/units/position.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { positionSchema, referenceFacts, referenceTable } from "#tests/support/reference-table.ts";

describe("rings on a sphere, by hand", () => {
  const ring = z.strictObject({ centre: positionSchema, radiusDegrees: z.number() });
  const row = z.strictObject({
    first: ring,
    second: ring,
    kind: z.enum(["cross", "touch", "apart", "same-circle"]),
    points: z.array(positionSchema).default([]),
    gapDegrees: z.number().optional(),
  });
  const { rows, tolerance } = referenceTable("rings-on-a-sphere", row);

  it("are seven", () => {
    expect(rows).toHaveLength(7);
  });
  it.each(rows)("$kind: radii $first.radiusDegrees and $second.radiusDegrees degrees", ({ first, second, kind, points, gapDegrees }) => {
    const found = sphericalCrossings({ first, second });
    expect(found.kind).toBe(kind);
    const foundPoints: readonly Position[] = "points" in found ? found.points : [];
    expect(foundPoints).toHaveLength(points.length);
    for (const [index, point] of points.entries()) {
      expectWithin(foundPoints[index]?.latitudeDegrees ?? NaN, point.latitudeDegrees, tolerance);
      expectWithin(foundPoints[index]?.longitudeDegrees ?? NaN, point.longitudeDegrees, tolerance);
    }
    if (gapDegrees !== undefined) expectWithin("gapDegrees" in found ? found.gapDegrees : NaN, gapDegrees, tolerance);
  });
});

describe("rings about the storm of February 2004 on the ellipsoid", () => {
  const mirrors = referenceTable(
    "storm-february-2004",
    z.strictObject({ first: z.string(), second: z.string(), mirror: positionSchema }),
  );
  const receiver = z.strictObject({ id: z.string(), position: positionSchema, distanceMetres: z.number() });
  const { storm, receivers } = referenceFacts(
    "storm-february-2004",
    z.object({ storm: positionSchema, receivers: z.array(receiver) }),
  );
  const ringOf = (id: string) => {
    const found = receivers.find((one) => one.id === id);
    if (found === undefined) throw new Error(`no receiver ${id}`);
    return { centre: found.position, radiusMetres: found.distanceMetres };
  };

  it("have three receivers and three mirror points", () => {
    expect(receivers).toHaveLength(3);
    expect(mirrors.rows).toHaveLength(3);
  });
  it.each(receivers)("$id is as far from the storm as computed", ({ position, distanceMetres }) => {
    const centimetre = { absolute: 0.01, unit: "m", because: "positions are given to 1e-7 degrees" };
    expectWithin(geodesicInverse({ from: position, to: storm }).distanceMetres, distanceMetres, centimetre);
  });
  it.each(mirrors.rows)("$first and $second cross at the storm and at the mirror point", ({ first, second, mirror }) => {
    const found = ringCrossings({ first: ringOf(first), second: ringOf(second) });
    expect(found.kind).toBe("cross");
    const points: readonly Position[] = "points" in found ? found.points : [];
    const missOf = (to: Position) => Math.min(...points.map((from) => geodesicInverse({ from, to }).distanceMetres));
    const metre = { absolute: 1, unit: "m", because: "distances are given to the millimetre" };
    expectWithin(missOf(storm), 0, metre);
    expectWithin(missOf(mirror), 0, mirrors.tolerance);
  });
});
