import { spawn } from "node:child_process";
import { join } from "node:path";
import { createInterface } from "node:readline";
import Database from "better-sqlite3";
import { expect, test } from "vitest";
import { DATABASE_FILE } from "#lib/store/open-store.ts";
import { inventedLocalization } from "#tests/support/invented-localization.ts";
import { temporaryDirectory } from "#tests/support/temporary-directory.ts";
import { temporaryStore } from "#tests/support/temporary-store.ts";

const SAVES = 100;

/** Starts a program that keeps answers, and kills it once it has acknowledged so many; gives the numbers of all that it did. */
async function keptBeforeTheKill(folder: string, count: number): Promise<number[]> {
  const program = spawn(process.execPath, ["--import", "tsx", "tests/support/keep-until-stopped.ts", folder, String(SAVES)], { stdio: ["ignore", "pipe", "inherit"] });
  const numbers: number[] = [];
  for await (const line of createInterface({ input: program.stdout })) {
    numbers.push(Number(line));
    if (numbers.length === count) program.kill("SIGKILL");
  }
  return numbers;
}

test("a program killed in the middle of 100 saves leaves every revision that it acknowledged, and no half one; and the next goes on", async () => {
  const folder = temporaryDirectory();
  let before = 0;
  for (const count of [20, 47]) {
    const acknowledged = await keptBeforeTheKill(folder, count);
    expect(acknowledged.length).toBeGreaterThanOrEqual(count);
    expect(acknowledged.length).toBeLessThan(SAVES);
    expect(acknowledged[0]).toBe(before + 1);

    const { store } = await temporaryStore(folder);
    const kept = (await store.listLocalizations("gale")).map(({ number }) => number).reverse();
    expect(kept).toStrictEqual(kept.map((_, place) => place + 1)); // none is missing
    // The one that it was saving may be there, and no more.
    expect(kept.length - (acknowledged.at(-1) ?? 0)).toBeGreaterThanOrEqual(0);
    expect(kept.length - (acknowledged.at(-1) ?? 0)).toBeLessThanOrEqual(1);
    for (const number of kept) {
      const { startedFrom, ...saved } = inventedLocalization("gale", number);
      expect(await store.loadLocalization("gale", number)).toStrictEqual({ ...saved, number });
      expect(startedFrom).toBe(number - 1);
    }
    await store.close();

    const database = new Database(join(folder, DATABASE_FILE), { readonly: true });
    expect(database.pragma("integrity_check")).toStrictEqual([{ integrity_check: "ok" }]);
    expect(database.pragma("foreign_key_check")).toStrictEqual([]);
    expect(database.prepare("SELECT json_extract(detail_json, '$.number') FROM audit_entries WHERE action = 'localization saved' ORDER BY id").pluck().all()).toStrictEqual(kept);
    database.close();
    before = kept.length;
  }
});
