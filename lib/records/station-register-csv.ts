import { isDeepStrictEqual } from "node:util";
import { byStation } from "#lib/core/arrival/by-station.ts";
import type { Deployment } from "#lib/core/arrival/observations.ts";
import { inOrderOfTime } from "#lib/core/arrival/overlapping-spans.ts";
import { UNDESCRIBED, VISIBILITIES, type StationDescription } from "#lib/core/arrival/station-description.ts";
import { ID_WANTED, isLine, isStationId, MOST_DEPLOYMENTS, MOST_SHELF_LEGS, STATION_LETTERS, tidy } from "#lib/core/arrival/station-limits.ts";
import { readChoice, readTime } from "./cells.ts";
import { readCsvTable, type CsvRow } from "./csv-table.ts";
import { reportOverlaps } from "./deployment-overlaps.ts";
import { DEPLOYMENT_COLUMNS, knownTimeZones, readDeployment, REQUIRED_COLUMNS, STATION_COLUMNS, type CellOf, type TimeZones } from "./deployment-row.ts";
import { distinctRows } from "./distinct-rows.ts";
import type { ReadResult } from "./note.ts";
import type { Problems } from "./problems.ts";
import { readAliases, readClockCorrections, readDoi, readLine, readNote } from "./station-cells.ts";

/** What a file says of a station beside its deployments: only of what it has a column for. */
export type SaidOfStation = Partial<Omit<StationDescription, "id" | "deployments">>;

export interface RegisterStation {
  readonly id: string;
  /** In order of time. */
  readonly deployments: readonly Deployment[];
  readonly said: SaidOfStation;
  /** Line of its first row, and of the row that gives its aliases. */
  readonly row: number;
  readonly aliasRow: number;
}

export interface StationRegister {
  /** In the order in which the file names them first. */
  readonly stations: readonly RegisterStation[];
  readonly columns: ReadonlySet<string>;
  /** For what else is found wrong with the file, by row. */
  readonly problems: Problems;
}

interface ReadRow {
  readonly row: number;
  readonly deployment: Deployment | null;
  readonly stationId: string | null;
  readonly said: readonly Said[];
}

/** One cell that says something of its station. */
interface Said {
  readonly column: string;
  readonly part: SaidOfStation;
}

/**
 * The register of stations as a file: the columns of `readStationsCsv` and `aliases, group, licence, attribution,
 * contact, doi, visibility, embargo_until, clock_corrections, note`. These may stand on any row of a station; rows that
 * give one must agree.
 *
 * @throws InputError with every problem by row and column.
 */
export function readStationRegister(text: string, fileName: string): ReadResult<StationRegister> {
  const optional = [...DEPLOYMENT_COLUMNS, ...STATION_COLUMNS];
  const { table, problems, notes } = readCsvTable({ text, fileName, required: REQUIRED_COLUMNS, optional });
  const distinct = distinctRows(table);
  const timeZones = knownTimeZones();
  const rows = distinct.rows.map((row) => readRow(row, (column, required = false) => ({ table, row, column, problems, required }), timeZones));
  const placed = rows.flatMap(({ deployment, row }) => (deployment === null ? [] : [{ deployment, row }]));
  reportOverlaps({ placed, problems });
  const named = rows.filter((row): row is ReadRow & { stationId: string } => row.stationId !== null);
  const columns = new Set(table.columns.keys());
  const stations = [...byStation(named, ({ stationId }) => stationId)].map(([id, own]) => gathered(id, own, columns, problems));
  reportSharedAliases(stations, problems);
  problems.throwIfAny();
  return { value: { stations, columns, problems }, notes: [...notes, ...distinct.notes] };
}

function readRow(row: CsvRow, cell: CellOf, timeZones: TimeZones): ReadRow {
  const read = readDeployment(cell, timeZones);
  const deployment = read && { ...read, stationId: tidy(read.stationId), name: tidy(read.name) };
  const { problems } = cell("id");
  const wrong = (column: string, found: string, wanted: string): void => problems.add({ code: "not-taken", row: row.row, column, found, wanted });
  if (deployment !== null && !isStationId(deployment.stationId)) wrong("id", deployment.stationId, ID_WANTED);
  if (deployment !== null && !isLine(deployment.name, STATION_LETTERS.name)) wrong("name", deployment.name, `a name of 1 to ${STATION_LETTERS.name} letters on one line`);
  if (deployment !== null && deployment.shelf.length > MOST_SHELF_LEGS) wrong("shelf", `${deployment.shelf.length} legs`, `at most ${MOST_SHELF_LEGS} legs`);
  const stationId = deployment?.stationId ?? null;
  return { row: row.row, deployment, stationId, said: readSaid(cell, stationId ?? "") };
}

