/**
 * `npm run bench [-- WORD...]`: runs tests/bench/*.bench.ts one after another, those whose name holds one of the words.
 * Each prints JSON lines `{bench, value, unit, target?, ...}` on standard output; nothing else goes there.
 */
import { spawnSync } from "node:child_process";
import { readdirSync } from "node:fs";
import { join } from "node:path";

const FOLDER = "tests/bench";
const words = process.argv.slice(2);
const files = readdirSync(FOLDER)
  .filter((name) => name.endsWith(".bench.ts"))
  .filter((name) => words.length === 0 || words.some((word) => name.includes(word)))
  .sort();

if (files.length === 0) {
  console.error(`No file of ${FOLDER} is named like ${words.join(", ") || "*.bench.ts"}.`);
  process.exitCode = 2;
}
for (const file of files) {
  console.error(`== ${file}`);
  const { status } = spawnSync(process.execPath, ["--import", "tsx", join(FOLDER, file)], { stdio: "inherit" });
  if (status !== 0) {
    console.error(`${file} ended with status ${String(status)}.`);
    process.exitCode = 1;
  }
}
