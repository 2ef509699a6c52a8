import { useId } from "react";
import type { NumberedStation } from "#lib/core/arrival/numbered-stations.ts";
import { keptWords, type KeptAnswer } from "#lib/presentation/kept-words.ts";
import { KeepForm } from "./keep-form.tsx";
import styles from "./kept-answers.module.css";

/** What was kept of this event, latest first, and the way to keep what the page shows now. */
export function KeptAnswers(props: {
  eventId: string;
  /** Latest first. */
  kept: readonly KeptAnswer[];
  stations: readonly NumberedStation[];
  without: readonly string[];
  isBehind: boolean;
}) {
  const { kept, stations } = props;
  const heading = useId();
  return (
    <section className={styles.kept} aria-labelledby={heading}>
      <h2 id={heading} className={styles.heading}>Kept answers</h2>
      <KeepForm {...props} latestNumber={kept[0]?.number ?? 0} />
      {kept.length === 0 ? (
        <p className={styles.none}>None kept yet.</p>
      ) : (
        <ol className={styles.list}>
          {kept.map((one) => <Entry key={one.number} kept={one} stations={stations} />)}
        </ol>
      )}
    </section>
  );
}

function Entry({ kept, stations }: { kept: KeptAnswer; stations: readonly NumberedStation[] }) {
  const { what, who, leftOut } = keptWords(kept, stations);
  return (
    <li>
      <b className={styles.number}>{kept.number}</b>
      <div className={styles.entry}>
        <p>{what}</p>
        <p className={styles.who}>{who}</p>
        {leftOut !== null && <p>{leftOut}</p>}
        {kept.reason !== "" && <p className={styles.reason}>{kept.reason}</p>}
      </div>
    </li>
  );
}