function readSaid(cell: CellOf, stationId: string): Said[] {
  const line = (column: "licence" | "attribution" | "contact"): SaidOfStation => given(column, readLine(cell(column), STATION_LETTERS[column]));
  const parts: readonly (readonly [string, SaidOfStation])[] = [
    ["aliases", given("aliases", readAliases(cell("aliases")))],
    ["group", given("groupId", readLine(cell("group"), STATION_LETTERS.group))],
    ["licence", line("licence")],
    ["attribution", line("attribution")],
    ["contact", line("contact")],
    ["doi", given("doi", readDoi(cell("doi")))],
    ["visibility", given("visibility", readChoice(cell("visibility"), VISIBILITIES))],
    ["embargo_until", given("embargoUntilEpochSeconds", readTime(cell("embargo_until")))],
    ["clock_corrections", given("clockCorrections", readClockCorrections(cell("clock_corrections"), stationId))],
    ["note", given("note", readNote(cell("note")))],
  ];
  return parts.filter(([, part]) => Object.keys(part).length > 0).map(([column, part]) => ({ column, part }));
}

function given<Key extends keyof SaidOfStation>(key: Key, value: SaidOfStation[Key] | null): SaidOfStation {
  return value === null ? {} : { [key]: value };
}

const CLEARED = {
  aliases: { aliases: UNDESCRIBED.aliases },
  group: { groupId: UNDESCRIBED.groupId },
  licence: { licence: null },
  attribution: { attribution: null },
  contact: { contact: null },
  doi: { doi: null },
  visibility: { visibility: UNDESCRIBED.visibility },
  embargo_until: { embargoUntilEpochSeconds: null },
  clock_corrections: { clockCorrections: UNDESCRIBED.clockCorrections },
  note: { note: UNDESCRIBED.note },
} as const satisfies Record<(typeof STATION_COLUMNS)[number], SaidOfStation>;

/** A column that is there and says nothing on any of a station's rows takes away what was said. */
function gathered(id: string, rows: readonly ReadRow[], columns: ReadonlySet<string>, problems: Problems): RegisterStation {
  const cleared = STATION_COLUMNS.filter((column) => columns.has(column)).map((column) => CLEARED[column]);
  const firstOf = new Map<string, { row: number; part: SaidOfStation }>();
  for (const { row, said } of rows) {
    for (const { column, part } of said) {
      const first = firstOf.get(column);
      if (first === undefined) firstOf.set(column, { row, part });
      else if (!isDeepStrictEqual(first.part, part)) {
        problems.add({ code: "rows-disagree", row, column, wanted: `what row ${first.row} says of station "${id}", or nothing, for a station has one such entry` });
      }
    }
  }
  const row = rows[0]?.row ?? 0;
  const deployments = inOrderOfTime(rows.flatMap(({ deployment }) => deployment ?? []));
  if (deployments.length > MOST_DEPLOYMENTS) problems.add({ code: "too-many", row, column: "id", found: id, wanted: `at most ${MOST_DEPLOYMENTS} deployments of one station` });
  const said: SaidOfStation = Object.assign({}, ...cleared, ...[...firstOf.values()].map(({ part }) => part)) as SaidOfStation;
  return { id, deployments, said, row, aliasRow: firstOf.get("aliases")?.row ?? row };
}

function reportSharedAliases(stations: readonly RegisterStation[], problems: Problems): void {
  const ownerOf = new Map<string, RegisterStation>();
  for (const station of stations) {
    for (const { scheme, value } of station.said.aliases ?? []) {
      const found = `${scheme}:${value}`;
      const owner = ownerOf.get(found);
      if (owner === undefined) ownerOf.set(found, station);
      else problems.add({ code: "alias-taken", row: station.aliasRow, column: "aliases", found, wanted: `aliases that no other station has; row ${owner.aliasRow} gives this one to "${owner.id}"` });
    }
  }
}
