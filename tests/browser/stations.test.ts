import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import axe from "axe-core";
import type { Locator, Page } from "playwright-core";
import { afterAll, describe, expect, test } from "vitest";
import { demoBrowser, DESK, PHONE } from "#tests/support/demo-browser.ts";
import { inventedStationFile } from "#tests/support/station-file.ts";

const { open, address, expectFault } = demoBrowser();
const folder = mkdtempSync(join(tmpdir(), "offing-station-files-"));
afterAll(() => { rmSync(folder, { recursive: true, force: true }); });

const HEADER = "id,name,latitude,longitude,from,to,aliases,licence";
const LONG = "Wickerstrand Outer Bank North Cardinal Mark Waverider of the Harbour Board";

function fileOf(name: string, text: string): string {
  const path = join(folder, name);
  writeFileSync(path, text);
  return path;
}

async function choose(page: Page, path: string): Promise<void> {
  await page.getByLabel("A CSV file of stations").setInputFiles(path);
}

async function bringIn(text: string): Promise<void> {
  const response = await fetch(address("api/v1/stations.csv"), { method: "POST", headers: { "content-type": "text/csv" }, body: text });
  expect(response.status).toBe(200);
}

async function stored(id: string): Promise<Record<string, unknown>> {
  return (await (await fetch(address(`api/v1/stations/${id}`))).json()) as Record<string, unknown>;
}

const rowsOf = (page: Page): Locator => page.getByRole("group", { name: "Table of stations" }).locator("tbody tr[aria-rowindex]");
const count = (page: Page): Locator => page.getByRole("region", { name: "Register" }).getByRole("status").first();
const problems = (page: Page): Locator => page.getByRole("alert", { name: "What is wrong" });

/** What axe finds against the page once it has settled. */
async function faults(page: Page): Promise<string[]> {
  await page.waitForFunction(() => document.title !== "");
  await page.evaluate(axe.source);
  return page.evaluate(async () => {
    const inPage = globalThis as unknown as { axe: { run: () => Promise<{ violations: { id: string; nodes: { html: string }[] }[] }> } };
    const { violations } = await inPage.axe.run();
    return violations.flatMap(({ id, nodes }) => nodes.map(({ html }) => `${id}: ${html}`));
  });
}

const overTheSide = (page: Page): Promise<number> => page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);

describe("the register of stations", () => {
  test("shows the demo's stations in a table and on a map, and choosing one marks it in both", async () => {
    const page = await open("stations");
    await page.locator("path[class*=dot]").nth(16).waitFor();
    expect(await rowsOf(page).count()).toBe(17);
    expect(await count(page).innerText()).toBe("17 stations");
    await page.getByRole("button", { name: "Coldharrow" }).click();
    await page.locator("path[data-chosen]").waitFor();
    expect(await page.locator("path[data-chosen] title").textContent()).toBe("Coldharrow, col");
    expect(new URL(page.url()).search).toBe("?station=col");
    expect((await page.getByRole("region", { name: "Chart" }).getByRole("status").first().innerText()).replaceAll("\u00a0", " ")).toBe("Coldharrow col, 42.6° S 74.4° W");

    await page.locator("path[class*=dot]", { hasText: "Otterglass, ott" }).dispatchEvent("click");
    await page.locator("button[aria-pressed=true]", { hasText: "Otterglass" }).waitFor();
    expect(await page.locator("button[aria-pressed=true]").count()).toBe(1);
  });

  test("keeps filter, order and choice in its address, and filters by every word", async () => {
    const page = await open("stations?filter=local&sort=-name&station=ott");
    const names = async (): Promise<string[]> => rowsOf(page).locator("td:nth-child(2)").allInnerTexts();
    const all = await names();
    expect(all).toStrictEqual(all.toSorted((a, b) => b.localeCompare(a)));
    expect(await page.locator("button[aria-pressed=true]").innerText()).toBe("Otterglass");
    await page.getByLabel("Filter").fill("LOCAL otter");
    await page.getByText("1 of 17 stations").waitFor();
    expect(await names()).toStrictEqual(["Otterglass"]);
    await page.getByLabel("Filter").fill("nothing like it");
    await page.getByText("No station has these words.").waitFor();
    await page.getByRole("button", { name: "arrivals" }).click();
    await page.waitForFunction(() => location.search.includes("sort=arrivals"));
    await page.reload();
    expect(await page.getByLabel("Filter").inputValue()).toBe("nothing like it");
  });

  test("is walked by keyboard: from the filter to a row, down the rows, and to the station's page", async () => {
    const page = await open("stations");
    await page.getByLabel("Filter").focus();
    for (let step = 0; step < 20; step++) {
      await page.keyboard.press("Tab");
      if (await page.getByRole("button", { name: "Brackenfoot" }).evaluate((element) => element === document.activeElement)) break;
    }
    await page.keyboard.press("Enter");
    await page.locator("button[aria-pressed=true]", { hasText: "Brackenfoot" }).waitFor();
    await page.keyboard.press("ArrowDown");
    await page.locator("button[aria-pressed=true]:focus", { hasText: "Coldharrow" }).waitFor();
    await page.keyboard.press("Shift+Tab");
    await page.keyboard.press("Enter");
    await page.getByRole("heading", { level: 1, name: "Coldharrow" }).waitFor();
    expect(new URL(page.url()).pathname).toBe("/stations/col");
  });

  test.each(["light", "dark"] as const)("has nothing against it from axe and nothing over the side, on a desk and a phone, in the %s", async (colorScheme) => {
    for (const [path, viewport] of [["stations?station=ott", DESK], ["stations?file=yes", DESK], ["stations", PHONE], ["stations/new", PHONE], ["stations/col", DESK]] as const) {
      const page = await open(path, { colorScheme, viewport });
      await page.getByRole("heading", { level: 1 }).waitFor();
      expect(await faults(page), path).toStrictEqual([]);
      expect(await overTheSide(page), path).toBe(0);
    }
  });
});

