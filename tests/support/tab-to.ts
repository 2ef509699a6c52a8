import type { Locator, Page } from "playwright-core";

/** Tabs on until a control has the focus; every control must be in reach within this many steps. */
export async function tabTo(page: Page, target: Locator, mostSteps = 60): Promise<void> {
  for (let step = 0; step < mostSteps; step++) {
    await page.keyboard.press("Tab");
    if (await target.evaluate((element) => element === document.activeElement)) return;
  }
  throw new Error("The keyboard does not reach it.");
}
