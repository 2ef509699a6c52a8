import { useEffect, useId, useState } from "react";
import { askServer, type Asked } from "../../_components/ask-server.ts";
import type { NumberedStation } from "#lib/core/arrival/numbered-stations.ts";
import { changeWords, type KeptDifference } from "#lib/presentation/change-words.ts";
import type { DistanceUnit } from "#lib/presentation/distances.ts";
import forms from "../../_components/forms.module.css";
import styles from "./kept-answers.module.css";

/** What is different between any two kept answers; the latest and the one before it to begin with. */
export function KeptChanges({ eventId, numbers, stations, unit }: { eventId: string; numbers: readonly number[]; stations: readonly NumberedStation[]; unit: DistanceUnit }) {
  const [to, setTo] = useState(numbers[0] ?? 0);
  const [since, setSince] = useState(numbers[1] ?? 0);
  const difference = useDifference(eventId, { to, since });
  const heading = useId();
  const nameOf = (id: string): string => {
    const station = stations.find((one) => one.id === id);
    return station === undefined ? id : `${station.number}\u00a0${station.name}`;
  };
  return (
    <div className={styles.changes}>
      <h3 id={heading} className={styles.heading}>What changed</h3>
      <p className={styles.action}>
        <Choice label="In number" value={to} numbers={numbers} onChange={setTo} />
        <Choice label="since number" value={since} numbers={numbers} onChange={setSince} />
      </p>
      <div role="status" aria-labelledby={heading}>
        {difference?.kind === "done" && (
          <ul>
            {changeWords(difference.reply, { nameOf, unit }).map((sentence) => <li key={sentence}>{sentence}</li>)}
          </ul>
        )}
        {difference !== null && difference.kind !== "done" && difference.issues.map(({ message }) => <p key={message}>{message}</p>)}
      </div>
    </div>
  );
}

function Choice({ label, value, numbers, onChange }: { label: string; value: number; numbers: readonly number[]; onChange: (number: number) => void }) {
  const id = useId();
  return (
    <>
      <label htmlFor={id}>{label}</label>
      <select id={id} className={forms.choice} value={value} onChange={({ target }) => { onChange(Number(target.value)); }}>
        {numbers.map((number) => <option key={number}>{number}</option>)}
      </select>
    </>
  );
}

/** Null while it is being asked for. */
function useDifference(eventId: string, { to, since }: { to: number; since: number }): Asked<KeptDifference> | null {
  const [found, setFound] = useState<{ of: string; difference: Asked<KeptDifference> } | null>(null);
  const path = `/api/v1/events/${encodeURIComponent(eventId)}/localizations/${to}/changes?since=${since}`;
  useEffect(() => {
    const asked = { isCurrent: true };
    void askServer<KeptDifference>(path, { unheard: "The server did not answer. Choose again to ask once more." }).then((difference) => {
      if (asked.isCurrent) setFound({ of: path, difference });
    });
    return () => { asked.isCurrent = false; };
  }, [path]);
  return found?.of === path ? found.difference : null;
}
