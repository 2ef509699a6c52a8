import { describe, expect, it } from "vitest";
import type { EventObservations } from "#lib/core/arrival/observations.ts";
import type { SourceAnswer } from "#lib/core/source/answer.ts";
import { DEFAULT_SETTINGS, type EstimationSettings } from "#lib/core/source/settings.ts";
import { solveEvent } from "#lib/core/source/solve-event.ts";
import { wrapLongitudeDegrees, type Position } from "#lib/core/units/position.ts";
import { shelfDelaySeconds } from "#lib/core/waves/shelf-delay.ts";
import { regionContains } from "#tests/support/coverage/region-contains.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { faultsOf, regionArea } from "#tests/support/region-checks.ts";
import { travelSeconds } from "#tests/support/simulator/deep-water.ts";
import { legBetween, pointAlong } from "#tests/support/simulator/ellipsoid.ts";
import { matchedReadings, ridgeReading } from "#tests/support/simulator/matched-storm.ts";
import { randomStream } from "#tests/support/simulator/random.ts";
import { observationsOf, type NetworkStation } from "#tests/support/simulator/simulated-event.ts";
import { exactArrivals, statedObservations, STORM_EPOCH_SECONDS, type StatedArrival } from "#tests/support/stated-arrivals.ts";

const at = (latitudeDegrees: number, longitudeDegrees: number): Position => ({ latitudeDegrees, longitudeDegrees });
const metres = (absolute: number, because: string) => ({ absolute, unit: "m", because });
const seconds = (absolute: number, because: string) => ({ absolute, unit: "s", because });
const ratio = (relative: number, because: string) => ({ relative, unit: "(ratio)", because });
const missOf = (from: Position | undefined, to: Position | undefined) => (from && to ? legBetween(from, to).distanceMetres : NaN);

function answerOf(observations: EventObservations, settings: EstimationSettings = DEFAULT_SETTINGS, checks = false): SourceAnswer {
  const { answer } = solveEvent({ observations, settings, land: null, sightTables: new Map(), checks });
  if (answer === null) throw new Error("no station was fitted");
  return answer;
}
const placed = (arrivals: readonly StatedArrival[]) => answerOf(statedObservations(arrivals));
const areas = ({ regions }: SourceAnswer) => regions.map(({ areaSquareMetres }) => areaSquareMetres);

/** Three stations about a storm, 5000 to 7000 km away, whose statements are out by some per cent and some hours. */
function arrivalsAbout(storm: Position, factor = 1): StatedArrival[] {
  const around = [[20, 5e6, 0.02, 3], [140, 6e6, -0.03, -2], [250, 7e6, 0.01, 4]] as const;
  const stations = around.map(([headsTowardDegrees, distanceMetres], i) => ({ id: `s${i}`, position: pointAlong(storm, { headsTowardDegrees, distanceMetres }) }));
  return exactArrivals({ stations, storm, distanceFraction: 0.04 * factor, originSigmaSeconds: 18_000 * factor }).map((arrival, i) => ({
    ...arrival,
    distanceMetres: arrival.distanceMetres * (1 + (around[i]?.[2] ?? NaN)),
    originEpochSeconds: arrival.originEpochSeconds + 3600 * (around[i]?.[3] ?? NaN),
  }));
}
const moved = (arrivals: readonly StatedArrival[], move: (position: Position) => Position) => arrivals.map((arrival) => ({ ...arrival, position: move(arrival.position) }));
const plain = placed(arrivalsAbout(at(20, -150)));

/** Two dozen stations all round a storm, every sixth of which heard another, days later and elsewhere. */
function manyArrivals(strays: (i: number) => boolean): StatedArrival[] {
  const storm = at(-40, -150);
  const stations = Array.from({ length: 24 }, (_, i) => ({ id: `s${String(i).padStart(2, "0")}`, position: pointAlong(storm, { headsTowardDegrees: 15 * i, distanceMetres: 3e6 + 3e5 * i }) }));
  return exactArrivals({ stations, storm }).map((arrival, i) =>
    strays(i) ? { ...arrival, distanceMetres: 14e6 - 2e5 * i, originEpochSeconds: arrival.originEpochSeconds + 86_400 * (4 + i / 6) } : arrival,
  );
}

