import type { CsvRow, CsvTable } from "./csv-table.ts";
import { parseIsoTime } from "#lib/core/units/parse-iso-time.ts";
import type { Problems } from "./problems.ts";

/** One cell of a table, and where to say what is wrong with it. */
export interface CellPlace {
  readonly table: CsvTable;
  readonly row: CsvRow;
  readonly column: string;
  readonly problems: Problems;
  /** Whether an empty cell is a problem. */
  readonly required?: boolean;
}

export interface NumberWanted {
  /** To follow the word "wanted", e.g. "a number of metres above zero". */
  readonly wanted: string;
  readonly accepts: (value: number) => boolean;
}

interface Range {
  readonly least: number;
  readonly most: number;
}

export function inRange(unit: string, { least, most }: Range): NumberWanted {
  return { wanted: `a number of ${unit} from ${least} to ${most}`, accepts: (value) => value >= least && value <= most };
}

export function zeroOrInRange(unit: string, { least, most }: Range): NumberWanted {
  return { wanted: `a number of ${unit}, 0 or from ${least} to ${most}`, accepts: (value) => value === 0 || (value >= least && value <= most) };
}

const DECIMAL = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;

/** The cell's text, null where it is empty or the file has no such column. */
export function readText(place: CellPlace, wanted: string): string | null {
  const index = place.table.columns.get(place.column);
  const text = index === undefined ? "" : (place.row.cells[index] ?? "");
  if (text !== "") return text;
  if (place.required === true) addProblem(place, "empty-cell", "", wanted);
  return null;
}

/** The cell's number; null where it is empty, or is no number that `accepts` takes (then a problem is added). */
export function readNumber(place: CellPlace, { wanted, accepts }: NumberWanted): number | null {
  const text = readText(place, wanted);
  if (text === null) return null;
  const value = DECIMAL.test(text) ? Number(text) : Number.NaN;
  if (Number.isFinite(value) && accepts(value)) return value;
  const decimalComma = /^[+-]?\d+,\d+$/.test(text) ? ", with a point and not a comma before its decimals" : "";
  addProblem(place, Number.isNaN(value) ? "not-a-number" : "out-of-range", text, `${wanted}${decimalComma}`);
  return null;
}

/** The cell's word, one of `choices` in small or capital letters. */
export function readChoice<Choice extends string>(place: CellPlace, choices: readonly Choice[]): Choice | null {
  const wanted = `one of ${choices.join(", ")}`;
  const text = readText(place, wanted);
  if (text === null) return null;
  const choice = choices.find((candidate) => candidate === text.toLowerCase());
  if (choice === undefined) addProblem(place, "not-a-choice", text, wanted);
  return choice ?? null;
}

/** The moment a cell names, in seconds since 1970-01-01T00:00Z. */
export function readTime(place: CellPlace): number | null {
  const text = readText(place, TIME_WANTED["not-a-time"]);
  if (text === null) return null;
  const outcome = parseIsoTime(text);
  if (outcome.kind === "time") return outcome.epochSeconds;
  addProblem(place, outcome.kind, text, TIME_WANTED[outcome.kind]);
  return null;
}

const TIME_WANTED = {
  "not-a-time": "an ISO 8601 time with Z or an offset, such as 2024-02-28T14:30Z or 2024-02-28T04:30-10:00",
  "no-offset": "a time that ends in Z or an offset such as -10:00, for a clock time alone does not name a moment",
  "no-such-time": "a day, time of day and offset that exist",
} as const;

function addProblem(place: CellPlace, code: string, found: string, wanted: string): void {
  place.problems.add({ code, row: place.row.row, column: place.column, found, wanted });
}
