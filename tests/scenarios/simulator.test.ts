import { describe, expect, test } from "vitest";
import { expectWithin } from "../support/expect-within.ts";
import { travelSeconds } from "../support/simulator/deep-water.ts";
import { legBetween, pointAlong } from "../support/simulator/ellipsoid.ts";
import { matchedReadings } from "../support/simulator/matched-storm.ts";
import { physicalReadings, type ReadingWay } from "../support/simulator/physical-readings.ts";
import { buildStorm, type StormShape } from "../support/simulator/physical-storm.ts";
import { randomStream } from "../support/simulator/random.ts";
import { drawEffects, STATED_EFFECTS } from "../support/simulator/storm-effects.ts";
import { readWorld } from "../support/simulator/world.ts";

/** Storm of 24 February 2004, Delpey, Ardhuin, Collard & Chapron 2010; distances worked out on WGS84 from the published positions. */
const STORM = { latitudeDegrees: 42, longitudeDegrees: 160 };
const RECEIVERS = [
  { name: "Berkeley", position: { latitudeDegrees: 37.87622, longitudeDegrees: -122.23558 }, distanceMetres: 6425863.562, hours: [114.325, 137.19, 160.055, 182.919] },
  { name: "Port Moresby", position: { latitudeDegrees: -9.4047, longitudeDegrees: 147.1597 }, distanceMetres: 5840800.242, hours: [103.916, 124.699, 145.482, 166.265] },
  { name: "Christmas gauge", position: { latitudeDegrees: 1.985, longitudeDegrees: -157.4766667 }, distanceMetres: 6131501.629, hours: [109.088, 130.905, 152.723, 174.54] },
] as const;

describe("the simulator's own earth and sea", () => {
  test.each(RECEIVERS)("reaches $name as far and as late as worked out from the published storm", ({ position, distanceMetres, hours }) => {
    const leg = legBetween(STORM, position);
    expectWithin(leg.distanceMetres, distanceMetres, { absolute: 0.01, unit: "m", because: "one position is printed to 1e-7 degrees, 1 cm" });
    hours.forEach((expected, i) => {
      const seconds = travelSeconds({ frequencyHz: 0.05 + i / 100, distanceMetres, gravity: 9.81 });
      expectWithin(seconds / 3600, expected, { absolute: 0.0006, unit: "h", because: "printed to 0.001 h" });
    });
    const there = pointAlong(STORM, leg);
    expectWithin(there.latitudeDegrees, position.latitudeDegrees, { absolute: 1e-8, unit: "degrees", because: "1 mm" });
    expectWithin(there.longitudeDegrees, position.longitudeDegrees, { absolute: 1e-8, unit: "degrees", because: "1 mm" });
  });

  test("agrees with Karney's library documentation from Berkeley to Port Moresby", () => {
    const [berkeley, portMoresby] = RECEIVERS;
    const leg = legBetween(berkeley.position, portMoresby.position);
    expectWithin(leg.distanceMetres, 10700471.955233702, { absolute: 0.001, unit: "m", because: "Vincenty's series is good to 0.1 mm" });
    expectWithin(leg.headsTowardDegrees, 360 - 96.91639942294974, { absolute: 1e-8, unit: "degrees", because: "1 mm across the path" });
  });

  // Facts of geography, from any atlas.
  test.each([
    ["the middle of the Atlantic", 30, -45, true],
    ["the sea off Fiji, on the 180th meridian", -19, 179.99, true],
    ["the Ross Sea's open water", -70, 179.5, true],
    ["Kansas", 38, -98, false],
    ["Chukotka, on the 180th meridian", 68, 179.99, false],
    ["the South Pole", -90, 0, false],
    ["the North Pole", 90, 0, true],
    ["Antarctica's plateau", -80, 90, false],
    ["the Caspian Sea, which no ocean swell reaches", 42, 50.5, false],
  ])("tells whether %s is sea", (_, latitudeDegrees, longitudeDegrees, sea) => {
    expect(readWorld().isSea({ latitudeDegrees, longitudeDegrees })).toBe(sea);
  });

  test("sees Hawaii from the Gulf of Alaska, and not the North Sea from California", () => {
    const { isOpen } = readWorld();
    const gulfOfAlaska = { latitudeDegrees: 52, longitudeDegrees: -145 };
    expect(isOpen({ station: { latitudeDegrees: 21.7, longitudeDegrees: -158 }, storm: gulfOfAlaska })).toBe(true);
    expect(isOpen({ station: { latitudeDegrees: 34.5, longitudeDegrees: -121 }, storm: { latitudeDegrees: 57, longitudeDegrees: 2 } })).toBe(false);
  });
});

