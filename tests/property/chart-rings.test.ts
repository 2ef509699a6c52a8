import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { bandOverlap } from "#lib/chart/band-overlap.ts";
import type { ChartArea, ChartLine } from "#lib/chart/chart-point.ts";
import { pointInWindow, windowAround, type ChartWindow } from "#lib/chart/chart-window.ts";
import { areaIntoWindow } from "#lib/chart/into-window.ts";
import { bandPolygon, ringLine } from "#lib/chart/ring-shape.ts";
import type { Position } from "#lib/core/units/position.ts";
import { areaHolds, areaSquareMetres } from "#tests/support/chart-shapes.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { legBetween } from "#tests/support/simulator/ellipsoid.ts";

const evenly = (min: number, max: number) => fc.integer({ min: 0, max: 1e9 }).map((part) => min + ((max - min) * part) / 1e9);
const places: fc.Arbitrary<Position> = fc.record({
  latitudeDegrees: evenly(-1, 1).map((z) => (Math.asin(z) * 180) / Math.PI),
  longitudeDegrees: fc.oneof({ weight: 4, arbitrary: evenly(-180, 180) }, { weight: 1, arbitrary: fc.constantFrom(-180, 179.999, 0) }),
});
const windows: fc.Arbitrary<ChartWindow> = fc.integer({ min: -180, max: 180 }).map((centreLongitudeDegrees) => ({ centreLongitudeDegrees }));
const at = (latitudeDegrees: number, longitudeDegrees: number): Position => ({ latitudeDegrees, longitudeDegrees });
const metresTo = (from: Position, [latitudeDegrees, longitudeDegrees]: readonly [number, number]): number =>
  legBetween(from, { latitudeDegrees, longitudeDegrees }).distanceMetres;

/** Stations whose rings cross the 180th meridian, hold a pole, hold both, or are wider than a hemisphere. */
const RINGS = [
  { name: "in mid-ocean", centre: at(10, -40), radiusMetres: 2_500_000 },
  { name: "across the 180th meridian", centre: at(-20, 176), radiusMetres: 3_000_000 },
  { name: "round the South Pole", centre: at(-54.4, 158.4), radiusMetres: 4_577_000 },
  { name: "round the North Pole, across 180", centre: at(71.5, -179), radiusMetres: 2_600_000 },
  { name: "wider than a hemisphere", centre: at(37, -123), radiusMetres: 12_000_000 },
  { name: "round both poles", centre: at(5, 100), radiusMetres: 10_600_000 },
  { name: "nearly round the world", centre: at(21, -158), radiusMetres: 17_700_000 },
];
const SIGMA_METRES = 200_000;
const WINDOWS = [{ centreLongitudeDegrees: 0 }, { centreLongitudeDegrees: 180 }, { centreLongitudeDegrees: -75 }];

/** Places spread evenly over the sphere (a spiral of golden angles), so that nothing depends on where one looks. */
const EVERYWHERE = Array.from({ length: 1500 }, (_, k) => {
  const z = (2 * k + 1) / 1500 - 1;
  return at((Math.asin(z) * 180) / Math.PI, ((k * 137.507_764) % 360) - 180);
});

function band(window: ChartWindow, { centre, radiusMetres }: { centre: Position; radiusMetres: number }): ChartArea {
  const polygon = bandPolygon({ centre, innerMetres: radiusMetres - SIGMA_METRES, outerMetres: radiusMetres + SIGMA_METRES });
  return polygon === null ? [] : areaIntoWindow(window, polygon);
}

/** Null within a kilometre of an edge, where the sides' own deviation from the true circle decides. */
function isInBand({ centre, radiusMetres }: { centre: Position; radiusMetres: number }, place: Position): boolean | null {
  const off = Math.abs(legBetween(centre, place).distanceMetres - radiusMetres);
  return Math.abs(off - SIGMA_METRES) < 1000 ? null : off < SIGMA_METRES;
}

function longestJump(line: ChartLine): number {
  return Math.max(...line.slice(1).map(([, longitude], i) => Math.abs(longitude - (line[i]?.[1] ?? NaN))));
}

