import type { Page } from "playwright-core";
import { describe, expect, onTestFinished, test } from "vitest";
import { axeFaults } from "#tests/support/axe-faults.ts";
import { demoBrowser, DESK, PHONE } from "#tests/support/demo-browser.ts";
import { cell, described, findings, paste, row, station, timedRows } from "#tests/support/hand-readings-page.ts";
import { legBetween } from "#tests/support/simulator/ellipsoid.ts";
import { regionContains } from "#tests/support/coverage/region-contains.ts";
import { serveFolder } from "#tests/support/served-folder.ts";
import { temporaryDirectory } from "#tests/support/temporary-directory.ts";
import { tabTo } from "#tests/support/tab-to.ts";

const { open, address, expectFault } = demoBrowser();

/** A storm of this file's own, and where the demo's stations stand. */
const STORM = { position: { latitudeDegrees: 41, longitudeDegrees: 172 }, originEpochSeconds: Date.UTC(2031, 2, 3, 6) / 1000 };
const WICKERSTRAND = { latitudeDegrees: 22.4, longitudeDegrees: -159.4 };
const THORNHOLM = { latitudeDegrees: 44.3, longitudeDegrees: -125.6 };
const GULLMERE = { latitudeDegrees: 28.6, longitudeDegrees: -116.6 };
const PERIODS = [19, 18, 17, 16, 15, 14, 13];

async function choose(page: Page, name: string): Promise<void> {
  await station(page).fill(name);
  await page.keyboard.press("Enter");
}

async function pasteRows(page: Page, rows: readonly (readonly string[])[]): Promise<void> {
  await cell(page, 1, "Time").focus();
  await paste(page, rows.map((cells) => cells.join("\t")).join("\n"));
  await row(page, rows.length).waitFor();
}

const bringIn = (page: Page): Promise<void> => page.getByRole("button", { name: "Bring in" }).click();

interface Located {
  readonly source: { latitude: number; longitude: number };
  readonly regions: readonly { probability: number; geometry: { type: "MultiPolygon"; coordinates: number[][][][] } }[];
}

test("three stations by hand become a region on the map that holds the storm, and the answer is kept", async () => {
  const page = await open("readings");
  for (const [name, at] of [["Wickerstrand", WICKERSTRAND], ["Thornholm", THORNHOLM], ["Gullmere", GULLMERE]] as const) {
    await choose(page, name);
    await pasteRows(page, timedRows(STORM, at, PERIODS));
    await page.locator("[data-drawn] .leaflet-rings-pane path").first().waitFor();
    expect(await findings(page)).toContain("7 readings used");
    // The ring's distance is within its own error of the geodesic, which another program worked out.
    const [, km = "", sigmaKm = ""] = /Distance L ([\d ]+) ± ([\d ]+) km/.exec(await findings(page)) ?? [];
    const off = Number(km.replace(/\D/g, "")) - legBetween(STORM.position, at).distanceMetres / 1000;
    expect(Math.abs(off)).toBeLessThan(2 * Number(sigmaKm.replace(/\D/g, "")));
    if (name === "Wickerstrand") await page.getByRole("textbox", { name: "Title of the event" }).fill("March storm by hand");
    else expect(await page.getByRole("radio", { name: "An event there is" }).isChecked()).toBe(true);
    await bringIn(page);
    await page.getByText(`7 readings of ${name} are in.`).waitFor();
    expect(await station(page).inputValue()).toBe("");
    await page.waitForFunction(() => document.activeElement?.getAttribute("role") === "combobox");
    expect(await row(page, 2).count()).toBe(0);
  }
  await page.getByRole("link", { name: "Open the event sheet: March storm by hand" }).click();
  await page.locator("[data-drawn] .leaflet-regions-pane path").first().waitFor();
  expect(await page.getByRole("rowheader").filter({ hasText: /Wickerstrand|Thornholm|Gullmere/ }).count()).toBe(3);
  await page.getByRole("button", { name: "Keep this answer" }).click();
  await page.getByText("Kept as number 1.").waitFor();

  const { pathname } = new URL(page.url());
  await page.goBack();
  await station(page).waitFor();
  expect(await page.getByRole("combobox", { name: "Event" }).locator("option:checked").innerText()).toBe("March storm by hand, first swell 5 Mar 2031");

  const id = pathname.split("/").at(-1) ?? "";
  const kept = (await (await fetch(address(`api/v1/events/${id}/localizations/1`))).json()) as { answer: Located };
  const widest = kept.answer.regions.find(({ probability }) => probability === 0.95);
  expect(widest !== undefined && regionContains(widest.geometry, STORM.position)).toBe(true);
});

