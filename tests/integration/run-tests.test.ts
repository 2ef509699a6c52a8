import { spawnSync } from "node:child_process";
import { chmodSync, mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { createRequire } from "node:module";
import { delimiter, join } from "node:path";
import { pathToFileURL } from "node:url";
import { expect, test } from "vitest";
import { temporaryDirectory } from "#tests/support/temporary-directory.ts";

const RUNNER = join(process.cwd(), "tests/support/run-tests.ts");
const TSX = pathToFileURL(createRequire(import.meta.url).resolve("tsx")).href;

/** Stands in for npm: the scripts named in FAILING fail, and the tests leave the report in REPORT, if there is one. */
const NPM = `#!${process.execPath}
const { writeFileSync } = require("node:fs");
const script = process.argv[4];
const to = process.argv.map((word) => /^--outputFile\\.json=(.*)/.exec(word)?.[1]).find((path) => path);
if (to !== undefined && process.env.REPORT !== "") writeFileSync(to, process.env.REPORT);
process.exit(process.env.FAILING.split(",").includes(script) ? 1 : 0);
`;

const GOOD = { numPassedTests: 40, numFailedTests: 0, numFailedTestSuites: 0, success: true };

function runTests({ failing = "", report = GOOD, chromium = process.execPath, ci = "" }: {
  readonly failing?: string;
  readonly report?: object | null;
  readonly chromium?: string;
  readonly ci?: string;
}) {
  const folder = temporaryDirectory();
  mkdirSync(join(folder, "tests", "browser"), { recursive: true });
  writeFileSync(join(folder, "tests", "browser", "chart.test.ts"), "");
  writeFileSync(join(folder, "npm"), NPM);
  chmodSync(join(folder, "npm"), 0o755);
  const { status, stdout, stderr } = spawnSync(process.execPath, ["--import", TSX, RUNNER], {
    cwd: folder,
    encoding: "utf8",
    env: {
      ...process.env,
      ...{ PATH: `${folder}${delimiter}${process.env.PATH ?? ""}`, CI: ci, CHROMIUM_PATH: chromium },
      ...{ FAILING: failing, REPORT: report === null ? "" : JSON.stringify(report) },
    },
  });
  const summary: unknown = JSON.parse(readFileSync(join(folder, "tests", "output", "summary.json"), "utf8"));
  return { status, last: stdout.trimEnd().split("\n").at(-1), stderr, summary };
}

test.each([
  ["all is well", {}, 43, 0],
  ["lint finds something", { failing: "lint" }, 42, 1],
  ["two tests fail", { failing: "vitest", report: { ...GOOD, numFailedTests: 2, success: false } }, 43, 2],
  ["a file breaks before its first test", { failing: "vitest", report: { ...GOOD, numFailedTestSuites: 1, success: false } }, 43, 1],
  ["the tests leave no report", { failing: "vitest", report: null }, 3, 1],
  ["the build fails", { failing: "build" }, 0, 1],
])("the run of all tests counts what passed and failed where %s", (_, given, passed, failed) => {
  const run = runTests(given);
  expect(run).toMatchObject({ status: failed === 0 ? 0 : 1, last: `${passed} passed, ${failed} failed`, summary: { passed, failed } });
});

test("without Chromium it names the browser tests that did not run, and fails where it tests for everyone", () => {
  const alone = runTests({ chromium: "/nowhere" });
  expect(alone).toMatchObject({ status: 0, last: "43 passed, 0 failed" });
  expect(alone.stderr).toContain("These browser tests DID NOT RUN:\n  tests/browser/chart.test.ts\n");
  expect(runTests({ chromium: "/nowhere", ci: "true" })).toMatchObject({ status: 1, last: "43 passed, 1 failed" });
});
