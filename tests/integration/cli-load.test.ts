import { spawnSync } from "node:child_process";
import { mkdirSync, readdirSync, rmSync, utimesSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { expect, test } from "vitest";
import { temporaryDirectory } from "#tests/support/temporary-directory.ts";

const LOADER = new URL("../../lib/cli/load-command.mjs", import.meta.url).href;

/** A package whose command says a word that stands in a file of its own. */
function packageThatSays(word: string): string {
  const root = temporaryDirectory();
  mkdirSync(join(root, "lib", "cli"), { recursive: true });
  writeFileSync(join(root, "package.json"), '{"type": "module"}');
  writeFileSync(join(root, "package-lock.json"), "{}");
  writeFileSync(join(root, "lib", "cli", "main.ts"), 'import { WORD } from "../word.ts";\nexport function main(): void { console.log(WORD); }\n');
  say(root, word);
  return root;
}

function say(root: string, word: string): void {
  writeFileSync(join(root, "lib", "word.ts"), `export const WORD: string = ${JSON.stringify(word)};\n`);
}

function answerOf(root: string): string {
  const script = `import { loadCommand } from ${JSON.stringify(LOADER)}; (await loadCommand(${JSON.stringify(root)})).main();`;
  const { stdout, stderr } = spawnSync(process.execPath, ["--input-type=module", "--eval", script], { encoding: "utf8" });
  expect(stderr).toBe("");
  return stdout.trim();
}

test("the command is joined into one file once, and again when a source has changed", () => {
  const root = packageThatSays("calm");
  const kept = join(root, "node_modules", ".cache", "offing");
  expect(answerOf(root)).toBe("calm");
  const first = readdirSync(kept);
  expect(first).toHaveLength(1);
  writeFileSync(join(kept, first[0] ?? ""), 'exports.main = () => console.log("from the one file");');
  expect(answerOf(root)).toBe("from the one file");

  say(root, "gale");
  expect(answerOf(root)).toBe("gale");
  // Another call may have found the first and have yet to read it; a day later none has.
  expect(readdirSync(kept)).toHaveLength(2);
  expect(readdirSync(kept)).toContain(first[0]);
  const dayAndHourAgo = new Date(Date.now() - 25 * 3_600_000);
  for (const name of readdirSync(kept)) utimesSync(join(kept, name), dayAndHourAgo, dayAndHourAgo);
  say(root, "storm");
  expect(answerOf(root)).toBe("storm");
  expect(readdirSync(kept)).toHaveLength(1);
});

test("where the one file cannot be kept, the sources are read as they stand", () => {
  const root = packageThatSays("calm");
  rmSync(join(root, "node_modules"), { recursive: true, force: true });
  writeFileSync(join(root, "node_modules"), "A file, in which nothing can be kept.");
  expect(answerOf(root)).toBe("calm");
});
