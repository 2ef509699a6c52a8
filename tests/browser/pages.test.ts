import type { Page } from "playwright-core";
import { describe, expect, test } from "vitest";
import { axeFaults } from "#tests/support/axe-faults.ts";
import { contrast, luminance } from "#tests/support/contrast.ts";
import { demoBrowser, DESK, PHONE } from "#tests/support/demo-browser.ts";
import { DEMO_EVENTS } from "#tests/support/simulator/demo-events.ts";

const { open, openEvent, address, expectFault } = demoBrowser();

test.each(["events/petrel", "stations", "readings"])("the chart at %s lies on the sea's own colour, under controls of ours", async (path) => {
  const page = await open(path);
  await page.locator(".leaflet-land-pane path").waitFor();
  const colours = await page.evaluate(() => {
    const probe = document.body.appendChild(document.createElement("div"));
    probe.style.backgroundColor = "var(--sea)";
    const sea = getComputedStyle(probe).backgroundColor;
    probe.remove();
    const style = (selector: string): CSSStyleDeclaration => getComputedStyle(document.querySelector(selector) ?? document.body);
    return { sea, chart: style(".leaflet-container").backgroundColor, border: style(".leaflet-bar").borderTopWidth, font: style(".leaflet-container").fontSize };
  });
  expect(colours.chart).toBe(colours.sea);
  expect([colours.border, colours.font]).toStrictEqual(["1px", "14px"]);
});

describe("the list of events", () => {
  test("names every event, latest first, and leads to each", async () => {
    const page = await open("");
    const titles = await page.getByRole("main").getByRole("link").allInnerTexts();
    const latestFirst = [...DEMO_EVENTS].sort((a, b) => b.originEpochSeconds - a.originEpochSeconds);
    expect(titles).toStrictEqual(latestFirst.map(({ title }) => title));

    await page.getByRole("link", { name: "Far southern storm" }).click();
    await page.locator("[data-drawn] .leaflet-rings-pane path").first().waitFor();
    expect(await page.title()).toBe("Far southern storm · Offing");
    expect(new URL(page.url()).pathname).toBe("/events/albatross");
  });
});

describe("an address that leads nowhere", () => {
  test.each(["events/nope", "events/%3Cscript%3E", "nowhere"])("%s is answered 404 with a way back", async (path) => {
    expectFault(/status of 404/);
    expect((await fetch(address(path))).status).toBe(404);
    const page = await open(path);
    expect(await page.getByRole("heading", { level: 1 }).innerText()).toBe("Nothing here");
    await page.getByRole("link", { name: "All events" }).click();
    await page.waitForURL(address(""));
  });
});

describe("on a phone, and on the narrowest screen that WCAG asks for (1.4.10)", () => {
  test.each(["", ...DEMO_EVENTS.map(({ id }) => `events/${id}`)])("nothing runs over the side of /%s", async (path) => {
    const page = await open(path, { viewport: PHONE });
    if (path !== "") await page.locator("[data-drawn]").waitFor();
    for (const viewport of [PHONE, { width: 320, height: 640 }]) {
      await page.setViewportSize(viewport);
      expect(await overTheSide(page), `${viewport.width} px`).toStrictEqual({ pixels: 0, texts: [] });
    }
  });
});

test("on a phone the open key covers nothing, and the chart keeps its height", async () => {
  const page = await openEvent("petrel", { viewport: PHONE });
  const chart = page.locator(".leaflet-container");
  const before = (await chart.boundingBox())?.height;
  await page.getByText("Key", { exact: true }).click();
  const sides = await chart.boundingBox();
  expect(sides?.height).toBe(before);
  const key = await page.getByRole("list").filter({ hasText: "crossing of two rings" }).boundingBox();
  expect(key?.y).toBeGreaterThanOrEqual((sides?.y ?? NaN) + (sides?.height ?? NaN));
  for (const name of ["Sight lines", "Overlap of bands"]) {
    const box = page.getByRole("checkbox", { name });
    // A click goes to whatever lies on top, and waits in vain for a covered control.
    const was = await box.isChecked();
    await box.click({ timeout: 5000 });
    expect(await box.isChecked()).toBe(!was);
  }
});

/** How far the page can be scrolled sideways, and the texts outside the chart that are cut by the screen's edge. */
function overTheSide(page: Page): Promise<{ pixels: number; texts: (string | null)[] }> {
  return page.evaluate(() => {
    const texts = [...document.querySelectorAll("main p, main h1, main h2, main td, main th, main li, main label, main dd, main button, main summary")];
    const shown = texts.filter((element) => element.closest(".leaflet-container, .for-screen-readers, details:not([open]) ul") === null && element.getClientRects().length > 0);
    const cut = shown.filter((element) => {
      const { left, right } = element.getBoundingClientRect();
      return right > innerWidth + 0.5 || left < -0.5;
    });
    return { pixels: document.documentElement.scrollWidth - document.documentElement.clientWidth, texts: cut.map(({ textContent }) => textContent) };
  });
}

describe.each(["light", "dark"] as const)("in the %s", (colorScheme) => {
  test("ink stands out from the paper, and the sea and the land from each other", async () => {
    const page = await openEvent("petrel", { colorScheme });
    const [paper, ink, land, sea] = await page.evaluate(() => {
      const style = (selector: string) => getComputedStyle(document.querySelector(selector) ?? document.body);
      return [style("html").backgroundColor, style("html").color, style(".leaflet-land-pane path").fill, style(".leaflet-container").backgroundColor];
    });
    expect(luminance(paper) > luminance(ink)).toBe(colorScheme === "light");
    expect(contrast(paper, ink)).toBeGreaterThan(7);
    expect(land).not.toBe(sea);
  });

  test.each([
    ["the list", "", DESK],
    ["a located event", "events/gannet?focus=umb&overlap=yes&without=red", DESK],
    ["two possible sources, on a phone", "events/tern", PHONE],
    ["one station", "events/fulmar", DESK],
  ])("axe finds nothing against %s", async (_, path, viewport) => {
    const page = await open(path, { colorScheme, viewport });
    if (path !== "") await page.locator("[data-drawn] .leaflet-rings-pane path").first().waitFor();
    const key = page.getByText("Key", { exact: true });
    if ((await key.count()) > 0) await key.click();
    expect(await axeFaults(page)).toStrictEqual([]);
  });
});
