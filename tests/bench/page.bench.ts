/**
 * The event page in Chromium: from leaving a station out, or taking it in again, to the frame that shows the new
 * answer; and the scripts that the page loads before anything is touched, as they come over the wire. The worker's
 * scripts and the land are told apart: the page is read and used while they load. Needs `npm run build` first.
 */
import { chromium, type Browser, type Page } from "playwright-core";
import { median } from "../support/coverage/tally.ts";
import { CHROMIUM_FLAGS, findChromium } from "../support/chromium.ts";
import { serveDemo } from "../support/served-demo.ts";

/** Those of the demo's events that have five or six stations. */
const EVENTS = ["petrel", "albatross", "gannet"];
const CHANGES = 10;
const VISITS = 5;
/** A station of each whose readings are dropped and taken up again. */
const FOCUS: Readonly<Record<string, string>> = { petrel: "lan", albatross: "tar", gannet: "umb" };

function say(line: { bench: string; value: number; unit: string; target?: number; events?: number[] }): void {
  console.log(JSON.stringify(line));
}

async function openEvent(browser: Browser, address: string, id: string): Promise<Page> {
  const page = await browser.newPage({ viewport: { width: 1280, height: 720 } });
  await page.goto(`${address}events/${id}`);
  await page.locator("[data-drawn='0'] .leaflet-rings-pane path").first().waitFor();
  await page.locator("[data-drawn='0'] .leaflet-land-pane path").waitFor();
  return page;
}

/** Runs in the page: ticks the box that stands at a place of a table, and waits for the frame after the chart has changed. */
function redrawMilliseconds({ table, place }: { table: string; place: number }): Promise<number> {
  return new Promise((answer) => {
    const map = document.querySelector("[data-drawn]");
    const box = document.querySelectorAll<HTMLInputElement>(`${table} tbody input[type=checkbox]`)[place];
    if (map === null || box === undefined) throw new Error("The page has no chart, or no such box.");
    let began = NaN;
    const watch = new MutationObserver(() => {
      watch.disconnect();
      // The frame after the next one begins when the next one, with the new chart on it, has been painted.
      requestAnimationFrame(() => {
        requestAnimationFrame(() => {
          answer(performance.now() - began);
        });
      });
    });
    watch.observe(map, { attributes: true, attributeFilter: ["data-drawn"] });
    began = performance.now();
    box.click();
  });
}

interface Redraws {
  readonly stations: number[];
  readonly readings: number[];
}

async function redraws(browser: Browser, address: string, id: string): Promise<Redraws> {
  const page = await openEvent(browser, address, `${id}?focus=${FOCUS[id] ?? ""}`);
  const times = async (table: string): Promise<number[]> => {
    const found: number[] = [];
    // Each is left out and taken in again; the first pair warms the code up, as a reader's first touch does.
    for (let change = 0; change < CHANGES + 2; change++) found.push(await page.evaluate(redrawMilliseconds, { table, place: Math.floor(change / 2) % 5 }));
    return found.slice(2);
  };
  const found = { stations: await times("[aria-label=Evidence]"), readings: await times("section:has(form)") };
  await page.close();
  return found;
}

/** As text, for it runs in the page as it stands: notes when rings and land are first there together. */
const WATCH_CHART = `requestAnimationFrame(function look() {
  const isThere = (pane) => document.querySelector("[data-drawn] .leaflet-" + pane + "-pane path") !== null;
  if (isThere("rings") && isThere("land")) globalThis.chartAt = performance.now();
  else requestAnimationFrame(look);
});`;

/** From asking for the page to the frame that shows rings and land, in a browser that has seen nothing of it before. */
async function firstChartMilliseconds(browser: Browser, address: string, id: string): Promise<number> {
  const context = await browser.newContext({ viewport: { width: 1280, height: 720 } });
  const page = await context.newPage();
  await page.addInitScript({ content: WATCH_CHART });
  await page.goto(`${address}events/${id}`);
  const drawn = await page.waitForFunction(() => (globalThis as { chartAt?: number }).chartAt);
  const at = Number(await drawn.jsonValue());
  await context.close();
  return at;
}

/** Bytes on the wire of a fresh visit: the page's scripts, and those of its worker with the land that it fetches. */
async function loadedBytes(browser: Browser, address: string): Promise<{ page: number; worker: number; land: number }> {
  const context = await browser.newContext();
  const page = await context.newPage();
  const session = await context.newCDPSession(page);
  await session.send("Network.enable");
  const scripts = new Set<string>();
  let pageBytes = 0;
  session.on("Network.responseReceived", ({ requestId, type }) => {
    if (type === "Script") scripts.add(requestId);
  });
  session.on("Network.loadingFinished", ({ requestId, encodedDataLength }) => {
    if (scripts.has(requestId)) pageBytes += encodedDataLength;
  });
  await page.goto(`${address}events/petrel`);
  await page.locator("[data-drawn='0'] .leaflet-land-pane path").waitFor();
  await page.waitForLoadState("networkidle");
  const inWorker = await Promise.all(
    page.workers().map((worker) =>
      worker.evaluate(() => (performance.getEntriesByType("resource") as PerformanceResourceTiming[]).map(({ name, encodedBodySize }) => ({ name, bytes: encodedBodySize }))),
    ),
  );
  await context.close();
  const sum = (isLand: boolean): number => inWorker.flat().filter(({ name }) => name.includes("land-") === isLand).reduce((total, { bytes }) => total + bytes, 0);
  return { page: pageBytes, worker: sum(false), land: sum(true) };
}

const demo = await serveDemo();
const browser = await chromium.launch({ executablePath: findChromium() ?? "", args: CHROMIUM_FLAGS });
try {
  const times: Redraws[] = [];
  for (const id of EVENTS) times.push(await redraws(browser, demo.address, id));
  for (const what of ["stations", "readings"] as const) {
    const each = times.map((found) => found[what]);
    say({ bench: `page-redraw-${what}`, value: Math.round(median(each.flat())), unit: "ms", target: 300, events: each.map((own) => Math.round(median(own))) });
  }
  const firsts: number[] = [];
  for (let visit = 0; visit < VISITS; visit++) for (const id of EVENTS) firsts.push(await firstChartMilliseconds(browser, demo.address, id));
  say({ bench: "page-first-chart", value: Math.round(median(firsts)), unit: "ms", target: 1500, events: [Math.round(Math.max(...firsts))] });
  const loaded = await loadedBytes(browser, demo.address);
  const kilobytes = (bytes: number): number => Number((bytes / 1000).toFixed(1));
  say({ bench: "page-scripts", value: kilobytes(loaded.page), unit: "kB gzip", target: 350 });
  say({ bench: "page-worker-scripts", value: kilobytes(loaded.worker), unit: "kB gzip" });
  say({ bench: "page-land", value: kilobytes(loaded.land), unit: "kB gzip" });
} finally {
  await browser.close();
  await demo.stop();
}
