import { describe, expect, it } from "vitest";
import { DEFAULT_SETTINGS } from "#lib/core/source/settings.ts";
import { solveEvent } from "#lib/core/source/solve-event.ts";
import type { Position } from "#lib/core/units/position.ts";
import { DENSE_MODEL, denseArea, denseMean, densePeak, densePosterior, type DenseCell } from "#tests/support/dense-posterior.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { legBetween } from "#tests/support/simulator/ellipsoid.ts";
import { exactArrivals, statedObservations, type StatedArrival } from "#tests/support/stated-arrivals.ts";

const at = (latitudeDegrees: number, longitudeDegrees: number): Position => ({ latitudeDegrees, longitudeDegrees });
const STATIONS = {
  california: at(37.9, -122.2),
  papua: at(-9.4, 147.2),
  kiritimati: at(2, -157.5),
  wellington: at(-41.3, 174.8),
  alaska: at(58.3, -134.4),
  iceland: at(64, -22),
} as const;

interface Case {
  readonly name: string;
  readonly storm: Position;
  /** Each station's error as a fraction of its distance, and in hours. */
  readonly off: Partial<Record<keyof typeof STATIONS, readonly [number, number]>>;
  readonly sure?: { readonly distanceFraction: number; readonly originSigmaSeconds: number };
  readonly raises?: boolean;
  /** Where the first station says that the waves come from. */
  readonly comesFromDegrees?: number;
}

const CASES: readonly Case[] = [
  { name: "three stations", storm: at(42, 160), off: { california: [0.03, -3], papua: [-0.02, 4], kiritimati: [0.04, 1] } },
  {
    name: "four stations of which one heard another storm",
    storm: at(42, 160),
    off: { california: [0.01, -3], papua: [-0.02, 4], kiritimati: [0.02, 1], wellington: [0.25, 20] },
  },
  { name: "two stations, and so two sources", storm: at(42, 160), off: { california: [0.02, 2], kiritimati: [-0.01, -3] } },
  { name: "a storm beside the pole", storm: at(84, 150), off: { california: [0.02, 2], alaska: [-0.01, -3], iceland: [0.01, 1] } },
  {
    name: "three stations of which one measured a direction",
    storm: at(42, 160),
    off: { california: [0.03, -3], papua: [-0.02, 4], kiritimati: [0.04, 1] },
    comesFromDegrees: 285,
  },
  {
    name: "four stations that disagree",
    storm: at(42, 160),
    off: { california: [0.1, 6], papua: [-0.1, 6], kiritimati: [-0.1, -6], alaska: [0.1, -6] },
    sure: { distanceFraction: 0.01, originSigmaSeconds: 7200 },
    raises: true,
  },
];

function arrivalsOf({ storm, off, comesFromDegrees, sure = { distanceFraction: 0.04, originSigmaSeconds: 18_000 } }: Case): StatedArrival[] {
  const stations = Object.entries(STATIONS).flatMap(([id, position]) => (id in off ? [{ id, position }] : []));
  return exactArrivals({ stations, storm, ...sure }).map((arrival, index) => {
    const [fraction, hours] = off[arrival.id as keyof typeof STATIONS] ?? [NaN, NaN];
    return {
      ...arrival,
      distanceMetres: arrival.distanceMetres * (1 + fraction),
      originEpochSeconds: arrival.originEpochSeconds + 3600 * hours,
      ...(index === 0 && comesFromDegrees !== undefined ? { bearing: { comesFromDegrees, sigmaDegrees: 12 } } : {}),
    };
  });
}

const ratio = (relative: number, because: string) => ({ relative, unit: "(ratio)", because });

