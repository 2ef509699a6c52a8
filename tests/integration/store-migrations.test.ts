import { cpSync, existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import Database from "better-sqlite3";
import { describe, expect, test } from "vitest";
import { migrate } from "#lib/store/migrate.ts";
import { openStore } from "#lib/store/open-store.ts";
import { NO_CHOICES } from "#lib/core/arrival/observation-choices.ts";
import { broughtIn } from "#tests/support/brought-in.ts";
import { inventedEvent } from "#tests/support/invented-event.ts";
import { temporaryDirectory } from "#tests/support/temporary-directory.ts";
import { MIGRATIONS_DIRECTORY } from "#tests/support/migrations-directory.ts";
import { temporaryStore } from "#tests/support/temporary-store.ts";

/** A database with one event, and a copy of the migrations to which a test can add. */
async function keptDatabase(): Promise<{ databasePath: string; migrationsDirectory: string; add(name: string, sql: string): void }> {
  const dataDirectory = temporaryDirectory();
  const store = await openStore({ dataDirectory, migrationsDirectory: MIGRATIONS_DIRECTORY });
  await store.saveEvent(inventedEvent("gale"));
  await store.close();
  const migrationsDirectory = join(dataDirectory, "migrations");
  cpSync(MIGRATIONS_DIRECTORY, migrationsDirectory, { recursive: true });
  return {
    databasePath: join(dataDirectory, "offing.sqlite"),
    migrationsDirectory,
    add(name, sql) {
      mkdirSync(join(migrationsDirectory, name), { recursive: true });
      writeFileSync(join(migrationsDirectory, name, "migration.sql"), sql);
    },
  };
}

function query(databasePath: string, sql: string): unknown[] {
  const database = new Database(databasePath, { readonly: true });
  const rows = database.prepare(sql).all();
  database.close();
  return rows;
}

describe("migrations", () => {
  test("are applied once, and recorded in the table that Prisma's own command reads", async () => {
    const kept = await keptDatabase();
    expect(migrate(kept)).toStrictEqual({ applied: [], backupPath: null });
    const rows = query(kept.databasePath, `SELECT migration_name, checksum, finished_at FROM "_prisma_migrations"`);
    expect(rows).toHaveLength(readdirSync(MIGRATIONS_DIRECTORY, { withFileTypes: true }).filter((entry) => entry.isDirectory()).length);
    expect(rows[0]).toMatchObject({ migration_name: "0001_stations_and_events", checksum: expect.stringMatching(/^[0-9a-f]{64}$/) as string });
  });

  test("that come later are applied after a copy of what was there", async () => {
    const kept = await keptDatabase();
    kept.add("9999_later", "ALTER TABLE events ADD COLUMN later TEXT; UPDATE events SET title = 'changed';");
    const { applied, backupPath } = migrate(kept);
    expect(applied).toStrictEqual(["9999_later"]);
    expect(query(kept.databasePath, "SELECT title FROM events")).toStrictEqual([{ title: "changed" }]);
    expect(query(backupPath ?? "", "SELECT title FROM events")).toStrictEqual([{ title: "Storm gale" }]);
  });

  test("of a database of the first version keep its events, readings, estimates and answers as they were", async () => {
    const folder = temporaryDirectory();
    const migrationsDirectory = join(folder, "migrations");
    for (const name of ["0001_stations_and_events", "0002_localizations"]) cpSync(join(MIGRATIONS_DIRECTORY, name), join(migrationsDirectory, name), { recursive: true });
    const databasePath = join(folder, "offing.sqlite");
    migrate({ databasePath, migrationsDirectory });
    const database = new Database(databasePath);
    database.exec(readFileSync("fixtures/records/first-version.sql", "utf8"));
    database.close();

    const { store } = await temporaryStore(folder);
    const event = inventedEvent("gale");
    const { title, note, observations } = event;
    expect(broughtIn(await store.loadEvent("gale"))).toStrictEqual({ id: "gale", title, note, observations });
    expect(await store.listLocalizations("gale")).toMatchObject([{ number: 1, eventRevision: 1, choices: { ...NO_CHOICES, leftOutStationIds: ["far-rock"] } }]);
    const [first] = await store.listArrivals({ eventId: "gale", limit: 10 });
    expect(first).toMatchObject({ stationId: "north-mole", revision: 1, readings: [{ quality: 2 }, { quality: 2 }] });
  });

  test("that fail are undone whole, and the copy stays", async () => {
    const kept = await keptDatabase();
    kept.add("9999_broken", "DELETE FROM events; INSERT INTO no_such_table VALUES (1);");
    expect(() => migrate(kept)).toThrow(/9999_broken failed and was undone: no such table/);
    expect(query(kept.databasePath, "SELECT id FROM events")).toStrictEqual([{ id: "gale" }]);
    const copies = readdirSync(join(kept.databasePath, "..")).filter((name) => name.includes(".before-migration-"));
    expect(copies).toHaveLength(1);
    expect(query(join(kept.databasePath, "..", copies[0] ?? ""), "SELECT id FROM events")).toStrictEqual([{ id: "gale" }]);

    kept.add("9999_broken", "UPDATE events SET note = 'mended';");
    expect(migrate(kept).applied).toStrictEqual(["9999_broken"]);
  });

  test("that would leave rows pointing at nothing are undone", async () => {
    const kept = await keptDatabase();
    kept.add("9999_orphans", "DELETE FROM stations;");
    expect(() => migrate(kept)).toThrow(/rows that point at nothing/);
    expect(query(kept.databasePath, "SELECT count(*) AS n FROM stations")).toStrictEqual([{ n: 2 }]);
  });

  test("that have changed since, or are unknown to this program, stop it", async () => {
    const kept = await keptDatabase();
    kept.add("9999_later", "UPDATE events SET note = 'a';");
    migrate(kept);
    expect(() => migrate({ ...kept, migrationsDirectory: MIGRATIONS_DIRECTORY })).toThrow(/newer version of this program \(9999_later\)/);
    kept.add("9999_later", "UPDATE events SET note = 'b';");
    expect(() => migrate(kept)).toThrow(/9999_later was changed after/);
  });

  test("make a database where there was none, without a copy", () => {
    const databasePath = join(temporaryDirectory(), "new.sqlite");
    expect(migrate({ databasePath, migrationsDirectory: MIGRATIONS_DIRECTORY }).backupPath).toBeNull();
    expect(existsSync(databasePath)).toBe(true);
  });
});
