import { readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { beforeAll, describe, expect, it } from "vitest";
import type { LocateJson } from "#lib/contracts/locate-json.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { runOffing } from "#tests/support/run-offing.ts";

const FOLDER = new URL("../../fixtures/records/buoys-1996-01/", import.meta.url);

/**
 * Two swells of January 1996 at buoys 46022 and 46042 (US National Data Buoy Center), read off their spectra as
 * fixtures/README.md tells. What is known of them are rough hand fits with one start time for both buoys: distances
 * good to 20-25 %, time to half a day; nobody's truth. So they are held to loosely.
 */
const SWELLS = [
  { name: "13 January", file: "readings-0113.csv", start: "1996-01-12T02:00Z", distancesKm: { "46022": 2121, "46042": 2256 } },
  { name: "8 January", file: "readings-0108.csv", start: "1996-01-05T15:00Z", distancesKm: { "46022": 3649, "46042": 4008 } },
];
const LOOSELY = { because: "the hand fits are good to 20-25 % and half a day, and so is a reading of 0.01 Hz bands" };

describe.each(SWELLS)("the swell of $name 1996 at two buoys", ({ file, start, distancesKm }) => {
  const answers: LocateJson[] = [];

  beforeAll(() => {
    const args = ["locate", "--stations", "s.csv", "--readings", "r.csv", "--json"];
    const files = { "s.csv": readFixture("stations.csv"), "r.csv": readFixture(file) };
    const run = runOffing({ args, files });
    expect(run.status, run.messages.join("\n")).toBe(0);
    answers.push(JSON.parse(run.out) as LocateJson);
  });

  it("comes from about as far away, and began at about the time, as hand fits say", () => {
    const [answer] = answers;
    expect(["located", "several"]).toContain(answer?.outcome);
    for (const [id, distanceKm] of Object.entries(distancesKm)) {
      const station = answer?.stations.find((one) => one.id === id);
      // The distance of the answer is the ring less the residual.
      const answered = (station?.ringKm ?? Number.NaN) - (station?.residual?.distanceKm ?? Number.NaN);
      expectWithin(answered, distanceKm, { relative: 0.3, unit: "km", ...LOOSELY });
    }
    const hours = (Date.parse(answer?.source?.time ?? "") - Date.parse(start)) / 3.6e6;
    expectWithin(hours, 0, { absolute: 18, unit: "h", ...LOOSELY });
  });

  it("comes out of the open ocean west of the buoys", () => {
    const [answer] = answers;
    expect(answer?.source?.onLand).toBe(false);
    expect(answer?.source?.longitude).toBeLessThan(-124.54);
  });
});

function readFixture(name: string): string {
  return readFileSync(fileURLToPath(new URL(name, FOLDER)), "utf8");
}
