import { describe, expect, it } from "vitest";
import { STANDARD_GRAVITY } from "#lib/core/units/gravity.ts";
import { SECONDS_PER_HOUR } from "#lib/core/units/time.ts";
import { wrapLongitudeDegrees } from "#lib/core/units/position.ts";
import { DEFAULT_SETTINGS } from "#lib/core/source/settings.ts";

describe("units", () => {
  it("take gravity as the 3rd General Conference on Weights and Measures fixed it in 1901 (from memory)", () => {
    expect(STANDARD_GRAVITY).toBe(9.80665);
    expect(DEFAULT_SETTINGS.gravity).toBe(STANDARD_GRAVITY);
  });
  it("have sixty minutes of sixty seconds in an hour", () => {
    expect(SECONDS_PER_HOUR).toBe(60 * 60);
  });
  it.each([[0, 0], [180, -180], [-180, -180], [179.5, 179.5], [190, -170], [-190, 170], [540, -180], [359, -1]])("name the meridian %d as %d", (given, wrapped) => {
    expect(wrapLongitudeDegrees(given)).toBe(wrapped);
  });
});
