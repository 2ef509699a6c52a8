import { gridDisk, latLngToCell } from "h3-js";
import { describe, expect, it } from "vitest";
import { fitDispersionLine } from "#lib/core/arrival/dispersion-line.ts";
import type { ArrivalEstimate } from "#lib/core/arrival/estimate.ts";
import { straySets } from "#lib/core/source/belonging.ts";
import { planSubsets } from "#lib/core/source/conditioned.ts";
import { findPeaks } from "#lib/core/source/find-peaks.ts";
import { areaOf, centreOf, spacingMetres } from "#lib/core/source/grid.ts";
import { steadyCovariance } from "#lib/core/source/joint-covariance.ts";
import { modesOf, type Mode } from "#lib/core/source/modes.ts";
import { neighbourFinder } from "#lib/core/source/neighbours.ts";
import { networkOf } from "#lib/core/source/network.ts";
import { cellsHolding, logTotal } from "#lib/core/source/regions.ts";
import { ringSigmas } from "#lib/core/source/ring-sigma.ts";
import { searchOcean, type WeighedCell } from "#lib/core/source/search.ts";
import { DEFAULT_SETTINGS } from "#lib/core/source/settings.ts";
import { widenedForScatter } from "#lib/core/source/widened.ts";
import type { Position } from "#lib/core/units/position.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { legBetween } from "#tests/support/simulator/ellipsoid.ts";
import { exactArrivals, statedObservations } from "#tests/support/stated-arrivals.ts";

const at = (latitudeDegrees: number, longitudeDegrees: number): Position => ({ latitudeDegrees, longitudeDegrees });
const rounding = { relative: 1e-12, unit: "(ratio)", because: "rounding only" };

describe("which stations may have seen the storm", () => {
  it.each([[1, 1], [2, 1], [3, 4], [4, 11], [5, 26], [6, 57]])("of %d stations is any two or more: %d sets", (size, count) => {
    const sets = straySets(size);
    expect(sets).toHaveLength(count);
    expect(new Set(sets.map((set) => set.join())).size).toBe(count);
    expect(sets.every((strays) => size - strays.length >= Math.min(2, size))).toBe(true);
    expect(sets.flat().every((i) => i >= 0 && i < size)).toBe(true);
  });
  it("of many stations is all but two at most, about everyone and about what a search found", () => {
    expect(straySets(7)).toHaveLength(1 + 7 + 21);
    const strayCounts = straySets(9).map((strays) => strays.length);
    expect([0, 1, 2, 3].map((count) => strayCounts.filter((one) => one === count).length)).toEqual([1, 9, 36, 0]);
    const around = straySets(9, [[0, 1, 2]]).map((set) => set.join());
    expect(around).toEqual(expect.arrayContaining(["", "8", "0,1", "0,1,2", "0", "0,1,2,7,8", "0,1,4"]));
    expect(around).not.toContain("3,4,5");
    expect(new Set(around).size).toBe(around.length);
  });
});

/** Cells of a patch of sea, each as dense as a law says of its distance (km) from some middles. */
function cellsOf(rings: number, logDensity: (place: Position) => number): WeighedCell[] {
  return gridDisk(latLngToCell(10, -150, 4), rings).map((cell) => {
    const centre = centreOf(cell);
    const log = logDensity(centre);
    const weight = { logFree: log, logHeld: log, originMean: 0, originVariance: 1, belongs: new Float64Array() };
    return { cell, centre, areaSquareMetres: areaOf(cell, centre), ...weight };
  });
}
const kilometres = (a: Position, b: Position) => legBetween(a, b).distanceMetres / 1000;

describe("the cells that hold a probability", () => {
  const middle = at(10, -150);
  const cells = cellsOf(24, (place) => -0.5 * (kilometres(place, middle) / 200) ** 2 - 700);

  it.each([0.5, 0.9, 0.95])("are a disc of a Gaussian's radius for %d", (probability) => {
    const held = cellsHolding(cells, probability);
    const area = held.reduce((sum, cell) => sum + cell.areaSquareMetres, 0) / 1e6;
    const disc = Math.PI * 200 ** 2 * -2 * Math.log(1 - probability);
    expectWithin(area, disc, { relative: 0.02, unit: "km2", because: "cells 45 km apart, and a patch that ends at five sigma" });
    const total = logTotal(cells.map((cell) => cell.logHeld + Math.log(cell.areaSquareMetres)));
    const massOf = (some: readonly WeighedCell[]) => some.reduce((sum, cell) => sum + Math.exp(cell.logHeld - total) * cell.areaSquareMetres, 0);
    expect(massOf(held)).toBeGreaterThanOrEqual(probability);
    expect(massOf(held.slice(0, -1))).toBeLessThan(probability);
    const least = Math.min(...held.map(({ logHeld }) => logHeld));
    expect(cells.filter((cell) => cell.logHeld > least && !held.includes(cell))).toEqual([]);
  });
  it("come in one order, whatever the order of the cells", () => {
    expect(cellsHolding([...cells].reverse(), 0.9)).toEqual(cellsHolding(cells, 0.9));
    const level = cellsOf(3, () => -5);
    expect(cellsHolding([...level].reverse(), 0.5)).toEqual(cellsHolding(level, 0.5));
  });
  it("add logarithms that would leave the range of numbers", () => {
    expectWithin(logTotal([-1000, -1000]), -1000 + Math.log(2), rounding);
    expectWithin(logTotal([1000, 0]), 1000, rounding);
    expect(logTotal([])).toBe(-Infinity);
    expect(logTotal([-Infinity, -Infinity])).toBe(-Infinity);
  });
});