describe("many stations", () => {
  it("are told apart from the strays among them, none of which then moves the answer", () => {
    const arrivals = manyArrivals((i) => i % 6 === 0);
    const answer = answerOf(statedObservations(arrivals), DEFAULT_SETTINGS, true);
    expect(answer.outcome).toBe("located");
    expect(answer.stations.flatMap(({ id, belongs }) => ((belongs ?? NaN) < 0.5 ? [id] : []))).toEqual(["s00", "s06", "s12", "s18"]);
    for (const { leaveOneOutShiftMetres } of answer.stations) expect(leaveOneOutShiftMetres).toBeLessThan(20_000);
  });

  it("that tell of as many storms do not agree", () => {
    const scattered = manyArrivals(() => false).map((arrival, i) => ({ ...arrival, originEpochSeconds: arrival.originEpochSeconds + 4e5 * ((7 * i) % 24) }));
    expect(placed(scattered).outcome).toBe("no-agreement");
  });

  it("all belong where that is certain beforehand", () => {
    const answer = answerOf(statedObservations(arrivalsAbout(at(20, -150))), { ...DEFAULT_SETTINGS, belongPrior: 1 });
    expect(answer.outcome).toBe("located");
    for (const { belongs } of answer.stations) expect(belongs).toBeGreaterThan(1 - 1e-9);
  });

  it("keep the p-value of the spread as set where their misfit raised it", () => {
    const out = manyArrivals(() => false)
      .filter((_, i) => i % 4 === 0)
      .map((arrival, i) => ({ ...arrival, originEpochSeconds: arrival.originEpochSeconds + 3600 * (i % 2 === 0 ? -16 : 16) }));
    const answer = placed(out);
    expect(answer.spreadRaisedBy).toBeGreaterThan(1);
    expect(answer.fit?.pValue).toBeLessThan(0.05);
  });
});

describe("stations that measure directions", () => {
  /** Exact distances and times, and the true directions off by so much. */
  const directed = (count: number, offDegrees: number): StatedArrival[] => {
    const storm = at(-45, -165);
    const stations = Array.from({ length: count }, (_, i) => ({ id: `s${i}`, position: pointAlong(storm, { headsTowardDegrees: 100 + 12 * i, distanceMetres: 6e6 + 4e5 * i }) }));
    return exactArrivals({ stations, storm }).map((arrival) => ({
      ...arrival,
      bearing: { comesFromDegrees: legBetween(arrival.position, storm).headsTowardDegrees + offDegrees, sigmaDegrees: 15 },
    }));
  };
  it.each([2, 3, 4, 6, 8, 14])("agree with their distances: %d of them", (count) => {
    const answer = placed(directed(count, 0));
    expect(answer.outcome).toBe("located");
    expectWithin(missOf(answer.source?.position, at(-45, -165)), 0, metres(1000, "directions on the mean sphere"));
  });

  it("draw the best point to where the whole density is highest, from wherever the climb starts", () => {
    const answer = answerOf(statedObservations(directed(5, 8)), DEFAULT_SETTINGS, true);
    const shifts = answer.stations.map(({ leaveOneOutShiftMetres }) => leaveOneOutShiftMetres ?? NaN);
    expect(missOf(answer.source?.position, at(-45, -165))).toBeGreaterThan(20_000);
    for (const shift of shifts) expect(shift).toBeGreaterThan(1000); // each station draws
  });
});

