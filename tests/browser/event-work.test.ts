import type { Locator, Page } from "playwright-core";
import { describe, expect, test } from "vitest";
import { axeFaults } from "#tests/support/axe-faults.ts";
import { demoBrowser, PHONE, redrawn } from "#tests/support/demo-browser.ts";
import { tabTo } from "#tests/support/tab-to.ts";

const { open, openEvent, address, expectFault } = demoBrowser();

const answer = async (page: Page): Promise<string> => spaced(await page.getByRole("region", { name: "Answer", exact: true }).getByRole("status").innerText());
const readings = (page: Page): Locator => page.getByRole("region", { name: "Readings" });
const kept = (page: Page): Locator => page.getByRole("region", { name: "Kept answers" });
const arrivals = (page: Page): Locator => page.getByRole("region", { name: "Arrivals of this event" });
const use = (page: Page, row: number): Locator => page.getByRole("checkbox", { name: `Use reading ${row}`, exact: true });
const time = (page: Page, row: number): Locator => page.getByRole("textbox", { name: `Time of reading ${row}, UTC`, exact: true });
const period = (page: Page, row: number): Locator => page.getByRole("textbox", { name: `Period of reading ${row}, seconds`, exact: true });
const spaced = (text: string): string => text.replace(/\s+/g, " ").trim();

async function choose(page: Page, id: string): Promise<void> {
  await readings(page).getByRole("combobox", { name: "Station" }).selectOption(id);
}

async function keep(page: Page, number: number): Promise<void> {
  await kept(page).getByRole("button", { name: "Keep this answer" }).click();
  await kept(page).getByText(`Kept as number ${number}.`).waitFor();
  await kept(page).getByRole("listitem").filter({ hasText: new RegExp(`^${number}`) }).first().waitFor();
  // The fresh list comes into the page as it stands, and does not make it anew.
  await page.waitForTimeout(300);
  expect(await kept(page).getByText(`Kept as number ${number}.`).count()).toBe(1);
}

/** Asks the programming interface as another program would. */
async function ask(path: string, init?: { method: string; body: unknown }): Promise<Record<string, unknown>> {
  const response = await fetch(address(`api/v1/${path}`), init && { method: init.method, headers: { "content-type": "application/json" }, body: JSON.stringify(init.body) });
  expect(response.ok).toBe(true);
  return (await response.json()) as Record<string, unknown>;
}

