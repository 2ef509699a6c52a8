import { describe, expect, it } from "vitest";
import { toEstimationSettings } from "#lib/contracts/estimation-settings.ts";
import { DEFAULT_PUBLIC_SETTINGS, readSettings } from "#lib/contracts/settings.ts";
import { InputError } from "#lib/core/failures/input-error.ts";
import { DEFAULT_SETTINGS } from "#lib/core/source/settings.ts";

describe("settings", () => {
  it("are the core's own where nothing is set", () => {
    expect(toEstimationSettings(readSettings({}))).toEqual(DEFAULT_SETTINGS);
  });

  it("replace only what is named, at any depth", () => {
    const settings = readSettings({ spread: { distanceKm: 100 }, timed: { durationHours: 3 }, sight: false });
    expect(settings).toEqual({
      ...DEFAULT_PUBLIC_SETTINGS,
      spread: { ...DEFAULT_PUBLIC_SETTINGS.spread, distanceKm: 100 },
      timed: { ...DEFAULT_PUBLIC_SETTINGS.timed, durationHours: 3 },
      sight: false,
    });
    expect(toEstimationSettings(settings)).toMatchObject({ spread: { distanceMetres: 100_000 }, timed: { durationSeconds: 10_800 } });
  });

  it("keep a default that a form hands over as undefined", () => {
    expect(readSettings({ spread: { distanceKm: undefined }, sight: undefined })).toEqual(DEFAULT_PUBLIC_SETTINGS);
  });

  it.each<[string, unknown, RegExp]>([
    ["an unknown key", { gravitation: 9.8 }, /^S\.json: found "gravitation"; wanted only settings that exist \(gravity, spread, /],
    ["an unknown key inside", { band: { midHz: 0.06 } }, /^S\.json, band: found "midHz"; wanted only settings that exist \(lowHz, highHz\)/],
    ["a word for a number", { gravity: "9.8" }, /^S\.json, gravity: found "9\.8"; wanted a number\.$/],
    ["a number for a switch", { sight: 1 }, /^S\.json, sight: found 1; wanted true or false\.$/],
    ["null", { gravity: null }, /^S\.json, gravity: found null; wanted a number\.$/],
    ["a list", [], /^S\.json: found \[\]; wanted an object of settings\.$/],
    ["a negative spread", { spread: { distanceKm: -1 } }, /^S\.json, spread\.distanceKm: found -1; wanted a number of at least 0\.$/],
    ["a correlation above one", { spread: { sharedCorrelation: 1.5 } }, /^S\.json, spread\.sharedCorrelation: found 1\.5; wanted a number of at most 1\.$/],
    ["a scale of zero", { spread: { azimuthScaleDegrees: 0 } }, /azimuthScaleDegrees: found 0; wanted a number above 0\.$/],
    ["a band the wrong way round", { band: { lowHz: 0.2 } }, /^S\.json, band: found 0\.2 to 0\.12 Hz; wanted lowHz below highHz\.$/],
  ])("refuse %s", (_, overrides, message) => {
    const problem = refusalOf(() => readSettings(overrides, "S.json"));
    expect(problem.issues).toHaveLength(1);
    expect(problem.issues[0]?.message).toMatch(message);
  });
});

function refusalOf(read: () => unknown): InputError {
  try {
    read();
  } catch (error) {
    if (error instanceof InputError) return error;
    throw error;
  }
  throw new Error("The settings were taken.");
}