describe("the simulator's chance", () => {
  test("has the moments of the normal law", () => {
    const random = randomStream(7, 1);
    const sample = Array.from({ length: 40_000 }, () => random.normal());
    const mean = sample.reduce((sum, x) => sum + x, 0) / sample.length;
    const variance = sample.reduce((sum, x) => sum + (x - mean) ** 2, 0) / sample.length;
    expectWithin(mean, 0, { absolute: 0.015, unit: "", because: "three standard errors of 40,000 draws" });
    expectWithin(variance, 1, { absolute: 0.022, unit: "", because: "three standard errors of 40,000 draws" });
    const outside = sample.filter((x) => Math.abs(x) > 1.959964).length / sample.length;
    expectWithin(outside, 0.05, { absolute: 0.0033, unit: "", because: "three standard errors of 40,000 draws" });
  });

  test("shares the stations' effects as the method states", () => {
    const random = randomStream(8, 1);
    const draws = Array.from({ length: 8000 }, () => drawEffects({ azimuthsDegrees: [350, 20, 170], sizes: STATED_EFFECTS, random }));
    const products = (a: number, b: number): number =>
      draws.reduce((sum, { pathMetres }) => sum + (pathMetres[a] ?? NaN) * (pathMetres[b] ?? NaN), 0) / draws.length / 150_000 ** 2;
    const because = "three standard errors of 8000 draws";
    expectWithin(products(1, 1), 1, { absolute: 0.05, unit: "", because });
    expectWithin(products(0, 1), 0.5 * Math.exp(-1), { absolute: 0.035, unit: "", because });
    expectWithin(products(1, 2), 0.5 * Math.exp(-5), { absolute: 0.035, unit: "", because });
  });
});

const SHORE = { id: "shore", position: { latitudeDegrees: 0, longitudeDegrees: 36 } };
const STILL: StormShape = {
  centre: { latitudeDegrees: 0, longitudeDegrees: 0 },
  originEpochSeconds: 1_600_000_000,
  sizeSigmaMetres: 0,
  lifeSigmaSeconds: 6 * 3600,
  speedMetresPerSecond: 0,
  headsTowardDegrees: 0,
  peakHz: 0.065,
  peakFallHzPerSecond: 0,
  spectrumSigmaHz: 0.012,
};
const METRES_PER_SLOPE = 9.80665 / (4 * Math.PI);
const EXACT_DISTANCE = legBetween(STILL.centre, SHORE.position).distanceMetres;

/** Straight line through readings by plain least squares: time on frequency, or frequency on time. */
function slopeOf(points: readonly { x: number; y: number }[]): number {
  const meanX = points.reduce((sum, p) => sum + p.x, 0) / points.length;
  const meanY = points.reduce((sum, p) => sum + p.y, 0) / points.length;
  return points.reduce((sum, p) => sum + (p.x - meanX) * (p.y - meanY), 0) / points.reduce((sum, p) => sum + (p.x - meanX) ** 2, 0);
}

function readingsOf(shape: StormShape, way: ReadingWay): { frequencyHz: number; seconds: number }[] {
  return physicalReadings({ storm: buildStorm(shape), station: SHORE, random: randomStream(1), way }).map(({ reading }) => ({
    frequencyHz: reading.frequencyHz,
    seconds: reading.arrivalEpochSeconds - shape.originEpochSeconds,
  }));
}

function ridgeSlope(shape: StormShape, way: ReadingWay): number {
  return slopeOf(readingsOf(shape, way).map((r) => ({ x: r.frequencyHz, y: r.seconds })));
}