describe("work on readings", () => {
  test("drops, moves and adds, and the answer follows; each step is undone, and all of it", async () => {
    const page = await openEvent("petrel");
    const before = await answer(page);
    await choose(page, "ott");
    await redrawn(page, () => use(page, 12).click());
    expect(await page.getByText("1 reading dropped.").count()).toBe(1);
    const dropped = await answer(page);

    await redrawn(page, async () => {
      await period(page, 13).fill("25.5");
      await period(page, 13).press("Enter");
    });
    expect(await page.getByText("1 reading dropped and 1 moved.").count()).toBe(1);
    const moved = await answer(page);
    expect(moved).not.toBe(dropped);

    await readings(page).getByRole("textbox", { name: "Add a reading: time, UTC" }).fill("2022-01-16 12:00");
    await readings(page).getByRole("textbox", { name: "period, s" }).fill("13,5");
    await redrawn(page, () => readings(page).getByRole("button", { name: "Add" }).click());
    expect(await page.getByText("1 reading dropped, 1 moved and 1 added.").count()).toBe(1);
    expect(await period(page, 22).inputValue()).toBe("13.50");

    for (const words of ["1 reading dropped and 1 moved.", "1 reading dropped."]) {
      await redrawn(page, () => page.getByRole("button", { name: "Undo the last change" }).click());
      expect(await page.getByText(words, { exact: true }).count()).toBe(1);
    }
    expect(await answer(page)).toBe(dropped);
    await redrawn(page, () => page.getByRole("button", { name: "Back to what was brought in" }).click());
    expect(await answer(page)).toBe(before);
    expect(await page.getByText("Not kept yet.").count()).toBe(0);
  });

  test("by keyboard alone: a station, a reading dropped, another moved step by step, and kept", async () => {
    const page = await openEvent("heron");
    await tabTo(page, page.getByRole("rowheader", { name: "Coldharrow" }).getByRole("button"));
    await page.keyboard.press("Enter");
    await tabTo(page, use(page, 2));
    await redrawn(page, () => page.keyboard.press("Space"));
    expect(await use(page, 2).isChecked()).toBe(false);
    await tabTo(page, time(page, 3));
    const was = await time(page, 3).inputValue();
    await redrawn(page, () => page.keyboard.press("ArrowUp"));
    expect(Date.parse(`${await time(page, 3).inputValue()}Z`) - Date.parse(`${was}Z`)).toBe(600_000);
    await tabTo(page, kept(page).getByRole("button", { name: "Keep this answer" }), 200);
    await page.keyboard.press("Enter");
    await kept(page).getByText("Kept as number 1.").waitFor();
    expect(spaced(await kept(page).getByRole("listitem").first().innerText())).toContain("1 reading dropped and 1 moved.");
  });

  test("says beside a field what it cannot use, changes nothing for it, and loses nothing typed", async () => {
    const page = await openEvent("petrel");
    await choose(page, "lan");
    const before = await answer(page);
    const was = await period(page, 2).inputValue();
    for (const [field, wrong, wanted] of [
      [period(page, 2), "0", /Wanted a number of seconds from 0\.5 to 1000\./],
      [period(page, 2), "fifteen", /Wanted a number of seconds/],
      [time(page, 2), "2022-02-30 10:00", /Wanted a day and a time such as/],
      [time(page, 2), "16:27", /Wanted a day and a time such as/],
    ] as const) {
      await field.fill(wrong);
      await field.press("Enter");
      expect(await field.getAttribute("aria-invalid")).toBe("true");
      const problem = page.locator(`[id="${(await field.getAttribute("aria-describedby")) ?? ""}"]`);
      expect(await problem.innerText()).toMatch(wanted);
      expect(await field.inputValue()).toBe(wrong);
      await field.press("Escape");
    }
    expect(await period(page, 2).inputValue()).toBe(was);
    expect(await answer(page)).toBe(before);
    await readings(page).getByRole("textbox", { name: "period, s" }).fill("15");
    await readings(page).getByRole("button", { name: "Add" }).click();
    expect(await readings(page).getByRole("alert").filter({ hasText: "Time: wanted a day and a time" }).count()).toBe(1);
    expect(await readings(page).getByRole("textbox", { name: "period, s" }).inputValue()).toBe("15");
    expect(await page.getByText("Not kept yet.").count()).toBe(0);
  });

  test("outlives a closed tab, until it is kept", async () => {
    const page = await openEvent("albatross");
    const context = page.context();
    const before = await answer(page);
    await choose(page, "tar");
    await redrawn(page, () => use(page, 25).click());
    await redrawn(page, () => page.getByRole("checkbox", { name: "Include 1 " }).click());
    await kept(page).getByRole("textbox", { name: "Why (optional)" }).fill("Half a thought");
    const worked = await answer(page);
    expect(worked).not.toBe(before);
    await page.close();

    const later = await context.newPage();
    await later.goto(address("events/albatross"));
    await later.getByText("Work that was not kept was brought back.").waitFor();
    await later.waitForFunction(() => Number(document.querySelector("[data-drawn]")?.getAttribute("data-drawn")) > 0);
    expect(await answer(later)).toBe(worked);
    expect(await kept(later).getByRole("textbox", { name: "Why (optional)" }).inputValue()).toBe("Half a thought");
    await keep(later, 1);
    await later.goto(address("events/albatross"));
    await later.locator("[data-drawn]").waitFor();
    expect(await answer(later)).toBe(worked);
    expect(await later.getByText("brought back").count()).toBe(0);
    expect(await later.getByText("Not kept yet.").count()).toBe(0);
  });
});

