import type { Locator, Page } from "playwright-core";
import { describe, expect, test } from "vitest";
import { demoBrowser, redrawn } from "#tests/support/demo-browser.ts";
import { expectWithin } from "#tests/support/expect-within.ts";

const { open, openEvent, address } = demoBrowser();

const search = (page: Page): string => new URL(page.url()).search;
const box = (page: Page, name: string): Locator => page.getByRole("checkbox", { name: `Include ${name}` });
const drawnWithout = (page: Page, rings: number): Promise<unknown> =>
  page.waitForFunction((wanted) => document.querySelectorAll(".leaflet-rings-pane path").length === wanted, rings);

/** What the page says and shows of its choice: the headline, the unit, and whether the first station counts. */
async function shown(page: Page): Promise<{ words: string; nmi: boolean; first: boolean }> {
  const words = (await page.getByRole("region", { name: "Answer", exact: true }).getByRole("status").innerText()).replace(/\s+/g, " ");
  return { words, nmi: await page.getByRole("radio", { name: "nmi" }).isChecked(), first: await box(page, "1 Fennbank").isChecked() };
}

describe("the browser's own buttons", () => {
  test("bring back what the address says, not what the page was first opened with", async () => {
    const page = await open("");
    await page.getByRole("link", { name: "Far southern storm" }).click();
    await drawnWithout(page, 5);
    await redrawn(page, () => box(page, "1 Fennbank").click());
    await page.getByRole("radio", { name: "nmi" }).check();
    expect(search(page)).toBe("?without=fen&unit=nmi");
    const chosen = await shown(page);
    expect(chosen).toMatchObject({ nmi: true, first: false, words: expect.stringContaining("Left out: 1 Fennbank.") as string });

    await page.getByRole("link", { name: "Events", exact: true }).click();
    await page.getByRole("heading", { name: "Events" }).waitFor();
    await page.goBack();
    await drawnWithout(page, 4);
    expect(search(page)).toBe("?without=fen&unit=nmi");
    expect(await shown(page)).toStrictEqual(chosen);

    await page.goBack();
    await page.getByRole("heading", { name: "Events" }).waitFor();
    await page.goForward();
    await drawnWithout(page, 4);
    expect(search(page)).toBe("?without=fen&unit=nmi");
    expect(await shown(page)).toStrictEqual(chosen);
  });

  test("are followed within one page as well", async () => {
    const page = await openEvent("albatross");
    const whole = await shown(page);
    await page.evaluate(() => { globalThis.location.hash = "main"; });
    await redrawn(page, () => box(page, "1 Fennbank").click());
    expect(search(page)).toBe("?without=fen");
    await redrawn(page, async () => { await page.goBack(); });
    expect(search(page)).toBe("");
    expect(await shown(page)).toStrictEqual(whole);
  });
});

describe("the chart's place", () => {
  const middleOf = async (page: Page, name: string): Promise<{ x: number; y: number }> => {
    const found = await page.getByRole("button", { name }).boundingBox();
    return { x: (found?.x ?? NaN) + (found?.width ?? NaN) / 2, y: (found?.y ?? NaN) + (found?.height ?? NaN) / 2 };
  };
  const expectSame = (actual: { x: number; y: number }, expected: { x: number; y: number }): void => {
    for (const axis of ["x", "y"] as const) expectWithin(actual[axis], expected[axis], { absolute: 3, unit: "pixels", because: "the address holds hundredths of a degree and of a step of scale" });
  };

  test("stands in the address once the reader moves it, and a colleague sees the same piece of sea", async () => {
    const page = await openEvent("petrel");
    expect(search(page)).toBe("");
    const atFirst = await middleOf(page, "Station 1 Lanternreach");
    await page.getByRole("button", { name: "Zoom in" }).click();
    await page.waitForFunction(() => globalThis.location.search.startsWith("?at="));
    const nearer = search(page);
    await page.getByRole("region", { name: /^Map of stations/ }).focus();
    await page.keyboard.press("ArrowRight");
    await page.waitForFunction((was) => globalThis.location.search !== was, nearer);
    expect(search(page)).toMatch(/^\?at=-?\d+(\.\d\d?)?,-?\d+(\.\d\d?)?,\d(\.\d\d?)?$/);
    const moved = await middleOf(page, "Station 1 Lanternreach");

    const colleague = await open(page.url().slice(address("").length));
    await drawnWithout(colleague, 6);
    expectSame(await middleOf(colleague, "Station 1 Lanternreach"), moved);
    expect(search(colleague)).toBe(search(page));

    for (const one of [page, colleague]) {
      await one.getByRole("button", { name: "Show all" }).click();
      await one.waitForFunction(() => globalThis.location.search === "");
      expectSame(await middleOf(one, "Station 1 Lanternreach"), atFirst);
    }
  });

  test("is the whole event again where the address makes no sense", async () => {
    const page = await openEvent("petrel?at=95,nowhere,3");
    expect(search(page)).toBe("");
    const plain = await openEvent("petrel");
    expectSame(await middleOf(page, "Station 1 Lanternreach"), await middleOf(plain, "Station 1 Lanternreach"));
  });

  test("stays whole when the screen changes and nobody has moved it", async () => {
    const page = await openEvent("petrel");
    await page.setViewportSize({ width: 1000, height: 600 });
    const sides = await page.locator(".leaflet-container").boundingBox();
    await page.waitForTimeout(400); // the map library waits 200 ms for the last of a row of changes
    for (const mark of await page.getByRole("button", { name: /^Station \d/ }).all()) {
      const at = await mark.boundingBox();
      expect(at?.x).toBeGreaterThan(sides?.x ?? NaN);
      expect(at?.x).toBeLessThan((sides?.x ?? NaN) + (sides?.width ?? NaN));
    }
    expect(search(page)).toBe("");
  });
});
