import { chromium, type Browser, type BrowserContext, type BrowserContextOptions, type Locator, type Page } from "playwright-core";
import { afterAll, afterEach, beforeAll, expect } from "vitest";
import { CHROMIUM_FLAGS, findChromium } from "./chromium.ts";
import { serveDemo, type ServedDemo } from "./served-demo.ts";

export const DESK = { width: 1280, height: 720 };
export const PHONE = { width: 390, height: 844 };

export interface DemoBrowser {
  /** Opens an address below the demo's, on a page of its own that is closed after the test. */
  readonly open: (path: string, options?: BrowserContextOptions) => Promise<Page>;
  /** The same for an event, and waits until its chart is drawn. */
  readonly openEvent: (id: string, options?: BrowserContextOptions) => Promise<Page>;
  /** Lets a fault pass that a test brings about on purpose. */
  readonly expectFault: (words: RegExp) => void;
  readonly address: (path: string) => string;
}

/** One server (of the demo, or of events of the test's own) and one Chromium for all tests of a file. Whatever a page's console calls an error fails the test. */
export function demoBrowser({ writeEvents }: { writeEvents?: (folder: string) => void } = {}): DemoBrowser {
  const running: { demo: ServedDemo | null; browser: Browser | null } = { demo: null, browser: null };
  const faults: string[] = [];
  const expected: RegExp[] = [];
  const contexts: BrowserContext[] = [];

  beforeAll(async () => {
    const executablePath = findChromium() ?? "";
    [running.demo, running.browser] = await Promise.all([serveDemo(writeEvents), chromium.launch({ executablePath, args: CHROMIUM_FLAGS })]);
  });
  afterAll(async () => {
    await running.browser?.close();
    await running.demo?.stop();
  });
  afterEach(async () => {
    for (const context of contexts.splice(0)) await context.close();
    const unforeseen = faults.splice(0).filter((fault) => !expected.some((words) => words.test(fault)));
    expected.length = 0;
    expect(unforeseen).toStrictEqual([]);
  });

  const address = (path: string): string => `${running.demo?.address ?? ""}${path}`;
  const open: DemoBrowser["open"] = async (path, options = {}) => {
    if (running.browser === null) throw new Error("The browser is not running.");
    const context = await running.browser.newContext({ viewport: DESK, reducedMotion: "reduce", ...options });
    contexts.push(context);
    context.on("console", (message) => {
      if (message.type() === "error") faults.push(message.text());
    });
    context.on("weberror", (error) => faults.push(error.error().message));
    const page = await context.newPage();
    await page.goto(address(path));
    return page;
  };
  const openEvent: DemoBrowser["openEvent"] = async (id, options) => {
    const page = await open(`events/${id}`, options);
    await drawn(page).waitFor();
    return page;
  };
  return { open, openEvent, address, expectFault: (words) => void expected.push(words) };
}

/** The chart, once its rings stand on it. */
function drawn(page: Page): Locator {
  return page.locator("[data-drawn] .leaflet-rings-pane path, [data-drawn] .leaflet-marker-pane *").first();
}

/** Does something that changes the answer, and waits until the new one is drawn. */
export async function redrawn(page: Page, act: () => Promise<void>): Promise<void> {
  const map = page.locator("[data-drawn]");
  const before = await map.getAttribute("data-drawn");
  await act();
  await page.waitForFunction((was) => document.querySelector("[data-drawn]")?.getAttribute("data-drawn") !== was, before);
}
