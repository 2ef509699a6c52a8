import { EMPTY_DRAFT, EMPTY_ROW, type Draft, type DraftRow } from "#lib/contracts/hand-readings/draft.ts";
import { isBlank, type RowField } from "#lib/contracts/hand-readings/hand-row.ts";
import { readTimeOfDay } from "#lib/contracts/hand-readings/clock-time.ts";
import type { PastedRow } from "#lib/contracts/hand-readings/pasted-rows.ts";

export type DraftChange =
  | { readonly kind: "row"; readonly key: number; readonly part: Partial<Omit<DraftRow, "key">> }
  | { readonly kind: "add" }
  | { readonly kind: "remove"; readonly key: number }
  | { readonly kind: "restore"; readonly row: DraftRow; readonly index: number }
  | { readonly kind: "paste"; readonly key: number; readonly rows: readonly PastedRow[] }
  | { readonly kind: "column"; readonly key: number; readonly field: RowField; readonly values: readonly string[] }
  | { readonly kind: "station"; readonly part: Partial<Draft["station"]> }
  | { readonly kind: "keep"; readonly part: Partial<Draft["keep"]> }
  | { readonly kind: "rest"; readonly part: Partial<Pick<Draft, "clock" | "note">> }
  | { readonly kind: "anew" }
  /** Readings were brought in: the next station's follow, for the same event. */
  | { readonly kind: "next"; readonly event: string | null };

export function changedDraft(draft: Draft, change: DraftChange): Draft {
  switch (change.kind) {
    case "row":
      return { ...draft, rows: draft.rows.map((row) => (row.key === change.key ? changedRow(row, change.part) : row)) };
    case "add":
      return { ...draft, rows: [...draft.rows, newRow(draft.rows)] };
    case "remove":
      return { ...draft, rows: withoutRow(draft.rows, change.key) };
    case "restore":
      return { ...draft, rows: restored(draft.rows, change) };
    case "paste":
      return { ...draft, rows: withPasted(draft.rows, change) };
    case "column":
      return { ...draft, rows: withColumn(draft.rows, change) };
    case "station":
      return { ...draft, station: { ...draft.station, ...change.part } };
    case "keep":
      return { ...draft, keep: { ...draft.keep, ...change.part } };
    case "rest":
      return { ...draft, ...change.part };
    case "anew":
      return { ...EMPTY_DRAFT, station: { ...EMPTY_DRAFT.station, way: draft.station.way } };
    case "next":
      return afterBringingIn(draft, change.event);
  }
}

/** Which of two it was is said of one time only. */
function changedRow(row: DraftRow, part: Partial<Omit<DraftRow, "key">>): DraftRow {
  return { ...row, ...("date" in part || "time" in part ? { turn: null } : {}), ...part };
}

/** Keys of rows that are made grow by one from here. */
export function nextKey(rows: readonly DraftRow[]): number {
  return Math.max(0, ...rows.map(({ key }) => key)) + 1;
}

function newRow(rows: readonly DraftRow[]): DraftRow {
  return { key: nextKey(rows), ...EMPTY_ROW, date: rows.at(-1)?.date ?? "" };
}

function withoutRow(rows: readonly DraftRow[], key: number): DraftRow[] {
  const left = rows.filter((row) => row.key !== key);
  return left.length > 0 ? left : [newRow(rows)];
}

function restored(rows: readonly DraftRow[], { row, index }: { row: DraftRow; index: number }): DraftRow[] {
  const only = rows.length === 1 && rows[0] !== undefined && isBlank(rows[0]);
  const others = only ? [] : rows;
  return [...others.slice(0, index), { ...row, key: nextKey(rows) }, ...others.slice(index)];
}

/** Pasted rows stand after the one that they were pasted into, or in its place where it was blank. */
function withPasted(rows: readonly DraftRow[], { key, rows: pasted }: { key: number; rows: readonly PastedRow[] }): DraftRow[] {
  const at = rows.findIndex((row) => row.key === key);
  const into = rows[at];
  if (into === undefined) return [...rows];
  let { date } = into;
  const first = nextKey(rows);
  const made = pasted.map((row, i): DraftRow => {
    // A cell that holds no mere time of day may hold a day in a form that nobody can be sure of: it gets none from above.
    if (row.date === null && row.time !== "" && readTimeOfDay(row.time) === null) return { ...EMPTY_ROW, ...row, date: "", key: first + i };
    date = row.date ?? date;
    return { ...EMPTY_ROW, ...row, date, key: first + i };
  });
  const kept = isBlank(into) ? [] : [into];
  return [...rows.slice(0, at), ...kept, ...made, ...rows.slice(at + 1)];
}

function withColumn(rows: readonly DraftRow[], { key, field, values }: { key: number; field: RowField; values: readonly string[] }): DraftRow[] {
  const at = rows.findIndex((row) => row.key === key);
  const all = [...rows];
  if (at < 0) return all;
  while (all.length < at + values.length) all.push(newRow(all));
  return all.map((row, i) => (i < at || i >= at + values.length ? row : changedRow(row, { [field]: values[i - at] ?? "" })));
}

function afterBringingIn(draft: Draft, event: string | null): Draft {
  const { placed } = EMPTY_DRAFT.station;
  return {
    ...EMPTY_DRAFT,
    station: { way: draft.station.way, id: "", placed },
    clock: draft.clock,
    rows: [{ key: 1, ...EMPTY_ROW, date: draft.rows.at(-1)?.date ?? "" }],
    keep: event === null ? { ...draft.keep, title: "" } : { way: "event", title: "", event },
  };
}
