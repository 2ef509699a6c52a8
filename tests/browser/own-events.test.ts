import { cpSync, mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { demoBrowser } from "#tests/support/demo-browser.ts";

const DEMO = "fixtures/scenarios/demo";
const ID = "Süd 1";

/**
 * The demo's far southern storm as a newcomer might bring it: an id with a space and an umlaut, no note, no errors of
 * the readings' times, and one station whose dates are five days early.
 */
function writeEvents(directory: string): void {
  const [, ...rows] = readFileSync(join(DEMO, "albatross", "readings.csv"), "utf8").trim().split("\n");
  const readings = rows.map((row) => {
    const [station = "", time = "", period = ""] = row.split(",");
    const early = new Date(Date.parse(time) - 120 * 3_600_000).toISOString();
    return [station, station === "sal" ? early : time, period, "0"].join(",");
  });
  cpSync(join(DEMO, "stations.csv"), join(directory, "stations.csv"));
  mkdirSync(join(directory, ID));
  writeFileSync(join(directory, ID, "event.json"), '{"title": "Südsturm"}');
  writeFileSync(join(directory, ID, "readings.csv"), ["station,time,period_s,period_sigma_s", ...readings].join("\n"));
}

const { open, openEvent } = demoBrowser({ writeEvents });

describe("an event of one's own", () => {
  test("is reached from the list by an id that is not plain letters", async () => {
    const page = await open("");
    await page.getByRole("link", { name: "Südsturm" }).click();
    await page.getByRole("heading", { level: 1, name: "Südsturm" }).waitFor();
    expect(decodeURIComponent(new URL(page.url()).pathname)).toBe(`/events/${ID}`);
    expect(await page.title()).toBe("Südsturm · Offing");
  });

  test("says on its page which errors were assumed", async () => {
    const page = await openEvent(encodeURIComponent(ID));
    const answer = await page.getByRole("region", { name: "Answer", exact: true }).innerText();
    expect(answer).toContain(`Assumed at intake: ${ID}/readings.csv, 55 rows: kind ridge and no time_sigma_s; 1800 s was used.`);
  });

  test("is told to look at the dates of a station whose distance fits", async () => {
    const page = await openEvent(encodeURIComponent(ID));
    const checks = (await page.getByRole("region", { name: "Evidence" }).innerText()).replace(/\s+/g, " ");
    expect(checks).toMatch(/Clocks 2 fits in distance and is 12\d h early: look at its dates/);
    const row = (await page.getByRole("row").filter({ has: page.getByRole("rowheader", { name: "Saltharrow" }) }).innerText()).replace(/\s+/g, " ");
    expect(row).toMatch(/ <0\.01 \d+$/);
  });

  test("draws no bar of a residual that lies within its ring's band", async () => {
    const page = await openEvent(encodeURIComponent(ID));
    // All rings fit within their bands: the demo's storm is the truth, and only a station's dates are wrong.
    expect(await page.locator("tbody svg").count()).toBe(0);
  });
});