describe("a source", () => {
  it.each([30, 90.5, 150, 211, -29.7])("goes round the Earth with its stations, by %d degrees", (turn) => {
    const turned = (position: Position) => ({ ...position, longitudeDegrees: wrapLongitudeDegrees(position.longitudeDegrees + turn) });
    const answer = placed(moved(arrivalsAbout(at(20, -150)), turned));
    const expected = plain.source && turned(plain.source.position);
    expectWithin(missOf(answer.source?.position, expected ?? undefined), 0, metres(1, "both are exact geodesics' best points"));
    expectWithin(answer.source?.originEpochSeconds ?? NaN, plain.source?.originEpochSeconds ?? NaN, seconds(1, "likewise"));
    expectWithin(answer.source?.originSigmaSeconds ?? NaN, plain.source?.originSigmaSeconds ?? NaN, ratio(0.01, "other cells"));
    areas(answer).forEach((area, i) => expectWithin(area, areas(plain)[i] ?? NaN, ratio(0.02, "other cells")));
  });

  it("is mirrored with its stations from north to south", () => {
    const answer = placed(moved(arrivalsAbout(at(20, -150)), ({ latitudeDegrees, longitudeDegrees }) => at(-latitudeDegrees, longitudeDegrees)));
    const { latitudeDegrees, longitudeDegrees } = plain.source?.position ?? at(NaN, NaN);
    expectWithin(missOf(answer.source?.position, at(-latitudeDegrees, longitudeDegrees)), 0, metres(1, "both are exact"));
    areas(answer).forEach((area, i) => expectWithin(area, areas(plain)[i] ?? NaN, ratio(0.02, "other cells")));
  });

  const places: readonly [string, Position][] = [
    ["on the 180th meridian", at(20, 180)],
    ["just east of it", at(-35, -179.9)],
    ["on the north pole", at(90, 0)],
    ["beside the north pole", at(88, 100)],
    ["near the south pole, across the 180th meridian", at(-84, 179)],
    ["where the zero meridian meets the equator", at(0, 0)],
  ];
  it.each(places)("has a region as large, and drawn for the map, %s", (_, storm) => {
    const answer = placed(arrivalsAbout(storm));
    expect(answer.outcome).toBe("located");
    areas(answer).forEach((area, i) => expectWithin(area, areas(plain)[i] ?? NaN, ratio(0.03, "other cells, and the ellipsoid's own bend")));
    for (const { geometry, areaSquareMetres } of answer.regions) {
      expect(faultsOf(geometry)).toEqual([]);
      expectWithin(regionArea(geometry), areaSquareMetres, ratio(0.005, "sides of cells, and areas at their centres"));
    }
    const { position } = answer.source ?? { position: at(NaN, NaN) };
    const holding = answer.regions.filter(({ geometry }) => regionContains(geometry, position));
    expect(holding).toHaveLength(3);
  });

  it("lies in regions of which the surer hold the less sure", () => {
    const random = randomStream(5);
    const { regions } = placed(arrivalsAbout(at(-30, 179)));
    expect(regions.map(({ probability }) => probability)).toEqual([0.5, 0.9, 0.95]);
    const held = Array.from({ length: 4000 }, () => {
      const place = pointAlong(at(-30, 179), { distanceMetres: 1.5e6 * Math.sqrt(random.uniform()), headsTowardDegrees: random.between(0, 360) });
      return regions.map(({ geometry }) => regionContains(geometry, place));
    });
    expect(held.filter(([half = false, ninety = false, most = false]) => half > ninety || ninety > most)).toEqual([]);
    const counts = [0, 1, 2].map((i) => held.filter((one) => one[i]).length);
    expect(counts[0]).toBeGreaterThan(100);
    expect(counts[1]).toBeGreaterThan(2 * (counts[0] ?? NaN));
    expect(counts[2]).toBeGreaterThan(1.1 * (counts[1] ?? NaN));
  });

  it("is less sure with less sure stations", () => {
    const [surer, plainer, less] = [0.5, 1, 2].map((factor) => areas(placed(arrivalsAbout(at(20, -150), factor))));
    for (const i of [0, 1, 2]) {
      expect(plainer?.[i]).toBeGreaterThan(1.1 * (surer?.[i] ?? NaN));
      expect(less?.[i]).toBeGreaterThan(1.3 * (plainer?.[i] ?? NaN));
    }
  });
});

