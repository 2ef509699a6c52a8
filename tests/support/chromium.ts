import { existsSync } from "node:fs";

const USUAL_PLACES = [
  "/usr/bin/chromium",
  "/usr/bin/chromium-browser",
  "/usr/bin/google-chrome",
  "/Applications/Chromium.app/Contents/MacOS/Chromium",
  "/Applications/Google Chrome.app/Contents/MacOS/Google Chrome",
];

/** Path of the Chromium that browser tests drive, or null. `CHROMIUM_PATH` goes before the usual places. */
export function findChromium(): string | null {
  const named = process.env.CHROMIUM_PATH;
  const places = named === undefined ? USUAL_PLACES : [named];
  return places.find((path) => existsSync(path)) ?? null;
}

/** Quiet on a machine without display, sandbox or network. */
export const CHROMIUM_FLAGS = [
  "--no-sandbox",
  "--disable-gpu",
  "--disable-quic",
  "--no-first-run",
  "--disable-background-networking",
  "--disable-component-update",
  "--disable-sync",
];
