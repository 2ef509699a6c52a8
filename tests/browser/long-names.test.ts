import { cpSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import type { Page } from "playwright-core";
import { expect, test } from "vitest";
import { axeFaults } from "#tests/support/axe-faults.ts";
import { demoBrowser, PHONE } from "#tests/support/demo-browser.ts";

/** As long as the program takes them: words, and one that no line can be broken in. */
const WORDS = "Long-wave gauge off the outermost of the northern rocks ".repeat(4).slice(0, 200).trim();
const WORD = "W".repeat(200);

/** The demo's event of six stations, under names as long as may be. */
function writeLongNames(folder: string): void {
  const demo = "fixtures/scenarios/demo";
  cpSync(join(demo, "petrel"), join(folder, "petrel"), { recursive: true });
  writeFileSync(join(folder, "petrel", "event.json"), JSON.stringify({ title: WORDS, note: `${WORD} ${WORDS}` }));
  const [header = "", ...rows] = readFileSync(join(demo, "stations.csv"), "utf8").trim().split("\n");
  const named = rows.map((row, place) => row.split(",").map((cell, column) => (column === 1 ? (place % 2 === 0 ? WORDS : WORD) : cell)).join(","));
  writeFileSync(join(folder, "stations.csv"), [header, ...named].join("\n"));
}

const { open, openEvent, address } = demoBrowser({ writeEvents: writeLongNames });

async function runsOver(page: Page): Promise<number> {
  return page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);
}

async function post(path: string, body: unknown): Promise<{ id?: string }> {
  const response = await fetch(address(`api/v1/${path}`), { method: "POST", headers: { "content-type": "application/json" }, body: JSON.stringify(body) });
  expect(response.status).toBe(201);
  return (await response.json()) as { id?: string };
}

test.each(["light", "dark"] as const)("with names as long as may be nothing runs over the side and axe finds nothing, in the %s", async (colorScheme) => {
  const page = await openEvent("petrel", { colorScheme });
  await page.getByRole("region", { name: "Readings" }).getByRole("combobox", { name: "Station" }).selectOption("ott");
  await page.getByRole("region", { name: "Arrivals of this event" }).locator("summary").click();
  for (const size of [{ width: 1280, height: 720 }, PHONE, { width: 320, height: 844 }]) {
    await page.setViewportSize(size);
    expect(await runsOver(page)).toBe(0);
  }
  expect(await axeFaults(page)).toStrictEqual([]);
  const list = await open("", { viewport: PHONE, colorScheme });
  expect(await runsOver(list)).toBe(0);
  expect(await axeFaults(list)).toStrictEqual([]);
});

test("an event of nothing says so, and how to go on; with many arrivals waiting the list is still there", async () => {
  const { id = "" } = await post("events", { title: WORD });
  for (let hour = 10; hour < 22; hour += 1) {
    await post("arrivals", { station: "lan", readings: [{ time: `2022-01-15T${hour}:00Z`, periodSeconds: 18 }, { time: `2022-01-16T${hour}:00Z`, periodSeconds: 14 }] });
  }
  const page = await open(`events/${id}`, { viewport: PHONE });
  expect(await page.getByRole("main").innerText()).toContain("No arrival is in this event yet.");
  expect(await page.getByRole("link", { name: "Bring in readings timed by hand" }).getAttribute("href")).toBe(`/readings?event=${id}`);
  expect(await runsOver(page)).toBe(0);
  expect(await axeFaults(page)).toStrictEqual([]);

  const list = await open("", { viewport: PHONE });
  const waiting = list.getByRole("region", { name: "12 arrivals wait for an event" });
  expect(await waiting.getByRole("checkbox").count()).toBe(12);
  expect(await waiting.getByRole("listitem").first().innerText()).toMatch(/\(lan\): first swell 15 Jan 2022 10:00\sUTC, 18 to 14\ss, 2\sreadings; brought in .*, local keeper$/);
  expect((await waiting.boundingBox())?.height).toBeLessThan(700);
  expect(await runsOver(list)).toBe(0);
  expect(await axeFaults(list)).toStrictEqual([]);
});
