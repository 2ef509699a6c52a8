/**
 * `npm test`: everything that has to hold, in one command. The checks of types, lint and unused code count as one test
 * each; the last line is `N passed, N failed`, and tests/output/summary.json says the same.
 */
import { spawnSync } from "node:child_process";
import { mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { z } from "zod";
import { findChromium } from "./chromium.ts";

const OUTPUT = "tests/output";
const REPORT = `${OUTPUT}/vitest.json`;
const VitestReport = z.object({ numPassedTests: z.number(), numFailedTests: z.number(), numFailedTestSuites: z.number(), success: z.boolean() });

interface Tally {
  readonly passed: number;
  readonly failed: number;
}

function runs(title: string, script: string, ...args: string[]): boolean {
  console.log(`\n== ${title}`);
  return spawnSync("npm", ["run", "--silent", script, "--", ...args], { stdio: "inherit" }).status === 0;
}

function check(title: string, script: string): Tally {
  return runs(title, script) ? { passed: 1, failed: 0 } : { passed: 0, failed: 1 };
}

function vitest(): Tally {
  rmSync(REPORT, { force: true });
  const isGood = runs("Tests", "vitest", "--reporter=default", "--reporter=json", `--outputFile.json=${REPORT}`);
  try {
    const report = VitestReport.parse(JSON.parse(readFileSync(REPORT, "utf8")));
    // A file that breaks before its first test has no failed test to count.
    const failed = Math.max(report.numFailedTests, isGood && report.success ? 0 : 1);
    return { passed: report.numPassedTests, failed };
  } catch {
    console.error("The tests left no report.");
    return { passed: 0, failed: 1 };
  }
}

/** Says which browser tests did not run, where they could not; on a server that tests for everyone it is a failure. */
function missingBrowser(): Tally {
  if (findChromium() !== null) return { passed: 0, failed: 0 };
  const files = readdirSync("tests/browser", { recursive: true, encoding: "utf8" }).filter((name) => name.endsWith(".test.ts"));
  console.error("\nThere is no Chromium on this machine (CHROMIUM_PATH can name one). These browser tests DID NOT RUN:");
  for (const file of files.sort()) console.error(`  tests/browser/${file}`);
  return { passed: 0, failed: process.env.CI === "true" ? 1 : 0 };
}

const begun = Date.now();
mkdirSync(OUTPUT, { recursive: true });
const tallies: Tally[] = [];
// The browser's tests need the pages as they are served, and the check of types needs the code that the build makes.
if (runs("Build", "build")) {
  tallies.push(check("Types", "types"), check("Lint", "lint"), check("Unused code", "unused"), vitest(), missingBrowser());
} else {
  tallies.push({ passed: 0, failed: 1 });
}

const passed = tallies.reduce((sum, tally) => sum + tally.passed, 0);
const failed = tallies.reduce((sum, tally) => sum + tally.failed, 0);
writeFileSync(`${OUTPUT}/summary.json`, `${JSON.stringify({ passed, failed })}\n`);
console.log(`\n${((Date.now() - begun) / 1000).toFixed(0)} s\n${passed} passed, ${failed} failed`);
process.exitCode = failed === 0 ? 0 : 1;
