import { isLine, isStationId, STATION_LETTERS } from "#lib/core/arrival/station-limits.ts";
import type { Deployment } from "#lib/core/arrival/observations.ts";
import { isTimeZone } from "#lib/core/units/time-zone.ts";
import { wrapLongitudeDegrees, type Position } from "#lib/core/units/position.ts";
import { writtenNumber } from "./written-number.ts";

/** A new station as it is being typed. */
export interface PlacedStation {
  readonly id: string;
  readonly name: string;
  readonly latitude: string;
  readonly longitude: string;
  readonly timeZone: string;
}

export type PlacedField = keyof PlacedStation;

export interface PlacedIssue {
  readonly field: PlacedField;
  readonly message: string;
}

export interface ReadPlaced {
  readonly issues: readonly PlacedIssue[];
  /** Null until both coordinates say something. */
  readonly position: Position | null;
  /** Null where none, or none that exists, is named. */
  readonly timeZone: string | null;
  /** As it would be stored; null while anything is missing or wrong. */
  readonly deployment: Deployment | null;
}

/** Latitude and longitude take a sign or a letter: -21.3, 21.3 S. Where no name is given the id stands for it. */
export function readPlaced(placed: PlacedStation): ReadPlaced {
  const [id, name, zone] = [placed.id.trim(), placed.name.trim(), placed.timeZone.trim()];
  const latitudeDegrees = within(degreesOf(placed.latitude, "N", "S"), -90, 90);
  const longitudeDegrees = within(degreesOf(placed.longitude, "E", "W"), -180, 360);
  const [zoneIsKnown, nameFits] = [zone === "" || isTimeZone(zone), name === "" || isLine(name, STATION_LETTERS.name)];
  const issues: PlacedIssue[] = [
    ...(isStationId(id) ? [] : [{ field: "id" as const, message: id === "" ? "Give the station a short id of its own." : `“${short(id)}” can be no id: give 1 to ${STATION_LETTERS.id} letters on one line, and not “new”.` }]),
    ...(nameFits ? [] : [{ field: "name" as const, message: `Give a name of at most ${STATION_LETTERS.name} letters.` }]),
    ...(latitudeDegrees !== null ? [] : [{ field: "latitude" as const, message: wanted(placed.latitude, "latitude", "from -90 to 90, or with N or S, such as 21.3 N") }]),
    ...(longitudeDegrees !== null ? [] : [{ field: "longitude" as const, message: wanted(placed.longitude, "longitude", "from -180 to 360, or with E or W, such as 157.9 W") }]),
    ...(zoneIsKnown ? [] : [{ field: "timeZone" as const, message: `No time zone is called “${short(zone)}”. Give an IANA name, such as Pacific/Honolulu, or leave it empty.` }]),
  ];
  const position = latitudeDegrees === null || longitudeDegrees === null ? null : { latitudeDegrees, longitudeDegrees: wrapLongitudeDegrees(longitudeDegrees) };
  const timeZone = zone !== "" && zoneIsKnown ? zone : null;
  const deployment = issues.length > 0 || position === null ? null : shoreDeployment({ id, name: name === "" ? id : name, position, timeZone });
  return { issues, position, timeZone, deployment };
}

/** Where somebody stands and looks at the sea: no sensor but the eye, which sees the surface. */
export function shoreDeployment({ id, name, position, timeZone }: { id: string; name: string; position: Position; timeZone: string | null }): Deployment {
  const unknown = { depthMetres: null, exposure: null, recordMinutes: null, stamp: null, fromEpochSeconds: null, toEpochSeconds: null };
  return { stationId: id, name, position, sensor: "surface", timeZone, shelf: [], ...unknown };
}

function degreesOf(text: string, positive: string, negative: string): number | null {
  const [, number = "", letter = ""] = /^(.*?)\s*°?\s*([NSEWnsew]?)$/.exec(text.trim()) ?? [];
  const degrees = writtenNumber(number);
  if (degrees === null || letter === "") return degrees;
  if (degrees < 0 || ![positive, negative].includes(letter.toUpperCase())) return null;
  return letter.toUpperCase() === negative ? -degrees : degrees;
}

function within(degrees: number | null, least: number, most: number): number | null {
  return degrees !== null && degrees >= least && degrees <= most ? degrees : null;
}

function wanted(text: string, what: string, range: string): string {
  return text.trim() === "" ? `Give the ${what} in degrees, or click the map.` : `“${short(text.trim())}” is no ${what}. Give degrees ${range}.`;
}

function short(text: string): string {
  return text.length > 40 ? `${text.slice(0, 40)}…` : text;
}
