import { spawn } from "node:child_process";
import { chmodSync, mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { createInterface } from "node:readline";
import Database from "better-sqlite3";
import { describe, expect, onTestFinished, test } from "vitest";
import { InputError } from "#lib/core/failures/input-error.ts";
import { DATABASE_FILE, openStore } from "#lib/store/open-store.ts";
import { broughtIn } from "#tests/support/brought-in.ts";
import { inventedEvent } from "#tests/support/invented-event.ts";
import { MIGRATIONS_DIRECTORY } from "#tests/support/migrations-directory.ts";
import { temporaryDirectory } from "#tests/support/temporary-directory.ts";
import { temporaryStore } from "#tests/support/temporary-store.ts";

/** Who may do what is not held against the superuser: as that, the test becomes somebody else for a moment. */
const NOBODY = 65_534;

const openIn = (dataDirectory: string) => openStore({ dataDirectory, migrationsDirectory: MIGRATIONS_DIRECTORY });

/** What opening the folder is refused for. */
async function refusal(dataDirectory: string): Promise<string> {
  try {
    await (await openIn(dataDirectory)).close();
  } catch (error) {
    if (error instanceof InputError) return error.message;
    throw error;
  }
  throw new Error("The folder was taken.");
}

async function asNobody<Value>(work: () => Promise<Value>): Promise<Value> {
  if (process.geteuid?.() !== 0) return work();
  process.seteuid?.(NOBODY);
  try {
    return await work();
  } finally {
    process.seteuid?.(0);
  }
}

describe("a data folder is refused in a sentence, and left as it is", () => {
  test("where a file stands in its place", async () => {
    const path = join(temporaryDirectory(), "data");
    writeFileSync(path, "");
    expect(await refusal(path)).toBe(`Data folder ${path}: found a file in its place; wanted a folder (EEXIST).`);
    expect(await refusal(join(path, "below"))).toMatch(/found a file in its place; wanted a folder \(ENOTDIR\)\.$/);
  });

  test("where it may not be written: a new one, and one with a database", async () => {
    const { store, dataDirectory } = await temporaryStore();
    await store.saveEvent(inventedEvent("gale"));
    await store.close();
    const outer = dirname(dataDirectory);
    expect(outer).not.toBe(dataDirectory);
    chmodSync(dataDirectory, 0o555);
    onTestFinished(() => {
      chmodSync(dataDirectory, 0o755);
    });
    const inside = await asNobody(() => refusal(dataDirectory));
    expect(inside).toMatch(/^Data folder .*: found a folder, or a database in it, that may not be written; wanted one that may \(SQLITE_/);
    const below = await asNobody(() => refusal(join(dataDirectory, "below")));
    expect(below).toMatch(/may not be written; wanted one that may \(EACCES\)\.$/);
  });

  test("where the database is a folder, is no database, or is damaged", async () => {
    const folder = temporaryDirectory();
    mkdirSync(join(folder, DATABASE_FILE));
    expect(await refusal(folder)).toMatch(/\(SQLITE_CANTOPEN/);

    const text = temporaryDirectory();
    writeFileSync(join(text, DATABASE_FILE), "These are not the bytes of a database.".repeat(100));
    expect(await refusal(text)).toMatch(/found an offing\.sqlite that is no database of this program \(SQLITE_NOTADB\)\.$/);

    const { store, dataDirectory } = await temporaryStore();
    await store.saveEvent(inventedEvent("gale"));
    await store.close();
    const path = join(dataDirectory, DATABASE_FILE);
    const bytes = readFileSync(path);
    bytes.fill(0xff, 100, 1000); // behind the file's header, where the list of tables begins
    writeFileSync(path, bytes);
    expect(await refusal(dataDirectory)).toMatch(/found a damaged database; wanted a whole one.* \(SQLITE_CORRUPT\)\.$/);
    expect(readFileSync(path).equals(bytes)).toBe(true);
  });

  test("where the database is of a newer version", async () => {
    const { store, dataDirectory } = await temporaryStore();
    await store.close();
    const database = new Database(join(dataDirectory, DATABASE_FILE));
    database.exec(`INSERT INTO "_prisma_migrations" (id, checksum, migration_name, started_at, finished_at, applied_steps_count)
      VALUES ('x', 'x', '9999_from_later', 0, 0, 1)`);
    database.close();
    expect(await refusal(dataDirectory)).toBe(
      "The database was written by a newer version of this program (9999_from_later). Use that version, or another data folder.",
    );
  });

  test("where another store has it, until that one lets go", async () => {
    const { store, dataDirectory } = await temporaryStore();
    expect(await refusal(dataDirectory)).toMatch(/found another program using it; wanted one at a time \(SQLITE_BUSY\)\.$/);
    await store.saveEvent(inventedEvent("gale"));
    await store.close();
    const next = await openIn(dataDirectory);
    expect((await next.listEvents()).map(({ id }) => id)).toStrictEqual(["gale"]);
    await next.close();
  });
});

test("a program killed in the middle of saving leaves all that it acknowledged, nothing half done, and no lock", async () => {
  const dataDirectory = temporaryDirectory();
  for (const round of [1, 2]) {
    const folder = join(dataDirectory, String(round));
    const acknowledged = await savedBeforeTheKill(folder, 10 * round);
    expect(acknowledged.length).toBeGreaterThanOrEqual(10 * round);

    const store = await openIn(folder);
    const kept = (await store.listEvents()).map(({ id }) => id);
    expect(kept).toStrictEqual(expect.arrayContaining(acknowledged));
    // The one that it was saving may be there, and no more.
    expect(kept.length - acknowledged.length).toBeLessThanOrEqual(1);
    for (const id of kept) expect(broughtIn(await store.loadEvent(id))?.observations).toStrictEqual(inventedEvent(id).observations);
    await store.close();

    const database = new Database(join(folder, DATABASE_FILE), { readonly: true });
    expect(database.pragma("integrity_check")).toStrictEqual([{ integrity_check: "ok" }]);
    // The first event brought its two stations, and the others found them there.
    const trail = ["station north-mole", "station far-rock", ...kept.sort().map((id) => `event ${id}`)];
    expect(database.prepare("SELECT subject FROM audit_entries ORDER BY id").pluck().all()).toStrictEqual(trail);
    database.close();
  }
});

/** Starts a program that saves, and kills it once it has acknowledged so many events; gives the ids of all that it did. */
async function savedBeforeTheKill(folder: string, count: number): Promise<string[]> {
  const program = spawn(process.execPath, ["--import", "tsx", "tests/support/save-until-stopped.ts", folder], { stdio: ["ignore", "pipe", "inherit"] });
  const ids: string[] = [];
  for await (const id of createInterface({ input: program.stdout })) {
    ids.push(id);
    if (ids.length === count) program.kill("SIGKILL");
  }
  return ids;
}
