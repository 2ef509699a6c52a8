import { parseIsoTime } from "#lib/core/units/parse-iso-time.ts";
import { clockAt, readDate, type Turn } from "./clock-time.ts";

/** A row of a spreadsheet, sorted into the fields of a reading as it stood: what is wrong in it is told by its field. */
export interface PastedRow {
  /** Null where the row brings none. */
  readonly date: string | null;
  readonly time: string;
  readonly turn: Turn | null;
  readonly period: string;
  readonly waves: string;
  readonly seconds: string;
}

export interface Pasted {
  readonly rows: readonly PastedRow[];
  /** Lines without a digit, such as a header, as they stood. */
  readonly leftOut: readonly string[];
}

/**
 * Text that holds several cells, or null for the text of one. Cells are parted by tabs, semicolons, or commas that are
 * no decimal commas; a row is `time, period` or `time, waves, seconds`, with a date before the time or in it. A time
 * with `Z` or an offset is turned into clock time of `zone`.
 */
export function pastedRows(text: string, zone: string): Pasted | null {
  const lines = text.split(/\r\n?|\n/).filter((line) => line.trim() !== "");
  const cut = lines.map(cellsOf);
  if (cut.every((cells) => cells.length < 2)) return null;
  const rows: PastedRow[] = [];
  const leftOut: string[] = [];
  cut.forEach((cells, index) => {
    if (/\d/.test(cells.join(""))) rows.push(rowOf(cells, zone));
    else leftOut.push((lines[index] ?? "").trim());
  });
  return { rows, leftOut };
}

/** One cell a line, for a paste down one column; null for a single line. */
export function pastedColumn(text: string): readonly string[] | null {
  const lines = text.replace(/(\r\n?|\n)$/, "").split(/\r\n?|\n/);
  return lines.length < 2 ? null : lines.map((line) => line.trim());
}

function cellsOf(line: string): string[] {
  const separator = line.includes("\t") ? "\t" : line.includes(";") ? ";" : ",";
  return line.split(separator).map((cell) => cell.trim().replace(/^"(.*)"$/, "$1"));
}

function rowOf(cells: readonly string[], zone: string): PastedRow {
  const [first = "", ...others] = cells;
  const day = readDate(first);
  const when = day === null ? whenOf(first, zone) : { ...whenOf(others[0] ?? "", zone), date: day };
  const [one = "", other = "", ...beyond] = day === null ? others : others.slice(1);
  const isCount = other !== "" || beyond.some((cell) => cell !== "");
  // What has no field of its own stays in view beside the last one, and is told there.
  const rest = [other, ...beyond].filter((cell) => cell !== "").join(" ");
  return { ...when, period: isCount ? "" : one, waves: isCount ? one : "", seconds: isCount ? rest : "" };
}

function whenOf(cell: string, zone: string): Pick<PastedRow, "date" | "time" | "turn"> {
  const moment = parseIsoTime(cell);
  if (moment.kind === "time") return clockAt(moment.epochSeconds, zone);
  const parts = /^(\S+)[T ](.+)$/.exec(cell);
  const date = readDate(parts?.[1] ?? "");
  if (parts === null || date === null) return { date: null, time: cell, turn: null };
  return { date, time: (parts[2] ?? "").trim(), turn: null };
}