test("a whole entry goes by keyboard alone", async () => {
  const page = await open("readings");
  const rows = timedRows(STORM, THORNHOLM, [18, 16, 14]);
  await station(page).waitFor();
  await tabTo(page, station(page));
  await page.keyboard.type("tho");
  await page.keyboard.press("ArrowDown");
  await page.keyboard.press("ArrowUp");
  await page.keyboard.press("Enter");
  expect(await station(page).inputValue()).toBe("Thornholm (tho)");
  await tabTo(page, cell(page, 1, "Date"));
  const [date = ""] = rows[0] ?? [];
  await page.keyboard.type(date);
  await page.keyboard.press("Tab");
  for (const [i, [day = "", time = "", period = ""]] of rows.entries()) {
    await page.keyboard.type(time.replace(":", ""));
    await page.keyboard.press("Tab");
    await page.keyboard.type(period);
    if (i === rows.length - 1) break;
    await page.keyboard.press("Enter");
    // The new row has the date of the one above; the next day is offered, and taken only where it is asked for.
    expect(await cell(page, i + 2, "Date").inputValue()).toBe(day);
    const [next = "", nextTime = ""] = rows[i + 1] ?? [];
    if (next !== day) {
      await page.keyboard.type(nextTime.replace(":", ""));
      await page.keyboard.press("Shift+Tab");
      await page.keyboard.press("Control+A");
      await page.keyboard.type(next);
      await page.keyboard.press("Tab");
      await page.keyboard.press("Control+A");
    }
  }
  await tabTo(page, page.getByRole("radio", { name: "A new event" }));
  await page.keyboard.press("ArrowRight");
  await page.keyboard.press("ArrowRight");
  expect(await page.getByRole("radio", { name: "No event yet" }).isChecked()).toBe(true);
  await tabTo(page, page.getByRole("button", { name: "Bring in" }));
  await page.keyboard.press("Enter");
  await page.getByText("3 readings of Thornholm are in, and wait for an event.").waitFor();
  const { arrivals } = (await (await fetch(address("api/v1/arrivals?waiting=yes&station=tho"))).json()) as { arrivals: { readings: { time: string; periodSeconds: number }[] }[] };
  expect(arrivals.at(-1)?.readings.map(({ time, periodSeconds }) => [time.slice(0, 10), time.slice(11, 16), String(Math.round(periodSeconds * 1e6) / 1e6)])).toStrictEqual(rows);
});

