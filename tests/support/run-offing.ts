import { spawnSync } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";

const ENTRY = fileURLToPath(new URL("../../lib/cli/offing.mjs", import.meta.url));

export interface OffingRun {
  readonly status: number | null;
  readonly out: string;
  /** Lines of standard error. */
  readonly messages: readonly string[];
  readonly seconds: number;
}

/** Runs the command for real, from an empty folder into which `files` are written first. */
export function runOffing({ args, files = {} }: { readonly args: readonly string[]; readonly files?: Readonly<Record<string, string>> }): OffingRun {
  const folder = mkdtempSync(join(tmpdir(), "offing-call-"));
  try {
    for (const [name, text] of Object.entries(files)) writeFileSync(join(folder, name), text);
    const start = performance.now();
    const { status, stdout, stderr } = spawnSync(process.execPath, [ENTRY, ...args], { cwd: folder, encoding: "utf8", maxBuffer: 1e8 });
    const seconds = (performance.now() - start) / 1000;
    return { status, out: stdout, messages: stderr.split("\n").filter((line) => line !== ""), seconds };
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
