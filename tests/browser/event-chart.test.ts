import { describe, expect, test } from "vitest";
import type { Page } from "playwright-core";
import type { Position } from "#lib/core/units/position.ts";
import { demoBrowser } from "#tests/support/demo-browser.ts";
import { readChart, type DrawnChart, type Stroke } from "#tests/support/drawn-chart.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { DEMO_EVENTS } from "#tests/support/simulator/demo-events.ts";
import { DEMO_STATIONS } from "#tests/support/simulator/demo-stations.ts";
import { legBetween, pointAlong } from "#tests/support/simulator/ellipsoid.ts";

const { openEvent } = demoBrowser();

/** The demo's storms were made by a simulator that shares nothing with the estimator: they are the truth here. */
const truthOf = (id: string) => {
  const event = DEMO_EVENTS.find((candidate) => candidate.id === id);
  if (event === undefined) throw new Error(`There is no event ${id}.`);
  return event;
};
const station = (id: string) => {
  const found = DEMO_STATIONS.find((candidate) => candidate.id === id);
  if (found === undefined) throw new Error(`There is no station ${id}.`);
  return found;
};
/** East of Greenwich all the way round, so that the Pacific is in one piece. */
const eastward = (position: Position): Position => ({ ...position, longitudeDegrees: (position.longitudeDegrees + 360) % 360 });
const asDrawn = (id: string, turn: (position: Position) => Position) => ({ name: station(id).name, position: turn(station(id).position) });
const unchanged = (position: Position): Position => position;

interface Answer {
  readonly position: Position;
  readonly epochSeconds: number;
  readonly sigmaSeconds: number;
}

/** The answer as a reader takes it from the page. */
async function readAnswer(page: Page): Promise<Answer> {
  const words = (await page.getByRole("region", { name: "Answer", exact: true }).getByRole("status").innerText()).replace(/\s+/g, " ");
  const found = /([\d.]+)° ([NS]) ([\d.]+)° ([EW]) (\d+ \w+ \d+ \d\d:\d\d UTC) ± ([\d.]+) h/.exec(words);
  if (found === null) throw new Error(`No position and time in: ${words}`);
  const [, latitude, ns, longitude, ew, moment = "", hours] = found;
  return {
    position: { latitudeDegrees: Number(latitude) * (ns === "S" ? -1 : 1), longitudeDegrees: Number(longitude) * (ew === "W" ? -1 : 1) },
    epochSeconds: Date.parse(moment) / 1000,
    sigmaSeconds: Number(hours) * 3600,
  };
}

/** The ring's figure in a station's row (km). */
async function ringKm(page: Page, name: string): Promise<number> {
  const row = page.getByRole("row").filter({ has: page.getByRole("rowheader", { name }) });
  return Number((await row.getByRole("cell").nth(2).innerText()).replace(/\s|±.*$/gs, ""));
}

/** How far the points of a stroke lie from a station (km), the nearest and the farthest. */
function reach(stroke: Stroke, centre: Position): { least: number; most: number } {
  const lengths = stroke.map((point) => legBetween(centre, point).distanceMetres / 1000);
  return { least: Math.min(...lengths), most: Math.max(...lengths) };
}

/** The drawn ring of a station: every point of it at the distance that the station's row states. */
async function expectRing(page: Page, chart: DrawnChart, id: string): Promise<Stroke[]> {
  const { name, position } = station(id);
  const stated = await ringKm(page, name);
  const kmPerPixel = 111.3 * chart.degreesPerPixel;
  const fits = ({ least, most }: { least: number; most: number }): boolean => Math.abs(least - stated) <= 2 * kmPerPixel && Math.abs(most - stated) <= 2 * kmPerPixel;
  const rings = (await chart.strokes("rings")).filter((shape) => shape.length > 0 && shape.every((stroke) => fits(reach(stroke, position))));
  expect(rings, `rings ${stated} km about ${name}`).toHaveLength(1);
  return rings.flat();
}

/** A side of a ring, region or sight line is some pixels long; a line torn at a meridian would run across the chart. */
const LONGEST_SIDE_PIXELS = 90;

async function expectUntorn(chart: DrawnChart): Promise<void> {
  for (const layer of ["rings", "sight", "regions"]) expect(await chart.longestSide(layer), layer).toBeLessThan(LONGEST_SIDE_PIXELS);
}

