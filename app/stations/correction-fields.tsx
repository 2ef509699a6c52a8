import { ListMessage, TextField } from "./issues.tsx";
import { nextRow, type CorrectionDraft } from "./station-draft.ts";
import styles from "./station-form.module.css";

const TIME_HINT = "by its own clock, as 2004-02-01T00:00Z; empty: open";

/** How wrong the station's clock was, and over which span of its own time. */
export function CorrectionFields({ corrections, onChange }: { corrections: readonly CorrectionDraft[]; onChange: (corrections: readonly CorrectionDraft[]) => void }) {
  return (
    <section className={styles.section} aria-label="Clock corrections">
      <h2 className={styles.heading}>Clock corrections</h2>
      <p className={styles.hint}>They are taken off the readings’ times whenever an answer is worked out; the readings stay as they were brought in.</p>
      <ListMessage path="clockCorrections" />
      {corrections.map((correction, place) => {
        const of = (key: Exclude<keyof CorrectionDraft, "row">) => ({
          path: `clockCorrections[${place}].${key}`,
          value: correction[key],
          onChange: (text: string) => { onChange(corrections.map((other) => (other.row === correction.row ? { ...other, [key]: text } : other))); },
        });
        return (
          <fieldset key={correction.row} className={styles.group}>
            <legend>Clock correction {place + 1}</legend>
            <div className={styles.grid}>
              <TextField {...of("from")} label="From" hint={TIME_HINT} />
              <TextField {...of("to")} label="To" hint={TIME_HINT} />
              <TextField {...of("fastBySeconds")} label="Fast by, seconds" hint="slow: negative" input={{ inputMode: "decimal" }} />
              <TextField {...of("reason")} label="Why" className={styles.wide} />
            </div>
            <button type="button" className={styles.button} onClick={() => { onChange(corrections.filter(({ row }) => row !== correction.row)); }}>Remove clock correction {place + 1}</button>
          </fieldset>
        );
      })}
      <button type="button" className={styles.button} onClick={() => { onChange([...corrections, { row: nextRow(corrections), from: "", to: "", fastBySeconds: "", reason: "" }]); }}>Add a clock correction</button>
    </section>
  );
}
