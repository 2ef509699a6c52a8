import type { Locator, Page } from "playwright-core";
import type { Position } from "#lib/core/units/position.ts";
import { travelSeconds } from "./simulator/deep-water.ts";
import { legBetween } from "./simulator/ellipsoid.ts";

/** The form for readings by hand, by its roles and labels. */
export const station = (page: Page): Locator => page.getByRole("combobox", { name: "Station" });
export const row = (page: Page, number: number): Locator => page.getByRole("group", { name: `Reading ${number}`, exact: true });
export const cell = (page: Page, number: number, name: "Date" | "Time" | "Period, s" | "or waves" | "seconds"): Locator => row(page, number).getByRole("textbox", { name, exact: true });
export const findings = async (page: Page): Promise<string> => (await page.getByRole("region", { name: "What the readings say" }).innerText()).replace(/\s+/g, " ");

/** The sentences that describe a field, as a screen reader would say them. */
export function described(field: Locator): Promise<string> {
  return field.evaluate((element) => (element.getAttribute("aria-describedby") ?? "").split(" ").map((id) => document.getElementById(id)?.textContent ?? "").join(" "));
}

/** Pastes into the field that has the focus, as from a spreadsheet. */
export function paste(page: Page, text: string): Promise<void> {
  return page.evaluate((pasted) => {
    const clipboardData = new DataTransfer();
    clipboardData.setData("text/plain", pasted);
    document.activeElement?.dispatchEvent(new ClipboardEvent("paste", { clipboardData, bubbles: true, cancelable: true }));
  }, text);
}

/**
 * When swell of each period reaches a station from a point storm over deep water, as rows of date, time and period, as if
 * they had been timed there.
 */
export function timedRows(storm: { position: Position; originEpochSeconds: number }, at: Position, periodsSeconds: readonly number[]): string[][] {
  const { distanceMetres } = legBetween(storm.position, at);
  return periodsSeconds.map((period) => {
    const arrival = storm.originEpochSeconds + travelSeconds({ frequencyHz: 1 / period, distanceMetres });
    const written = new Date(Math.round(arrival / 60) * 60_000).toISOString();
    return [written.slice(0, 10), written.slice(11, 16), String(period)];
  });
}
