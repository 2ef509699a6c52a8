import { spawnSync } from "node:child_process";
import { mkdirSync, mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { serveFolder, type ServedFolder } from "./served-folder.ts";

const DEMO_EVENTS = fileURLToPath(new URL("../../fixtures/scenarios/demo", import.meta.url));

export type ServedDemo = Pick<ServedFolder, "address" | "processId" | "stop">;

/** The built pages over the demo's events, or those that are written into a folder, on a free port of this machine. */
export async function serveDemo(writeEvents?: (folder: string) => void): Promise<ServedDemo> {
  const folder = mkdtempSync(join(tmpdir(), "offing-pages-"));
  const from = writeEvents === undefined ? DEMO_EVENTS : join(folder, "events");
  if (writeEvents !== undefined) mkdirSync(from);
  writeEvents?.(from);
  const seeded = spawnSync(process.execPath, ["--import", "tsx", "prisma/seed.ts", "--from", from, "--data", folder], { encoding: "utf8" });
  if (seeded.status !== 0) throw new Error(`The demo could not be saved: ${seeded.stderr}`);

  const { address, processId, stop } = await serveFolder(folder);
  return {
    address,
    processId,
    stop: async () => {
      await stop();
      rmSync(folder, { recursive: true, force: true });
    },
  };
}
