import type { Deployment } from "#lib/core/arrival/observations.ts";
import { readCsvTable } from "./csv-table.ts";
import { reportOverlaps } from "./deployment-overlaps.ts";
import { DEPLOYMENT_COLUMNS, knownTimeZones, readDeployment, REQUIRED_COLUMNS, STATION_COLUMNS } from "./deployment-row.ts";
import type { CellOf } from "./deployment-row.ts";
import { distinctRows } from "./distinct-rows.ts";
import type { ReadResult } from "./note.ts";

/**
 * Stations and their deployments (`id,name,latitude,longitude` and optionally what the sensor is, where it faces and
 * when it stood there). Several rows of one id are its deployments, told apart by `from` and `to`. Longitudes from
 * -180 to 360 are taken and named within -180 to 180; a sensor that is not named is at the surface. What the register
 * of stations says beyond that (see station-register-csv.ts) may stand there, and is not used.
 *
 * @throws InputError with every problem by row and column, overlapping deployments included.
 */
export function readStationsCsv(text: string, fileName: string): ReadResult<Deployment[]> {
  const optional = [...DEPLOYMENT_COLUMNS, ...STATION_COLUMNS];
  const { table, problems, notes } = readCsvTable({ text, fileName, required: REQUIRED_COLUMNS, optional });
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
