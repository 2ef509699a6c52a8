import { spawnSync } from "node:child_process";
import { join } from "node:path";
import Database from "better-sqlite3";
import { expect, test } from "vitest";
import { DATABASE_FILE } from "#lib/store/open-store.ts";
import { perform } from "#tests/support/api-client.ts";
import { serveFolder } from "#tests/support/served-folder.ts";
import { temporaryDirectory } from "#tests/support/temporary-directory.ts";

const SAVES = 100;
const EVENT = "fulmar";

/** Needs `npm run build` first. */
test("a server killed in the middle of 100 saves, and started again, has every answer that it acknowledged", async () => {
  const folder = temporaryDirectory();
  expect(spawnSync(process.execPath, ["--import", "tsx", "prisma/seed.ts", "--data", folder]).status).toBe(0);
  let kept = 0;
  for (const killAfter of [13, 37]) {
    const server = await serveFolder(folder);
    const acknowledged: number[] = [];
    let dying: Promise<void> | null = null;
    for (let save = 0; save < SAVES; save += 1) {
      const asking = perform(server.address, "keepLocalization", { params: { id: EVENT }, body: { startedFrom: kept + acknowledged.length, reason: `save ${save}` } });
      if (acknowledged.length === killAfter) dying = server.kill();
      const answer = await asking.catch(() => null); // the dead give none
      if (answer === null) break;
      expect(answer.status, JSON.stringify(answer.issues)).toBe(201);
      acknowledged.push((answer.body as { number: number }).number);
    }
    expect(dying).not.toBeNull();
    await dying;
    expect(acknowledged.length).toBeGreaterThanOrEqual(killAfter);
    expect(acknowledged.length).toBeLessThan(SAVES);

    const again = await serveFolder(folder);
    const { body } = await perform(again.address, "listLocalizations", { params: { id: EVENT } });
    const numbers = (body as { localizations: { number: number }[] }).localizations.map(({ number }) => number).reverse();
    expect(numbers).toStrictEqual(numbers.map((_, place) => place + 1));
    expect(numbers).toStrictEqual(expect.arrayContaining(acknowledged));
    expect(numbers.length - kept - acknowledged.length).toBeLessThanOrEqual(1);
    for (const number of numbers) expect((await perform(again.address, "readLocalization", { params: { id: EVENT, number } })).status).toBe(200);
    await again.stop();
    kept = numbers.length;

    const database = new Database(join(folder, DATABASE_FILE), { readonly: true });
    expect(database.pragma("integrity_check")).toStrictEqual([{ integrity_check: "ok" }]);
    expect(database.prepare("SELECT json_extract(detail_json, '$.number') FROM audit_entries WHERE action = 'localization saved' ORDER BY id").pluck().all()).toStrictEqual(numbers);
    database.close();
  }
});