test("a place that is no station yet becomes one, by a click on the map or typed degrees", async () => {
  const page = await open("readings");
  await page.getByRole("radio", { name: "A new one" }).check();
  const box = await page.locator(".leaflet-container").boundingBox();
  await page.mouse.click((box?.x ?? 0) + (box?.width ?? 0) * 0.6, (box?.y ?? 0) + (box?.height ?? 0) * 0.6);
  const latitude = page.getByRole("textbox", { name: "Latitude, degrees" });
  const longitude = page.getByRole("textbox", { name: "Longitude, degrees" });
  expect(Number(await latitude.inputValue())).toBeLessThan(0);
  expect(Number(await longitude.inputValue())).toBeGreaterThan(0);
  await latitude.fill("21.6 N");
  await longitude.fill("201.9");
  await page.getByText("It stands at 21.6° N 158.1° W.").waitFor();
  await page.getByRole("textbox", { name: "Id" }).fill("north point");
  await page.getByRole("combobox", { name: "Time zone (optional)" }).fill("Pacific/Honolulu");
  await page.getByRole("radio", { name: "local time, Pacific/Honolulu" }).check();
  await pasteRows(page, [["2031-03-05", "01:00", "20", "330"], ["2031-03-05", "07:00", "20", "300"]]);
  // Ten hours behind, and half a count later.
  expect(await row(page, 1).innerText()).toMatch(/16\.5 ±\s\d\.\d\ss, 5 Mar 2031 11:00\sUTC/);
  await page.getByRole("radio", { name: "No event yet" }).check();
  await bringIn(page);
  await page.getByText("2 readings of north point are in, and wait").waitFor();
  const stored = (await (await fetch(address("api/v1/stations/north%20point"))).json()) as { deployments: { latitudeDegrees: number; longitudeDegrees: number; timeZone: string }[] };
  expect(stored.deployments).toMatchObject([{ latitudeDegrees: 21.6, timeZone: "Pacific/Honolulu" }]);
  const { arrivals } = (await (await fetch(address("api/v1/arrivals?station=north%20point"))).json()) as { arrivals: { readings: { time: string; frequencySigmaHz: number }[] }[] };
  expect(arrivals[0]?.readings.map(({ time }) => time)).toStrictEqual(["2031-03-05T11:02:45.000Z", "2031-03-05T17:02:30.000Z"]);
});

describe("what is wrong", () => {
  test("is said beside its field once that was left, and keeps the readings here", async () => {
    const page = await open("readings");
    await choose(page, "Gullmere");
    await cell(page, 1, "Date").fill("28/02/2031");
    expect(await cell(page, 1, "Date").getAttribute("aria-invalid")).toBe("false");
    await page.keyboard.press("Tab");
    expect(await cell(page, 1, "Date").getAttribute("aria-invalid")).toBe("true");
    expect(await described(cell(page, 1, "Date"))).toContain("“28/02/2031” is no day. Write it year first");
    await page.keyboard.type("25:10");
    await page.keyboard.press("Tab");
    expect(await described(cell(page, 1, "Time"))).toContain("“25:10” is no time of day");
    expect(await described(cell(page, 1, "Period, s"))).toBe("");
    await page.getByRole("textbox", { name: "Note (optional)" }).fill("from the pier");
    expect(await described(cell(page, 1, "Period, s"))).toContain("Give the period in seconds, or the number of waves");
    await cell(page, 1, "Period, s").fill("15");
    await cell(page, 1, "or waves").fill("20");
    await page.keyboard.press("Tab");
    expect(await described(cell(page, 1, "Period, s"))).toContain("and not both");

    let posts = 0;
    page.on("request", (request) => { if (request.method() !== "GET") posts += 1; });
    await bringIn(page);
    await page.getByRole("alert").getByText("Nothing was sent").waitFor();
    expect(await described(page.getByRole("textbox", { name: "Title of the event" }))).toContain("Give the event a title");
    expect(posts).toBe(0);
    // The focus comes with the frame after the words.
    await cell(page, 1, "Date").and(page.locator(":focus")).waitFor();
    expect(await cell(page, 1, "Time").inputValue()).toBe("25:10");
  });

  test("with a station or a place is said there", async () => {
    const page = await open("readings");
    await station(page).fill("Nowhere");
    await page.keyboard.press("Tab");
    expect(await described(station(page))).toContain("No station is called “Nowhere”");
    await page.getByRole("radio", { name: "A new one" }).check();
    for (const [name, text, words] of [["Latitude, degrees", "95", "is no latitude"], ["Longitude, degrees", "12 N", "is no longitude"]] as const) {
      await page.getByRole("textbox", { name }).fill(text);
      await page.keyboard.press("Tab");
      expect(await described(page.getByRole("textbox", { name }))).toContain(words);
    }
    const zone = page.getByRole("combobox", { name: "Time zone (optional)" });
    await zone.fill("Mars/Base");
    await page.keyboard.press("Tab");
    expect(await described(zone)).toContain("No time zone is called “Mars/Base”");
  });

  test("to the server's mind stands beside the field as well, with nothing lost", async () => {
    expectFault(/status of 409/);
    const page = await open("readings");
    await page.getByRole("radio", { name: "A new one" }).check();
    await page.getByRole("textbox", { name: "Id" }).fill("wic");
    await page.getByRole("textbox", { name: "Latitude, degrees" }).fill("1");
    await page.getByRole("textbox", { name: "Longitude, degrees" }).fill("2");
    await pasteRows(page, [["2031-03-05", "01:00", "17"], ["2031-03-05", "09:00", "15"]]);
    await page.getByRole("textbox", { name: "Title of the event" }).fill("Never made");
    await bringIn(page);
    await page.getByText("A station “wic” is stored already.").waitFor();
    expect(await described(page.getByRole("textbox", { name: "Id" }))).toContain("is stored already");
    expect(await cell(page, 2, "Period, s").inputValue()).toBe("15");
  });

  test("with the readings' line is said in words", async () => {
    const page = await open("readings");
    await pasteRows(page, [["2031-03-05", "01:00", "14"], ["2031-03-05", "09:00", "17"]]);
    expect(await findings(page)).toContain("The period rises with time, so this is not one dispersive arrival");
    expect(await page.getByRole("group", { name: "Distance and time" }).count()).toBe(0);
  });
});

