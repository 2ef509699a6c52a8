import { createHash } from "node:crypto";
import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";

export interface MigrationFile {
  readonly name: string;
  readonly sql: string;
  /** SHA-256 of the file, hexadecimal, as Prisma's own command writes it. */
  readonly checksum: string;
}

/** The migrations in `directory`, one folder each with a `migration.sql`, in the order of their names. */
export function readMigrationFiles(directory: string): MigrationFile[] {
  return readdirSync(directory, { withFileTypes: true })
    .filter((entry) => entry.isDirectory())
    .map((entry) => entry.name)
    .sort()
    .map((name) => {
      const bytes = readFileSync(join(directory, name, "migration.sql"));
      return { name, sql: bytes.toString("utf8"), checksum: createHash("sha256").update(bytes).digest("hex") };
    });
}