describe("two tabs of one browser", () => {
  test("each keep their own unsaved work, and it comes back tab by tab", async () => {
    const one = await openEvent("albatross");
    const context = one.context();
    const other = await context.newPage();
    await other.goto(address("events/albatross"));
    await other.locator("[data-drawn] .leaflet-rings-pane path").first().waitFor();
    for (const [page, rows] of [[one, [24, 26]], [other, [27]]] as const) {
      await choose(page, "tar");
      for (const row of rows) {
        const wasUsed = await use(page, row).isChecked();
        await redrawn(page, () => use(page, row).click());
        expect(await use(page, row).isChecked()).toBe(!wasUsed);
      }
    }
    await one.close();
    await other.waitForTimeout(50);
    await other.close();
    const droppedIn = async (page: Page): Promise<number[]> => {
      await page.goto(address("events/albatross"));
      await page.getByText("Work that was not kept was brought back.").waitFor();
      await choose(page, "tar");
      const boxes = await Promise.all([24, 26, 27].map(async (row) => ((await use(page, row).isChecked()) ? [] : [row])));
      return boxes.flat();
    };
    // The newest first; while that tab is open another one gets what is left.
    const [again, more] = [await context.newPage(), await context.newPage()];
    expect(await droppedIn(again)).toStrictEqual([27]);
    expect(await droppedIn(more)).toStrictEqual([24, 26]);
  });

  test("work that was overtaken says so until somebody has looked, and is not kept over it unseen", async () => {
    expectFault(/status of 409/);
    const id = "heron";
    const page = await openEvent(id);
    const before = (await ask(`events/${id}/localizations`))["localizations"] as unknown[];
    await choose(page, "gul");
    const row = Number(await readings(page).getByRole("row").nth(1).getByRole("cell").nth(1).innerText());
    await redrawn(page, () => use(page, row).click());
    await ask(`events/${id}/localizations`, { method: "POST", body: { startedFrom: before.length, reason: "meanwhile" } });
    const isToldAgain = async (): Promise<void> => {
      await page.reload();
      await page.getByText(new RegExp(`number ${before.length + 1} was kept since`)).waitFor();
    };
    await isToldAgain();
    await isToldAgain();
    await kept(page).getByRole("button", { name: "Keep this answer" }).click();
    await kept(page).getByRole("alert").getByText(`Number ${before.length + 1} of event`).waitFor();
    await kept(page).getByRole("button", { name: "Show what is there now" }).click();
    await keep(page, before.length + 2);
  });
});

describe("two at one event", () => {
  test("the second to keep is told, sees what was kept, and keeps its own after it", async () => {
    expectFault(/status of 409/);
    const [one, other] = [await openEvent("gannet"), await openEvent("gannet")];
    await choose(one, "umb");
    await choose(other, "umb");
    await redrawn(one, () => use(one, 40).click());
    await keep(one, 1);
    await redrawn(other, () => use(other, 41).click());
    await kept(other).getByRole("button", { name: "Keep this answer" }).click();
    await kept(other).getByRole("alert").getByText("Number 1 of event").waitFor();
    await kept(other).getByRole("button", { name: "Show what is there now" }).click();
    await kept(other).getByRole("listitem").first().waitFor();
    expect(await use(other, 41).isChecked()).toBe(false);
    expect(await use(other, 40).isChecked()).toBe(true);
    await keep(other, 2);
    await kept(other).getByText(/^5\sUmberbank: 1\sreading out and 1\sreading in\.$/).waitFor();

    await redrawn(other, () => kept(other).getByRole("button", { name: "Take up number 1 again" }).click());
    expect(await use(other, 41).isChecked()).toBe(true);
    expect(await use(other, 40).isChecked()).toBe(false);
    expect(await other.getByRole("button", { name: "Back to number 2" }).count()).toBe(1);
  });

  test("who keeps an answer of an event that was changed meanwhile is told, and goes on with what it is now", async () => {
    expectFault(/status of 409/);
    const page = await openEvent("tern");
    await choose(page, "wic");
    await redrawn(page, () => use(page, 2).click());
    const { arrivals: own, revision } = (await ask("events/tern")) as { arrivals: { id: number; station: string; revision: number }[]; revision: number };
    const fenn = own.find(({ station }) => station === "fen");
    expect(revision).toBe(1);
    await ask(`arrivals/${String(fenn?.id)}`, { method: "PATCH", body: { revision: fenn?.revision, event: null } });
    await kept(page).getByRole("button", { name: "Keep this answer" }).click();
    await kept(page).getByRole("alert").getByText("was changed meanwhile").waitFor();
    await kept(page).getByRole("button", { name: "Show what is there now" }).click();
    await page.getByText("Work that was not kept was brought back.").waitFor();
    await page.getByText("Distance only.").first().waitFor();
    expect(await use(page, 2).isChecked()).toBe(false);
    await keep(page, 1);
  });
});