describe("an event told otherwise", () => {
  const stations: NetworkStation[] = [
    { id: "north", position: at(58.3, -134.4) },
    { id: "east", position: at(37.9, -122.2) },
    { id: "line", position: at(2, -157.5) },
    { id: "south", position: at(-41.3, 174.8) },
  ];
  const readings = matchedReadings({ stations, position: at(42, 165), originEpochSeconds: STORM_EPOCH_SECONDS, random: randomStream(12) });
  const told = observationsOf(stations, readings);
  const answer = answerOf(told, DEFAULT_SETTINGS, true);
  const byId = ({ stations: verdicts }: SourceAnswer) => [...verdicts].sort((a, b) => (a.id < b.id ? -1 : 1));

  it("in another order gives the same answer to the last bit", () => {
    const other = answerOf({ deployments: [...told.deployments].reverse(), readings: [...told.readings].reverse(), estimates: [] }, DEFAULT_SETTINGS, true);
    const { source, regions, modes, fit, drift, ruledOut, spreadRaisedBy, outcome } = answer;
    expect(other).toMatchObject({ source, regions, modes, fit, drift, ruledOut, spreadRaisedBy, outcome });
    expect(byId(other)).toEqual(byId(answer));
    expect(other.stations.map(({ id }) => id)).toEqual(["south", "line", "east", "north"]);
  });
  it("twice over gives the same answer to the last bit", () => {
    const twice = { deployments: [...told.deployments, ...told.deployments], readings: [...told.readings, ...told.readings], estimates: [] };
    expect(answerOf(twice, DEFAULT_SETTINGS, true)).toEqual(answer);
    expect(answerOf(told, DEFAULT_SETTINGS, true)).toEqual(answer);
  });
  it("counts a station under two names for more than one and less than two", () => {
    const arrivals = arrivalsAbout(at(20, -150));
    const [first] = arrivals;
    const doubled = placed([...arrivals, ...(first ? [{ ...first, id: "again" }] : [])]);
    const share = (areas(doubled)[2] ?? NaN) / (areas(plain)[2] ?? NaN);
    expect(share).toBeGreaterThan(0.7);
    expect(share).toBeLessThan(1);
  });
  it("by ground motion of twice the frequency is the same; not halved, it lies at half the distance", () => {
    const doubled = told.readings.map((entry) => (entry.stationId === "line" ? { ...entry, reading: { ...entry.reading, frequencyHz: 2 * entry.reading.frequencyHz } } : entry));
    const asGround = told.deployments.map((deployment) => (deployment.stationId === "line" ? { ...deployment, sensor: "ground" as const } : deployment));
    const heard = solveEvent({ observations: { ...told, deployments: asGround, readings: doubled }, settings: DEFAULT_SETTINGS, land: null, sightTables: new Map(), checks: false });
    expect(heard.answer?.source).toEqual(answer.source);
    expect(heard.warnings.map(({ code }) => code)).toEqual(["ground-halved", "no-shelf"]);
    const distanceOf = (observations: EventObservations) => {
      const { outcome } = solveEvent({ observations, settings: DEFAULT_SETTINGS, land: null, sightTables: new Map(), checks: false }).stations[2] ?? {};
      return outcome?.kind === "fitted" ? outcome.line.distanceMetres : NaN;
    };
    expectWithin(distanceOf({ ...told, readings: doubled }), distanceOf(told) / 2, ratio(1e-9, "a secondary microseism has twice the frequency"));
  });
  it("over a shelf is the same once the shelf's delay is taken off, and says so", () => {
    const shelf = [{ lengthMetres: 80_000, depthMetres: 60 }, { lengthMetres: 40_000, depthMetres: 140 }];
    const delayed = told.readings.map(({ stationId, reading }) => {
      const delay = stationId === "east" ? shelfDelaySeconds({ frequencyHz: reading.frequencyHz, legs: shelf, gravity: 9.80665 }) : 0;
      return { stationId, reading: { ...reading, arrivalEpochSeconds: reading.arrivalEpochSeconds + delay } };
    });
    const deployments = told.deployments.map((deployment) => (deployment.stationId === "east" ? { ...deployment, shelf } : deployment));
    const heard = solveEvent({ observations: { ...told, deployments, readings: delayed }, settings: DEFAULT_SETTINGS, land: null, sightTables: new Map(), checks: false });
    expectWithin(missOf(heard.answer?.source?.position, answer.source?.position), 0, metres(5, "rounding of seconds since 1970"));
    expect(heard.stations.map(({ outcome }) => outcome.kind === "fitted" && outcome.line.shelfCorrected)).toEqual([false, true, false, false]);
  });
  it("is judged by residuals that are ring less answer, in time and in distance", () => {
    for (const [i, { residual }] of answer.stations.entries()) {
      const { outcome } = solveEvent({ observations: told, settings: DEFAULT_SETTINGS, land: null, sightTables: new Map(), checks: false }).stations[i] ?? {};
      const station = stations[i]?.position;
      if (outcome?.kind !== "fitted" || !station || !answer.source) throw new Error("all four are fitted");
      const ring = outcome.line.distanceMetres - missOf(answer.source.position, station);
      expectWithin(residual?.distanceMetres ?? NaN, ring, metres(0.01, "two ways over the ellipsoid"));
      expectWithin(residual?.originSeconds ?? NaN, outcome.line.originEpochSeconds - answer.source.originEpochSeconds, seconds(1e-3, "rounding"));
    }
  });
});