describe("separate sources", () => {
  const separate = (cells: readonly WeighedCell[]): Mode[] => modesOf({ cells, neighboursOf: neighbourFinder(cells) }, ({ logHeld }) => logHeld);
  const [west, east] = [at(10, -154), at(10, -146)]; // 877 km apart, the saddle half way
  const hump = (place: Position, middle: Position, sigma: number) => -0.5 * (kilometres(place, middle) / sigma) ** 2;
  const modesAt = (sigma: number, lower: number) =>
    separate(cellsOf(24, (place) => Math.max(hump(place, west, sigma), hump(place, east, sigma) - lower)));

  it("are two where the saddle lies e^2 under the lower, each with its share", () => {
    const modes = modesAt(150, 1); // saddle near exp(-3.8) of the lower
    expect(modes).toHaveLength(2);
    expectWithin((modes[0]?.probability ?? NaN) / (modes[1]?.probability ?? NaN), Math.E, { relative: 0.06, unit: "(ratio)", because: "tails go to the nearer" });
    expectWithin(modes.reduce((sum, { probability }) => sum + probability, 0), 1, rounding);
    expect(kilometres(modes[0]?.start ?? east, west)).toBeLessThan(40);
    expect(kilometres(modes[1]?.start ?? west, east)).toBeLessThan(40);
    const cells = modes.flatMap((mode) => mode.cells);
    expect(new Set(cells.map(({ cell }) => cell)).size).toBe(cells.length);
  });
  it("are one where the saddle is shallower", () => {
    expect(modesAt(250, 0)).toHaveLength(1); // saddle near exp(-1.5) of either
    expect(modesAt(150, 3.5)).toHaveLength(2); // exp(-2.7) under the lower one, nearer to it
    expect(modesAt(150, 7)).toHaveLength(1); // exp(-1.5) under it
  });
  it("are two where no cell joins them", () => {
    const cells = cellsOf(24, () => -1).filter(({ centre }) => Math.abs(centre.longitudeDegrees + 150) > 2);
    expect(separate(cells)).toHaveLength(2);
  });
});

describe("the cells of a search", () => {
  const stations = [at(37.9, -122.2), at(-9.4, 147.2), at(2, -157.5)].map((position, i) => ({ id: `s${i}`, position }));
  const searched = (narrower: number) => {
    const { spread } = DEFAULT_SETTINGS;
    const narrow = { ...spread, distanceMetres: spread.distanceMetres / narrower, scaleFraction: spread.scaleFraction / narrower, tiltSecondsPerHz: spread.tiltSecondsPerHz / narrower };
    const sent = statedObservations(exactArrivals({ stations, storm: at(42, 160), distanceFraction: 0.03 / narrower })).estimates;
    const arrivals = sent.map(({ stationId, estimate: stated }, i) => ({ id: stationId, position: stations[i]?.position ?? at(0, 0), estimate: stated, readings: [], exposure: null, sight: null }));
    const network = networkOf(arrivals, { settings: { ...DEFAULT_SETTINGS, spread: narrow } });
    const sets = straySets(3);
    return searchOcean({ network, sets, land: null }, findPeaks(network, planSubsets(network, sets)));
  };

  it.each([[1, 3], [2, 4], [4, 5], [8, 5]])("are a hundred and more in the 95 %% region, and fine beside its axes: %d times narrower", (narrower, least) => {
    const { level, cells, peaks } = searched(narrower);
    expect(level).toBeGreaterThanOrEqual(least);
    expect(cellsHolding(cells, 0.95).length).toBeGreaterThanOrEqual(100);
    const { eastEast = NaN, eastNorth = NaN, northNorth = NaN } = peaks[0]?.information ?? {};
    const smallestAxis = 1 / Math.sqrt((eastEast + northNorth) / 2 + Math.hypot((eastEast - northNorth) / 2, eastNorth));
    expect(spacingMetres(level)).toBeLessThanOrEqual(smallestAxis / 2);
    const coarser = spacingMetres(level - 1) <= smallestAxis / 2;
    if (coarser) expect(cellsHolding(cells, 0.95).length).toBeLessThan(7 * 130); // a level less would not have been enough
  });
});