test("a try that is not answered loses nothing, and the next one saves nothing twice", async () => {
  expectFault(/ERR_FAILED/);
  const page = await open("readings");
  await choose(page, "Gullmere");
  const rows = timedRows(STORM, GULLMERE, [17.5, 15.5]);
  await pasteRows(page, rows);
  await page.getByRole("radio", { name: "No event yet" }).check();
  // The server takes the arrival, and its answer is lost on the way.
  await page.route("**/api/v1/arrivals", async (route) => {
    await route.fetch();
    await route.abort();
  });
  await bringIn(page);
  await page.getByRole("alert").getByText("The server did not answer").waitFor();
  expect(await cell(page, 2, "Period, s").inputValue()).toBe("15.5");
  await page.unroute("**/api/v1/arrivals");
  await bringIn(page);
  await page.getByText("2 readings of Gullmere are in").waitFor();
  const count = async (): Promise<number> => {
    const { arrivals } = (await (await fetch(address("api/v1/arrivals?waiting=yes&station=gul"))).json()) as { arrivals: unknown[] };
    return arrivals.length;
  };
  expect(await count()).toBe(1);

  await choose(page, "Gullmere");
  await pasteRows(page, rows);
  await bringIn(page);
  await page.getByRole("alert").getByText("The same readings of this station are in already").waitFor();
  expect(await count()).toBe(1);
});

test("an hour that came twice is asked about, and one that did not exist is refused", async () => {
  const page = await open("readings");
  await choose(page, "Thornholm");
  await page.getByRole("radio", { name: "local time, America/Los_Angeles" }).check();
  await pasteRows(page, [["2024-11-03", "01:30", "15"], ["2024-03-10", "02:30", "14"]]);
  await bringIn(page);
  expect(await described(cell(page, 1, "Time"))).toContain("came twice in America/Los_Angeles. Say whether it was the first (UTC-07:00) or the second (UTC-08:00)");
  expect(await described(cell(page, 2, "Time"))).toContain("did not exist in America/Los_Angeles: the clocks went forward from 02:00 to 03:00");
  const later = row(page, 1).getByRole("radio", { name: "the second 01:30, 3 Nov 2024 09:30 UTC" });
  await later.check();
  expect(await described(cell(page, 1, "Time"))).toBe("");
  expect(await row(page, 1).innerText()).toContain("09:30\u00a0UTC");
  await cell(page, 1, "Time").fill("01:45");
  expect(await row(page, 1).getByRole("radio", { name: "the second 01:45, 3 Nov 2024 09:45 UTC" }).isChecked()).toBe(false);
  expect(await described(cell(page, 1, "Time"))).toContain("came twice");
});

