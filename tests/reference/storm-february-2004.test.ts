import { describe, expect, it } from "vitest";
import { z } from "zod";
import type { StationReading } from "#lib/core/arrival/observations.ts";
import { buildSightTable } from "#lib/core/geodesy/build-sight-table.ts";
import { buildLandMask } from "#lib/core/geodesy/land-mask.ts";
import { visibleFraction } from "#lib/core/geodesy/sight-table.ts";
import { planSubsets } from "#lib/core/source/conditioned.ts";
import { linearFit, placeColumns } from "#lib/core/source/linear-fit.ts";
import { networkOf } from "#lib/core/source/network.ts";
import { climbToPeak } from "#lib/core/source/peak.ts";
import { DEFAULT_SETTINGS } from "#lib/core/source/settings.ts";
import { solveEvent } from "#lib/core/source/solve-event.ts";
import { chiSquareQuantile } from "#lib/core/statistics/chi-square.ts";
import type { Position } from "#lib/core/units/position.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { shippedLand } from "#tests/support/land.ts";
import { positionSchema, referenceFacts, referenceTable } from "#tests/support/reference-table.ts";
import { legBetween } from "#tests/support/simulator/ellipsoid.ts";
import { ridgeReading } from "#tests/support/simulator/matched-storm.ts";
import { observationsOf } from "#tests/support/simulator/simulated-event.ts";

const receiver = z.strictObject({ id: z.string(), position: positionSchema, distanceMetres: z.number() });
const { storm, receivers } = referenceFacts("storm-february-2004", z.object({ storm: positionSchema, receivers: z.array(receiver) }));
const mirrorRow = z.strictObject({ first: z.string(), second: z.string(), mirror: positionSchema });
const mirrors = referenceTable("storm-february-2004", mirrorRow);
const arrivalRow = z.looseObject({ id: z.string(), frequencyHz: z.number(), hours: z.number() });
const arrivals = referenceTable("arrivals-february-2004", arrivalRow);

const ORIGIN_EPOCH_SECONDS = Date.UTC(2004, 1, 24) / 1000; // assumed: the source gives the day
const GRAVITY = 9.81; // of the table of hours
const minute = { absolute: 60, unit: "s", because: "exact readings; what the method asks for" };
const land = buildLandMask(shippedLand());

/** Readings as the table of hours has them; Port Moresby's way crosses land, so sight is off. */
function locatedFrom(ids: readonly string[]) {
  const readings: StationReading[] = arrivals.rows
    .filter(({ id }) => ids.includes(id))
    .map(({ id, frequencyHz, hours }) => ridgeReading({ stationId: id, frequencyHz, arrivalEpochSeconds: ORIGIN_EPOCH_SECONDS + 3600 * hours }));
  const observations = observationsOf(receivers.filter(({ id }) => ids.includes(id)), readings);
  const settings = { ...DEFAULT_SETTINGS, gravity: GRAVITY, sight: false };
  const { answer } = solveEvent({ observations, settings, land, sightTables: new Map() });
  if (answer === null) throw new Error("no station was fitted");
  return answer;
}

const missOf = (from: Position, to: Position) => legBetween(from, to).distanceMetres;

describe("the storm of February 2004, placed from its arrivals", () => {
  it("has three receivers, four arrivals at each, and three mirror points", () => {
    expect(receivers).toHaveLength(3);
    expect(arrivals.rows).toHaveLength(12);
    expect(mirrors.rows).toHaveLength(3);
  });

  it("lies where three rings close, and when", () => {
    const { outcome, source, modes, crossings, fit, stations } = locatedFrom(["berkeley", "port-moresby", "christmas"]);
    expect(outcome).toBe("located");
    expectWithin(missOf(source?.position ?? storm, storm), 0, mirrors.tolerance);
    expectWithin(source?.originEpochSeconds ?? NaN, ORIGIN_EPOCH_SECONDS, minute);
    expect(source?.onLand).toBe(false);
    expect(modes).toHaveLength(1);
    expectWithin(fit?.ringMissMetres ?? NaN, 0, mirrors.tolerance);
    for (const { residual } of stations) expectWithin(residual?.distanceMetres ?? NaN, 0, mirrors.tolerance);
    for (const { residual } of stations) expectWithin(residual?.originSeconds ?? NaN, 0, minute);
    expect(crossings).toHaveLength(3);
  });

  it.each(mirrors.rows)("may lie at both crossings of $first and $second", ({ first, second, mirror }) => {
    const { outcome, modes, crossings } = locatedFrom([first, second]);
    expect(outcome).toBe("several");
    expect(modes).toHaveLength(2);
    for (const place of [storm, mirror]) {
      const nearest = [...modes].sort((a, b) => missOf(a.position, place) - missOf(b.position, place))[0];
      expectWithin(missOf(nearest?.position ?? mirror, place), 0, mirrors.tolerance);
      expectWithin(nearest?.originEpochSeconds ?? NaN, ORIGIN_EPOCH_SECONDS, minute);
      const crossing = Math.min(...(crossings[0]?.points ?? []).map((point) => missOf(point, place)));
      expectWithin(crossing, 0, mirrors.tolerance);
    }
    const together = modes.reduce((sum, { probability }) => sum + probability, 0);
    expectWithin(together, 1, { absolute: 1e-9, unit: "(probability)", because: "each cell goes to one crossing" });
  });
});

