import type { Note } from "./note.ts";

const LINES_NAMED = 20;

/** Notes about many lines of one file, gathered so that each kind is told once, with the lines that it is about. */
export interface LineNotes {
  /** `what` follows "lines 3, 4": "left out, for ...". */
  readonly add: (code: string, row: number, what: string) => void;
  /** About so many rows that have no line of their own any more; nothing where there are none. */
  readonly count: (code: string, rows: number, what: string) => void;
  readonly all: () => Note[];
}

export function groupedNotes(fileName: string): LineNotes {
  const lines = new Map<string, { code: string; what: string; rows: number[]; total: number }>();
  const counts = new Map<string, { code: string; what: string; total: number }>();
  return {
    add(code, row, what) {
      const group = lines.get(code) ?? { code, what, rows: [], total: 0 };
      group.total += 1;
      if (group.rows.length < LINES_NAMED) group.rows.push(row);
      lines.set(code, group);
    },
    count(code, rows, what) {
      if (rows > 0) counts.set(code, { code, what, total: (counts.get(code)?.total ?? 0) + rows });
    },
    all: () => [
      ...[...lines.values()].map(({ code, what, rows, total }) => ({ code, message: `${fileName}, ${named(rows, total)}: ${what}.` })),
      ...[...counts.values()].map(({ code, what, total }) => ({ code, message: `${fileName}: ${total === 1 ? "1 row" : `${total} rows`} ${what}.` })),
    ],
  };
}

function named(rows: readonly number[], total: number): string {
  const more = total > rows.length ? ` and ${total - rows.length} more` : "";
  return `${total === 1 ? "line" : "lines"} ${rows.join(", ")}${more}`;
}
