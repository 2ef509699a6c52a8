import { randomUUID } from "node:crypto";
import Database from "better-sqlite3";
import { InputError } from "#lib/core/failures/input-error.ts";
import { readMigrationFiles } from "./migration-files.ts";
import type { MigrationFile } from "./migration-files.ts";

/** Prisma's own table, so that its command agrees with this runner on a machine that has its native engine. */
const MIGRATIONS_TABLE = `CREATE TABLE IF NOT EXISTS "_prisma_migrations" (
  "id" TEXT PRIMARY KEY NOT NULL,
  "checksum" TEXT NOT NULL,
  "finished_at" DATETIME,
  "migration_name" TEXT NOT NULL,
  "logs" TEXT,
  "rolled_back_at" DATETIME,
  "started_at" DATETIME NOT NULL DEFAULT current_timestamp,
  "applied_steps_count" INTEGER UNSIGNED NOT NULL DEFAULT 0
)`;

export interface MigrationResult {
  readonly applied: readonly string[];
  /** The copy made before anything changed; null where there was nothing to copy or nothing to do. */
  readonly backupPath: string | null;
}

/**
 * Brings a database up to the migrations in `migrationsDirectory`: each in a transaction of its own, after a copy of
 * the whole database beside it.
 *
 * @throws InputError where the database knows a migration that this program does not.
 * @throws Error where a migration fails (it is undone, those before it stay, the copy stays), or where one that was
 *   applied has changed since.
 */
export function migrate(paths: { databasePath: string; migrationsDirectory: string }): MigrationResult {
  const files = readMigrationFiles(paths.migrationsDirectory);
  const database = new Database(paths.databasePath, { timeout: 10_000 });
  try {
    database.pragma("journal_mode = WAL");
    database.pragma("synchronous = FULL");
    const applied = appliedMigrations(database);
    const pending = pendingMigrations(files, applied);
    if (pending.length === 0) return { applied: [], backupPath: null };

    const backupPath = applied.size === 0 ? null : copyOf(database, paths.databasePath);
    database.pragma("foreign_keys = OFF"); // a table that is rebuilt would take the rows that point at it along
    database.exec(MIGRATIONS_TABLE);
    for (const file of pending) applyMigration(database, file);
    return { applied: pending.map((file) => file.name), backupPath };
  } finally {
    database.close();
  }
}

/** Checksums by name of those that ran to their end. */
function appliedMigrations(database: Database.Database): Map<string, string> {
  const hasTable = database.prepare("SELECT 1 FROM sqlite_master WHERE name = '_prisma_migrations'").get();
  if (hasTable === undefined) return new Map();
  const rows = database
    .prepare<[], { name: string; checksum: string }>(
      `SELECT migration_name AS name, checksum FROM "_prisma_migrations"
       WHERE finished_at IS NOT NULL AND rolled_back_at IS NULL`,
    )
    .all();
  return new Map(rows.map((row) => [row.name, row.checksum]));
}

function pendingMigrations(files: readonly MigrationFile[], applied: ReadonlyMap<string, string>): MigrationFile[] {
  const known = new Set(files.map((file) => file.name));
  const foreign = [...applied.keys()].filter((name) => !known.has(name));
  if (foreign.length > 0) {
    const message = `The database was written by a newer version of this program (${foreign.join(", ")}). Use that version, or another data folder.`;
    throw new InputError([{ code: "newer-database", path: "data folder", message }]);
  }
  const changed = files.find((file) => applied.has(file.name) && applied.get(file.name) !== file.checksum);
  if (changed !== undefined) {
    throw new Error(`Migration ${changed.name} was changed after it had been applied to this database.`);
  }
  return files.filter((file) => !applied.has(file.name));
}

function copyOf(database: Database.Database, databasePath: string): string {
  const moment = new Date().toISOString().replaceAll(/[-:.]/g, "");
  const backupPath = `${databasePath}.before-migration-${moment}`;
  database.prepare("VACUUM INTO ?").run(backupPath);
  return backupPath;
}

function applyMigration(database: Database.Database, file: MigrationFile): void {
  const startedAt = Date.now();
  database.exec("BEGIN IMMEDIATE");
  try {
    database.exec(file.sql);
    const orphans = database.pragma("foreign_key_check") as unknown[];
    if (orphans.length > 0) throw new Error(`It would leave ${orphans.length} rows that point at nothing.`);
    database
      .prepare(
        `INSERT INTO "_prisma_migrations" (id, checksum, migration_name, started_at, finished_at, applied_steps_count)
         VALUES (?, ?, ?, ?, ?, 1)`,
      )
      .run(randomUUID(), file.checksum, file.name, startedAt, Date.now());
    database.exec("COMMIT");
  } catch (cause) {
    if (database.inTransaction) database.exec("ROLLBACK");
    const reason = cause instanceof Error ? cause.message : String(cause);
    throw new Error(`Migration ${file.name} failed and was undone: ${reason}`, { cause });
  }
}
