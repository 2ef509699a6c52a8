import { readFileSync } from "node:fs";
import { join } from "node:path";
import Database from "better-sqlite3";
import { expect, onTestFinished, test } from "vitest";
import { migrate } from "#lib/store/migrate.ts";
import { readPrismaSchema } from "#tests/support/prisma-schema.ts";
import type { SchemaTable } from "#tests/support/prisma-schema.ts";
import { temporaryDirectory } from "#tests/support/temporary-directory.ts";
import { MIGRATIONS_DIRECTORY } from "#tests/support/migrations-directory.ts";

const declared = readPrismaSchema(readFileSync("prisma/schema.prisma", "utf8"));

interface ColumnRow {
  readonly name: string;
  readonly type: SchemaTable["columns"][number]["type"];
  readonly notnull: number;
  readonly pk: number;
}
interface KeyRow {
  readonly id: number;
  readonly table: string;
  readonly from: string;
  readonly to: string;
  readonly on_delete: string;
}

function migratedDatabase(): Database.Database {
  const databasePath = join(temporaryDirectory(), "empty.sqlite");
  migrate({ databasePath, migrationsDirectory: MIGRATIONS_DIRECTORY });
  const database = new Database(databasePath);
  onTestFinished(() => {
    database.close();
  });
  return database;
}

/** A table as the database itself describes it. */
function builtTable(database: Database.Database, name: string): SchemaTable {
  const columns = database.pragma(`table_info(${name})`) as ColumnRow[];
  const indices = database.pragma(`index_list(${name})`) as { name: string; origin: string }[];
  const keys = database.pragma(`foreign_key_list(${name})`) as KeyRow[];
  const columnsOfIndex = (index: string) => (database.pragma(`index_info(${index})`) as { name: string }[]).map((row) => row.name).join();
  const keyIds = [...new Set(keys.map((key) => key.id))];
  return {
    name,
    columns: columns.map((column) => ({ name: column.name, type: column.type, required: column.notnull === 1 })),
    primaryKey: columns.filter((column) => column.pk > 0).sort((a, b) => a.pk - b.pk).map((column) => column.name).join(),
    unique: indices.filter((index) => index.origin === "u").map((index) => columnsOfIndex(index.name)).sort(),
    foreignKeys: keyIds
      .map((id) => keys.filter((key) => key.id === id))
      .map((parts) => `${parts.map((part) => part.from).join()} -> ${parts[0]?.table ?? ""}(${parts.map((part) => part.to).join()}) ${parts[0]?.on_delete ?? ""}`)
      .sort(),
  };
}

test("the migrated database holds the schema's tables and no others", () => {
  const tables = migratedDatabase().prepare<[], { name: string }>("SELECT name FROM sqlite_master WHERE type = 'table' ORDER BY name").all();
  const own = tables.map((row) => row.name).filter((name) => !name.startsWith("sqlite_") && name !== "_prisma_migrations");
  expect(own).toStrictEqual(declared.map((table) => table.name).sort());
  expect(own).toHaveLength(12);
});

test.each(declared)("the migrated table $name has the schema's columns and keys", (table) => {
  expect(table.columns.length).toBeGreaterThan(0);
  expect(builtTable(migratedDatabase(), table.name)).toStrictEqual(table);
});

const STATION = "INSERT INTO stations (id) VALUES ('a');";
const DEPLOYMENT = "INSERT INTO deployments (station_id, ordinal, name, sensor, latitude_degrees, longitude_degrees";
const ARRIVAL = "INSERT INTO arrivals (id, station_id, event_id, ordinal, note, actor, saved_epoch_seconds";
const EVENT = `${STATION} INSERT INTO events (id, title, note, saved_epoch_seconds) VALUES ('e', 'Storm', '', 0); ${ARRIVAL}) VALUES (1, 'a', 'e', 0, '', 'me', 0);`;
const READING = `${EVENT} INSERT INTO readings (arrival_id, source_row, quality, arrival_epoch_seconds, frequency_sigma_hz, kind, frequency_hz, arrival_sigma_seconds`;
const ESTIMATE = `${EVENT} INSERT INTO estimates (arrival_id, source_row, shared_shifts_json, origin_epoch_seconds, distance_metres, distance_variance_m2, origin_variance_s2, distance_origin_covariance_m_s)`;

const LOCALIZATION = `${EVENT} INSERT INTO localizations (event_id, number, saved_epoch_seconds, actor, reason, program, node_version, input_digest, settings_json, input_json, left_out_json, answer_json, outcome, latitude_degrees, longitude_degrees, origin_epoch_seconds) VALUES ('e', 1, 0, 'me', '', 'p', 'v', '${"0".repeat(64)}', '{}', '{}', '[]', '{}'`;

const ALIAS = `${STATION} INSERT INTO station_aliases VALUES ('a', 0, 'wmo', '46001');`;

