import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { turnDegrees, wrapBearingDegrees } from "#lib/core/geodesy/bearing.ts";
import { HALF_GIRTH_METRES } from "#lib/core/geodesy/earth.ts";
import { geodesicDirect, geodesicInverse } from "#lib/core/geodesy/geodesic.ts";
import { ringCrossings } from "#lib/core/geodesy/ring-crossings.ts";
import { geodesicRing } from "#lib/core/geodesy/ring.ts";
import { sphericalCrossings } from "#lib/core/geodesy/spherical-crossings.ts";
import { wrapLongitudeDegrees, type Position } from "#lib/core/units/position.ts";
import { expectWithin } from "#tests/support/expect-within.ts";

/** Between two numbers, evenly: `fc.double` prefers the smallest and the largest of all doubles. */
const evenly = (min: number, max: number) => fc.integer({ min: 0, max: 1e9 }).map((part) => min + ((max - min) * part) / 1e9);

/** Anywhere, evenly over the sphere, and often at the poles and on the 180th meridian. */
const anywhere: fc.Arbitrary<Position> = fc.record({
  latitudeDegrees: fc.oneof(
    { weight: 8, arbitrary: evenly(-1, 1).map((z) => (Math.asin(z) * 180) / Math.PI) },
    { weight: 1, arbitrary: fc.constantFrom(90, -90, 0) },
  ),
  longitudeDegrees: fc.oneof(
    { weight: 8, arbitrary: evenly(-180, 180) },
    { weight: 1, arbitrary: fc.constantFrom(-180, 180, 0) },
  ),
});
const headings = fc.double({ min: 0, max: 360, noNaN: true });
const distance = (from: Position, to: Position) => geodesicInverse({ from, to }).distanceMetres;
const metres = (absolute: number, because: string) => ({ absolute, unit: "m", because });
const angle = { absolute: 1e-9, unit: "degrees", because: "rounding" };

describe("bearings", () => {
  it("keep their direction when wrapped, within a full turn", () => {
    fc.assert(
      fc.property(fc.double({ min: -1e4, max: 1e4, noNaN: true }), (bearing) => {
        const wrapped = wrapBearingDegrees(bearing);
        expect(wrapped >= 0 && wrapped < 360).toBe(true);
        expectWithin(Math.sin(((wrapped - bearing) * Math.PI) / 360), 0, { ...angle, unit: "(sine of half)" });
      }),
    );
    expect(Object.is(wrapBearingDegrees(-0), 0)).toBe(true);
    expect(wrapBearingDegrees(-1e-20)).toBe(0);
  });
  it("turn the short way round", () => {
    expect(turnDegrees({ fromDegrees: 350, toDegrees: 10 })).toBe(20);
    expect(turnDegrees({ fromDegrees: 10, toDegrees: 350 })).toBe(-20);
    expect(turnDegrees({ fromDegrees: 0, toDegrees: 180 })).toBe(-180);
  });
});

describe("geodesics", () => {
  it("lead back to where the inverse problem says they started", () => {
    fc.assert(
      fc.property(anywhere, headings, evenly(1, 1.99e7), (from, headsTowardDegrees, distanceMetres) => {
        const end = geodesicDirect({ from, headsTowardDegrees, distanceMetres });
        const back = geodesicInverse({ from: end.position, to: from });
        expectWithin(back.distanceMetres, distanceMetres, metres(1e-6, "rounding of degrees"));
        if (distanceMetres < 1000) return; // a short way's heading is known only as well as its ends
        expectWithin(turnDegrees({ fromDegrees: end.arrivesTowardDegrees, toDegrees: back.departsTowardDegrees + 180 }), 0, {
          absolute: 1e-4,
          unit: "degrees",
          because: "near the antipode and the poles a nanometre turns the heading",
        });
      }),
    );
  });
  it("do not care where longitudes are counted from", () => {
    fc.assert(
      fc.property(anywhere, anywhere, fc.double({ min: -180, max: 180, noNaN: true }), (from, to, turn) => {
        const turned = (position: Position) => ({
          ...position,
          longitudeDegrees: wrapLongitudeDegrees(position.longitudeDegrees + turn),
        });
        expectWithin(distance(turned(from), turned(to)), distance(from, to), metres(1e-6, "rounding of degrees"));
        expectWithin(distance(to, from), distance(from, to), metres(1e-6, "rounding of degrees"));
      }),
    );
  });
});

