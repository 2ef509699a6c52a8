import type { MultiPolygon } from "geojson";
import { describe, expect, test } from "vitest";
import { regionContains } from "../support/coverage/region-contains.ts";

/** A box across the 180th meridian cut in two, a cap round the South Pole closed along the map's edge, and a hole. */
const REGION: MultiPolygon = {
  type: "MultiPolygon",
  coordinates: [
    [[[170, -10], [180, -10], [180, 10], [170, 10], [170, -10]]],
    [[[-180, -10], [-170, -10], [-170, 10], [-180, 10], [-180, -10]]],
    [[[-180, -90], [180, -90], [180, -70], [0, -65], [-180, -70], [-180, -90]]],
    [
      [[10, 10], [30, 10], [30, 30], [10, 30], [10, 10]],
      [[18, 18], [18, 22], [22, 22], [22, 18], [18, 18]],
    ],
  ],
};

describe("the judge's region test", () => {
  test.each([
    [0, 179, true],
    [0, -179, true],
    [0, 160, false],
    [-89.9, 45, true],
    [-66, 1, true],
    [-64, 1, false],
    [15, 15, true],
    [20, 20, false],
  ])("finds %f, %f held: %s", (latitudeDegrees, longitudeDegrees, held) => {
    expect(regionContains(REGION, { latitudeDegrees, longitudeDegrees })).toBe(held);
  });
});
