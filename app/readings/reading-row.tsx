import { useId, type ClipboardEvent, type FocusEvent, type KeyboardEvent } from "react";
import type { QualityFlag } from "#lib/core/arrival/quality.ts";
import type { DraftRow } from "#lib/contracts/hand-readings/draft.ts";
import { HAND_QUALITIES, isBlank, type ReadRow, type RowField, type RowIssue } from "#lib/contracts/hand-readings/hand-row.ts";
import { periodWords } from "#lib/presentation/line-words.ts";
import { momentWords } from "#lib/presentation/times.ts";
import { Message } from "./field.tsx";
import styles from "./form.module.css";

const QUALITY_WORDS: Readonly<Record<QualityFlag, string>> = { 1: "good", 2: "not checked", 3: "suspect", 4: "bad", 9: "missing" };

const CELLS = [
  { field: "date", label: "Date", mode: "numeric", placeholder: "2024-02-28" },
  { field: "time", label: "Time", mode: "numeric", placeholder: "14:30" },
  { field: "period", label: "Period, s", mode: "decimal", placeholder: "" },
  { field: "waves", label: "or waves", mode: "numeric", placeholder: "" },
  { field: "seconds", label: "seconds", mode: "decimal", placeholder: "" },
] as const satisfies readonly { field: RowField; label: string; mode: "numeric" | "decimal"; placeholder: string }[];

export interface RowHandlers {
  readonly onChange: (key: number, part: Partial<Omit<DraftRow, "key">>) => void;
  readonly onRemove: (key: number) => void;
  /** Goes on to the row below, or to a new one. */
  readonly onEnter: (key: number, field: RowField) => void;
  /** Gives whether the text was several cells, and so was taken. */
  readonly onPaste: (key: number, field: RowField, text: string) => boolean;
  readonly onLeave: (key: number, fields: readonly RowField[]) => void;
}

/** One reading as it is typed, with what it says and what is wrong with it. */
export function ReadingRow(props: {
  row: DraftRow;
  number: number;
  read: ReadRow;
  /** Those to be shown by now. */
  issues: readonly RowIssue[];
  suggestion: string | null;
  zone: string;
  handlers: RowHandlers;
}) {
  const { row, number, read, issues, suggestion, zone, handlers } = props;
  const id = useId();
  const messageOf = (field: RowField): RowIssue | undefined => issues.find((issue) => issue.field === field);
  const leaveRow = ({ currentTarget, relatedTarget }: FocusEvent<HTMLLIElement>): void => {
    if (!currentTarget.contains(relatedTarget)) handlers.onLeave(row.key, CELLS.map(({ field }) => field));
  };
  return (
    <li className={styles.row} onBlur={leaveRow}>
      <div role="group" aria-label={`Reading ${number}`}>
        <div className={styles.cells}>
          <span className={styles.number} aria-hidden="true">{number}</span>
          {CELLS.map(({ field, label, mode, placeholder }) => (
            <div key={field} className={styles[field]}>
              <label htmlFor={`${id}-${field}`} className={styles.label}>{label}</label>
              <input
                id={`${id}-${field}`}
                data-cell={`${row.key}-${field}`}
                className={styles.input}
                inputMode={mode}
                autoComplete="off"
                enterKeyHint="next"
                placeholder={number === 1 ? placeholder : ""}
                maxLength={200}
                value={row[field]}
                aria-invalid={messageOf(field) !== undefined}
                aria-describedby={messageOf(field) === undefined ? undefined : `${id}-${field}-message`}
                onChange={({ target }) => { handlers.onChange(row.key, { [field]: target.value }); }}
                onBlur={() => { if (row[field].trim() !== "") handlers.onLeave(row.key, [field]); }}
                onKeyDown={(event: KeyboardEvent) => {
                  if (event.key !== "Enter" || event.nativeEvent.isComposing) return;
                  event.preventDefault();
                  handlers.onEnter(row.key, field);
                }}
                onPaste={(event: ClipboardEvent) => {
                  if (handlers.onPaste(row.key, field, event.clipboardData.getData("text/plain"))) event.preventDefault();
                }}
              />
            </div>
          ))}
          <div className={styles.quality}>
            <label htmlFor={`${id}-quality`} className={`${styles.label ?? ""} ${styles.qualityLabel ?? ""}`}>Quality</label>
            <select
              id={`${id}-quality`}
              className={styles.input}
              value={row.quality}
              onChange={({ target }) => { handlers.onChange(row.key, { quality: HAND_QUALITIES.find((flag) => flag === Number(target.value)) ?? 2 }); }}
            >
              {HAND_QUALITIES.map((flag) => <option key={flag} value={flag}>{QUALITY_WORDS[flag]}</option>)}
            </select>
          </div>
          <button type="button" className={styles.remove} aria-label={`Remove reading ${number}`} title="Remove" onClick={() => { handlers.onRemove(row.key); }}>
            <span aria-hidden="true">×</span>
          </button>
        </div>
        <div className={styles.below}>
          {issues.map(({ field, message }) => <Message key={field} id={`${id}-${field}-message`} message={message} />)}
          {read.turns !== null && <Turns row={row} turns={read.turns} onChange={handlers.onChange} />}
          {suggestion !== null && !isBlank(row) && (
            <>
              <span>Earlier than the reading above.</span>
              <button type="button" className={`${styles.button ?? ""} ${styles.small ?? ""}`} onClick={() => { handlers.onChange(row.key, { date: suggestion }); }}>
                Make it {suggestion}
              </button>
            </>
          )}
          <Readout read={read} isUtc={zone === "UTC"} isCount={row.waves.trim() !== ""} />
        </div>
      </div>
    </li>
  );
}

/** What the program makes of a row, where that is more than what stands in it. */
function Readout({ read, isUtc, isCount }: { read: ReadRow; isUtc: boolean; isCount: boolean }) {
  const { reading } = read;
  if (reading === null || (isUtc && !isCount)) return null;
  const periodSeconds = reading.periodSeconds ?? 1 / (reading.frequencyHz ?? NaN);
  const sigma = reading.frequencySigmaHz === undefined ? null : reading.frequencySigmaHz * periodSeconds ** 2;
  return (
    <span className={styles.readout}>
      {isCount && periodWords(periodSeconds, sigma)}
      {isCount && !isUtc && ", "}
      {!isUtc && momentWords(read.clockEpochSeconds ?? NaN)}
    </span>
  );
}

function Turns({ row, turns, onChange }: { row: DraftRow; turns: NonNullable<ReadRow["turns"]>; onChange: RowHandlers["onChange"] }) {
  const ways = [
    { turn: "earlier", label: "the first", epochSeconds: turns.earlierEpochSeconds },
    { turn: "later", label: "the second", epochSeconds: turns.laterEpochSeconds },
  ] as const;
  const question = useId();
  return (
    <div role="radiogroup" aria-labelledby={question} className={styles.choices}>
      <span id={question} className={styles.question}>The clocks went back here. Was it</span>
      {ways.map(({ turn, label, epochSeconds }) => (
        <label key={turn} className={styles.choice}>
          <input type="radio" name={`turn-${row.key}`} checked={row.turn === turn} onChange={() => { onChange(row.key, { turn }); }} />
          {label} {row.time.trim()}, {momentWords(epochSeconds)}
        </label>
      ))}
    </div>
  );
}
