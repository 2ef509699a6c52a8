import { describe, expect, it } from "vitest";
import { buildSightTable } from "#lib/core/geodesy/build-sight-table.ts";
import { buildLandMask } from "#lib/core/geodesy/land-mask.ts";
import type { StationArrival } from "#lib/core/source/answer.ts";
import { assess } from "#lib/core/source/assess.ts";
import { straySets } from "#lib/core/source/belonging.ts";
import { boundAbove } from "#lib/core/source/bound.ts";
import { conditionAt, planSubsets, type Conditioned, type SubsetPlan } from "#lib/core/source/conditioned.ts";
import { exactSite } from "#lib/core/source/exact-site.ts";
import { reachMetres } from "#lib/core/source/grid.ts";
import { networkOf, type Network } from "#lib/core/source/network.ts";
import { DEFAULT_SETTINGS, type EstimationSettings } from "#lib/core/source/settings.ts";
import { outlookFrom } from "#lib/core/source/site.ts";
import { subsetLogs, weigh } from "#lib/core/source/weigh.ts";
import { wrapLongitudeDegrees, type Position } from "#lib/core/units/position.ts";
import { shippedLand } from "#tests/support/land.ts";
import { legBetween, pointAlong } from "#tests/support/simulator/ellipsoid.ts";
import { randomStream, type RandomStream } from "#tests/support/simulator/random.ts";

const NO_FLOORS = { free: -Infinity, held: -Infinity };
const land = buildLandMask(shippedLand());

const anywhere = (random: RandomStream): Position => ({
  latitudeDegrees: (Math.asin(random.between(-1, 1)) * 180) / Math.PI,
  longitudeDegrees: random.between(-180, 180),
});

/** A storm anywhere and two to five stations, some with a direction, some open to a part of the sea, some that see land. */
function drawArrivals(random: RandomStream, storm: Position, sees: boolean): StationArrival[] {
  return Array.from({ length: random.whole(2, 5) }, (_, i) => {
    const position = pointAlong(storm, { distanceMetres: random.between(2e5, 1.8e7), headsTowardDegrees: random.between(0, 360) });
    const { distanceMetres } = legBetween(position, storm);
    const [fraction, seconds] = [random.between(0.01, 0.08), 3600 * random.between(1, 8)];
    const sigma = fraction * distanceMetres;
    return {
      id: `s${i}`,
      position,
      estimate: {
        distanceMetres: distanceMetres + sigma * random.normal(),
        originEpochSeconds: seconds * random.normal(),
        covariance: { distanceVariance: sigma ** 2, originVariance: seconds ** 2, distanceOriginCovariance: -0.9 * sigma * seconds },
        sharedShifts: [],
        bearing: random.uniform() < 0.3 ? { comesFromDegrees: random.between(0, 360), sigmaDegrees: random.between(10, 40) } : null,
      },
      readings: [],
      exposure: random.uniform() < 0.3 ? { facesFromDegrees: random.between(0, 360), facesToDegrees: random.between(0, 360) } : null,
      sight: sees ? buildSightTable({ station: position, land }) : null,
    };
  });
}

function settingsOf(event: number): EstimationSettings {
  const spreads = [
    { distanceMetres: 150_000, sharedCorrelation: 0.5, azimuthScaleDegrees: 30 },
    { distanceMetres: 40_000, sharedCorrelation: 0.9, azimuthScaleDegrees: 120 },
    { distanceMetres: 300_000, sharedCorrelation: 0, azimuthScaleDegrees: 5 },
  ];
  return { ...DEFAULT_SETTINGS, spread: { ...DEFAULT_SETTINGS.spread, ...spreads[event % 3] } };
}

/** Middles of cells near the storm, near a station or its antipode, and anywhere. */
function drawCentre(random: RandomStream, storm: Position, arrivals: readonly StationArrival[]): Position {
  const { latitudeDegrees, longitudeDegrees } = arrivals[0]?.position ?? storm;
  const opposite = { latitudeDegrees: -latitudeDegrees, longitudeDegrees: wrapLongitudeDegrees(longitudeDegrees + 180) };
  const from = [storm, storm, { latitudeDegrees, longitudeDegrees }, opposite, anywhere(random)][random.whole(0, 4)] ?? storm;
  return pointAlong(from, { distanceMetres: random.between(0, 2.5e6), headsTowardDegrees: random.between(0, 360) });
}