describe("a ring on the chart", () => {
  it("keeps its distance from its station at every vertex and between them, wherever it lies", () => {
    fc.assert(
      fc.property(places, evenly(100_000, 18_500_000), windows, (centre, radiusMetres, window) => {
        const line = ringLine(window, { centre, radiusMetres });
        for (let i = 0; i + 1 < line.length; i += 7) {
          const [from, to] = [line[i], line[i + 1]];
          if (from === undefined || to === undefined) throw new Error("A vertex is missing.");
          expectWithin(metresTo(centre, from), radiusMetres, { absolute: 1, unit: "m", because: "both formulae are good to a millimetre, degrees are kept in full" });
          if (Math.abs(from[0]) > 80) continue;
          const middle = [(from[0] + to[0]) / 2, (from[1] + to[1]) / 2] as const;
          expectWithin(metresTo(centre, middle), radiusMetres, { absolute: 3000, unit: "m", because: "a side is straight on the chart and not a great circle: under a hundredth of a band's width" });
        }
      }),
      { numRuns: 60 },
    );
  });

  it("starts in the window, never jumps, and ends where it began: a whole turn on if it holds one pole", () => {
    for (const { name, centre, radiusMetres } of RINGS) {
      const pole = (sign: number): boolean => legBetween(centre, at(90 * sign, 0)).distanceMetres < radiusMetres;
      const turns = Number(pole(1)) + Number(pole(-1)) === 1 ? 1 : 0;
      for (const window of WINDOWS) {
        const line = ringLine(window, { centre, radiusMetres });
        const [first, last] = [line[0], line.at(-1)];
        expect(Math.abs((first?.[1] ?? NaN) - window.centreLongitudeDegrees), name).toBeLessThanOrEqual(180);
        expect(longestJump(line), name).toBeLessThan(90);
        expectWithin(Math.abs((last?.[1] ?? NaN) - (first?.[1] ?? NaN)), 360 * turns, { absolute: 1e-9, unit: "degrees", because: "rounding" });
        expectWithin(last?.[0] ?? NaN, first?.[0] ?? NaN, { absolute: 1e-9, unit: "degrees", because: "it is one and the same vertex" });
      }
    }
  });
});

describe("a band on the chart", () => {
  it.each(RINGS)("holds what lies within its width of the ring and nothing else: $name", (ring) => {
    for (const window of WINDOWS) {
      const area = band(window, ring);
      const wrong = EVERYWHERE.filter((place) => isInBand(ring, place) !== null && isInBand(ring, place) !== areaHolds(area, place));
      expect(wrong).toStrictEqual([]);
      expect(EVERYWHERE.filter((place) => areaHolds(area, place)).length).toBeGreaterThan(10);
    }
  });

  it.each(RINGS)("has the area of a zone of the sphere: $name", (ring) => {
    const [inner, outer] = [ring.radiusMetres - SIGMA_METRES, ring.radiusMetres + SIGMA_METRES];
    const radius = 6_371_007;
    const zone = 2 * Math.PI * radius ** 2 * (Math.cos(inner / radius) - Math.cos(outer / radius));
    for (const window of WINDOWS) {
      expectWithin(areaSquareMetres(band(window, ring)), zone, { relative: 0.02, unit: "m2", because: "the Earth is flattened by 1/298, which a narrow zone near the antipode feels most" });
    }
  });

  it("lies whole in the window, once", () => {
    for (const window of WINDOWS) {
      for (const ring of RINGS) {
        const longitudes = band(window, ring).flat(2).map(([, longitude]) => longitude - window.centreLongitudeDegrees);
        expect(Math.min(...longitudes)).toBeGreaterThanOrEqual(-180 - 1e-6);
        expect(Math.max(...longitudes)).toBeLessThanOrEqual(180 + 1e-6);
      }
    }
  });

  it("is a disc where its error is wider than its radius, and nothing where it would be the whole Earth", () => {
    const window = { centreLongitudeDegrees: 0 };
    const disc = bandPolygon({ centre: at(80, 30), innerMetres: -50_000, outerMetres: 1_500_000 });
    const area = disc === null ? [] : areaIntoWindow(window, disc);
    expect(areaHolds(area, at(80, 30))).toBe(true);
    expect(areaHolds(area, at(89.9, -120))).toBe(true);
    expect(areaHolds(area, at(60, 30))).toBe(false);
    expect(bandPolygon({ centre: at(0, 0), innerMetres: 0, outerMetres: 20_000_000 })).toBeNull();
  });
});

