import { defineConfig } from "vitest/config";
import { findChromium } from "../tests/support/chromium.ts";

const LONG_TESTS = "tests/**/*.long.test.ts";
const isLongRun = process.env.OFFING_LONG_TESTS === "1";

// Browser tests are left out as a whole where there is no Chromium; tests/support/run-tests.ts says so at the end.
const withoutBrowser = findChromium() === null ? ["tests/browser/**"] : [];

export default defineConfig({
  root: new URL("..", import.meta.url).pathname,
  test: {
    include: isLongRun ? [LONG_TESTS, "tests/property/**/*.test.ts"] : ["tests/**/*.test.ts"],
    exclude: ["node_modules/**", ...(isLongRun ? [] : [LONG_TESTS]), ...withoutBrowser],
    setupFiles: ["tests/support/property-runs.ts"],
    testTimeout: isLongRun ? 600_000 : 60_000,
    hookTimeout: 120_000,
    maxWorkers: 2,
  },
});