describe("a file of stations", () => {
  test("is refused by row, and taken once it was mended", async () => {
    expectFault(/status of 400/);
    const page = await open("stations?file=yes");
    await choose(page, fileOf("s.csv", `${HEADER}\nqa,Alder,91,2,,,46001,\nqb,Birch,1,2,,,,CC0\nqb,Birch,1,3,2020-01-01T00:00Z,,,MIT`));
    await problems(page).waitFor();
    const said = await problems(page).getByRole("listitem").allInnerTexts();
    expect(said.map((message) => message.split(":", 1)[0])).toStrictEqual(["Row 2, column latitude", "Row 2, column aliases", "Row 4, column id", "Row 4, column licence"]);
    expect(await faults(page)).toStrictEqual([]);
    expect((await fetch(address("api/v1/stations/qa"))).status).toBe(404);

    await choose(page, fileOf("s.csv", `${HEADER}\nqa,Alder,11,2,,,wmo:46001,\nqb,Birch,1,2,,2020-01-01T00:00Z,,CC0\nqb,Birch,1,3,2020-01-01T00:00Z,,,`));
    await page.getByRole("button", { name: "Store 2 stations" }).click();
    await page.getByRole("heading", { name: "s.csv is stored" }).waitFor();
    expect(await stored("qb")).toMatchObject({ revision: 1, licence: "CC0", deployments: [{}, { longitudeDegrees: 3 }] });
    await page.getByRole("button", { name: "Back to the table" }).click();
    await page.getByRole("button", { name: "Alder" }).waitFor();
  });

  test("is shown field by field, and has to be looked at again where somebody was faster", async () => {
    expectFault(/status of 409/);
    await bringIn(`${HEADER}\nqc,Cedar,1,2,,,,CC0`);
    const page = await open("stations?file=yes");
    await choose(page, fileOf("c.csv", `${HEADER}\nqc,${LONG},1.5,2,,,,CC-BY-4.0`));
    const changes = page.getByRole("group", { name: "Changes" });
    await changes.waitFor();
    expect(await changes.locator("tbody tr").allInnerTexts()).toStrictEqual(["qc\tlicence\tCC0\tCC-BY-4.0", `name, of deployment 1\tCedar\t${LONG}`, "latitude, of deployment 1\t1\t1.5"]);
    expect(await faults(page)).toStrictEqual([]);
    await bringIn(`${HEADER}\nqc,Cedar,9,2,,,,CC0`);
    await page.getByRole("button", { name: "Store 1 station" }).click();
    await problems(page).getByText("Look at the preview again").waitFor();
    await page.getByRole("button", { name: "Look at it again" }).click();
    await changes.getByText("latitude, of deployment 1").waitFor();
    expect(await changes.locator("tbody tr").last().innerText()).toBe("latitude, of deployment 1\t9\t1.5");
    await page.getByRole("button", { name: "Store 1 station" }).click();
    await page.getByRole("heading", { name: "c.csv is stored" }).waitFor();
    expect(await stored("qc")).toMatchObject({ revision: 3, licence: "CC-BY-4.0" });
  });

  test("may be dropped", async () => {
    const page = await open("stations?file=yes");
    const dropped = await page.evaluateHandle((text) => {
      const transfer = new DataTransfer();
      transfer.items.add(new File([text], "dropped.csv", { type: "text/csv" }));
      return transfer;
    }, `${HEADER}\nqz,Zelkova,1,2,,,,`);
    await page.getByText("A CSV file of stations").dispatchEvent("drop", { dataTransfer: dropped });
    await page.getByRole("heading", { name: "dropped.csv: nothing is stored yet" }).waitFor();
    await page.getByRole("button", { name: "Put it away" }).click();
    expect(await page.getByRole("region", { name: "Preview" }).count()).toBe(0);
    expect((await fetch(address("api/v1/stations/qz"))).status).toBe(404);
  });

  test("can be what the register gives out, and then says nothing new", async () => {
    const page = await open("stations");
    const [download] = await Promise.all([page.waitForEvent("download"), page.getByRole("link", { name: "Download all as CSV" }).click()]);
    expect(download.suggestedFilename()).toBe("stations.csv");
    const path = join(folder, "down.csv");
    await download.saveAs(path);
    await page.getByRole("button", { name: "Bring in a file" }).click();
    await choose(page, path);
    await page.getByRole("heading", { name: "down.csv says nothing new" }).waitFor();
    expect(await page.getByRole("button", { name: /^Store/ }).count()).toBe(0);
  });

  test("that is no text, or a server that does not answer, is told", async () => {
    expectFault(/status of 400/);
    expectFault(/ERR_FAILED/);
    const page = await open("stations?file=yes");
    writeFileSync(join(folder, "x.csv"), Buffer.from([0xff, 0xfe, 0x41, 0x00]));
    await choose(page, join(folder, "x.csv"));
    await problems(page).getByText("no UTF-8 text").waitFor();
    await page.route("**/stations.csv?*", (route) => route.abort());
    await choose(page, fileOf("y.csv", `${HEADER}\nqy,Y,1,2,,,,`));
    await problems(page).getByText("The server did not answer").waitFor();
  });
});

