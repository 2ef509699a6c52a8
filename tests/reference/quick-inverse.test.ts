import { describe, expect, it } from "vitest";
import { turnDegrees } from "#lib/core/geodesy/bearing.ts";
import { geodesicDirect, geodesicInverse } from "#lib/core/geodesy/geodesic.ts";
import { areaRatio, frameAt, quickAzimuth, quickDistance } from "#lib/core/geodesy/quick-inverse.ts";
import { wrapLongitudeDegrees, type Position } from "#lib/core/units/position.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { randomStream, type RandomStream } from "#tests/support/simulator/random.ts";

/** Against Karney's geodesics (karney-2013), which the library's own table holds to a nanometre. */
interface Errors {
  readonly metres: number;
  readonly degrees: number;
}

function errorsBetween(from: Position, to: Position): Errors {
  const way = geodesicInverse({ from, to });
  const [first, second] = [frameAt(from), frameAt(to)];
  return {
    metres: Math.abs(quickDistance(first, second) - way.distanceMetres),
    degrees: Math.abs(turnDegrees({ fromDegrees: way.departsTowardDegrees, toDegrees: (quickAzimuth(first, second) * 180) / Math.PI })),
  };
}

function anywhere(random: RandomStream): Position {
  return { latitudeDegrees: (Math.asin(random.between(-1, 1)) * 180) / Math.PI, longitudeDegrees: random.between(-180, 180) };
}

/** The largest errors over pairs whose ways are of lengths between two bounds. */
function largest(range: { readonly seed: number; readonly pairs: number; readonly from: number; readonly to: number }): Errors {
  const random = randomStream(range.seed);
  let [metres, degrees] = [0, 0];
  for (let pair = 0; pair < range.pairs; pair += 1) {
    const from = anywhere(random);
    const distanceMetres = random.between(range.from, range.to);
    const to = geodesicDirect({ from, headsTowardDegrees: random.between(0, 360), distanceMetres }).position;
    const errors = errorsBetween(from, to);
    metres = Math.max(metres, errors.metres);
    degrees = Math.max(degrees, errors.degrees);
  }
  return { metres, degrees };
}

describe("quick distances and azimuths", () => {
  const ranges = [
    { seed: 6, pairs: 20_000, from: 1, to: 100_000, metres: 0.2, degrees: 0.1 },
    { seed: 1, pairs: 20_000, from: 100_000, to: 15_000_000, metres: 60, degrees: 0.35 },
    { seed: 2, pairs: 20_000, from: 15_000_000, to: 18_000_000, metres: 220, degrees: 0.9 },
    { seed: 3, pairs: 20_000, from: 18_000_000, to: 19_000_000, metres: 500, degrees: 1.8 },
    { seed: 4, pairs: 20_000, from: 19_000_000, to: 19_800_000, metres: 2500, degrees: 9 },
    { seed: 5, pairs: 20_000, from: 19_800_000, to: 20_003_900, metres: 28_000, degrees: 180 },
  ];
  it.each(ranges)("from $from to $to m are out by at most $metres m and $degrees degrees", (range) => {
    const { metres, degrees } = largest(range);
    expect(metres).toBeLessThan(range.metres);
    expect(degrees).toBeLessThanOrEqual(range.degrees);
    expect(metres).toBeGreaterThan(0.5 * range.metres); // the figures say what was measured, and no more
  });

  const at = (latitudeDegrees: number, longitudeDegrees: number): Position => ({ latitudeDegrees, longitudeDegrees });
  it.each([
    { name: "from a pole", from: at(90, 0), to: at(40, -120) },
    { name: "to a pole", from: at(-35, 174), to: at(-90, 50) },
    { name: "over a pole", from: at(70, 20), to: at(65, -150) },
    { name: "over the 180th meridian", from: at(-18, 178.5), to: at(21, -158) },
    { name: "along the 180th meridian, told both ways", from: at(10, 180), to: at(40, -180) },
    { name: "along the equator", from: at(0, -100), to: at(0, 30) },
    { name: "along a meridian", from: at(-60, 12), to: at(60, 12) },
  ])("are as good $name", ({ from, to }) => {
    const { metres, degrees } = errorsBetween(from, to);
    expect(metres).toBeLessThan(60);
    expect(degrees).toBeLessThan(0.35);
  });

  it("stay numbers where the formula would divide by zero", () => {
    const place = frameAt(at(37.5, -122));
    expectWithin(quickDistance(place, place), 0, { absolute: 1, unit: "m", because: "a point and itself" });
    const [east, west] = [frameAt(at(0, 0)), frameAt(at(0, 180))];
    const girth = { absolute: 70_000, unit: "m", because: "the girths of the ellipsoid differ by 67 km" };
    expectWithin(quickDistance(east, west), 20_003_931, girth);
    expect(Number.isFinite(quickAzimuth(east, west))).toBe(true);
  });

  it("count longitudes from anywhere", () => {
    const random = randomStream(7);
    for (let pair = 0; pair < 1000; pair += 1) {
      const [from, to, turn] = [anywhere(random), anywhere(random), random.between(-360, 360)];
      const turned = (place: Position) => ({ ...place, longitudeDegrees: wrapLongitudeDegrees(place.longitudeDegrees + turn) });
      const same = { absolute: 0.01, unit: "m", because: "rounding, which the antipode magnifies" };
      expectWithin(quickDistance(frameAt(turned(from)), frameAt(turned(to))), quickDistance(frameAt(from), frameAt(to)), same);
    }
  });
});

describe("the area of the ellipsoid over the sphere's", () => {
  /** Area (m2) north of the equator and south of a latitude of WGS84, in closed form (common practice, no source). */
  function zone(latitudeDegrees: number): number {
    const [a, f] = [6_378_137, 1 / 298.257223563];
    const e = Math.sqrt(f * (2 - f));
    const sine = Math.sin((latitudeDegrees * Math.PI) / 180);
    return Math.PI * (a * (1 - f)) ** 2 * (sine / (1 - (e * sine) ** 2) + Math.atanh(e * sine) / e);
  }

  it("adds up to zones of the ellipsoid, and to its 510 065 621.724 km2 (published for WGS84; from memory)", () => {
    expectWithin((2 * zone(90)) / 1e6, 510_065_621.724, { absolute: 0.01, unit: "km2", because: "given to a thousandth" });
    const step = 0.01;
    let area = 0;
    for (let middle = step / 2; middle < 90; middle += step) {
      const cosine = Math.cos((middle * Math.PI) / 180);
      area += 2 * Math.PI * 6_371_007.1809 ** 2 * areaRatio(middle) * cosine * ((step * Math.PI) / 180);
      const close = { relative: 1e-6, unit: "(ratio)", because: "strips a hundredth of a degree wide" };
      if (Math.round(middle / step) % 1500 === 0) expectWithin(area, zone(middle + step / 2), close);
    }
    expectWithin(area, zone(90), { relative: 1e-8, unit: "(ratio)", because: "strips a hundredth of a degree wide" });
  });
});