describe("the ways of the storm of February 2004", () => {
  it("cross land on the way to Port Moresby alone", () => {
    const open = receivers.map(({ id, position }) => {
      const { distanceMetres, headsTowardDegrees } = legBetween(position, storm);
      const table = buildSightTable({ station: position, land });
      return [id, visibleFraction({ table, bearingDegrees: headsTowardDegrees, distanceMetres, discRadiusMetres: 150_000 }) > 0.5];
    });
    expect(Object.fromEntries(open)).toEqual({ berkeley: true, "port-moresby": false, christmas: true });
  });
});

describe("the ellipse of the storm of February 2004", () => {
  const axis = z.strictObject({ quantity: z.string(), value: z.number(), printed: z.number(), reason: z.string() });
  const table = referenceTable("ellipse-february-2004", axis);
  const facts = z.object({ distanceFraction: z.number(), majorAzimuthDegrees: z.number() });
  const { distanceFraction, majorAzimuthDegrees } = referenceFacts("ellipse-february-2004", facts);
  const none = { distanceMetres: 0, originSeconds: 0, sharedCorrelation: 0, azimuthScaleDegrees: 30, tiltSecondsPerHz: 0, scaleFraction: 0 };
  const stated = receivers.map(({ id, position, distanceMetres }) => {
    const covariance = { distanceVariance: (distanceFraction * distanceMetres) ** 2, originVariance: 3600 ** 2, distanceOriginCovariance: 0 };
    const estimate = { distanceMetres, originEpochSeconds: ORIGIN_EPOCH_SECONDS, covariance, sharedShifts: [], bearing: null };
    return { id, position, estimate, readings: [], exposure: null, sight: null };
  });
  const network = networkOf(stated, { settings: { ...DEFAULT_SETTINGS, spread: none } });
  const peak = climbToPeak(network, { latitudeDegrees: 44, longitudeDegrees: 157 }, planSubsets(network, [[]]));
  const covariance = peak && linearFit({ ...peak, subset: 0, columns: placeColumns(network, peak.site) })?.covariance;
  const [ee = NaN, en = NaN, , , nn = NaN] = covariance ?? [];
  const half = Math.hypot((ee - nn) / 2, en);
  const [major, minor] = [Math.sqrt((ee + nn) / 2 + half) / 1000, Math.sqrt((ee + nn) / 2 - half) / 1000];
  const ninetyFive = Math.sqrt(chiSquareQuantile(0.95, 2));
  const found: Record<string, number> = {
    oneSigmaMajorKilometres: major,
    oneSigmaMinorKilometres: minor,
    ninetyFiveMajorKilometres: major * ninetyFive,
    ninetyFiveMinorKilometres: minor * ninetyFive,
  };

  it("has four axes", () => {
    expect(table.rows).toHaveLength(4);
  });
  it.each(table.rows)("has a $quantity of $value", ({ quantity, value, printed }) => {
    expectWithin(found[quantity] ?? NaN, value, table.tolerance);
    expectWithin(printed, value, { relative: 1e-3, unit: "km", because: "the value first worked out was a thousandth off" });
  });
  it("points along its azimuth", () => {
    const azimuth = (Math.atan2(2 * en, nn - ee) * 90) / Math.PI; // of the major axis, clockwise from north
    expectWithin((azimuth + 180) % 180, majorAzimuthDegrees, { absolute: 0.01, unit: "degrees", because: "given to a hundredth" });
  });
});