function weightAt(network: Network, conditioned: Conditioned, position: Position) {
  const site = exactSite(network, position);
  const assessment = assess(conditioned, site.distances);
  const logs = subsetLogs(conditioned, assessment, site.logBearing);
  return { logs, ...weigh({ conditioned, assessment, logs, outlook: outlookFrom(network, site, position, null) }) };
}

const conditioned = (network: Network, azimuths: Float64Array | null, plan: SubsetPlan): Conditioned => {
  const found = conditionAt(network, azimuths, plan);
  if (found === null) throw new Error("the covariance is positive definite");
  return found;
};

describe("the bound of the density about a place", () => {
  const events = 90;
  /** For each place within reach of each cell: by how much the density, free and held, stays below its bound. */
  const slacks = Array.from({ length: events }, (_, event) => {
    const random = randomStream(9, event);
    const storm = anywhere(random);
    const arrivals = drawArrivals(random, storm, event % 3 === 0);
    const network = networkOf(arrivals, { settings: settingsOf(event) });
    const plan = planSubsets(network, straySets(network.size));
    return Array.from({ length: 8 }, (__, draw) => {
      const level = 1 + (draw % 4);
      const centre = drawCentre(random, storm, arrivals);
      const site = exactSite(network, centre);
      return [true, false].flatMap((apart) => {
        const used = conditioned(network, apart ? null : site.azimuths, plan);
        const surroundings = { conditioned: used, site, assessment: assess(used, site.distances), reachMetres: reachMetres(level), apart };
        const bound = boundAbove(NO_FLOORS, surroundings);
        if (bound === null) throw new Error("nothing lies below no floor");
        return Array.from({ length: 6 }, (___, place) => {
          const distanceMetres = reachMetres(level) * (place < 3 ? 1 : Math.sqrt(random.uniform()));
          const position = pointAlong(centre, { distanceMetres, headsTowardDegrees: random.between(0, 360) });
          const weight = weightAt(network, apart ? conditioned(network, exactSite(network, position).azimuths, plan) : used, position);
          const bySubset = Math.min(...weight.logs.map((log, s) => (bound.bySubsetFree[s] ?? NaN) - log));
          return { level, apart, free: bound.logFree - weight.logFree, held: bound.logHeld - weight.logHeld, bySubset };
        });
      });
    }).flat(2);
  }).flat();

  it("is looked at in thousands of places", () => {
    expect(slacks.length).toBe(events * 8 * 2 * 6);
  });
  it("is never exceeded, land disregarded or held against it, by all subsets or by any", () => {
    expect(slacks.filter(({ free, held, bySubset }) => !(free >= 0 && held >= 0 && bySubset >= 0))).toEqual([]);
  });
  it("is near enough to leave cells out by", () => {
    const fine = slacks.filter(({ level, apart }) => level === 4 && !apart).map(({ free }) => free).sort((a, b) => a - b);
    expect(fine[Math.floor(fine.length / 2)]).toBeLessThan(8);
    expect(Math.min(...fine)).toBeLessThan(0.1);
  });

  it("is not given below both floors", () => {
    const random = randomStream(2);
    const storm = anywhere(random);
    const arrivals = drawArrivals(random, storm, false);
    const network = networkOf(arrivals, { settings: DEFAULT_SETTINGS });
    const site = exactSite(network, storm);
    const used = conditioned(network, site.azimuths, planSubsets(network, straySets(network.size)));
    const surroundings = { conditioned: used, site, assessment: assess(used, site.distances), reachMetres: 1000, apart: false };
    const logFree = boundAbove(NO_FLOORS, surroundings)?.logFree ?? NaN;
    expect(boundAbove({ free: logFree + 1, held: logFree + 1 }, surroundings)).toBeNull();
    expect(boundAbove({ free: logFree - 1, held: Infinity }, surroundings)?.logFree).toBe(logFree);
    expect(boundAbove({ free: Infinity, held: logFree - 1 }, surroundings)?.logFree).toBe(logFree);
  });
});
