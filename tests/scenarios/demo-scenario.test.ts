import { readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { describe, expect, test } from "vitest";
import { DEMO_EVENTS } from "../support/simulator/demo-events.ts";
import { demoFiles } from "../support/simulator/demo-scenario.ts";
import { DEMO_STATIONS } from "../support/simulator/demo-stations.ts";
import { legBetween } from "../support/simulator/ellipsoid.ts";
import { readWorld } from "../support/simulator/world.ts";

const folder = fileURLToPath(new URL("../../fixtures/scenarios/demo/", import.meta.url));
const world = readWorld();

describe("the demo scenario", () => {
  test("on disk is what the simulator makes", () => {
    const files = demoFiles();
    expect(files.size).toBe(1 + 2 * DEMO_EVENTS.length + 1);
    for (const [path, text] of files) expect(readFileSync(`${folder}${path}`, "utf8"), path).toBe(text);
  });

  test("has every station in the sea and every storm in open sight of its stations", () => {
    for (const { id, position } of DEMO_STATIONS) expect(world.isSea(position), id).toBe(true);
    for (const event of DEMO_EVENTS) {
      for (const id of [...event.ridge, ...event.timed, ...event.estimated]) {
        expect(world.isOpen({ station: positionOf(id), storm: event.storm }), `${event.id} from ${id}`).toBe(true);
      }
    }
  });

  test("holds the South Pole in a ring of the far southern storm", () => {
    const storm = DEMO_EVENTS.find(({ id }) => id === "albatross")?.storm ?? { latitudeDegrees: NaN, longitudeDegrees: NaN };
    const ring = legBetween(positionOf("tar"), storm).distanceMetres;
    const pole = legBetween(positionOf("tar"), { latitudeDegrees: -90, longitudeDegrees: 0 }).distanceMetres;
    expect(ring).toBeGreaterThan(pole + 400_000);
  });
});

function positionOf(id: string): { latitudeDegrees: number; longitudeDegrees: number } {
  return DEMO_STATIONS.find((station) => station.id === id)?.position ?? { latitudeDegrees: NaN, longitudeDegrees: NaN };
}
