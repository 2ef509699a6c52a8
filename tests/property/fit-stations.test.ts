import { describe, expect, it } from "vitest";
import type { Deployment, EventObservations } from "#lib/core/arrival/observations.ts";
import { fitStations } from "#lib/core/source/fit-stations.ts";
import { DEFAULT_SETTINGS } from "#lib/core/source/settings.ts";
import { ridgeReading } from "#tests/support/simulator/matched-storm.ts";
import { deploymentOf } from "#tests/support/simulator/simulated-event.ts";
import { exactArrivals, statedObservations } from "#tests/support/stated-arrivals.ts";

const DAY = 86_400;
const at = (latitudeDegrees: number) => ({ latitudeDegrees, longitudeDegrees: -130 });
const spell = (name: string, latitudeDegrees: number, from: number | null, to: number | null): Deployment => ({
  ...deploymentOf({ id: "buoy", position: at(latitudeDegrees) }),
  ...{ name, fromEpochSeconds: from, toEpochSeconds: to },
});
const readingsAbout = (epochSeconds: number) =>
  [0.05, 0.06, 0.07].map((frequencyHz) => ridgeReading({ stationId: "buoy", frequencyHz, arrivalEpochSeconds: epochSeconds + (frequencyHz - 0.06) * 7e6 }));
const fitted = (observations: EventObservations) => fitStations({ observations, settings: DEFAULT_SETTINGS });

describe("the deployment that a station's readings belong to", () => {
  const spells = [spell("second", 40, 100 * DAY, 200 * DAY), spell("third", 45, 300 * DAY, null), spell("first", 35, 10 * DAY, 100 * DAY)];
  const nameAt = (days: number, deployments = spells) => fitted({ deployments, readings: readingsAbout(days * DAY), estimates: [] }).map(({ name }) => name);

  it.each([
    [50, "first"],
    [150, "second"],
    [400, "third"],
    [250, "second"],
    [1, "first"],
    [100, "second"],
    [200, "second"],
    [99.999, "first"],
  ])("on day %d is the one that covers it, else the last before it, else the earliest: %s", (days, name) => {
    expect(nameAt(days)).toEqual([name]);
  });
  it("is an endless one where that is all there is", () => {
    expect(nameAt(50, [spell("always", 40, null, null)])).toEqual(["always"]);
    expect(nameAt(50, [spell("until then", 40, null, 60 * DAY), spell("since", 41, 60 * DAY, null)])).toEqual(["until then"]);
  });
  it("gives its place, also by the time of an estimate", () => {
    const [sent] = statedObservations(exactArrivals({ stations: [{ id: "buoy", position: at(40) }], storm: at(-40) })).estimates;
    if (!sent) throw new Error("one was sent in");
    const placeAt = (days: number, distanceMetres = sent.estimate.distanceMetres) =>
      fitted({ deployments: spells, readings: [], estimates: [{ ...sent, estimate: { ...sent.estimate, distanceMetres, originEpochSeconds: days * DAY } }] })[0]?.position;
    expect(placeAt(350)).toEqual(at(45));
    // Swell of 14 s travels 10.9 m/s (deep water, g T / 4 pi): ten days and a half for 9900 km.
    expect(placeAt(90, 9.9e6)).toEqual(at(40));
    expect(placeAt(89, 9.9e6)).toEqual(at(35));
  });
});

describe("what a station sent in", () => {
  const [one] = statedObservations(exactArrivals({ stations: [{ id: "buoy", position: at(40) }], storm: at(-40) })).estimates;
  const deployments = [spell("always", 40, null, null)];
  const sent = one ? [one] : [];

  it("stands as it is", () => {
    expect(fitted({ deployments, readings: [], estimates: sent })[0]?.outcome).toEqual({ kind: "sent-in", estimate: one?.estimate });
  });
  it("is refused beside readings, and twice", () => {
    const codesOf = (observations: EventObservations) => fitted(observations).map(({ outcome }) => outcome.kind === "refused" && outcome.code);
    expect(codesOf({ deployments, readings: readingsAbout(0), estimates: sent })).toEqual(["conflicting-input"]);
    expect(codesOf({ deployments, readings: [], estimates: [...sent, ...sent] })).toEqual(["conflicting-input"]);
  });
  it("is left aside where nothing was sent, or nothing is known of the station", () => {
    expect(fitted({ deployments, readings: [], estimates: [] })).toEqual([]);
    expect(fitted({ deployments: [], readings: readingsAbout(0), estimates: sent })).toEqual([]);
  });
});
