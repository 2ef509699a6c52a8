import type { Deployment } from "#lib/core/arrival/observations.ts";
import { isTimeZone } from "#lib/core/units/time-zone.ts";
import { readChoice, readNumber, readText, readTime } from "./cells.ts";
import type { CellPlace } from "./cells.ts";
import { unguarded } from "./formula-guard.ts";
import { readShelf } from "./shelf-cell.ts";

export const REQUIRED_COLUMNS = ["id", "name", "latitude", "longitude"] as const;
export const DEPLOYMENT_COLUMNS = [
  "depth_m", "sensor", "faces_from_deg", "faces_to_deg", "record_minutes", "stamp", "time_zone", "from", "to", "shelf",
] as const;
/** What is said of a station once, on any of its rows. */
export const STATION_COLUMNS = [
  "aliases", "group", "licence", "attribution", "contact", "doi", "visibility", "embargo_until", "clock_corrections", "note",
] as const;
const SENSORS = ["surface", "pressure", "ground"] as const;
const STAMPS = ["start", "middle", "end"] as const;

export type CellOf = (column: string, required?: boolean) => CellPlace;

/** One row of a stations file as the deployment that it describes; null where it lacks what none can do without. */
export function readDeployment(cell: CellOf, timeZones: TimeZones): Deployment | null {
  const stationId = readText(cell("id", true), "the station's id");
  const name = readText(cell("name", true), "the station's name");
  const position = readPosition(cell);
  const above = (unit: string) => ({ wanted: `a number of ${unit} above zero`, accepts: (value: number) => value > 0 });
  const rest = {
    depthMetres: readNumber(cell("depth_m"), above("metres")),
    sensor: readChoice(cell("sensor"), SENSORS) ?? "surface",
    exposure: readExposure(cell),
    recordMinutes: readNumber(cell("record_minutes"), above("minutes")),
    stamp: readChoice(cell("stamp"), STAMPS),
    timeZone: readTimeZone(cell("time_zone"), timeZones),
    ...readSpan(cell),
    shelf: readShelf(cell("shelf")),
  };
  if (stationId === null || name === null || position === null) return null;
  return { stationId: unguarded(stationId), name: unguarded(name), position, ...rest };
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

export type TimeZones = (zone: string) => boolean;

/** Whether a name is a time zone. Asking the platform is slow, so each name is asked once per file. */
export function knownTimeZones(): TimeZones {
  const answers = new Map<string, boolean>();
  return (zone) => {
    const known = answers.get(zone) ?? isTimeZone(zone);
    answers.set(zone, known);
    return known;
  };
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