/** The same posterior by a second way that shares no code with the estimator (method.md 5; common practice, no source). */
describe("the posterior laid out densely", () => {
  it.each(CASES)("holds what the answer says of $name", (example) => {
    const arrivals = arrivalsOf(example);
    const solved = solveEvent({ observations: statedObservations(arrivals), settings: DEFAULT_SETTINGS, land: null, sightTables: new Map(), checks: false });
    const { answer } = solved;
    if (!answer?.source) throw new Error("a source was placed");
    expect(answer.spreadRaisedBy > 1).toBe(example.raises === true);
    expect(answer.stations.filter(({ clockOffset }) => clockOffset !== null)).toEqual([]);
    const cells = densePosterior(arrivals, { ...DENSE_MODEL, raisedVariance: answer.spreadRaisedBy ** 2 });
    const peak = densePeak(cells);

    // The search leaves what lies e^-7.5 and more below the best: two thousandths of the probability, at most.
    const kept = cells.filter(({ logDensity }) => logDensity > peak.logDensity - 7.5);
    for (const { probability, areaSquareMetres } of answer.regions) {
      expectWithin(areaSquareMetres, denseArea(kept, probability), ratio(0.01, "cells of 20 and 55 km at the edge"));
      expectWithin(areaSquareMetres, denseArea(cells, probability), ratio(0.02, "and the tails that the search leaves"));
    }

    // The best point is found under its own covariance: the density there is as good as the densest.
    const { position, originEpochSeconds, originSigmaSeconds } = answer.source;
    const nearest = cells.reduce((best, cell) => (legBetween(cell.position, position).distanceMetres < legBetween(best.position, position).distanceMetres ? cell : best));
    expect(peak.logDensity - nearest.logDensity).toBeLessThan(0.02);
    const origin = originEpochSeconds - (arrivals[0]?.originEpochSeconds ?? NaN);
    expectWithin(origin, nearest.originMean, { absolute: 1800, unit: "s", because: "the nearest cell may be 40 km away" });
    const main = answer.modes.length > 1 ? cells.filter((cell) => isNearest(cell.position, answer.modes)) : cells;
    const variance = denseMean(main, (cell) => cell.originVariance + (cell.originMean - origin) ** 2);
    expectWithin(originSigmaSeconds, Math.sqrt(variance), ratio(0.01, "the tails that the search leaves"));

    answer.modes.forEach(({ probability }, index) => {
      const share = denseMean(cells, (cell) => (answer.modes.length === 1 || isNearest(cell.position, answer.modes, index) ? 1 : 0));
      expectWithin(probability, share, { absolute: 0.005, unit: "(probability)", because: "the tails that the search leaves" });
    });
    answer.stations.forEach(({ belongs }, i) => {
      const strays = (some: readonly DenseCell[]) => 1 - denseMean(some, (cell) => cell.belongs[i] ?? NaN);
      expectWithin(1 - (belongs ?? NaN), strays(kept), { absolute: 2e-5 + 0.1 * strays(kept), unit: "(probability)", because: "the edge of what is kept" });
      expectWithin(1 - (belongs ?? NaN), strays(cells), { absolute: 0.002, unit: "(probability)", because: "the tails that the search leaves" });
    });
  });
});

describe("whether two stations heard one storm", () => {
  /** Log odds that they did: against one of the two alone, or neither, with any place and any time of ten days as probable. */
  function logOdds(arrivals: readonly StatedArrival[]): number {
    const [prior, stray, tenDays] = [0.95, 1 / (19_500_000 * 10 * 86_400), 10 * 86_400];
    const together = densePosterior(arrivals, DENSE_MODEL).reduce((sum, { logDensity, areaSquareMetres }) => sum + Math.exp(logDensity) * areaSquareMetres, 0);
    const girths = arrivals.map(({ distanceMetres }) => 2 * Math.PI * 6_371_008.8 * Math.sin(distanceMetres / 6_371_008.8));
    const alone = girths.reduce((sum, girth) => sum + prior * girth * (1 - prior) * stray, 0);
    const neither = ((1 - prior) * stray) ** 2 * 510_065_621.724e6 * tenDays;
    return Math.log(together / (alone + neither));
  }
  const apartBy = (hours: number) =>
    exactArrivals({ stations: [{ id: "a", position: STATIONS.california }, { id: "c", position: STATIONS.kiritimati }], storm: at(42, 160) }).map((arrival, i) => ({
      ...arrival,
      originEpochSeconds: arrival.originEpochSeconds + i * 3600 * hours,
    }));
  const outcomeOf = (arrivals: readonly StatedArrival[]) =>
    solveEvent({ observations: statedObservations(arrivals), settings: DEFAULT_SETTINGS, land: null, sightTables: new Map(), checks: false }).answer?.outcome;

  it("turns where the odds are even", () => {
    let [low, high] = [0, 200];
    for (let i = 0; i < 9; i += 1) {
      const middle = (low + high) / 2;
      if (logOdds(apartBy(middle)) > 0) low = middle;
      else high = middle;
    }
    expect(low).toBeGreaterThan(30);
    expect(high).toBeLessThan(150);
    expect(logOdds(apartBy(low - 2))).toBeLessThan(1); // two hours are less than a factor of e
    expect(outcomeOf(apartBy(low - 2))).toBe("several");
    expect(outcomeOf(apartBy(high + 2))).toBe("no-agreement");
  });
});

function isNearest(place: Position, modes: readonly { readonly position: Position }[], index = 0): boolean {
  const apart = modes.map(({ position }) => legBetween(place, position).distanceMetres);
  return apart.every((metres) => metres >= (apart[index] ?? NaN));
}
