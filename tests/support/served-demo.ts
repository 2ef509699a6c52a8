import { spawn, spawnSync } from "node:child_process";
import { mkdirSync, mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";

const DEMO_EVENTS = fileURLToPath(new URL("../../fixtures/scenarios/demo", import.meta.url));

export interface ServedDemo {
  /** Ends in a slash. */
  readonly address: string;
  /** Of the command that serves; the server is a process that it started. */
  readonly processId: number;
  readonly stop: () => Promise<void>;
}

/** The built pages over the demo's events, or those that are written into a folder, on a free port of this machine. */
export async function serveDemo(writeEvents?: (folder: string) => void): Promise<ServedDemo> {
  const folder = mkdtempSync(join(tmpdir(), "offing-pages-"));
  const from = writeEvents === undefined ? DEMO_EVENTS : join(folder, "events");
  if (writeEvents !== undefined) mkdirSync(from);
  writeEvents?.(from);
  const run = (...args: string[]): string[] => ["--import", "tsx", ...args, "--data", folder];
  const seeded = spawnSync(process.execPath, run("prisma/seed.ts", "--from", from), { encoding: "utf8" });
  if (seeded.status !== 0) throw new Error(`The demo could not be saved: ${seeded.stderr}`);

  const server = spawn(process.execPath, run("lib/cli/start.ts", "--port", "0"), { stdio: ["ignore", "pipe", "inherit"] });
  const ended = new Promise<void>((answer) => {
    server.once("exit", () => {
      answer();
    });
  });
  const stop = async (): Promise<void> => {
    server.kill("SIGTERM");
    await ended;
    rmSync(folder, { recursive: true, force: true });
  };
  let said = "";
  for await (const part of server.stdout) {
    said += String(part);
    const address = /^Offing is at (http:\S+)$/m.exec(said)?.[1];
    if (address !== undefined) return { address, processId: server.pid ?? 0, stop };
  }
  await stop();
  throw new Error(`The pages are not served: ${said}`);
}
