import type { CsvRow, CsvTable } from "./csv-table.ts";
import type { Note } from "./note.ts";

const ROWS_NAMED = 20;

/** The rows without those that say in every known column what an earlier one said, and a note that names them. */
export function distinctRows(table: CsvTable): { rows: readonly CsvRow[]; notes: readonly Note[] } {
  const places = [...table.columns.values()];
  const firstRowOf = new Map<string, number>();
  const repeats: { row: number; first: number }[] = [];
  const rows = table.rows.filter((row) => {
    const key = JSON.stringify(places.map((place) => row.cells[place]));
    const first = firstRowOf.get(key);
    if (first !== undefined) repeats.push({ row: row.row, first });
    else firstRowOf.set(key, row.row);
    return first === undefined;
  });
  if (repeats.length === 0) return { rows, notes: [] };
  const named = repeats.slice(0, ROWS_NAMED).map(({ row, first }) => `row ${row} repeats row ${first}`).join(", ");
  const more = repeats.length > ROWS_NAMED ? `, and ${repeats.length - ROWS_NAMED} more` : "";
  return { rows, notes: [{ code: "duplicate-rows", message: `${table.fileName}: repeated rows were used once: ${named}${more}.` }] };
}
