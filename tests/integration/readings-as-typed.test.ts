import { describe, expect, test } from "vitest";
import { fitReadings, type NumberedReading } from "../../app/readings/fit-readings.ts";
import { readingsToSave, type NewReading } from "#lib/contracts/api/readings.ts";
import { shoreDeployment } from "#lib/contracts/hand-readings/placed-station.ts";
import { chosenObservations } from "#lib/core/arrival/chosen-observations.ts";
import type { ClockCorrection } from "#lib/core/arrival/gathered-observations.ts";
import { NO_CHOICES } from "#lib/core/arrival/observation-choices.ts";
import type { Deployment } from "#lib/core/arrival/observations.ts";
import { UNDESCRIBED } from "#lib/core/arrival/station-description.ts";
import { fitStations } from "#lib/core/source/fit-stations.ts";
import { DEFAULT_SETTINGS } from "#lib/core/source/settings.ts";
import { travelSeconds } from "#tests/support/simulator/deep-water.ts";
import { temporaryStore } from "#tests/support/temporary-store.ts";

const ORIGIN = Date.UTC(2031, 2, 3, 6);
const doing = { actor: "test", savedEpochSeconds: 1_900_000_000 };
const at = shoreDeployment({ id: "pier", name: "Pier", position: { latitudeDegrees: 21.6, longitudeDegrees: -158.1 }, timeZone: null });
const moved: Deployment = { ...at, position: { latitudeDegrees: 22, longitudeDegrees: -158 }, fromEpochSeconds: ORIGIN / 1000 + 86_400 };
const fast: ClockCorrection = { stationId: "pier", fromEpochSeconds: null, toEpochSeconds: null, fastBySeconds: 1800, reason: "set by ear" };

const readings: NewReading[] = [19, 18, 17, 16, 15, 14].map((period, i) => ({
  time: new Date(ORIGIN + 1000 * travelSeconds({ frequencyHz: 1 / period, distanceMetres: 5e6 })).toISOString(),
  ...(i % 2 === 0 ? { periodSeconds: period } : { frequencyHz: 1 / period, frequencySigmaHz: 0.001 }),
  kind: "timed" as const,
  quality: i === 2 ? (4 as const) : i === 3 ? (3 as const) : (2 as const),
}));
const numbered = readings.map((reading, i): NumberedReading => ({ number: i + 1, reading }));

describe("what the form says while readings are typed", () => {
  test.each<[string, readonly Deployment[], readonly ClockCorrection[]]>([
    ["at a plain station", [at], []],
    ["at one that was moved, with a clock that was fast", [{ ...at, toEpochSeconds: moved.fromEpochSeconds }, moved], [fast]],
    ["at one that feels the ground, behind a shelf", [{ ...at, sensor: "ground", shelf: [{ lengthMetres: 80_000, depthMetres: 60 }] }], []],
  ])("is what they give once they are stored: %s", async (_, deployments, clockCorrections) => {
    const typed = fitReadings({ id: "pier", deployments, clockCorrections }, numbered, DEFAULT_SETTINGS);

    const { store } = await temporaryStore();
    await store.saveStations([{ description: { ...UNDESCRIBED, id: "pier", deployments, clockCorrections }, startedFrom: 0 }], doing);
    const arrivalId = await store.saveArrival({ stationId: "pier", eventId: null, note: "", readings: readingsToSave(readings), estimate: null }, doing);
    await store.openEvent({ id: "march", title: "March", note: "", arrivalIds: [arrivalId] }, doing);
    const event = await store.loadEvent("march");
    const [stored] = event === null ? [] : fitStations({ observations: chosenObservations(event.observations, NO_CHOICES), settings: DEFAULT_SETTINGS });
    expect(stored?.outcome.kind).toBe("fitted");
    expect(typed.fitted?.outcome).toStrictEqual(stored?.outcome);
    expect(typed.fitted?.deployment.position).toStrictEqual(stored?.deployment.position);
  });

  test("names what was left aside, and what the place does to it", () => {
    const ground = { ...at, sensor: "ground" as const };
    const { fitted, notes } = fitReadings({ id: "pier", deployments: [ground], clockCorrections: [fast] }, numbered, DEFAULT_SETTINGS);
    expect(fitted?.readings.map(({ row }) => row)).toStrictEqual([1, 2, 5, 6]);
    expect(notes.join("\n")).toMatch(/^1 reading is flagged bad or missing and not used\.\n1 reading is flagged suspect and not used\.\nThe known error of its clock .* 4 of 4 readings\.\nThis station feels the ground.*\nNo shelf profile is known here/);
  });

  test("is nothing while no reading can be used", () => {
    expect(fitReadings({ id: "pier", deployments: [at], clockCorrections: [] }, [], DEFAULT_SETTINGS)).toStrictEqual({ fitted: null, notes: [] });
  });
});