describe("the simulator's waves", () => {
  test("of a point without spread arrive on the straight line of deep water", () => {
    const sizes = { pathMetres: 0, departureSeconds: 0, sharedCorrelation: 0.5, azimuthScaleDegrees: 30, tiltSecondsPerHz: 0, scaleFraction: 0 };
    const readings = matchedReadings({
      stations: RECEIVERS.map(({ name, position }) => ({ id: name, position })),
      position: STORM,
      originEpochSeconds: 0,
      random: randomStream(3),
      sizes,
      noiseSeconds: 0,
    });
    expect(readings.length).toBeGreaterThanOrEqual(24);
    for (const { stationId, reading } of readings) {
      const metres = RECEIVERS.find(({ name }) => name === stationId)?.distanceMetres ?? NaN;
      const expected = (4 * Math.PI * reading.frequencyHz * metres) / 9.80665;
      expectWithin(reading.arrivalEpochSeconds, expected, { absolute: 0.01, unit: "s", because: "the straight line of Munk et al. 1963" });
    }
  });

  test("timed at moments look too far by (duration window / spectrum)^2", () => {
    // Product of two Gaussians: the mean frequency leans to the peak, so the distance grows by 1 + sigma_f^2 / sigma_S^2.
    const readings = readingsOf(STILL, { kind: "timed", everyHours: 3, noiseFraction: 0 });
    const apparent = METRES_PER_SLOPE / slopeOf(readings.map((r) => ({ x: r.seconds, y: r.frequencyHz })));
    const windowHz = (STILL.lifeSigmaSeconds * METRES_PER_SLOPE) / EXACT_DISTANCE;
    const expected = EXACT_DISTANCE * (1 + (windowHz / STILL.spectrumSigmaHz) ** 2);
    expectWithin(apparent, expected, { relative: 0.01, unit: "m", because: "1600 emitters stand for a Gaussian life; the closed form has 12 % excess here" });
  });

  test.each([
    [0.01, 1 - 0.01 ** 2 / 12 / 0.012 ** 2, 0.018],
    [0.005, 1 - 0.005 ** 2 / 12 / 0.012 ** 2, 0.005],
  ])("read in bins of %f Hz at their centres look too near by the bin's variance over the spectrum's", (binWidthHz, ratio, absolute) => {
    // The mean frequency in a bin is f + (w^2 / 12) d ln S / d f, and d ln S / d f = -(f - peak) / sigma_S^2.
    const apparent = METRES_PER_SLOPE * ridgeSlope(STILL, { kind: "ridge", binWidthHz, frequency: "bin-centre", noiseSeconds: 0 });
    expectWithin(apparent / EXACT_DISTANCE, ratio, { absolute, unit: "", because: "5.8 and 1.4 % to first order; a bin's peak leans farther than its mean" });
    const mended = METRES_PER_SLOPE * ridgeSlope(STILL, { kind: "ridge", binWidthHz, frequency: "energy-mean", noiseSeconds: 0 });
    expectWithin(mended / EXACT_DISTANCE, 1, { absolute, unit: "", because: "mended but for the peak's lean beyond the mean" });
  });

  test("of a growing storm leave later the longer they are", () => {
    // For f given the time normal about peak - r (t - t0), the mean time given f has slope -r T^2 / (r^2 T^2 + S^2).
    const fall = 0.005 / STILL.lifeSigmaSeconds;
    const growing = { ...STILL, peakFallHzPerSecond: fall };
    const tilt = (-fall * STILL.lifeSigmaSeconds ** 2) / (0.005 ** 2 + STILL.spectrumSigmaHz ** 2);
    const slope = ridgeSlope(growing, { kind: "ridge", binWidthHz: 0.002, frequency: "energy-mean", noiseSeconds: 0 });
    const expected = EXACT_DISTANCE / METRES_PER_SLOPE + tilt;
    expectWithin(slope - EXACT_DISTANCE / METRES_PER_SLOPE, expected - EXACT_DISTANCE / METRES_PER_SLOPE, {
      relative: 0.12,
      unit: "s/Hz",
      because: "half an hour's slots and 1600 emitters; the tilt is some 4 h per 0.03 Hz",
    });
  });

  test("of a moving storm come from the middle of its track and life", () => {
    const moving = { ...STILL, sizeSigmaMetres: 100_000, speedMetresPerSecond: 12, headsTowardDegrees: 90 };
    const slope = ridgeSlope(moving, { kind: "ridge", binWidthHz: 0.002, frequency: "energy-mean", noiseSeconds: 0 });
    expectWithin(slope * METRES_PER_SLOPE, EXACT_DISTANCE, {
      relative: 0.01,
      unit: "m",
      because: "without growth every frequency comes on average from the centre; motion only widens the ridge",
    });
  });
});
