import { DEFAULT_ARRIVAL_SIGMA_SECONDS, DEFAULT_BEARING_SIGMA_DEGREES, DEFAULT_FREQUENCY_SIGMA_FRACTION } from "#lib/core/arrival/default-errors.ts";
import type { StationReading } from "#lib/core/arrival/observations.ts";
import { ARRIVAL_SIGMA_SECONDS } from "#lib/core/arrival/reading-limits.ts";
import type { Bearing, Reading } from "#lib/core/arrival/reading.ts";
import { readChoice, readNumber, readText, readTime, zeroOrInRange } from "./cells.ts";
import type { CellPlace } from "./cells.ts";
import { readCsvTable } from "./csv-table.ts";
import { distinctRows } from "./distinct-rows.ts";
import type { Note, ReadResult } from "./note.ts";
import { readFrequency } from "./reading-frequency.ts";

const OPTIONAL_COLUMNS = [
  "period_s", "frequency_hz", "period_sigma_s", "frequency_sigma_hz", "time_sigma_s", "kind", "bearing_deg", "bearing_sigma_deg",
];

const TIME_SIGMA = zeroOrInRange("seconds", ARRIVAL_SIGMA_SECONDS);

interface DefaultValue {
  readonly value: number;
  readonly message: string;
}

const RIDGE_TIME: DefaultValue = { value: DEFAULT_ARRIVAL_SIGMA_SECONDS.ridge, message: "kind ridge and no time_sigma_s; 1800 s was used" };
const RIDGE_FREQUENCY: DefaultValue = {
  value: DEFAULT_FREQUENCY_SIGMA_FRACTION.ridge,
  message: "kind ridge and no error of the period or frequency; 0 was used",
};
const TIMED_TIME: DefaultValue = { value: DEFAULT_ARRIVAL_SIGMA_SECONDS.timed, message: "kind timed and no time_sigma_s; 300 s was used" };
const TIMED_PERIOD_FRACTION: DefaultValue = {
  value: DEFAULT_FREQUENCY_SIGMA_FRACTION.timed,
  message: "kind timed and no error of the period or frequency; 2.5 % of the period was used",
};
const BEARING_DEGREES: DefaultValue = { value: DEFAULT_BEARING_SIGMA_DEGREES, message: "a bearing and no bearing_sigma_deg; 15 degrees was used" };

/** Defaults that stood in for what a row did not say, each counted so that one note can tell of all its rows. */
type DefaultsUsed = Map<string, number>;

/**
 * Readings of periods or frequencies at stations (`station,time` and `period_s` or `frequency_hz`, and optionally
 * their errors, `kind`, and a bearing that the waves come from). Where no error is given the reader takes 1800 s in
 * time and 0 in frequency for `ridge`, 2.5 % of the period and 300 s for `timed`, 15 degrees for a bearing, and a
 * note says so. Rows said twice are used once, with a note. Frequencies stay as measured.
 *
 * @throws InputError with every problem by row and column.
 */
export function readReadingsCsv(text: string, fileName: string): ReadResult<StationReading[]> {
  const { table, problems, notes } = readCsvTable({ text, fileName, required: ["station", "time"], optional: OPTIONAL_COLUMNS });
  if (!table.columns.has("period_s") && !table.columns.has("frequency_hz")) {
    problems.add({ code: "missing-column", row: 1, wanted: "a header with the column period_s or frequency_hz" });
    problems.throwIfAny();
  }
  const distinct = distinctRows(table);
  const defaults: DefaultsUsed = new Map();
  const value: StationReading[] = [];
  for (const row of distinct.rows) {
    const cell = (column: string, required = false): CellPlace => ({ table, row, column, problems, required });
    const stationId = readText(cell("station", true), "a station's id");
    const reading = readReading({ cell, row: row.row, defaults });
    if (stationId !== null && reading !== null) value.push({ stationId, reading });
  }
  problems.throwIfAny();
  return { value, notes: [...notes, ...distinct.notes, ...defaultNotes(fileName, defaults)] };
}

interface RowCells {
  readonly cell: (column: string, required?: boolean) => CellPlace;
  readonly row: number;
  readonly defaults: DefaultsUsed;
}

function readReading(cells: RowCells): Reading | null {
  const { cell, row } = cells;
  const arrivalEpochSeconds = readTime(cell("time", true));
  const kind = readChoice(cell("kind"), ["ridge", "timed"]) ?? "ridge";
  const frequency = readFrequency({ cell });
  const timeSigma = readNumber(cell("time_sigma_s"), TIME_SIGMA);
  const bearing = readBearing(cells);
  if (arrivalEpochSeconds === null || frequency === null) return null;
  const { frequencyHz } = frequency;
  const timed = kind === "timed";
  const arrivalSigmaSeconds = timeSigma ?? countDefault(cells, timed ? TIMED_TIME : RIDGE_TIME);
  const frequencySigmaHz =
    frequency.frequencySigmaHz ??
    (timed ? countDefault(cells, TIMED_PERIOD_FRACTION) * frequencyHz : countDefault(cells, RIDGE_FREQUENCY));
  if (arrivalSigmaSeconds === 0 && frequencySigmaHz === 0) {
    cell("").problems.add({
      code: "no-error",
      row,
      wanted: "an error (standard deviation) above zero in the time or in the period, for no reading is exact",
    });
  }
  return { arrivalEpochSeconds, frequencyHz, arrivalSigmaSeconds, frequencySigmaHz, kind, row, bearing };
}

function readBearing(cells: RowCells): Bearing | null {
  const { cell } = cells;
  const comesFromDegrees = readNumber(cell("bearing_deg"), {
    wanted: "a bearing that the waves come from, 0 to 360 degrees clockwise from north",
    accepts: (value) => value >= 0 && value <= 360,
  });
  const wanted = "a number of degrees above 0 and up to 180";
  const sigma = readNumber(cell("bearing_sigma_deg"), { wanted, accepts: (value) => value > 0 && value <= 180 });
  if (comesFromDegrees !== null) {
    return { comesFromDegrees, sigmaDegrees: sigma ?? countDefault(cells, BEARING_DEGREES) };
  }
  // An empty cell is the problem here; one that held something unusable has been reported already.
  if (sigma !== null) readText(cell("bearing_deg", true), "a bearing, since bearing_sigma_deg gives its error");
  return null;
}

function countDefault({ defaults }: RowCells, { value, message }: DefaultValue): number {
  defaults.set(message, (defaults.get(message) ?? 0) + 1);
  return value;
}

function defaultNotes(fileName: string, defaults: DefaultsUsed): Note[] {
  return [...defaults].map(([message, rows]) => ({ code: "default-error", message: `${fileName}, ${rows === 1 ? "1 row" : `${rows} rows`}: ${message}.` }));
}