const refused: [string, string][] = [
  ["a latitude of 95 degrees", `${STATION} ${DEPLOYMENT}) VALUES ('a', 0, 'A', 'surface', 95, 0)`],
  ["a longitude of 190 degrees", `${STATION} ${DEPLOYMENT}) VALUES ('a', 0, 'A', 'surface', 0, 190)`],
  ["an unknown sensor", `${STATION} ${DEPLOYMENT}) VALUES ('a', 0, 'A', 'radar', 0, 0)`],
  ["a depth of nothing", `${STATION} ${DEPLOYMENT}, depth_metres) VALUES ('a', 0, 'A', 'surface', 0, 0, 0)`],
  ["half an exposure", `${STATION} ${DEPLOYMENT}, faces_from_degrees) VALUES ('a', 0, 'A', 'surface', 0, 0, 10)`],
  ["a span that ends before it begins", `${STATION} ${DEPLOYMENT}, from_epoch_seconds, to_epoch_seconds) VALUES ('a', 0, 'A', 'surface', 0, 0, 2, 1)`],
  ["a station's deployment without the station", `${DEPLOYMENT}) VALUES ('b', 0, 'A', 'surface', 0, 0)`],
  ["a frequency of nothing", `${READING}) VALUES (1, 1, 2, 0, 0, 'ridge', 0, 0)`],
  ["an unknown kind of reading", `${READING}) VALUES (1, 1, 2, 0, 0, 'guess', 0.05, 0)`],
  ["a standard deviation below zero", `${READING}) VALUES (1, 1, 2, 0, 0, 'ridge', 0.05, -1)`],
  ["a bearing without its standard deviation", `${READING}, comes_from_degrees) VALUES (1, 1, 2, 0, 0, 'ridge', 0.05, 0, 10)`],
  ["text for a number", `${READING}) VALUES (1, 1, 2, 'noon', 0, 'ridge', 0.05, 0)`],
  ["a quality flag that is none", `${READING}) VALUES (1, 1, 5, 0, 0, 'ridge', 0.05, 0)`],
  ["an arrival of an event that nobody knows", `${STATION} ${ARRIVAL}) VALUES (1, 'a', 'e', 0, '', 'me', 0)`],
  ["an arrival of an event without a place in it", `${EVENT} ${ARRIVAL}) VALUES (2, 'a', 'e', NULL, '', 'me', 0)`],
  ["two arrivals at one place of an event", `${EVENT} ${ARRIVAL}) VALUES (2, 'a', 'e', 0, '', 'me', 0)`],
  ["a visibility that is none", "INSERT INTO stations (id, visibility) VALUES ('a', 'secret')"],
  ["a station of a group that nobody knows", "INSERT INTO stations (id, group_id) VALUES ('a', 'nobody')"],
  ["an alias of two stations", `${ALIAS} INSERT INTO stations (id) VALUES ('b'); INSERT INTO station_aliases VALUES ('b', 0, 'wmo', '46001')`],
  ["a clock correction of nothing", `${STATION} INSERT INTO clock_corrections VALUES ('a', 0, NULL, NULL, 0, 'why')`],
  ["a clock correction without a reason", `${STATION} INSERT INTO clock_corrections VALUES ('a', 0, NULL, NULL, 60, '')`],
  ["a correlation beyond one", `${ESTIMATE} VALUES (1, 1, '[]', 0, 1, 4, 9, -6.1)`],
  ["an outcome that is none", `${LOCALIZATION}, 'found', 1, 2, 3)`],
  ["a source without its time", `${LOCALIZATION}, 'located', 1, 2, NULL)`],
  ["shared shifts that are no list", `${ESTIMATE} VALUES (1, 1, '{}', 0, 1, 4, 9, -5.9)`],
];

test.each(refused)("the database refuses %s", (_, sql) => {
  const database = migratedDatabase();
  database.pragma("foreign_keys = ON");
  expect(() => database.exec(sql)).toThrow(/constraint failed|cannot store TEXT/);
});

test("the rows above are refused for what they name alone", () => {
  for (const sql of [
    `${STATION} ${DEPLOYMENT}) VALUES ('a', 0, 'A', 'surface', 90, -180)`,
    `${READING}) VALUES (1, 1, 2, 0, 0, 'ridge', 0.05, 0)`,
    `${ESTIMATE} VALUES (1, 1, '[]', 0, 1, 4, 9, -6)`,
    `${EVENT} ${ARRIVAL}) VALUES (2, 'a', NULL, NULL, '', 'me', 0); ${ARRIVAL}) VALUES (3, 'a', 'e', 1, '', 'me', 0)`,
    ALIAS,
    `${STATION} INSERT INTO clock_corrections VALUES ('a', 0, NULL, NULL, 60, 'why')`,
    `${LOCALIZATION}, 'located', 1, 2, 3)`,
  ]) {
    expect(() => migratedDatabase().exec(sql)).not.toThrow();
  }
});