const estimate: ArrivalEstimate = {
  ...{ distanceMetres: 6e6, originEpochSeconds: 0, sharedShifts: [], bearing: null },
  covariance: { distanceVariance: 2e5 ** 2, originVariance: 2e4 ** 2, distanceOriginCovariance: -0.9 * 2e5 * 2e4 },
};

describe("the spread between stations", () => {
  it("widens a ring by the spreads of distance, scale and tilt, raised where the misfit asked for it", () => {
    const widthOf = (spreadRaisedBy: number) => ringSigmas({ estimate, settings: DEFAULT_SETTINGS, spreadRaisedBy }).distanceSigmaMetres;
    const tilt = ((4 * 3600) / 0.03) * (9.80665 / (4 * Math.PI)); // the default: 4 h per 0.03 Hz
    expectWithin(widthOf(1), Math.hypot(2e5, 1.5e5, 1.2e5, tilt), rounding);
    expectWithin(widthOf(2), Math.hypot(2e5, 3e5, 2.4e5, 2 * tilt), rounding);
  });

  it("ties stations together by the shifts of one cause, and by no other", () => {
    const [first, second, third] = exactArrivals({ stations: ["a", "b", "c"].map((id, i) => ({ id, position: at(10 * i, 20) })), storm: at(-40, 60) });
    const arrivalsOf = (causes: readonly ("timed-readings" | "bin-width")[]) =>
      statedObservations([first, second, third].flatMap((arrival) => arrival ?? [])).estimates.map((sent, i) => ({
        ...{ id: sent.stationId, position: at(0, 0), readings: [], exposure: null, sight: null },
        estimate: { ...sent.estimate, sharedShifts: [{ cause: causes[i] ?? "bin-width", distanceMetres: 1e5 * (i + 1), originSeconds: -7000 * (i + 1) }] },
      }));
    const shared = steadyCovariance(arrivalsOf(["bin-width", "bin-width", "timed-readings"]), DEFAULT_SETTINGS, 1);
    const none = steadyCovariance(arrivalsOf(["bin-width", "timed-readings", "timed-readings"]).map((arrival) => ({ ...arrival, estimate: { ...arrival.estimate, sharedShifts: [] } })), DEFAULT_SETTINGS, 1);
    const added = (row: number, column: number) => (shared[row * 6 + column] ?? NaN) - (none[row * 6 + column] ?? NaN);
    const close = { relative: 1e-4, unit: "(ratio)", because: "a difference of squares" };
    expectWithin(added(0, 1), 1e5 * 2e5, close);
    expectWithin(added(1, 0), 1e5 * 2e5, close);
    expectWithin(added(0, 4), 1e5 * -14_000, close);
    expectWithin(added(3, 1), -7000 * 2e5, close);
    expectWithin(added(4, 0), 1e5 * -14_000, close);
    expectWithin(added(3, 4), 7000 * 14_000, close);
    for (const [row, column] of [[0, 0], [0, 2], [1, 2], [3, 5], [1, 5]] as const) expect(added(row, column)).toBe(0);
  });

  it("takes Student's t for what few readings say of their own scatter", () => {
    const ladder = [0.045, 0.05, 0.055, 0.06, 0.065, 0.07];
    const offs = [2, -3, 1, 3, -4, 2];
    const lineOf = (factor: number) => {
      const readings = ladder.map((frequencyHz, i) => ({
        ...{ frequencyHz, arrivalSigmaSeconds: 1800, frequencySigmaHz: 0, kind: "ridge" as const, row: i + 2, bearing: null },
        arrivalEpochSeconds: 7.7e6 * frequencyHz + factor * 1800 * (offs[i] ?? NaN),
      }));
      const outcome = fitDispersionLine(readings, DEFAULT_SETTINGS);
      if (outcome.kind !== "fitted") throw new Error("there is a line");
      return outcome.line;
    };
    const scattered = lineOf(1);
    expect(scattered.degreesOfFreedom).toBe(4);
    const widened = widenedForScatter(scattered).covariance;
    // Student's t at one sigma of a Gaussian: 1.1416 for 4 degrees (published tables; from memory)
    for (const key of ["distanceVariance", "originVariance", "distanceOriginCovariance"] as const) {
      expectWithin(widened[key] / scattered.covariance[key], 1.1416 ** 2, { relative: 1e-3, unit: "(ratio)", because: "four digits" });
    }
    expect(widenedForScatter(lineOf(0.1))).toEqual(lineOf(0.1));
    expect(widenedForScatter({ ...scattered, reducedChiSquare: null })).toMatchObject({ covariance: scattered.covariance });
  });
});