describe("the overlap of two bands", () => {
  it.each([
    { name: "across 180", pair: [RINGS[1], RINGS[4]] },
    { name: "round the South Pole", pair: [RINGS[2], RINGS[5]] },
    { name: "that meet nowhere", pair: [RINGS[0], RINGS[3]] },
  ])("holds what lies in both and nothing else: $name", ({ pair }) => {
    const [first, second] = pair;
    if (first === undefined || second === undefined) throw new Error("A pair is two.");
    for (const window of WINDOWS) {
      const area = bandOverlap(band(window, first), band(window, second));
      const places = EVERYWHERE.concat(overlapCandidates(first, second));
      const wrong = places.filter((place) => {
        const [inFirst, inSecond] = [isInBand(first, place), isInBand(second, place)];
        return inFirst !== null && inSecond !== null && areaHolds(area, place) !== (inFirst && inSecond);
      });
      expect(wrong).toStrictEqual([]);
    }
  });

  /** Places on the first ring, some of which lie in the second band. */
  function overlapCandidates(first: { centre: Position; radiusMetres: number }, second: { centre: Position; radiusMetres: number }): Position[] {
    const line = ringLine({ centreLongitudeDegrees: 0 }, first).map(([latitudeDegrees, longitudeDegrees]) => pointInWindow({ centreLongitudeDegrees: 0 }, at(latitudeDegrees, longitudeDegrees)));
    const candidates = line.map(([latitudeDegrees, longitudeDegrees]) => at(latitudeDegrees, longitudeDegrees));
    const both = candidates.filter((place) => isInBand(second, place) === true);
    expect(both.length > 0).toBe(first !== RINGS[0]);
    return candidates;
  }
});

describe("the window", () => {
  it("turns with the stations, and shows each of them within half a turn of its middle", () => {
    fc.assert(
      fc.property(fc.array(places, { minLength: 1, maxLength: 8 }), fc.integer({ min: -180, max: 180 }), (stations, turn) => {
        const resultant = Math.hypot(
          stations.reduce((sum, { longitudeDegrees }) => sum + Math.cos((longitudeDegrees * Math.PI) / 180), 0),
          stations.reduce((sum, { longitudeDegrees }) => sum + Math.sin((longitudeDegrees * Math.PI) / 180), 0),
        );
        fc.pre(resultant > 0.01);
        const window = windowAround(stations);
        const turned = windowAround(stations.map((station) => at(station.latitudeDegrees, station.longitudeDegrees + turn)));
        const apart = (turned.centreLongitudeDegrees - window.centreLongitudeDegrees - turn + 1080) % 360;
        expectWithin(Math.min(apart, 360 - apart), 0, { absolute: 1, unit: "degrees", because: "middles are whole degrees" });
        for (const station of stations) {
          const [latitude, longitude] = pointInWindow(window, station);
          expect(latitude).toBe(station.latitudeDegrees);
          expect(Math.abs(longitude - window.centreLongitudeDegrees)).toBeLessThanOrEqual(180);
          const turns = (longitude - station.longitudeDegrees) / 360;
          expectWithin(turns, Math.round(turns), { absolute: 1e-9, unit: "turns", because: "it is the same meridian" });
        }
      }),
    );
  });

  it("keeps a Pacific network in one piece", () => {
    expect(windowAround([at(42, 147), at(51, -174), at(22, -159)]).centreLongitudeDegrees).toBe(-182 + 360);
  });
});