describe("rings", () => {
  it("lie at their radius all round, over the poles and the 180th meridian", () => {
    fc.assert(
      fc.property(anywhere, fc.double({ min: 0, max: 1.99e7, noNaN: true }), (centre, radiusMetres) => {
        const ring = geodesicRing({ centre, radiusMetres, vertices: 24 });
        expect(ring).toHaveLength(24);
        for (const vertex of ring) expectWithin(distance(centre, vertex), radiusMetres, metres(1e-6, "rounding of degrees"));
      }),
    );
  });
  it("start in the north and go clockwise", () => {
    const centre = { latitudeDegrees: 10, longitudeDegrees: 20 };
    const [north, east] = geodesicRing({ centre, radiusMetres: 1e6, vertices: 4 });
    expectWithin(north?.longitudeDegrees ?? NaN, 20, angle);
    expect(north?.latitudeDegrees).toBeGreaterThan(10);
    const departs = east === undefined ? NaN : geodesicInverse({ from: centre, to: east }).departsTowardDegrees;
    expectWithin(departs, 90, angle);
  });
  it("refuse a radius beyond half the girth", () => {
    const centre = { latitudeDegrees: 0, longitudeDegrees: 0 };
    expect(() => geodesicRing({ centre, radiusMetres: 2.1e7, vertices: 9 })).toThrow("A ring's radius");
    const ring = { centre, radiusMetres: 1e6 };
    expect(() => ringCrossings({ first: ring, second: { centre, radiusMetres: NaN } })).toThrow("A ring's radius");
  });
});