describe("a station's page", () => {
  test("makes a station, and says beside each field what the server wants there", async () => {
    expectFault(/status of 400/);
    const page = await open("stations/new");
    await page.getByRole("button", { name: "Make this station" }).click();
    await page.getByText("A station needs an id.").waitFor();
    await page.getByLabel("Id", { exact: true }).and(page.locator(":focus")).waitFor();
    await page.getByLabel("Id", { exact: true }).fill("ne 1");
    await page.getByLabel("Latitude, ° north").fill("north");
    await page.getByLabel("Time zone").fill("Atlantis/Capital");
    await page.getByLabel("Way over the shelf").fill("12:40 x:90");
    await page.getByRole("button", { name: "Add an alias" }).click();
    await page.getByLabel("Name or number").fill("two words");
    await page.getByRole("button", { name: "Make this station" }).click();
    await page.getByRole("alert").getByText("reasons stand beside their fields").waitFor();
    const said = async (label: string): Promise<string> =>
      page.getByLabel(label).first().evaluate((field) => (field.getAttribute("aria-describedby") ?? "").split(" ").map((id) => document.getElementById(id)?.innerText ?? "").join(" "));
    expect(await said("Name")).toBe("Found \"\"; wanted a name of 1 to 200 letters on one line.");
    expect(await said("Latitude, ° north")).toContain("Found \"north\"; wanted a latitude of -90 to 90 degrees, north positive.");
    expect(await said("Longitude, ° east")).toContain("Found nothing; wanted a longitude");
    expect(await said("Time zone")).toContain("Found \"Atlantis/Capital\"; wanted an IANA time zone");
    expect(await said("Way over the shelf")).toContain("Leg 2, length: found \"x\"; wanted a number of kilometres");
    expect(await said("Name or number")).toContain("wanted an alias");
    await page.getByLabel("Name").first().and(page.locator(":focus")).waitFor();
    expect(await faults(page)).toStrictEqual([]);

    await page.getByLabel("Name", { exact: true }).fill(LONG);
    await page.getByLabel("Latitude, ° north").fill("-44.25");
    await page.getByLabel("Longitude, ° east").fill("190");
    await page.getByLabel("Time zone").fill("Pacific/Auckland");
    await page.getByLabel("Way over the shelf").fill("12:40 35.5:90");
    await page.getByLabel("Name or number").fill("55001");
    await page.getByRole("button", { name: "Make this station" }).click();
    await page.waitForURL(address("stations/ne%201"));
    await page.getByText("Revision 1, described for the first time").waitFor();
    expect(await stored("ne%201")).toMatchObject({
      id: "ne 1",
      aliases: [{ scheme: "wmo", value: "55001" }],
      deployments: [{ longitudeDegrees: -170, timeZone: "Pacific/Auckland", shelf: [{ lengthKm: 12, depthMetres: 40 }, { lengthKm: 35.5, depthMetres: 90 }] }],
    });
    for (const width of [390, 320]) {
      await page.setViewportSize({ width, height: 800 });
      expect(await overTheSide(page)).toBe(0);
    }
  });

  test("takes a second deployment that does not overlap, a clock correction and a licence, and tells each change in its history", async () => {
    expectFault(/status of 400/);
    await bringIn("id,name,latitude,longitude\nqd,Dogwood,1,2");
    const page = await open("stations/qd");
    await page.getByRole("button", { name: "Add a deployment" }).click();
    const second = page.getByRole("group", { name: "Deployment 2" });
    await second.getByLabel("Latitude, ° north").fill("1.5");
    await second.getByLabel("Longitude, ° east").fill("2.5");
    await page.getByRole("button", { name: "Save" }).click();
    await second.getByText("this one overlaps the 1st of the list").waitFor();
    const first = page.getByRole("group", { name: "Deployment 1" });
    await first.getByLabel("To", { exact: true }).fill("2020-01-01T00:00Z");
    await second.getByLabel("From", { exact: true }).fill("2020-01-01T00:00Z");
    await page.getByRole("button", { name: "Add a clock correction" }).click();
    const correction = page.getByRole("group", { name: "Clock correction 1" });
    await correction.getByLabel("Fast by, seconds").fill("3600");
    await correction.getByLabel("Why").fill("log kept in local time");
    await page.getByLabel("Licence").fill("CC-BY-4.0");
    await page.getByRole("button", { name: "Save" }).click();
    await page.getByRole("status").getByText("Saved as revision 2.").waitFor();
    const history = page.getByRole("region", { name: "History" });
    await history.getByText("Revision 2, changed").waitFor();
    const lines = await history.locator("ol > li").first().getByRole("listitem").allInnerTexts();
    expect(lines).toStrictEqual([
      "licence: nothing → CC-BY-4.0",
      "clock corrections: nothing → ../.. 3600 log kept in local time",
      "to, of deployment 1: nothing → 2020-01-01T00:00:00Z",
      "deployment 2: nothing → Dogwood, 1.5 2.5, 2020-01-01T00:00:00Z/..",
    ]);
  });

  test("says that somebody was faster, and loses nothing typed", async () => {
    expectFault(/status of 409/);
    await bringIn("id,name,latitude,longitude,licence\nqe,Elder,1,2,CC0");
    const page = await open("stations/qe");
    await page.getByLabel("Contact").fill("elder@example.org");
    await bringIn("id,name,latitude,longitude,licence\nqe,Elder,1,2,MIT");
    await page.getByRole("button", { name: "Save" }).click();
    await page.getByText("it is at revision 2, and this change started from revision 1").waitFor();
    expect(await page.getByLabel("Contact").inputValue()).toBe("elder@example.org");
    await page.getByRole("button", { name: "Keep what I typed" }).click();
    await page.getByRole("button", { name: "Save" }).click();
    await page.getByRole("status").getByText("Saved as revision 3.").waitFor();
    expect(await stored("qe")).toMatchObject({ contact: "elder@example.org", licence: "CC0", revision: 3 });
  });

  test("removes a station that has no arrivals, once asked twice, and no other", async () => {
    await bringIn("id,name,latitude,longitude\nqf,Fir,1,2");
    const page = await open("stations/qf");
    await page.getByRole("button", { name: "Remove this station" }).click();
    await page.getByRole("button", { name: "Leave it" }).click();
    await page.getByRole("button", { name: "Remove this station" }).click();
    await page.getByRole("button", { name: "Remove qf for good" }).click();
    await page.waitForURL(address("stations"));
    expect((await fetch(address("api/v1/stations/qf"))).status).toBe(404);
    const kept = await open("stations/col");
    expect(await kept.getByRole("region", { name: "Removing" }).innerText()).toContain("The station has 2 arrivals and stays with them.");
    expect(await kept.getByRole("button", { name: "Remove this station" }).count()).toBe(0);
  });
});

test("a register of thousands keeps few rows on the page, reaches the last one, and shows where it stands", async () => {
  await bringIn(inventedStationFile(2000));
  const page = await open("stations?filter=st&station=st2000");
  await page.locator("button[aria-pressed=true]", { hasText: "Station 2000" }).waitFor();
  expect(await rowsOf(page).count()).toBeLessThan(80);
  await page.locator("path[class*=dot]").nth(1999).waitFor();
  expect(await page.getByRole("table").getAttribute("aria-rowcount")).toMatch(/^2\d\d\d$/);
  await page.getByLabel("Filter").fill("wmo:40007");
  await page.getByText(/^1 of 2/).waitFor();
  expect(await rowsOf(page).allInnerTexts()).toStrictEqual([expect.stringContaining("st0008") as string]);
});
