import type { Locator, Page } from "playwright-core";
import { describe, expect, test } from "vitest";
import { contrast } from "#tests/support/contrast.ts";
import { demoBrowser, redrawn } from "#tests/support/demo-browser.ts";
import { tabTo } from "#tests/support/tab-to.ts";

const { open, openEvent, address, expectFault } = demoBrowser();

const headline = async (page: Page): Promise<string> => (await status(page).innerText()).replace(/\s+/g, " ");
const status = (page: Page): Locator => page.getByRole("region", { name: "Answer", exact: true }).getByRole("status");
const included = (page: Page, name: string): Locator => page.getByRole("checkbox", { name: `Include ${name}` });
const rings = (page: Page): Promise<number> => page.locator(".leaflet-rings-pane path").count();
const rowOf = async (page: Page, name: string): Promise<string> =>
  (await page.getByRole("row").filter({ has: page.getByRole("rowheader", { name }) }).innerText()).replace(/\s+/g, " ");

describe("leaving a station out", () => {
  test("by mouse: the figures follow, its ring goes, and it comes back", async () => {
    const page = await openEvent("petrel");
    const before = await headline(page);
    expect(await rings(page)).toBe(6);
    expect(await rowOf(page, "Thornholm")).toMatch(/± \d/);

    await redrawn(page, () => included(page, "4 Thornholm").click());
    const without = await headline(page);
    expect(without).not.toBe(before);
    expect(without).toMatch(/five stations/);
    expect(without).toContain("Left out: 4 Thornholm.");
    expect(await rings(page)).toBe(5);
    expect(await rowOf(page, "Thornholm")).toMatch(/left out$/);
    expect(await page.getByRole("button", { name: "Station 4 Thornholm, left out" }).count()).toBe(1);

    await redrawn(page, () => included(page, "4 Thornholm").click());
    expect(await headline(page)).toBe(before);
    expect(await rings(page)).toBe(6);
  });

  test("marks the figures as being worked out until the new ones are there", async () => {
    const page = await openEvent("albatross");
    await redrawn(page, async () => {
      const busy = await status(page).evaluate(async (element) => {
        document.querySelector<HTMLInputElement>("tbody input[type=checkbox]")?.click();
        await Promise.resolve();
        const evidence = document.querySelector("[aria-label=Evidence]");
        const fades = [element, evidence].map((part) => Number(getComputedStyle(part?.firstElementChild ?? document.body).opacity));
        return { busy: [element, evidence].map((part) => part?.getAttribute("aria-busy")), fades, words: element.textContent };
      });
      expect(busy.words).toContain("Left out: 1");
      expect(busy.busy).toStrictEqual(["true", "true"]);
      expect(Math.max(...busy.fades)).toBeLessThan(0.7);
    });
    expect(await status(page).getAttribute("aria-busy")).toBe("false");
    expect(await status(page).locator("> div").evaluate((element) => getComputedStyle(element).opacity)).toBe("1");
  });

  test("by keyboard alone", async () => {
    const page = await openEvent("gannet");
    const before = await headline(page);
    expect(before).toContain("but for the clock of 5");
    const box = included(page, "5 Umberbank");
    await tabTo(page, box);
    await redrawn(page, () => page.keyboard.press("Space"));
    expect(await box.isChecked()).toBe(false);
    expect(await rings(page)).toBe(5);
    const without = await headline(page);
    expect(without).toContain("All five stations agree (");
    expect(without).toContain("Left out: 5 Umberbank.");
  });

  test("stands in the address, and the server works out the same for whoever opens it", async () => {
    const page = await openEvent("petrel");
    await redrawn(page, () => included(page, "1 Lanternreach").click());
    await redrawn(page, () => included(page, "6 Wickerstrand").click());
    const said = await headline(page);
    expect(new URL(page.url()).search).toBe("?without=lan&without=wic");

    const colleague = await open(page.url().slice(address("").length), { javaScriptEnabled: false });
    expect(await headline(colleague)).toBe(said);
  });

  test("goes on to no station at all, and says so", async () => {
    const page = await openEvent("tern");
    await redrawn(page, () => included(page, "1 Wickerstrand").click());
    expect(await headline(page)).toContain("Distance only.");
    await redrawn(page, () => included(page, "2 Fennbank").click());
    expect(await headline(page)).toContain("No station is included.");
    expect(await rings(page)).toBe(0);
  });

  test("is worked out by the server where the chart could not be drawn", async () => {
    expectFault(/ERR_FAILED/);
    const page = await open("");
    await page.route("**/*land-50m*", (route) => route.abort());
    await page.goto(address("events/petrel"));
    await page.getByRole("alert").filter({ hasText: "The chart could not be drawn" }).waitFor();
    await included(page, "6 Wickerstrand").click();
    await page.waitForURL("**/petrel?without=wic");
    await page.getByRole("alert").filter({ hasText: "The chart could not be drawn" }).waitFor();
    const said = await headline(page);
    expect(said).toContain("All five stations agree");
    expect(said).toContain("Left out: 6 Wickerstrand.");
  });
});

describe("the station in focus", () => {
  test("is chosen on the chart by keyboard, in the table by mouse, and is one and the same", async () => {
    const page = await openEvent("albatross");
    const mark = page.getByRole("button", { name: "Station 3 Tarnmouth" });
    const named = page.getByRole("rowheader", { name: "Tarnmouth" }).getByRole("button");
    await tabTo(page, mark);
    await page.keyboard.press("Enter");
    expect(await mark.getAttribute("aria-pressed")).toBe("true");
    expect(await named.getAttribute("aria-pressed")).toBe("true");
    await named.click();
    expect(await mark.getAttribute("aria-pressed")).toBe("false");
  });

  test("is dropped by Escape", async () => {
    const page = await openEvent("albatross?focus=tar");
    const mark = page.getByRole("button", { name: "Station 3 Tarnmouth" });
    expect(await mark.getAttribute("aria-pressed")).toBe("true");
    await page.keyboard.press("Escape");
    expect(await mark.getAttribute("aria-pressed")).toBe("false");
    expect(new URL(page.url()).search).toBe("");
  });

  test.each(["light", "dark"] as const)("can be read where it is left out as well, in the %s", async (colorScheme) => {
    const page = await openEvent("albatross?focus=tar&without=tar", { colorScheme });
    const mark = page.getByRole("button", { name: "Station 3 Tarnmouth, left out" });
    const look = await mark.evaluate((element) => {
      const { color, backgroundColor, borderTopStyle, borderTopColor } = getComputedStyle(element);
      return { color, backgroundColor, borderTopStyle, borderTopColor };
    });
    expect(look.borderTopStyle).toBe("dashed");
    expect(contrast(look.color, look.backgroundColor)).toBeGreaterThan(7);
    expect(contrast(look.borderTopColor, look.backgroundColor)).toBeGreaterThan(3);
  });
});
