import type { Deployment } from "#lib/core/arrival/observations.ts";
import { readChoice, readNumber, readText, readTime } from "./cells.ts";
import type { CellPlace } from "./cells.ts";
import { readCsvTable } from "./csv-table.ts";
import { reportOverlaps } from "./deployment-overlaps.ts";
import { distinctRows } from "./distinct-rows.ts";
import type { ReadResult } from "./note.ts";
import { readShelf } from "./shelf-cell.ts";

const REQUIRED_COLUMNS = ["id", "name", "latitude", "longitude"];
const OPTIONAL_COLUMNS = [
  "depth_m", "sensor", "faces_from_deg", "faces_to_deg", "record_minutes", "stamp", "time_zone", "from", "to", "shelf",
];

type CellOf = (column: string, required?: boolean) => CellPlace;

/**
 * Stations and their deployments (`id,name,latitude,longitude` and optionally what the sensor is, where it faces and
 * when it stood there). Several rows of one id are its deployments, told apart by `from` and `to`. Longitudes from
 * -180 to 360 are taken and named within -180 to 180; a sensor that is not named is at the surface.
 *
 * @throws InputError with every problem by row and column, overlapping deployments included.
 */
export function readStationsCsv(text: string, fileName: string): ReadResult<Deployment[]> {
  const { table, problems, notes } = readCsvTable({ text, fileName, required: REQUIRED_COLUMNS, optional: OPTIONAL_COLUMNS });
  const distinct = distinctRows(table);
  const timeZones = knownTimeZones();
  const placed: { deployment: Deployment; row: number }[] = [];
  for (const row of distinct.rows) {
    const cell: CellOf = (column, required = false) => ({ table, row, column, problems, required });
    const deployment = readDeployment(cell, timeZones);
    if (deployment !== null) placed.push({ deployment, row: row.row });
  }
  reportOverlaps({ placed, problems });
  problems.throwIfAny();
  return { value: placed.map(({ deployment }) => deployment), notes: [...notes, ...distinct.notes] };
}

function readDeployment(cell: CellOf, timeZones: TimeZones): Deployment | null {
  const stationId = readText(cell("id", true), "the station's id");
  const name = readText(cell("name", true), "the station's name");
  const position = readPosition(cell);
  const above = (unit: string) => ({ wanted: `a number of ${unit} above zero`, accepts: (value: number) => value > 0 });
  const rest = {
    depthMetres: readNumber(cell("depth_m"), above("metres")),
    sensor: readChoice(cell("sensor"), ["surface", "pressure", "ground"]) ?? "surface",
    exposure: readExposure(cell),
    recordMinutes: readNumber(cell("record_minutes"), above("minutes")),
    stamp: readChoice(cell("stamp"), ["start", "middle", "end"]),
    timeZone: readTimeZone(cell("time_zone"), timeZones),
    ...readSpan(cell),
    shelf: readShelf(cell("shelf")),
  };
  if (stationId === null || name === null || position === null) return null;
  return { stationId, name, position, ...rest };
}

function readPosition(cell: CellOf): Deployment["position"] | null {
  const latitudeDegrees = readNumber(cell("latitude", true), {
    wanted: "a latitude of -90 to 90 degrees, north positive",
    accepts: (value) => value >= -90 && value <= 90,
  });
  const longitudeDegrees = readNumber(cell("longitude", true), {
    wanted: "a longitude of -180 to 360 degrees, east positive",
    accepts: (value) => value >= -180 && value <= 360,
  });
  if (latitudeDegrees === null || longitudeDegrees === null) return null;
  return { latitudeDegrees, longitudeDegrees: longitudeDegrees > 180 ? longitudeDegrees - 360 : longitudeDegrees };
}

function readExposure(cell: CellOf): Deployment["exposure"] {
  const wanted = "a bearing of 0 to 360 degrees, clockwise from north";
  const accepts = (value: number) => value >= 0 && value <= 360;
  const facesFromDegrees = readNumber(cell("faces_from_deg"), { wanted, accepts });
  const facesToDegrees = readNumber(cell("faces_to_deg"), { wanted, accepts });
  if (facesFromDegrees !== null && facesToDegrees !== null) return { facesFromDegrees, facesToDegrees };
  // The other of the two, as the same cell would be read were it required: an empty one is then the problem.
  if (facesFromDegrees !== null) readText(cell("faces_to_deg", true), `${wanted}, since faces_from_deg is given`);
  if (facesToDegrees !== null) readText(cell("faces_from_deg", true), `${wanted}, since faces_to_deg is given`);
  return null;
}

function readTimeZone(place: CellPlace, timeZones: TimeZones): string | null {
  const wanted = "an IANA time zone such as Pacific/Honolulu";
  const zone = readText(place, wanted);
  if (zone === null || timeZones(zone)) return zone;
  place.problems.add({ code: "not-a-time-zone", row: place.row.row, column: place.column, found: zone, wanted });
  return null;
}

type TimeZones = (zone: string) => boolean;

/** Whether a name is a time zone. Asking the platform is slow, so each name is asked once per file. */
function knownTimeZones(): TimeZones {
  const answers = new Map<string, boolean>();
  return (zone) => {
    const known = answers.get(zone) ?? isTimeZone(zone);
    answers.set(zone, known);
    return known;
  };
}

function isTimeZone(zone: string): boolean {
  try {
    return new Intl.DateTimeFormat("en", { timeZone: zone }).resolvedOptions().timeZone !== "";
  } catch {
    return false;
  }
}

function readSpan(cell: CellOf): Pick<Deployment, "fromEpochSeconds" | "toEpochSeconds"> {
  const fromEpochSeconds = readTime(cell("from"));
  const toEpochSeconds = readTime(cell("to"));
  if (fromEpochSeconds !== null && toEpochSeconds !== null && fromEpochSeconds >= toEpochSeconds) {
    const { row, problems, table } = cell("to");
    const found = row.cells[table.columns.get("to") ?? -1] ?? "";
    problems.add({ code: "span-backwards", row: row.row, column: "to", found, wanted: "a time after the one in from" });
  }
  return { fromEpochSeconds, toEpochSeconds };
}
