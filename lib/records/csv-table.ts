import { CsvError, parse } from "csv-parse/sync";
import type { Note } from "./note.ts";
import { collectProblems, quoted } from "./problems.ts";
import type { Problems } from "./problems.ts";

/** `row` is the line of the file on which the row ends, so that an editor finds it. Cells are trimmed. */
export interface CsvRow {
  readonly row: number;
  readonly cells: readonly string[];
}

export interface CsvTable {
  readonly fileName: string;
  /** Column name to its place in `cells`; only columns that the format knows. */
  readonly columns: ReadonlyMap<string, number>;
  readonly rows: readonly CsvRow[];
}

export interface CsvFormat {
  readonly text: string;
  readonly fileName: string;
  readonly required: readonly string[];
  readonly optional: readonly string[];
}

/**
 * A CSV file with a header as rows of trimmed cells: columns in any order, comma or semicolon (whichever the header
 * uses), LF, CRLF or CR, with or without a byte order mark. Columns that the format does not know are left out and
 * named in a note; so are rows that hold nothing. `problems` collects what the caller goes on to find.
 *
 * @throws InputError where the file is empty, is no CSV, lacks a required column, or a row has more or fewer cells
 *   than the header.
 */
export function readCsvTable(format: CsvFormat): { table: CsvTable; problems: Problems; notes: Note[] } {
  const { fileName } = format;
  const problems = collectProblems(fileName);
  const [header, ...rows] = parseRows(format, problems);
  if (header === undefined) {
    problems.add({ code: "empty-file", wanted: `a header with ${format.required.join(", ")} and rows under it`, found: "" });
    problems.throwIfAny();
    return { table: { fileName, columns: new Map(), rows: [] }, problems, notes: [] };
  }
  const { columns, unknown } = readHeader({ header, format, problems });
  const filled = rows.filter((row) => row.cells.some((cell) => cell !== ""));
  for (const row of filled) requireWidth(row, header.cells.length, problems);
  if (filled.length === 0) problems.add({ code: "no-rows", wanted: "at least one row under the header", found: "" });
  problems.throwIfAny();
  return { table: { fileName, columns, rows: filled }, problems, notes: notesOf(fileName, unknown, rows.length - filled.length) };
}

function parseRows(format: CsvFormat, problems: Problems): CsvRow[] {
  // One kind of line end, so that a file stitched together from two systems still counts its lines as an editor does.
  const text = format.text.replace(/^\uFEFF/, "").replace(/\r\n?/g, "\n");
  const options = { delimiter: delimiterOf(text), relax_column_count: true, skip_empty_lines: true, trim: true, info: true };
  try {
    // The package types rows as bare arrays of cells; with `info` each is an object that also knows its line.
    const records = parse(text, options) as unknown as { info: { lines: number }; record: string[] }[];
    return records.map(({ info, record }) => ({ row: info.lines, cells: record }));
  } catch (error) {
    if (!(error instanceof CsvError)) throw error;
    const line: unknown = error.lines;
    const row = typeof line === "number" ? { row: line } : {};
    problems.add({ code: "not-csv", ...row, wanted: "CSV in which every quotation mark that opens a cell is closed at its end" });
    problems.throwIfAny();
    return [];
  }
}

function delimiterOf(text: string): string {
  const [firstLine = ""] = text.trimStart().split("\n", 1);
  const unquoted = firstLine.replace(/"[^"]*"/g, "");
  return unquoted.split(";").length > unquoted.split(",").length ? ";" : ",";
}

function readHeader({ header, format, problems }: { header: CsvRow; format: CsvFormat; problems: Problems }) {
  const known = new Set([...format.required, ...format.optional]);
  const columns = new Map<string, number>();
  const unknown: string[] = [];
  for (const [index, cell] of header.cells.entries()) {
    const name = cell.toLowerCase();
    if (columns.has(name)) problems.add({ code: "column-twice", row: header.row, column: name, wanted: "each column once" });
    else if (known.has(name)) columns.set(name, index);
    else if (cell !== "") unknown.push(cell);
  }
  const missing = format.required.filter((name) => !columns.has(name));
  if (missing.length > 0) {
    problems.add({
      code: "missing-column",
      row: header.row,
      found: header.cells.join(", "),
      wanted: `a header that also has the column${missing.length > 1 ? "s" : ""} ${missing.join(", ")}`,
    });
    problems.throwIfAny();
  }
  return { columns, unknown };
}

function requireWidth({ row, cells }: CsvRow, width: number, problems: Problems): void {
  const extraCellIsFilled = cells.slice(width).some((cell) => cell !== "");
  if (cells.length >= width && !extraCellIsFilled) return;
  problems.add({ code: "row-width", row, wanted: `${width} cells, as many as the header has, and not ${cells.length}` });
}

function notesOf(fileName: string, unknown: readonly string[], emptyRows: number): Note[] {
  const notes: Note[] = [];
  if (unknown.length > 0) {
    const names = unknown.slice(0, 20).map(quoted).join(", ") + (unknown.length > 20 ? ` and ${unknown.length - 20} more` : "");
    notes.push({ code: "unknown-columns", message: `${fileName}: these columns are not known and were not used: ${names}.` });
  }
  if (emptyRows > 0) {
    const rows = emptyRows === 1 ? "1 row holds" : `${emptyRows} rows hold`;
    notes.push({ code: "empty-rows", message: `${fileName}: ${rows} nothing and did not count.` });
  }
  return notes;
}