test("the day after midnight is offered, and put in only when it is asked for", async () => {
  const page = await open("readings");
  await cell(page, 1, "Date").fill("2031-02-28");
  await cell(page, 1, "Time").fill("23:40");
  await cell(page, 1, "Period, s").fill("16");
  await page.keyboard.press("Enter");
  await page.keyboard.type("0020");
  expect(await cell(page, 2, "Date").inputValue()).toBe("2031-02-28");
  await row(page, 2).getByRole("button", { name: "Make it 2031-03-01" }).click();
  expect(await cell(page, 2, "Date").inputValue()).toBe("2031-03-01");
  expect(await row(page, 2).getByRole("button", { name: /Make it/ }).count()).toBe(0);
});

test("a removed row comes back where it was, with what stood in it", async () => {
  const page = await open("readings");
  await pasteRows(page, [["2031-03-05", "01:00", "17"], ["2031-03-05", "05:00", "16"], ["2031-03-05", "09:00", "15"]]);
  await page.getByRole("button", { name: "Remove reading 2" }).click();
  expect(await cell(page, 2, "Period, s").inputValue()).toBe("15");
  await page.getByRole("button", { name: "Restore reading 2" }).click();
  expect(await cell(page, 2, "Period, s").inputValue()).toBe("16");
  expect(await cell(page, 3, "Period, s").inputValue()).toBe("15");
  expect(await page.getByRole("button", { name: /^Restore/ }).count()).toBe(0);
});

test("what was typed outlives the tab, until it is started anew; the address holds the view", async () => {
  const page = await open("readings?unit=nmi&station=gul");
  expect(await station(page).inputValue()).toBe("Gullmere (gul)");
  await pasteRows(page, timedRows(STORM, GULLMERE, [18, 16, 14]));
  await page.getByRole("textbox", { name: "Note (optional)" }).fill("Half typed");
  const said = await findings(page);
  expect(said).toMatch(/± [\d ]+ nmi/);
  expect(new URL(page.url()).search).toBe("?station=gul&unit=nmi");
  const again = await page.context().newPage();
  await page.close();
  await again.goto(address("readings?unit=nmi"));
  await again.getByText("What was typed here earlier and not brought in is back.").waitFor();
  expect(await station(again).inputValue()).toBe("Gullmere (gul)");
  expect(await again.getByRole("textbox", { name: "Note (optional)" }).inputValue()).toBe("Half typed");
  expect(await findings(again)).toBe(said);
  await again.getByRole("button", { name: "Start anew" }).click();
  await again.reload();
  await station(again).waitFor();
  expect(await row(again, 2).count()).toBe(0);
  expect(await station(again).inputValue()).toBe("");
});

test("with nothing stored yet the first station is placed, and with long names nothing runs over the side", async () => {
  const empty = await serveFolder(temporaryDirectory());
  onTestFinished(() => empty.stop());
  const page = await open("", { viewport: PHONE });
  await page.goto(`${empty.address}readings`);
  expect(await page.getByRole("radio", { name: "A new one" }).isChecked()).toBe(true);
  await page.getByRole("radio", { name: "A stored one" }).check();
  await page.getByText("No station is stored yet. Place a new one.").waitFor();
  await page.getByRole("radio", { name: "An event there is" }).check();
  expect(await page.getByRole("combobox", { name: "Event" }).innerText()).toBe("no event is stored yet");
  expect(await axeFaults(page)).toStrictEqual([]);
  await page.getByRole("radio", { name: "A new one" }).check();
  await page.getByRole("radio", { name: "A new event" }).check();
  const long = "Längste".repeat(28);
  for (const [name, text] of [["Id", long], ["Name (optional)", long], ["Latitude, degrees", "21.6"], ["Longitude, degrees", "-158.1"], ["Title of the event", long]] as const) {
    await page.getByRole("textbox", { name }).fill(text);
  }
  await pasteRows(page, timedRows(STORM, { latitudeDegrees: 21.6, longitudeDegrees: -158.1 }, [18, 16, 14]));
  await bringIn(page);
  await page.getByRole("link", { name: `Open the event sheet: ${long}` }).waitFor();
  // The next one is most likely placed as well: its fields are empty, and the first of them is at hand.
  await page.waitForFunction(() => document.activeElement instanceof HTMLInputElement && document.activeElement.value === "");
  await page.getByRole("textbox", { name: "Id" }).and(page.locator(":focus")).waitFor();
  await page.getByRole("radio", { name: "A stored one" }).check();
  await station(page).fill("läng");
  await page.getByRole("option").first().waitFor();
  expect(await sideways(page)).toBe(0);
  await page.keyboard.press("Enter");
  await pasteRows(page, timedRows(STORM, { latitudeDegrees: 21.6, longitudeDegrees: -158.1 }, [17, 15]));
  expect(await sideways(page)).toBe(0);
  expect(await axeFaults(page)).toStrictEqual([]);
});