describe("what an event is made of", () => {
  test("an arrival is moved out, waits on the list, and is taken into a new event", async () => {
    const page = await openEvent("fulmar");
    await arrivals(page).locator("summary").click();
    await arrivals(page).getByRole("checkbox").first().click();
    await arrivals(page).getByRole("combobox", { name: "Move 1 arrival to" }).selectOption("no event: they wait");
    await arrivals(page).getByRole("button", { name: "Move", exact: true }).click();
    await page.getByText("No arrival is in this event yet.").waitFor();

    const list = await open("");
    const waiting = list.getByRole("region", { name: /wait.* for an event/ });
    await waiting.getByRole("checkbox").first().click();
    await waiting.getByRole("textbox", { name: "Title of the new event" }).fill("One gauge’s swell");
    await waiting.getByRole("button", { name: "Take in" }).click();
    await list.waitForURL(/events\/\d{4}-\d\d-\d\d$/);
    await list.getByText("One gauge’s swell").first().waitFor();
    await list.getByText("Distance only.").first().waitFor();
  });

  test("some of its arrivals are split off, and merged back; both pages say what was done", async () => {
    const page = await openEvent("petrel");
    const before = await answer(page);
    await arrivals(page).locator("summary").click();
    for (const name of [/^3 Brackenfoot/, /^4 Thornholm/]) await arrivals(page).getByRole("checkbox", { name }).click();
    await arrivals(page).getByRole("combobox", { name: "Move 2 arrivals to" }).selectOption("a new event");
    await arrivals(page).getByRole("textbox", { name: "Title of the new event" }).fill("The eastern half");
    await arrivals(page).getByRole("button", { name: "Split off" }).click();
    await page.getByRole("rowheader", { name: "Thornholm" }).waitFor({ state: "detached" });
    await page.locator("[data-drawn]").waitFor();
    expect(await page.locator(".leaflet-rings-pane path").count()).toBe(4);

    await arrivals(page).locator("summary").click();
    const select = arrivals(page).getByRole("combobox", { name: "Merge into this event all of" });
    await select.getByText(/^The eastern half/).waitFor({ state: "attached" });
    await select.selectOption({ label: "The eastern half, 2022-01-16" });
    await arrivals(page).getByRole("button", { name: "Merge" }).click();
    await page.getByRole("rowheader", { name: "Thornholm" }).waitFor();
    await page.locator("[data-drawn] .leaflet-rings-pane path").nth(5).waitFor({ state: "attached" });
    expect((await answer(page)).slice(0, 20)).toBe(before.slice(0, 20));

    await kept(page).getByText("What was done to this event").click();
    const trail = spaced(await kept(page).innerText());
    expect(trail).toMatch(/local keeper: took in 2 arrivals of \d{4}-\d\d-\d\d\. .*local keeper: moved 2 arrivals to \d{4}-\d\d-\d\d\. .*intake: made the event\./);
    const [, id = ""] = /took in 2 arrivals of (\S+)\./.exec(trail) ?? [];
    const other = await open(`events/${id}`);
    expect(spaced(await other.getByRole("main").innerText())).toContain("Its arrivals were merged into petrel.");
    expect(spaced(await (await open("")).getByRole("main").innerText())).not.toContain("The eastern half");
  });

  test("is described anew", async () => {
    const page = await openEvent("heron");
    await arrivals(page).locator("summary").click();
    await arrivals(page).getByRole("textbox", { name: "Title", exact: true }).fill("A title of its own");
    await arrivals(page).getByRole("button", { name: "Save title and note" }).click();
    await page.getByRole("heading", { level: 1, name: "A title of its own" }).waitFor();
    expect(await page.title()).toContain("A title of its own");
  });
});

test.each(["light", "dark"] as const)("with everything open axe finds nothing and nothing runs over a phone's side, in the %s", async (colorScheme) => {
  await ask("events/gannet/localizations", { method: "POST", body: { startedFrom: ((await ask("events/gannet/localizations"))["localizations"] as unknown[]).length } });
  await ask("events/gannet/localizations", { method: "POST", body: { startedFrom: ((await ask("events/gannet/localizations"))["localizations"] as unknown[]).length, leftOut: ["umb"] } });
  const page = await openEvent("gannet", { viewport: PHONE, colorScheme });
  await choose(page, "umb");
  await period(page, 40).fill("x");
  await period(page, 40).press("Enter");
  await arrivals(page).locator("summary").click();
  await kept(page).getByText("What was done to this event").click();
  await kept(page).getByText("In number").waitFor();
  expect(await axeFaults(page)).toStrictEqual([]);
  for (const width of [390, 320]) {
    await page.setViewportSize({ width, height: 844 });
    expect(await page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth)).toBe(0);
  }
  await page.setViewportSize({ width: 1280, height: 720 });
  expect(await axeFaults(page)).toStrictEqual([]);
});