describe.each([
  { id: "petrel", known: ["lan", "gul"], turn: eastward },
  { id: "gannet", known: ["lar", "eve"], turn: unchanged },
  { id: "albatross", known: ["pal", "col"], turn: eastward },
  { id: "heron", known: ["gul", "col"], turn: eastward },
])("the chart of $id", ({ id, known, turn }) => {
  test("says and shows where the storm was, within the stated errors, and draws each ring at the distance beside it", async () => {
    const truth = truthOf(id);
    const page = await openEvent(id);
    const answer = await readAnswer(page);
    const missKm = legBetween(answer.position, truth.storm).distanceMetres / 1000;
    expectWithin(missKm, 0, { absolute: 400, unit: "km", because: "the 95 % regions' radii are 280 to 760 km" });
    expectWithin(answer.epochSeconds, truth.originEpochSeconds, { absolute: 2.6 * answer.sigmaSeconds + 1800, unit: "s", because: "99 % of the stated error, and half of the hour that the time is rounded to" });

    const chart = await readChart(page, known.map((name) => asDrawn(name, turn)));
    const [mark, ...others] = (await chart.marks("sources")).map(turn);
    expect(others).toStrictEqual([]);
    const offKm = mark === undefined ? NaN : legBetween(mark, answer.position).distanceMetres / 1000;
    expectWithin(offKm, 0, { absolute: 9 + 111.3 * chart.degreesPerPixel, unit: "km", because: "a tenth of a degree, rounded, and a pixel" });
    const [widest] = await chart.holding("regions", turn(truth.storm));
    expect(widest, "the 95 % region holds the true storm").toBe(true);
    await expectUntorn(chart);

    const { ridge, timed, estimated } = truth;
    for (const heard of [...ridge, ...timed, ...estimated]) await expectRing(page, chart, heard);
    expect(await chart.strokes("rings")).toHaveLength(ridge.length + timed.length + estimated.length);
  });
});

test("a crossing that land hides is named as ruled out, and why; the one in sight is not", async () => {
  const page = await openEvent("heron");
  const list = page.getByRole("heading", { name: "Ruled out" }).locator("xpath=following-sibling::ol[1]").getByRole("listitem");
  expect(await list.count()).toBe(1);
  const words = (await list.innerText()).replace(/\s+/g, " ");
  const [, latitude, longitude] = /^a ([\d.]+)° S ([\d.]+)° W land lies between/.exec(words) ?? [];
  // Where the rings of the true distances cross besides the storm, in the tropical Atlantic.
  const hidden = { latitudeDegrees: -Number(latitude), longitudeDegrees: -Number(longitude) };
  for (const id of truthOf("heron").ridge) {
    const { position } = station(id);
    const trueKm = legBetween(position, truthOf("heron").storm).distanceMetres / 1000;
    expectWithin(legBetween(position, hidden).distanceMetres / 1000, trueKm, { absolute: 500, unit: "km", because: "two and a half times the bands' half widths" });
  }
});

describe("across the 180th meridian", () => {
  test("a region is one: filled on both sides, with no wall in the sea between", async () => {
    const page = await openEvent("tern");
    const chart = await readChart(page, ["wic", "fen"].map((id) => asDrawn(id, eastward)));
    for (const longitudeDegrees of [179.5, 179.97, 180.03, 180.5]) {
      const [widest] = await chart.holding("regions", { latitudeDegrees: 37, longitudeDegrees });
      expect(widest, `at ${longitudeDegrees}`).toBe(true);
    }
    const sides = (await chart.strokes("regions")).flat().flatMap((stroke) => stroke.slice(1).map((to, i) => ({ from: stroke[i] ?? to, to })));
    expect(sides.length).toBeGreaterThan(100);
    const isWall = ({ from, to }: { from: Position; to: Position }): boolean =>
      [from, to].every(({ longitudeDegrees }) => Math.abs(longitudeDegrees - 180) < chart.degreesPerPixel) && Math.abs(from.latitudeDegrees - to.latitudeDegrees) > 3 * chart.degreesPerPixel;
    expect(sides.filter(isWall)).toStrictEqual([]);
  });

  test("a ring goes on without a break", async () => {
    const page = await openEvent("petrel");
    const chart = await readChart(page, ["lan", "gul"].map((id) => asDrawn(id, eastward)));
    const ring = (await expectRing(page, chart, "ott")).flat().map(({ longitudeDegrees }) => longitudeDegrees);
    expect(Math.min(...ring)).toBeLessThan(175);
    expect(Math.max(...ring)).toBeGreaterThan(195);
    await expectUntorn(chart);
  });
});