describe.each(["light", "dark"] as const)("in the %s", (colorScheme) => {
  test.each([["at a desk", DESK], ["on a phone", PHONE]] as const)("%s axe finds nothing, and nothing runs over the side, whatever stands in the form", async (_, viewport) => {
    const page = await open("readings", { colorScheme, viewport });
    await station(page).waitFor();
    expect(await axeFaults(page)).toStrictEqual([]);
    await station(page).fill("e");
    await page.getByRole("option").first().waitFor();
    expect(await axeFaults(page)).toStrictEqual([]);
    await choose(page, "Thornholm");
    await pasteRows(page, [...timedRows(STORM, THORNHOLM, PERIODS), ["2031-03-09", "25:10", "x".repeat(60)]]);
    await page.locator("[data-drawn] .leaflet-rings-pane path").first().waitFor();
    await page.getByRole("radio", { name: "local time" }).check();
    await page.getByRole("textbox", { name: "Title of the event" }).fill("W".repeat(300));
    await page.getByRole("button", { name: "Remove reading 1" }).click();
    await bringIn(page);
    await page.getByRole("alert").getByText("Nothing was sent").waitFor();
    expect(await axeFaults(page)).toStrictEqual([]);
    expect(await sideways(page)).toBe(0);
    await page.getByRole("radio", { name: "A new one" }).check();
    await page.getByRole("textbox", { name: "Id" }).fill("W".repeat(300));
    expect(await axeFaults(page)).toStrictEqual([]);
    for (const width of [viewport.width, 320]) {
      await page.setViewportSize({ width, height: 700 });
      expect(await sideways(page), `${width} px`).toBe(0);
    }
  });
});

test("on a phone what is touched is large, and distance and time stay in sight beside the rows", async () => {
  const page = await open("readings", { viewport: PHONE, hasTouch: true, isMobile: true });
  await choose(page, "Gullmere");
  await pasteRows(page, timedRows(STORM, GULLMERE, [18, 16, 14]));
  const heights = await page.locator("form input:not([type=radio]), form button:not(.leaflet-container *), form select").evaluateAll((parts) => parts.filter((part) => part.getClientRects().length > 0).map((part) => part.getBoundingClientRect().height));
  expect(heights.length).toBeGreaterThan(15);
  expect(Math.min(...heights)).toBeGreaterThanOrEqual(44);
  expect(await cell(page, 1, "Period, s").getAttribute("inputmode")).toBe("decimal");
  expect(await cell(page, 1, "Time").getAttribute("inputmode")).toBe("numeric");
  const summary = page.getByRole("link", { name: "To what the readings say" });
  await cell(page, 1, "Time").scrollIntoViewIfNeeded();
  const box = await summary.boundingBox();
  expect(box?.y).toBeLessThan(PHONE.height);
  expect(await summary.innerText()).toMatch(/[\d\u202f]+ ±\s[\d\u202f]+\skm.*UTC ±/s);
});

/** By how much the page can be scrolled sideways. */
function sideways(page: Page): Promise<number> {
  return page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);
}
