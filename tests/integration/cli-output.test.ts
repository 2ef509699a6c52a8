import { spawn, spawnSync } from "node:child_process";
import { mkdirSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { expect, test } from "vitest";
import type { LocateJson } from "#lib/contracts/locate-json.ts";
import { runCommand } from "#lib/cli/run-command.ts";
import { temporaryDirectory } from "#tests/support/temporary-directory.ts";

const ENTRY = join(process.cwd(), "lib/cli/offing.mjs");
const DEMO = join(process.cwd(), "fixtures/scenarios/demo");
const LOCATE = ["locate", "--stations", `${DEMO}/stations.csv`, "--readings", `${DEMO}/gannet/readings.csv`];

test("--json prints one line of JSON and nothing else; what there is to warn of goes to standard error as well", () => {
  const { status, stdout, stderr } = spawnSync(process.execPath, [ENTRY, ...LOCATE, "--json"], { encoding: "utf8" });
  expect(status).toBe(0);
  expect(stdout.split("\n")).toHaveLength(2);
  const answer = JSON.parse(stdout) as LocateJson;
  expect(answer.warnings.length).toBeGreaterThan(0);
  expect(stderr.trimEnd().split("\n")).toStrictEqual(answer.warnings.map(({ message }) => `Warning: ${message}`));
});

/** Runs the command with a reader that closes the pipe at once, or with the first bytes in hand. */
function readInPart(closes: "at once" | "after a part", args: readonly string[]): Promise<{ status: number | null; errors: string }> {
  const command = spawn(process.execPath, [ENTRY, ...args], { stdio: ["ignore", "pipe", "pipe"] });
  if (closes === "at once") command.stdout.destroy();
  else command.stdout.once("data", () => command.stdout.destroy());
  let errors = "";
  command.stderr.on("data", (part) => (errors += String(part)));
  return new Promise((answer) => {
    command.once("close", (status) => {
      answer({ status, errors });
    });
  });
}

test.each([["at once"], ["after a part"]] as const)("a reader that closes the pipe %s does no harm", async (closes) => {
  for (const args of [[...LOCATE, "--json"], ["--help"]]) {
    const { status, errors } = await readInPart(closes, args);
    expect(status).toBe(0);
    expect(errors.split("\n").every((line) => line === "" || line.startsWith("Warning: "))).toBe(true);
  }
});

test("paths start where the caller stands, through npm and without it", () => {
  const folder = join(temporaryDirectory(), "with a space");
  mkdirSync(folder);
  writeFileSync(join(folder, "r.csv"), "station,time,period_s\nA,2031-02-11T00:00Z,18\nA,2031-02-11T12:00Z,16\nA,2031-02-12T00:00Z,14.4\n");
  const args = ["fit", "--readings", "r.csv"];
  const direct = spawnSync(process.execPath, [ENTRY, ...args], { cwd: folder, encoding: "utf8" });
  expect(direct).toMatchObject({ status: 0, stdout: expect.stringMatching(/^Station .*\nA /) as string });
  const throughNpm = spawnSync("npm", ["--prefix", process.cwd(), "run", "--silent", "offing", "--", ...args], {
    cwd: folder,
    encoding: "utf8",
    env: { ...process.env, INIT_CWD: undefined },
  });
  expect(throughNpm.stdout).toBe(direct.stdout);
  expect(throughNpm.status).toBe(0);
});

test("a fault of the program's own ends with status 1 and no answer", () => {
  // Without the land that the program ships, it cannot place anything; nobody's input is to blame.
  const packageRoot = temporaryDirectory();
  writeFileSync(join(packageRoot, "package.json"), '{"name": "offing", "version": "0.0.0"}');
  const result = runCommand({ args: [...LOCATE, "--json"], folder: "/", packageRoot });
  expect(result).toMatchObject({ status: 1, standardOutput: "" });
  expect(result.standardError).toMatch(/^The program met a fault of its own and has no answer: /);
});
