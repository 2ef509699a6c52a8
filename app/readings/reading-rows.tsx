import { useState } from "react";
import { flushSync } from "react-dom";
import type { Draft, DraftRow } from "#lib/contracts/hand-readings/draft.ts";
import { ROW_FIELDS, isBlank, type ReadRow, type RowField, type RowIssue } from "#lib/contracts/hand-readings/hand-row.ts";
import { suggestedDate } from "#lib/contracts/hand-readings/next-day.ts";
import { pastedColumn, pastedRows } from "#lib/contracts/hand-readings/pasted-rows.ts";
import { nextKey, type DraftChange } from "./draft-changes.ts";
import styles from "./form.module.css";
import { ReadingRow, type RowHandlers } from "./reading-row.tsx";

/** The readings, one below the other, filled by keyboard, number pad or paste. */
export function ReadingRows(props: {
  draft: Draft;
  reads: readonly ReadRow[];
  zone: string;
  stationZone: string | null;
  shownIssues: (row: DraftRow, read: ReadRow) => readonly RowIssue[];
  onLeave: RowHandlers["onLeave"];
  change: (change: DraftChange) => void;
}) {
  const { draft, reads, zone, stationZone, shownIssues, change } = props;
  const { rows } = draft;
  const [removed, setRemoved] = useState<{ row: DraftRow; index: number } | null>(null);
  const [leftOut, setLeftOut] = useState<readonly string[]>([]);
  const handlers = useRowHandlers({ rows, zone, change, onLeave: props.onLeave, onRemoved: setRemoved, onLeftOut: setLeftOut });
  return (
    <fieldset className={styles.section}>
      <legend className={styles.heading}>Readings</legend>
      <ClockChoice clock={draft.clock} stationZone={stationZone} change={change} />
      <p className={styles.hint}>
        Give the period, or count waves and the seconds they took, from the moment in Time on. Rows of a spreadsheet can be pasted: time and period, or time, waves and seconds.
      </p>
      <ol className={styles.rows}>
        {rows.map((row, i) => (
          <ReadingRow
            key={row.key}
            {...{ row, zone, handlers }}
            number={i + 1}
            read={reads[i] ?? { issues: [], reading: null, clockEpochSeconds: null, turns: null }}
            issues={reads[i] === undefined ? [] : shownIssues(row, reads[i])}
            suggestion={suggestedDate(row, rows[i - 1])}
          />
        ))}
      </ol>
      <div className={styles.actions}>
        <button type="button" className={styles.button} onClick={() => { addRow(change); }}>Add a reading</button>
        {removed !== null && (
          <button
            type="button"
            className={styles.button}
            data-restore
            onClick={() => {
              flushSync(() => {
                change({ kind: "restore", ...removed });
                setRemoved(null);
              });
              focusCells("time")[removed.index]?.focus();
            }}
          >
            Restore reading {removed.index + 1}
          </button>
        )}
      </div>
      <p role="status" className={styles.hint}>
        {leftOut.length > 0 && `Left out of what was pasted, for there is no number in it: ${leftOut.join("; ")}.`}
      </p>
    </fieldset>
  );
}

function ClockChoice({ clock, stationZone, change }: { clock: Draft["clock"]; stationZone: string | null; change: (change: DraftChange) => void }) {
  const isLocal = clock === "station" && stationZone !== null;
  return (
    <div role="radiogroup" aria-label="Clock times in" className={styles.choices}>
      <label className={styles.choice}>
        <input type="radio" name="clock" checked={!isLocal} onChange={() => { change({ kind: "rest", part: { clock: "utc" } }); }} />
        Clock times in UTC
      </label>
      <label className={styles.choice}>
        <input type="radio" name="clock" checked={isLocal} disabled={stationZone === null} onChange={() => { change({ kind: "rest", part: { clock: "station" } }); }} />
        {stationZone === null ? "local time (no time zone of the station is known)" : `local time, ${stationZone}`}
      </label>
    </div>
  );
}

function useRowHandlers(given: {
  rows: readonly DraftRow[];
  zone: string;
  change: (change: DraftChange) => void;
  onLeave: RowHandlers["onLeave"];
  onRemoved: (removed: { row: DraftRow; index: number }) => void;
  onLeftOut: (lines: readonly string[]) => void;
}): RowHandlers {
  const { rows, zone, change, onLeave, onRemoved, onLeftOut } = given;
  return {
    onLeave,
    onChange: (key, part) => { change({ kind: "row", key, part }); },
    onRemove: (key) => {
      const index = rows.findIndex((row) => row.key === key);
      const row = rows[index];
      if (row === undefined) return;
      flushSync(() => {
        onRemoved({ row, index });
        change({ kind: "remove", key });
      });
      document.querySelector<HTMLElement>("[data-restore]")?.focus();
    },
    onEnter: (key, field) => {
      const next = rows[rows.findIndex((row) => row.key === key) + 1];
      const last = rows.at(-1);
      if (next === undefined && last !== undefined && !isBlank(last)) addRow(change);
      else if (next !== undefined) document.querySelector<HTMLElement>(`[data-cell="${next.key}-${field}"]`)?.focus();
    },
    onPaste: (key, field, text) => {
      const pasted = pastedRows(text, zone);
      if (pasted !== null) {
        onLeftOut(pasted.leftOut);
        change({ kind: "paste", key, rows: pasted.rows });
        // Nobody will go through these fields one by one: what is wrong with them is said at once.
        for (const place of pasted.rows.keys()) onLeave(nextKey(rows) + place, ROW_FIELDS);
        return true;
      }
      const values = pastedColumn(text);
      if (values === null) return false;
      change({ kind: "column", key, field, values });
      return true;
    },
  };
}

/** A new row has the date of the one above, so its time is next. */
function addRow(change: (change: DraftChange) => void): void {
  flushSync(() => { change({ kind: "add" }); });
  focusCells("time").at(-1)?.focus();
}

function focusCells(field: RowField): HTMLElement[] {
  return [...document.querySelectorAll<HTMLElement>(`[data-cell$="-${field}"]`)];
}
