import { stringify } from "csv-stringify/sync";
import type { ClockCorrection } from "#lib/core/arrival/gathered-observations.ts";
import type { Deployment } from "#lib/core/arrival/observations.ts";
import type { StationDescription } from "#lib/core/arrival/station-description.ts";
import { guarded } from "./formula-guard.ts";
import { DEPLOYMENT_COLUMNS, REQUIRED_COLUMNS, STATION_COLUMNS } from "./deployment-row.ts";

const COLUMNS = [...REQUIRED_COLUMNS, ...DEPLOYMENT_COLUMNS, ...STATION_COLUMNS];

export type StationCells = Readonly<Record<(typeof STATION_COLUMNS)[number], string>>;
export type DeploymentCells = Readonly<Record<Exclude<(typeof REQUIRED_COLUMNS)[number], "id"> | (typeof DEPLOYMENT_COLUMNS)[number], string>>;

/**
 * The register of stations as `readStationRegister` reads it: a row for each deployment, what is said of a station as a
 * whole on its first. What is read back is what was written, to the last digit; see formula-guard.ts for the apostrophe
 * before what a spreadsheet would take for a formula.
 */
export function writeStationRegister(stations: readonly StationDescription[]): string {
  const rows = stations.flatMap((station) =>
    station.deployments.map((deployment, place) => {
      const cells: Readonly<Record<string, string>> = { id: guarded(station.id), ...guardedText(deploymentCells(deployment)), ...(place === 0 ? guardedText(stationCells(station)) : {}) };
      return COLUMNS.map((column) => cells[column] ?? "");
    }),
  );
  return stringify([COLUMNS, ...rows]);
}

/** Numbers may begin with a minus sign, and are no formulas. */
function guardedText(cells: Readonly<Record<string, string>>): Record<string, string> {
  return Object.fromEntries(Object.entries(cells).map(([column, text]) => [column, column === "latitude" || column === "longitude" ? text : guarded(text)]));
}

export function stationCells(station: Omit<StationDescription, "deployments">): StationCells {
  const { aliases, groupId, licence, attribution, contact, doi, visibility, embargoUntilEpochSeconds, clockCorrections, note } = station;
  return {
    aliases: aliases.map(({ scheme, value }) => `${scheme}:${value}`).join(" "),
    group: groupId,
    licence: licence ?? "",
    attribution: attribution ?? "",
    contact: contact ?? "",
    doi: doi ?? "",
    visibility,
    embargo_until: timeCell(embargoUntilEpochSeconds),
    clock_corrections: clockCorrections.map(correctionText).join(" | "),
    note,
  };
}

export function deploymentCells(deployment: Deployment): DeploymentCells {
  const { position, exposure } = deployment;
  return {
    name: deployment.name,
    latitude: String(position.latitudeDegrees),
    longitude: String(position.longitudeDegrees),
    depth_m: numberCell(deployment.depthMetres),
    sensor: deployment.sensor,
    faces_from_deg: numberCell(exposure?.facesFromDegrees ?? null),
    faces_to_deg: numberCell(exposure?.facesToDegrees ?? null),
    record_minutes: numberCell(deployment.recordMinutes),
    stamp: deployment.stamp ?? "",
    time_zone: deployment.timeZone ?? "",
    from: timeCell(deployment.fromEpochSeconds),
    to: timeCell(deployment.toEpochSeconds),
    shelf: deployment.shelf.map(({ lengthMetres, depthMetres }) => `${thousandth(lengthMetres)}:${plainDecimal(depthMetres)}`).join(" "),
  };
}

function correctionText({ fromEpochSeconds, toEpochSeconds, fastBySeconds, reason }: ClockCorrection): string {
  return `${timeCell(fromEpochSeconds) || ".."}/${timeCell(toEpochSeconds) || ".."} ${fastBySeconds} ${reason}`;
}

function numberCell(value: number | null): string {
  return value === null ? "" : String(value);
}

/** ISO 8601 with Z, with as many decimals of a second as the moment has, nine at most. */
function timeCell(epochSeconds: number | null): string {
  if (epochSeconds === null) return "";
  const whole = Math.floor(epochSeconds);
  const decimals = (epochSeconds - whole).toFixed(9).slice(1).replace(/\.?0+$/, "");
  return new Date(whole * 1000).toISOString().replace(".000Z", `${decimals}Z`);
}

/** A length in kilometres with the digits of its metres: the point is moved in the text, as it is moved back in reading. */
function thousandth(lengthMetres: number): string {
  const [whole = "0", fraction = ""] = plainDecimal(lengthMetres).split(".");
  const digits = whole.padStart(4, "0");
  const decimals = `${digits.slice(-3)}${fraction}`.replace(/0+$/, "");
  return `${digits.slice(0, -3)}${decimals === "" ? "" : `.${decimals}`}`;
}

/** Without a power of ten, which the legs of a shelf are not written with. */
function plainDecimal(value: number): string {
  const text = String(value);
  const [, first = "", rest = "", power = ""] = /^(\d)(?:\.(\d+))?e([+-]\d+)$/.exec(text) ?? [];
  if (first === "") return text;
  const shift = Number(power);
  return shift < 0 ? `0.${"0".repeat(-shift - 1)}${first}${rest}` : `${first}${rest.padEnd(shift, "0")}`;
}