describe("crossings of rings", () => {
  const through = (centre: Position, source: Position) => ({ centre, radiusMetres: distance(centre, source) });

  it("find the point that two rings were drawn through, in either order", () => {
    fc.assert(
      fc.property(anywhere, anywhere, anywhere, (a, b, source) => {
        const first = through(a, source);
        const second = through(b, source);
        // Rings that all but coincide, or that all but touch, meet at the source to no useful accuracy.
        const apart = Math.min(distance(a, b), HALF_GIRTH_METRES - distance(a, b));
        const radii = [first.radiusMetres, second.radiusMetres];
        fc.pre(apart > 200_000 && Math.min(...radii) > 10_000 && Math.max(...radii) < 1.99e7);
        const turn = Math.abs(Math.sin(((headingAt(a, source) - headingAt(b, source)) * Math.PI) / 180));
        fc.pre(turn > 0.05);
        const found = [ringCrossings({ first, second }), ringCrossings({ first: second, second: first })];
        for (const crossing of found) {
          expect(crossing.kind).toBe("cross");
          if (crossing.kind !== "cross") continue;
          const miss = Math.min(...crossing.points.map((point) => distance(point, source)));
          expectWithin(miss, 0, metres(0.01 / turn, "a millimetre along each ring, over the angle between them"));
          for (const point of crossing.points) {
            expectWithin(distance(a, point), first.radiusMetres, metres(0.01, "settled within a millimetre"));
            expectWithin(distance(b, point), second.radiusMetres, metres(0.01, "settled within a millimetre"));
          }
        }
      }),
    );
  });

  it("put the first point to the right of the way from the first centre to the second", () => {
    const first = { centre: { latitudeDegrees: 0, longitudeDegrees: 170 }, radiusMetres: 3e6 };
    const second = { centre: { latitudeDegrees: 0, longitudeDegrees: -160 }, radiusMetres: 3e6 };
    const found = ringCrossings({ first, second });
    expect(found.kind === "cross" && found.points[0].latitudeDegrees < 0 && found.points[1].latitudeDegrees > 0).toBe(true);
  });

  it("say by how much rings miss each other: outside, inside, and round the back", () => {
    const at = (longitudeDegrees: number, radiusMetres: number) => ({
      centre: { latitudeDegrees: 0, longitudeDegrees },
      radiusMetres,
    });
    const equator = 6_378_137 * (Math.PI / 180); // metres a degree along the equator, the WGS84 axis
    const gap = (a: number, b: number, separation: number) => {
      const found = ringCrossings({ first: at(0, a), second: at(separation, b) });
      return found.kind === "apart" ? found.gapMetres : NaN;
    };
    expectWithin(gap(2e6, 3e6, 90), 90 * equator - 5e6, metres(1e-3, "exact along the equator"));
    expectWithin(gap(3e6, 2e6, 90), 90 * equator - 5e6, metres(1e-3, "exact along the equator"));
    expectWithin(gap(9e6, 1e6, 20), 8e6 - 20 * equator, metres(1e-3, "exact along the equator"));
    expectWithin(gap(1e6, 9e6, 20), 8e6 - 20 * equator, metres(1e-3, "exact along the equator"));
    expectWithin(gap(1.5e7, 1.7e7, 90), 1.7e7 + 1.5e7 + 90 * equator - 2 * HALF_GIRTH_METRES, {
      absolute: 80_000,
      unit: "m",
      because: "girths of the ellipsoid differ by 67 km",
    });
  });

  it("reach as far round the back as the ellipsoid lets them", () => {
    const first = { centre: { latitudeDegrees: 35, longitudeDegrees: 20 }, radiusMetres: 1.3e7 };
    const centre = { latitudeDegrees: -20, longitudeDegrees: 140 };
    const headingsTried = Array.from({ length: 36_000 }, (_, index) => index / 100);
    const farthest = Math.max(
      ...headingsTried.map((headsTowardDegrees) =>
        distance(centre, geodesicDirect({ from: first.centre, headsTowardDegrees, distanceMetres: 1.3e7 }).position),
      ),
    );
    expect(ringCrossings({ first, second: { centre, radiusMetres: farthest - 1000 } }).kind).toBe("cross");
    const beyond = ringCrossings({ first, second: { centre, radiusMetres: farthest + 1000 } });
    expectWithin(beyond.kind === "apart" ? beyond.gapMetres : NaN, 1000, metres(0.5, "headings a hundredth of a degree apart"));
  });

  it("say when rings touch, from outside and from inside", () => {
    fc.assert(
      fc.property(anywhere, headings, fc.double({ min: 0.1, max: 0.9, noNaN: true }), (centre, headsTowardDegrees, share) => {
        const other = geodesicDirect({ from: centre, headsTowardDegrees, distanceMetres: 8e6 }).position;
        const outside = ringCrossings({
          first: { centre, radiusMetres: 8e6 * share },
          second: { centre: other, radiusMetres: 8e6 * (1 - share) },
        });
        const touching = geodesicDirect({ from: centre, headsTowardDegrees, distanceMetres: 8e6 * share }).position;
        expect(outside.kind).toBe("touch");
        expectWithin(outside.kind === "touch" ? distance(outside.points[0], touching) : NaN, 0, metres(0.01, "rounding"));
        const inside = ringCrossings({
          first: { centre, radiusMetres: 2e6 * share },
          second: { centre: other, radiusMetres: 8e6 + 2e6 * share },
        });
        expect(inside.kind).toBe("touch");
      }),
    );
  });

  it("know one circle by either of its centres", () => {
    fc.assert(
      fc.property(anywhere, fc.double({ min: 1e6, max: 1.9e7, noNaN: true }), (centre, radiusMetres) => {
        const opposite = {
          latitudeDegrees: -centre.latitudeDegrees,
          longitudeDegrees: wrapLongitudeDegrees(centre.longitudeDegrees + 180),
        };
        const first = { centre, radiusMetres };
        expect(ringCrossings({ first, second: first }).kind).toBe("same-circle");
        const second = { centre: opposite, radiusMetres: HALF_GIRTH_METRES - radiusMetres };
        expect(ringCrossings({ first, second }).kind).toBe("same-circle");
      }),
      { numRuns: 30 },
    );
  });

  it("have no radius beyond half the way round a sphere", () => {
    const ring = (radiusDegrees: number) => ({ centre: { latitudeDegrees: 0, longitudeDegrees: 0 }, radiusDegrees });
    const far = { ...ring(100), centre: { latitudeDegrees: 0, longitudeDegrees: 30 } };
    expect(() => sphericalCrossings({ first: ring(181), second: far })).toThrow("A ring's radius must lie between 0 and 180");
    expect(() => sphericalCrossings({ first: far, second: ring(181) })).toThrow("A ring's radius must lie between 0 and 180");
    expect(sphericalCrossings({ first: ring(180), second: far }).kind).toBe("apart");
  });

  it("lie on both circles of a sphere", () => {
    const arc = (a: Position, b: Position) => {
      const vector = ({ latitudeDegrees, longitudeDegrees }: Position) => {
        const [phi, lambda] = [(latitudeDegrees * Math.PI) / 180, (longitudeDegrees * Math.PI) / 180];
        return [Math.cos(phi) * Math.cos(lambda), Math.cos(phi) * Math.sin(lambda), Math.sin(phi)] as const;
      };
      const [ax, ay, az] = vector(a);
      const [bx, by, bz] = vector(b);
      return (2 * Math.asin(Math.min(1, Math.hypot(ax - bx, ay - by, az - bz) / 2)) * 180) / Math.PI;
    };
    fc.assert(
      fc.property(anywhere, anywhere, anywhere, (a, b, source) => {
        fc.pre(Math.abs(Math.sin((arc(a, b) * Math.PI) / 180)) > 0.01);
        const first = { centre: a, radiusDegrees: arc(a, source) };
        const second = { centre: b, radiusDegrees: arc(b, source) };
        const found = sphericalCrossings({ first, second });
        const near = { absolute: 1e-5, unit: "degrees", because: "chords near 180 degrees keep half their digits" };
        for (const point of "points" in found ? found.points : []) {
          expectWithin(arc(a, point), first.radiusDegrees, near);
          expectWithin(arc(b, point), second.radiusDegrees, near);
        }
        expect(found.kind === "apart" ? found.gapDegrees < 1e-5 : found.kind !== "same-circle").toBe(true);
      }),
    );
  });
});

function headingAt(from: Position, to: Position): number {
  return geodesicInverse({ from, to }).arrivesTowardDegrees;
}