describe("round the South Pole", () => {
  test("a ring runs through all longitudes and its band is closed under the pole", async () => {
    const page = await openEvent("albatross");
    const out = page.getByRole("button", { name: "Zoom out" });
    for (let press = 0; press < 8 && (await out.getAttribute("aria-disabled")) !== "true"; press++) {
      await out.press("Enter");
    }
    const chart = await readChart(page, ["pal", "col"].map((id) => asDrawn(id, eastward)));
    const ring = (await expectRing(page, chart, "tar")).flat();
    const { position } = station("tar");
    for (let longitude = 30; longitude < 390; longitude += 10) {
      const near = ring.filter(({ longitudeDegrees }) => Math.abs(longitudeDegrees - longitude) < 10);
      expect(near.length, `points of the ring about ${longitude}`).toBeGreaterThan(0);
    }
    await expectUntorn(chart);

    const metres = 1000 * (await ringKm(page, "Tarnmouth"));
    const inBand = async (distanceMetres: number, headsTowardDegrees: number): Promise<boolean | undefined> => {
      const at = eastward(pointAlong(position, { distanceMetres, headsTowardDegrees }));
      return (await chart.holding("bands", at))[truthOf("albatross").ridge.indexOf("tar")];
    };
    for (const bearing of [0, 60, 120, 165, 180, 195, 240, 300]) {
      expect(await inBand(metres, bearing), `on the ring, ${bearing} from Tarnmouth`).toBe(true);
      expect(await inBand(metres - 600_000, bearing), `inside the ring, ${bearing} from Tarnmouth`).toBe(false);
      expect(await inBand(metres + 600_000, bearing), `beyond the ring, ${bearing} from Tarnmouth`).toBe(false);
    }
  });
});

test("one station gives its ring and no place", async () => {
  const page = await openEvent("fulmar");
  const truth = truthOf("fulmar");
  const words = (await page.getByRole("region", { name: "Answer", exact: true }).getByRole("status").innerText()).replace(/\s+/g, " ");
  const [, km, sigmaKm, moment = "", hours] = /^([\d ]+) ± (\d+) km (.* UTC) ± ([\d.]+) h Distance only\./.exec(words) ?? [];
  const distanceKm = legBetween(station("mar").position, truth.storm).distanceMetres / 1000;
  expectWithin(Number(km?.replace(/\s/g, "")), distanceKm, { absolute: 2.6 * Number(sigmaKm), unit: "km", because: "99 % of the stated error" });
  expectWithin(Date.parse(moment) / 1000, truth.originEpochSeconds, { absolute: 2.6 * Number(hours) * 3600, unit: "s", because: "99 % of the stated error" });
  await expect(page.locator(".leaflet-sources-pane path").count()).resolves.toBe(0);
  await expect(page.locator(".leaflet-rings-pane path").count()).resolves.toBe(1);
});

test("two stations give two possible sources, one of them the storm", async () => {
  const page = await openEvent("tern");
  const chart = await readChart(page, ["wic", "fen"].map((id) => asDrawn(id, eastward)));
  const { storm } = truthOf("tern");
  const sources = (await chart.marks("sources")).map((mark) => legBetween(mark, storm).distanceMetres / 1000);
  expectWithin(Math.min(...sources), 0, { absolute: 400, unit: "km", because: "the 50 % region about it is 540 km in radius" });
  const answer = page.getByRole("region", { name: "Answer", exact: true }).getByRole("status");
  expect((await answer.innerText()).replace(/\s+/g, " ")).toMatch(/^Two possible sources A .*° N .*° E 0\.50 21 Nov .* UTC B .*° N .*° W 0\.50 21 Nov .* UTC Not one place\. .* sight lines are for A;/);
  const sizes = await answer.getByRole("listitem").locator("span").evaluateAll((parts) => parts.filter(({ textContent }) => /°|^0\./.test(textContent)).map((part) => getComputedStyle(part).fontSize));
  expect(sizes).toHaveLength(4);
  expect(new Set(sizes).size).toBe(1);
  expect(Number.parseFloat(sizes[0] ?? "")).toBeGreaterThan(18);
  expect((await chart.holding("regions", eastward(storm)))[0], "the 95 % region holds the true storm").toBe(true);
});

test("bands that overlap lie under the regions, and however many meet do not hide them", async () => {
  const page = await openEvent("petrel?overlap=yes");
  await page.locator(".leaflet-overlap-pane path").first().waitFor();
  const [overlap, regions] = await page.evaluate(() => ["overlap", "regions"].map((name) => Number(getComputedStyle(document.querySelector(`.leaflet-${name}-pane`) ?? document.body).zIndex)));
  expect(overlap).toBeLessThan(regions ?? NaN);
  const opacities = await page.locator(".leaflet-overlap-pane path").evaluateAll((paths) => paths.map((path) => Number(getComputedStyle(path).fillOpacity)));
  expect(opacities.length).toBeGreaterThan(5);
  const throughAll = opacities.reduce((through, opacity) => through * (1 - opacity), 1);
  expectWithin(1 - throughAll, 0.2, { absolute: 0.01, unit: "of full ink", because: "the darkest that leaves a region's own tint readable; common practice, no source" });
});
