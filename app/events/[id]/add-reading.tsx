import { useId, useRef, useState } from "react";
import { parseMoment } from "#lib/presentation/times.ts";
import { PERIOD_WORDS, parsePeriod } from "./period-text.ts";
import type { ShownReading } from "./reading-rows.ts";
import forms from "../../_components/forms.module.css";
import styles from "./readings-panel.module.css";
import type { ChangeReadings } from "./use-work.ts";

/** Adds a reading, with the kind and the errors of the one of this station that is nearest in time. */
export function AddReading({ stationId, rows, onChange }: { stationId: string; rows: readonly ShownReading[]; onChange: ChangeReadings }) {
  const ids = { time: useId(), period: useId(), problem: useId(), hint: useId() };
  const [time, setTime] = useState("");
  const [period, setPeriod] = useState("");
  const [problems, setProblems] = useState<readonly string[]>([]);
  const first = useRef<HTMLInputElement>(null);

  const add = (): void => {
    const arrivalEpochSeconds = parseMoment(time);
    const periodSeconds = parsePeriod(period);
    setProblems([
      ...(arrivalEpochSeconds === null ? ["Time: wanted a day and a time such as 2024-02-28 14:30."] : []),
      ...(periodSeconds === null ? [`Period: wanted ${PERIOD_WORDS}.`] : []),
    ]);
    if (arrivalEpochSeconds === null || periodSeconds === null) return;
    const [nearest] = rows.toSorted((a, b) => Math.abs(a.arrivalEpochSeconds - arrivalEpochSeconds) - Math.abs(b.arrivalEpochSeconds - arrivalEpochSeconds));
    if (nearest === undefined) return;
    const { kind, arrivalSigmaSeconds, frequencySigmaHz } = nearest;
    const added = { stationId, arrivalEpochSeconds, frequencyHz: 1 / periodSeconds, kind, arrivalSigmaSeconds, frequencySigmaHz };
    onChange((before) => ({ ...before, addedReadings: [...before.addedReadings, added] }));
    setTime("");
    setPeriod("");
    first.current?.focus();
  };
  const isFaulty = problems.length > 0;
  return (
    <form
      className={styles.add}
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        add();
      }}
    >
      <label htmlFor={ids.time}>Add a reading: time, UTC</label>
      <input ref={first} id={ids.time} className={styles.time} autoComplete="off" placeholder="2024-02-28 14:30" value={time} aria-invalid={isFaulty && parseMoment(time) === null} aria-describedby={isFaulty ? ids.problem : ids.hint} onChange={({ target }) => { setTime(target.value); }} />
      <label htmlFor={ids.period}>period, s</label>
      <input id={ids.period} className={styles.period} inputMode="decimal" autoComplete="off" value={period} aria-invalid={isFaulty && parsePeriod(period) === null} aria-describedby={isFaulty ? ids.problem : ids.hint} onChange={({ target }) => { setPeriod(target.value); }} />
      <button type="submit" className={forms.button}>Add</button>
      <p id={ids.hint} className="for-screen-readers">It takes the kind and the errors of the reading that is nearest in time.</p>
      <div id={ids.problem} role="alert" className={isFaulty ? styles.problem : ""}>
        {problems.map((problem) => <p key={problem}>{problem}</p>)}
      </div>
    </form>
  );
}