describe("what can be said", () => {
  const stations = [{ id: "a", position: at(37.9, -122.2) }, { id: "b", position: at(2, -157.5) }, { id: "c", position: at(-41.3, 174.8) }];
  const storm = at(42, 165);

  it("by no station is nothing", () => {
    const none = solveEvent({ observations: statedObservations([]), settings: DEFAULT_SETTINGS, land: null, sightTables: new Map() });
    expect(none).toEqual({ stations: [], answer: null, warnings: [] });
  });

  it("by one station is a ring, as wide as its errors and the spread", () => {
    const [arrival] = exactArrivals({ stations: stations.slice(0, 1), storm });
    if (!arrival) throw new Error("there is one station");
    const answer = placed([arrival]);
    expect(answer).toMatchObject({ outcome: "ring-only", source: null, modes: [], fit: null, crossings: [] });
    const tilt = ((4 * 3600) / 0.03) * (9.80665 / (4 * Math.PI));
    const sigma = Math.hypot(arrival.distanceSigmaMetres, 150_000, 0.02 * arrival.distanceMetres, tilt);
    const girth = 2 * Math.PI * 6_371_008.8 * Math.sin(arrival.distanceMetres / 6_371_008.8);
    [0.674, 1.645, 1.96].forEach((sigmas, i) => expectWithin(areas(answer)[i] ?? NaN, 2 * sigmas * sigma * girth, ratio(0.03, "a ring as broad as this is no straight band")));
    for (const { geometry, areaSquareMetres } of answer.regions) {
      expect(faultsOf(geometry)).toEqual([]);
      expectWithin(regionArea(geometry), areaSquareMetres, ratio(0.01, "sides of wide cells"));
    }
    const onRing = pointAlong(arrival.position, { distanceMetres: arrival.distanceMetres, headsTowardDegrees: 200 });
    const beside = pointAlong(arrival.position, { distanceMetres: arrival.distanceMetres + 3 * sigma, headsTowardDegrees: 200 });
    expect(answer.regions.map(({ geometry }) => [regionContains(geometry, onRing), regionContains(geometry, beside)])).toEqual([[true, false], [true, false], [true, false]]);
  });

  it("by two at one place, or at one another's antipode, is too little", () => {
    const [first] = stations;
    if (!first) throw new Error("there are stations");
    const beside = { id: "beside", position: pointAlong(first.position, { distanceMetres: 20_000, headsTowardDegrees: 40 }) };
    expect(placed(exactArrivals({ stations: [first, beside], storm })).outcome).toBe("too-few");
    const opposite = { id: "opposite", position: at(-first.position.latitudeDegrees, wrapLongitudeDegrees(first.position.longitudeDegrees + 180)) };
    expect(placed(exactArrivals({ stations: [first, opposite], storm })).outcome).toBe("too-few");
    const off = { id: "off", position: pointAlong(first.position, { distanceMetres: 300_000, headsTowardDegrees: 40 }) };
    expect(placed(exactArrivals({ stations: [first, off], storm })).outcome).toBe("several");
  });

  it("of rings that do not meet is that they do not agree", () => {
    const apart = exactArrivals({ stations: stations.slice(0, 2), storm }).map((arrival, i) => ({ ...arrival, distanceMetres: i === 0 ? 1e6 : 9e6, distanceSigmaMetres: 50_000 }));
    expect(placed(apart)).toMatchObject({ outcome: "no-agreement", source: null, regions: [], modes: [] });
    const days = exactArrivals({ stations: stations.slice(0, 2), storm }).map((arrival, i) => ({ ...arrival, originEpochSeconds: arrival.originEpochSeconds + i * 8 * 86_400 }));
    expect(placed(days).outcome).toBe("no-agreement");
  });

  it("of possible sources is probabilities that make one at most, most probable first", () => {
    for (let event = 0; event < 12; event += 1) {
      const random = randomStream(31, event);
      const heard = stations.slice(0, event % 2 === 0 ? 2 : 3);
      const arrivals = exactArrivals({ stations: heard, storm: at(random.between(-55, 55), random.between(150, 250) - 360) }).map((arrival) => ({
        ...arrival,
        distanceMetres: arrival.distanceMetres * (1 + 0.05 * random.normal()),
      }));
      const probabilities = placed(arrivals).modes.map(({ probability }) => probability);
      expect(probabilities.reduce((sum, probability) => sum + probability, 0)).toBeLessThanOrEqual(1 + 1e-9);
      expect(probabilities).toEqual([...probabilities].sort((a, b) => b - a));
      expect(probabilities.filter((probability) => probability < 0.01)).toEqual([]);
    }
  });

  it("of two clocks a day apart is not whose is wrong, and of one that is a day slow that it is slow", () => {
    const dayOut = (count: number, days: number) =>
      placed(exactArrivals({ stations: [...stations, { id: "d", position: at(58.3, -134.4) }, { id: "e", position: at(-9.4, 147.2) }].slice(0, count), storm, distanceFraction: 0.02, originSigmaSeconds: 7200 }).map((arrival, i) =>
        i === 1 ? { ...arrival, originEpochSeconds: arrival.originEpochSeconds + days * 86_400 } : arrival,
      )).stations.map(({ clockOffset }) => clockOffset?.offsetSeconds ?? null);
    expect(dayOut(2, 1)).toEqual([null, null]);
    const [first, second = null, ...others] = dayOut(5, -1);
    expect([first, ...others]).toEqual([null, null, null, null]);
    expectWithin(second ?? NaN, -86_400, seconds(60, "the other four are exact"));
  });

  it("of a clock that is a day fast names it, sets its time aside and keeps its distance", () => {
    const wide = [...stations, { id: "d", position: at(58.3, -134.4) }, { id: "e", position: at(-9.4, 147.2) }];
    const exact = exactArrivals({ stations: wide, storm, distanceFraction: 0.02, originSigmaSeconds: 7200 });
    const answer = placed(exact.map((arrival) => (arrival.id === "b" ? { ...arrival, originEpochSeconds: arrival.originEpochSeconds + 86_400 } : arrival)));
    const named = answer.stations.filter(({ clockOffset }) => clockOffset !== null);
    expect(named.map(({ id }) => id)).toEqual(["b"]);
    const { offsetSeconds = NaN, sigmaSeconds = NaN } = named[0]?.clockOffset ?? {};
    expectWithin(offsetSeconds, 86_400, seconds(60, "the other four are exact"));
    expect(sigmaSeconds / 3600).toBeGreaterThan(5); // method.md 5: some 7 h for one event at the default spread
    expect(sigmaSeconds / 3600).toBeLessThan(10);
    expectWithin(missOf(answer.source?.position, storm), 0, metres(1000, "exact distances"));
    expect(answer.warnings.map(({ code }) => code)).toContain("clock-suspect");
  });

  it("of how far the answer moves without each station is nothing where all agree, and else as far as solving without it says", () => {
    const wide = [...stations, { id: "d", position: at(58.3, -134.4) }];
    const exact = exactArrivals({ stations: wide, storm });
    const shiftsOf = (arrivals: readonly StatedArrival[]) => answerOf(statedObservations(arrivals), DEFAULT_SETTINGS, true).stations.map(({ leaveOneOutShiftMetres }) => leaveOneOutShiftMetres);
    for (const shift of shiftsOf(exact)) expectWithin(shift ?? NaN, 0, metres(1, "exact statements"));
    const out = shiftsOf(exact.map((arrival) => (arrival.id === "c" ? { ...arrival, distanceMetres: 1.06 * arrival.distanceMetres } : arrival))).map((shift) => shift ?? NaN);
    expect(out[2]).toBeGreaterThan(30_000);
    const without = placed(exact.filter(({ id }) => id !== "c"));
    const all = placed(exact.map((arrival) => (arrival.id === "c" ? { ...arrival, distanceMetres: 1.06 * arrival.distanceMetres } : arrival)));
    expectWithin(out[2] ?? NaN, missOf(without.source?.position, all.source?.position), metres(5, "solved again without it"));
    expect(shiftsOf(exact.slice(0, 2))).toEqual([null, null]);
  });

  it("of a storm that moved between low and high frequencies is that it moved, and of one that stood that it did not", () => {
    const [low, high] = [storm, pointAlong(storm, { distanceMetres: 700_000, headsTowardDegrees: 70 })];
    const frequencies = Array.from({ length: 16 }, (_, i) => 0.045 + 0.0025 * i);
    const eventOf = (later: Position, hours: number, told: { readonly kind?: "timed"; readonly backward?: boolean } = {}) => {
      const readings = stations.flatMap(({ id, position }) =>
        frequencies.map((frequencyHz, i) => {
          const distanceMetres = missOf(i < 8 ? low : later, position);
          const arrivalEpochSeconds = STORM_EPOCH_SECONDS + (i < 8 ? 0 : 3600 * hours) + travelSeconds({ frequencyHz, distanceMetres });
          const { stationId, reading } = ridgeReading({ stationId: id, frequencyHz, arrivalEpochSeconds });
          return { stationId, reading: { ...reading, kind: told.kind ?? reading.kind } };
        }),
      );
      return answerOf(observationsOf(stations, told.backward ? readings.reverse() : readings), DEFAULT_SETTINGS, true).drift;
    };
    expect(eventOf(low, 0)).toMatchObject({ significant: false });
    expectWithin(eventOf(low, 0)?.shiftMetres ?? NaN, 0, metres(50, "exact readings"));
    const drift = eventOf(high, 30);
    expect(drift?.significant).toBe(true);
    expectWithin(drift?.shiftMetres ?? NaN, 700_000, metres(1000, "each half is exact"));
    expectWithin(drift?.shiftSeconds ?? NaN, 30 * 3600, seconds(60, "each half is exact"));
    expectWithin(eventOf(high, 30, { backward: true })?.shiftMetres ?? NaN, drift?.shiftMetres ?? NaN, metres(1, "halves go by frequency, not by row"));
    expect(eventOf(high, 30, { kind: "timed" })).toBeNull(); // their line is corrected as a whole
    expect(answerOf(statedObservations(exactArrivals({ stations, storm })), DEFAULT_SETTINGS, true).drift).toBeNull();
  });
});
