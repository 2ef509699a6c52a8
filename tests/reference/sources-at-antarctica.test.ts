import { describe, expect, it } from "vitest";
import { z } from "zod";
import { createLand } from "#lib/application/land.ts";
import { locateEvent } from "#lib/application/locate-event.ts";
import { DEFAULT_PUBLIC_SETTINGS } from "#lib/contracts/settings.ts";
import { isOcean } from "#lib/core/geodesy/land-mask.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { shippedLand } from "#tests/support/land.ts";
import { positionSchema, referenceFacts, referenceTable } from "#tests/support/reference-table.ts";
import { legBetween } from "#tests/support/simulator/ellipsoid.ts";
import { exactArrivals, statedObservations } from "#tests/support/stated-arrivals.ts";

const row = z.strictObject({ place: z.string(), position: positionSchema, onLand: z.boolean() });
const { rows, tolerance } = referenceTable("sources-at-antarctica", row);
const facts = z.object({ stations: z.array(z.strictObject({ id: z.string(), position: positionSchema })) });
const { stations } = referenceFacts("sources-at-antarctica", facts);
const land = createLand({ readTopology: shippedLand });

describe("a source on or at the edge of Antarctica", () => {
  it("is tried at three places, from four stations", () => {
    expect(rows).toHaveLength(3);
    expect(stations).toHaveLength(4);
  });

  it.each(rows)("$place: on land $onLand, and left where it is", ({ position, onLand }) => {
    const observations = statedObservations(exactArrivals({ stations, storm: position }));
    const { answer } = locateEvent({ observations, settings: DEFAULT_PUBLIC_SETTINGS, host: { program: "test", land } });
    const source = answer?.source;
    expect(source?.onLand).toBe(onLand);
    const best = { latitudeDegrees: source?.latitude ?? NaN, longitudeDegrees: source?.longitude ?? NaN };
    expectWithin(legBetween(best, position).distanceMetres, 0, tolerance);

    const wet = source?.bestInWater ?? null;
    expect(wet !== null).toBe(onLand);
    expect(answer?.warnings.some(({ code }) => code === "source-on-land")).toBe(onLand);
    if (wet === null) return;
    const inWater = { latitudeDegrees: wet.latitude, longitudeDegrees: wet.longitude };
    expect(isOcean(land.mask(), inWater)).toBe(true);
    expect(inWater.latitudeDegrees).toBeGreaterThan(position.latitudeDegrees); // the sea lies to the north
    expect(legBetween(inWater, position).distanceMetres).toBeLessThan(1_000_000);
  });
});
