import type { StationEstimate } from "#lib/core/arrival/observations.ts";
import type { ArrivalEstimate } from "#lib/core/arrival/estimate.ts";
import { HALF_GIRTH_METRES } from "#lib/core/geodesy/earth.ts";
import { SECONDS_PER_HOUR } from "#lib/core/units/time.ts";
import { inRange, readNumber, readText, readTime } from "./cells.ts";
import type { CellPlace } from "./cells.ts";
import { readCsvTable } from "./csv-table.ts";
import { distinctRows } from "./distinct-rows.ts";
import type { Note, ReadResult } from "./note.ts";

const REQUIRED_COLUMNS = ["station", "distance_km", "origin_time"];
const SIGMA_COLUMNS = ["distance_sigma_km", "origin_time_sigma_h", "correlation"] as const;
const METRES_PER_KM = 1000;

/** No storm is farther than half the Earth's girth, and no error of a distance need be larger. */
const LENGTH = inRange("kilometres", { least: 0.001, most: Math.floor(HALF_GIRTH_METRES / METRES_PER_KM) });
const DISTANCE = { ...LENGTH, wanted: `${LENGTH.wanted}, half the Earth's girth` };
/** From seconds to thirty days: what lies outside is no error of a time. */
const ORIGIN_SIGMA = inRange("hours", { least: 0.001, most: 30 * 24 });

/** Common practice, no source: what estimates published without errors turn out to be good to. */
const DISTANCE_SIGMA_FRACTION = 0.08;
const ORIGIN_SIGMA_HOURS = 12;
/** Readings pin the middle of the line, so a longer way means an earlier start. */
const CORRELATION = -0.9;

/**
 * Estimates that stations sent in without their readings (`station,distance_km,origin_time` and optionally
 * `distance_sigma_km,origin_time_sigma_h,correlation`). What is not given is taken as 8 % of the distance, 12 h and
 * -0.9, and a note says so.
 *
 * @throws InputError with every problem by row and column.
 */
export function readArrivalsCsv(text: string, fileName: string): ReadResult<StationEstimate[]> {
  const { table, problems, notes } = readCsvTable({ text, fileName, required: REQUIRED_COLUMNS, optional: SIGMA_COLUMNS });
  const distinct = distinctRows(table);
  const defaults = { distance_sigma_km: 0, origin_time_sigma_h: 0, correlation: 0 };
  const value: StationEstimate[] = [];
  for (const row of distinct.rows) {
    const cell = (column: string, required = false): CellPlace => ({ table, row, column, problems, required });
    const stationId = readText(cell("station", true), "a station's id");
    const estimate = readEstimate({ cell, defaults });
    if (stationId !== null && estimate !== null) value.push({ stationId, row: row.row, estimate });
  }
  problems.throwIfAny();
  return { value, notes: [...notes, ...distinct.notes, ...defaultNotes(fileName, defaults)] };
}

type DefaultCounts = Record<(typeof SIGMA_COLUMNS)[number], number>;

function readEstimate({ cell, defaults }: { cell: (column: string, required?: boolean) => CellPlace; defaults: DefaultCounts }): ArrivalEstimate | null {
  const distanceKm = readNumber(cell("distance_km", true), DISTANCE);
  const originEpochSeconds = readTime(cell("origin_time", true));
  const sigmaKm = readNumber(cell("distance_sigma_km"), LENGTH);
  const sigmaHours = readNumber(cell("origin_time_sigma_h"), ORIGIN_SIGMA);
  const given = readNumber(cell("correlation"), { wanted: "a number above -1 and below 1", accepts: (value) => value > -1 && value < 1 });
  if (distanceKm === null || originEpochSeconds === null) return null;
  if (sigmaKm === null) defaults.distance_sigma_km += 1;
  if (sigmaHours === null) defaults.origin_time_sigma_h += 1;
  if (given === null) defaults.correlation += 1;
  const distanceMetres = distanceKm * METRES_PER_KM;
  const distanceSigma = sigmaKm === null ? DISTANCE_SIGMA_FRACTION * distanceMetres : sigmaKm * METRES_PER_KM;
  const originSigma = (sigmaHours ?? ORIGIN_SIGMA_HOURS) * SECONDS_PER_HOUR;
  const covariance = {
    distanceVariance: distanceSigma ** 2,
    originVariance: originSigma ** 2,
    distanceOriginCovariance: (given ?? CORRELATION) * distanceSigma * originSigma,
  };
  return { distanceMetres, originEpochSeconds, covariance, sharedShifts: [], bearing: null };
}

function defaultNotes(fileName: string, counts: DefaultCounts): Note[] {
  const used = { distance_sigma_km: "8 % of the distance", origin_time_sigma_h: "12 h", correlation: "-0.9" };
  return SIGMA_COLUMNS.filter((column) => counts[column] > 0).map((column) => ({
    code: "default-error",
    message: `${fileName}, ${counts[column] === 1 ? "1 row" : `${counts[column]} rows`}: no ${column}; ${used[column]} was used.`,
  }));
}
