import type { Locator, Page } from "playwright-core";
import { describe, expect, test } from "vitest";
import { axeFaults } from "#tests/support/axe-faults.ts";
import { demoBrowser, PHONE, redrawn } from "#tests/support/demo-browser.ts";
import { tabTo } from "#tests/support/tab-to.ts";

const { open, openEvent, address, expectFault } = demoBrowser();

const section = (page: Page): Locator => page.getByRole("region", { name: "Kept answers" });
const why = (page: Page): Locator => page.getByRole("textbox", { name: "Why (optional)" });
const button = (page: Page): Locator => section(page).getByRole("button", { name: "Keep this answer" });
const entries = async (page: Page): Promise<string[]> => (await section(page).getByRole("listitem").allInnerTexts()).map((text) => text.replace(/\s+/g, " "));

/** Waits until the list has so many entries. */
async function listed(page: Page, count: number): Promise<string[]> {
  await section(page).getByRole("listitem").nth(count - 1).waitFor();
  return entries(page);
}

/** Keeps an answer as another page or program would. */
async function keepElsewhere(id: string, body: unknown): Promise<void> {
  const init = { method: "POST", headers: { "content-type": "application/json" }, body: JSON.stringify(body) };
  expect((await fetch(address(`api/v1/events/${id}/localizations`), init)).status).toBe(201);
}

describe("keeping an answer", () => {
  test("by keyboard: it is listed at once, after a reload as well, and the next one names who was left out", async () => {
    const page = await openEvent("petrel");
    expect(await section(page).innerText()).toContain("None kept yet.");
    await tabTo(page, why(page));
    await page.keyboard.type("First look");
    await page.keyboard.press("Tab");
    await page.keyboard.press("Enter");
    await section(page).getByRole("status").getByText("Kept as number 1.").waitFor();
    const [first = ""] = await listed(page, 1);
    const answer = (await page.getByRole("region", { name: "Answer", exact: true }).innerText()).replace(/\s+/g, " ");
    const place = /\d+\.\d° [NS] \d+\.\d° [EW]/.exec(answer)?.[0] ?? "no place";
    const year = new Date().getUTCFullYear();
    expect(first).toMatch(new RegExp(`^1 ${place}, .* UTC \\d+ [A-Z][a-z]{2} ${year} \\d\\d:\\d\\d UTC, local keeper First look$`));
    expect(await why(page).inputValue()).toBe("");
    expect(await section(page).innerText()).not.toContain("None kept yet.");
    await page.reload();
    expect(await entries(page)).toStrictEqual([first]);

    await page.locator("[data-drawn]").waitFor();
    await redrawn(page, () => page.getByRole("checkbox", { name: "Include 4 Thornholm" }).click());
    await button(page).click();
    await section(page).getByText("Kept as number 2.").waitFor();
    const [second = "", before] = await listed(page, 2);
    expect(second).toMatch(/^2 .* local keeper Left out: 4 Thornholm\.$/);
    expect(before).toBe(`${first} Take up number 1 again`);
    // The fresh list leaves the view as it was.
    expect(new URL(page.url()).search).toBe("?without=tho");
    expect(await page.getByRole("checkbox", { name: "Include 4 Thornholm" }).isChecked()).toBe(false);
  });

  test("from a page that has not seen the latest is refused, and loses nothing typed", async () => {
    expectFault(/status of 409/);
    const [one, other] = [await openEvent("gannet"), await openEvent("gannet")];
    await button(one).click();
    await listed(one, 1);
    await why(other).fill("From the other page");
    await button(other).click();
    const alert = section(other).getByRole("alert");
    await alert.waitFor();
    expect(await alert.innerText()).toContain("Number 1 of event");
    expect(await entries(other)).toStrictEqual([]);
    expect(await why(other).inputValue()).toBe("From the other page");

    await section(other).getByRole("button", { name: "Show what is there now" }).click();
    await listed(other, 1);
    expect(await alert.count()).toBe(0);
    expect(await why(other).inputValue()).toBe("From the other page");
    await button(other).click();
    expect((await listed(other, 2))[0]).toMatch(/^2 .*From the other page$/);
  });

  test("says so while it works, and what went wrong, with the reason still there", async () => {
    expectFault(/ERR_FAILED/);
    expectFault(/status of 400/);
    const page = await openEvent("heron");
    await why(page).fill("Heard it");
    const held: { release: () => void } = { release: () => undefined };
    const released = new Promise<void>((answer) => { held.release = answer; });
    await page.route("**/localizations", async (route) => {
      await released;
      await route.abort();
    });
    await button(page).click();
    const busy = section(page).getByRole("button", { name: "Keeping…" });
    await busy.waitFor();
    expect(await busy.isDisabled()).toBe(true);
    held.release();
    await section(page).getByRole("alert").getByText("The server did not answer").waitFor();
    expect(await why(page).inputValue()).toBe("Heard it");
    expect(await button(page).isEnabled()).toBe(true);
    await page.unroute("**/localizations");

    for (const box of await page.getByRole("checkbox", { name: /^Include / }).all()) await redrawn(page, () => box.click());
    await button(page).click();
    await section(page).getByRole("alert").getByText("No station is left that could be fitted").waitFor();
    expect(await section(page).getByRole("button", { name: "Show what is there now" }).count()).toBe(0);
    expect(await why(page).inputValue()).toBe("Heard it");
    expect(await section(page).innerText()).toContain("None kept yet.");
  });

  test("waits for the answer to the stations that are chosen now", async () => {
    const page = await openEvent("albatross");
    await redrawn(page, async () => {
      const isDisabled = await button(page).evaluate(async (element) => {
        document.querySelector<HTMLInputElement>("tbody input[type=checkbox]")?.click();
        await Promise.resolve();
        return (element as HTMLButtonElement).disabled;
      });
      expect(isDisabled).toBe(true);
    });
    expect(await button(page).isEnabled()).toBe(true);
  });
});

