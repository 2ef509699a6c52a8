import axe from "axe-core";
import type { Page } from "playwright-core";

interface AxeInPage {
  readonly axe: { run: () => Promise<{ violations: { id: string; nodes: { html: string }[] }[] }> };
}

/** What axe finds against a page once it has settled (a refresh sends the title last), as rule and markup. */
export async function axeFaults(page: Page): Promise<string[]> {
  await page.waitForFunction(() => document.title !== "");
  await page.evaluate(axe.source);
  return page.evaluate(async () => {
    const { violations } = await (globalThis as unknown as AxeInPage).axe.run();
    return violations.flatMap(({ id, nodes }) => nodes.map(({ html }) => `${id}: ${html}`));
  });
}