describe("the list of kept answers", () => {
  test("says of answers without one place what they are", async () => {
    await keepElsewhere("fulmar", { startedFrom: 0 });
    await keepElsewhere("tern", { startedFrom: 0 });
    expect((await entries(await open("events/fulmar")))[0]).toMatch(/^1 Distance only /);
    expect((await entries(await open("events/tern")))[0]).toMatch(/^1 Not surely one place; most probable \d/);
  });

  test.each(["light", "dark"] as const)("on a phone a long reason wraps and nothing runs over the side; axe finds nothing, in the %s", async (colorScheme) => {
    expectFault(/status of 409/);
    const id = colorScheme === "light" ? "heron" : "albatross";
    const page = await openEvent(id, { viewport: PHONE, colorScheme });
    await keepElsewhere(id, { startedFrom: 0, reason: "x".repeat(2000) });
    await button(page).click();
    await section(page).getByRole("alert").waitFor();
    expect(await axeFaults(page)).toStrictEqual([]);
    await section(page).getByRole("button", { name: "Show what is there now" }).click();
    await listed(page, 1);
    expect(await axeFaults(page)).toStrictEqual([]);
    for (const width of [390, 320]) {
      await page.setViewportSize({ width, height: 844 });
      const sides = await section(page).evaluate((element) => ({
        over: document.documentElement.scrollWidth - document.documentElement.clientWidth,
        right: Math.max(...[...element.querySelectorAll("*")].map((part) => part.getBoundingClientRect().right)),
      }));
      expect(sides.over).toBe(0);
      expect(sides.right).toBeLessThanOrEqual(width);
    }
    // 2000 letters in lines of at most 320 px take many of them.
    expect((await section(page).getByRole("listitem").getByText("xxx").boundingBox())?.height).toBeGreaterThan(300);
  });
});
